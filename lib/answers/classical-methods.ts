import type { Campaign, Determination, GnssModel, LevellingModel, Measured, Site } from '../campaign/campaign.js';
import { levellingUncertaintyM } from '../model/levelling-line.js';

/** A levelling model with where it comes from: `option`, a class, `methods`, or `levelled-from` lines. */
export interface LevellingOverDistance extends LevellingModel {
  readonly origin: string;
}

/** One piece of what a height by GNSS and (quasi)geoid is uncertain by at a site. */
export interface GnssPiece {
  /** m² at each of two sites */
  readonly variance: number;
  /** correlation between the sites at any distance, where there is no length */
  readonly correlation: number;
  readonly correlationLengthM: number | null;
}

/** u² = 2·Σ variance·(1 − ρ(d)). */
export interface GnssOverDistance {
  readonly pieces: readonly GnssPiece[];
  readonly origin: string;
  /** from the file's own determinations: then each link has a value of its own, by the covariance of its two sites */
  readonly ofFile: boolean;
}

/** u of levelling over a geodesic distance, m. */
export const levellingOverDistanceM = ({ bRootM, k, detour }: LevellingModel, distanceM: number): number =>
  levellingUncertaintyM(detour * distanceM, bRootM, k);

/** Half the way round the Earth, m: no two sites are farther apart. */
const FAR_M = 2.0037e7;

/** Distance at which levelling is as uncertain as a length, m; null where on Earth it never is.
 *  b²·L + k²·L² = u², in the form whose terms don't cancel: L = 2u²/(b² + √(b⁴ + 4k²u²)). */
export function levellingDistanceForUncertaintyM(model: LevellingModel, uM: number): number | null {
  const b2 = model.bRootM ** 2;
  const root = Math.sqrt(b2 * b2 + 4 * model.k ** 2 * uM * uM);
  const distanceM = (2 * uM * uM) / (b2 + root) / model.detour;
  return distanceM <= FAR_M ? distanceM : null;
}

const correlationOver = ({ correlation, correlationLengthM }: GnssPiece, distanceM: number): number =>
  correlationLengthM === null ? correlation : Math.exp(-distanceM / correlationLengthM);

/** u of a height difference by GNSS and (quasi)geoid between two sites, m. */
export const gnssUncertaintyM = ({ pieces }: GnssOverDistance, distanceM: number): number =>
  Math.sqrt(
    Math.max(0, 2 * pieces.reduce((s, p) => s + p.variance * Math.max(0, 1 - correlationOver(p, distanceM)), 0)),
  );

/** From here on a crossing is looked for, m. */
const NEAR_M = 1;

/** First distance at which a rising u reaches a value, m; 0 where it lies above it from the start, null where it never does. */
export function smallestDistanceM(u: (distanceM: number) => number, valueM: number): number | null {
  if (u(NEAR_M) >= valueM) return 0;
  if (!(u(FAR_M) >= valueM)) return null;
  let [low, high] = [NEAR_M, FAR_M];
  while (high / low > 1 + 1e-12) {
    const middle = Math.sqrt(low * high);
    if (u(middle) >= valueM) high = middle;
    else low = middle;
  }
  return high;
}

export const fromGnssModel = (
  { hM, geoidM, correlation, correlationLengthM }: GnssModel,
  origin: string,
): GnssOverDistance => ({
  pieces: [
    { variance: hM * hM, correlation: 0, correlationLengthM: null },
    { variance: geoidM * geoidM, correlation, correlationLengthM },
  ],
  origin,
  ofFile: false,
});

type Line = Determination & { readonly kind: 'levelled-from' };

/** The root mean square of b and of k over the lines that state them; null without such a line. */
export function levellingInFile({ sites }: Campaign): LevellingOverDistance | null {
  const lines = sites.flatMap((s) => s.determinations.filter((d): d is Line => d.kind === 'levelled-from'));
  const stated = lines.filter(({ b, k }) => b !== undefined || k !== undefined);
  if (stated.length === 0) return null;
  const meanSquare = (of: (line: Line) => number) => stated.reduce((s, l) => s + of(l) ** 2, 0) / stated.length;
  return {
    bRootM: Math.sqrt(meanSquare(({ b }) => b?.value ?? 0)),
    k: Math.sqrt(meanSquare(({ k }) => k?.value ?? 0)),
    detour: 1,
    origin: 'levelled-from',
  };
}

/** What the GNSS determinations of the file are uncertain by at a site on average, by source; null without two of them.
 * @param of ids of the sites that count; all if not given */
export function gnssInFile({ sites, sources }: Campaign, of?: readonly string[]): GnssOverDistance | null {
  const at = sites.filter(({ id }) => of?.includes(id) ?? true).flatMap((site) => gnssOf(site));
  if (at.length < 2) return null;
  const bySource = new Map<string | null, number>();
  for (const { parts } of at.flat())
    for (const { u, source } of parts) bySource.set(source, (bySource.get(source) ?? 0) + (u * u) / at.length);
  const pieces = [...bySource].map(([id, variance]): GnssPiece => {
    const source = sources.find((s) => s.id === id);
    return {
      variance,
      correlation: source === undefined ? 0 : (source.correlation ?? 1),
      correlationLengthM: source?.correlationLengthM ?? null,
    };
  });
  return { pieces, origin: 'gnss', ofFile: true };
}

/** h and ζ or N of a site's first GNSS determination. */
function gnssOf(site: Site): readonly (readonly Measured[])[] {
  const d = site.determinations.find((one) => one.kind === 'gnss-quasigeoid' || one.kind === 'gnss-geoid');
  if (d === undefined) return [];
  const h = ('h' in d ? d.h : null) ?? site.h;
  const geoid = d.kind === 'gnss-geoid' ? d.N : d.kind === 'gnss-quasigeoid' ? d.zeta : null;
  return [[h, geoid].filter((m): m is Measured => m !== null)];
}
