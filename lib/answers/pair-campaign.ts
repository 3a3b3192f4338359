import type { Campaign, Clock, Measured, Site, TideSystem } from '../campaign/campaign.js';
import { CampaignError, type Fault, faultAt } from '../campaign/fault.js';
import { LOVE_NUMBERS } from '../earth/permanent-tide.js';
import { degToRad } from '../quantity/radians.js';
import { GRAVITY_RANGE_MS2 } from './floors.js';
import type { Estimate } from './prediction.js';

/** Id of the source that the two ζ or N share. */
export const GEOID = 'geoid';

/** One of two sites: where it is and what its height comes from. */
export interface PairSite {
  readonly name: string;
  /** geodetic, degrees, north and east positive */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  /** ellipsoidal height h, m */
  readonly hM: Estimate;
  /** height anomaly ζ, or geoid height N, m: exactly one of the two */
  readonly zetaM: Estimate | null;
  readonly nM: Estimate | null;
  /** gravity at the marker, m/s²; null: normal gravity there */
  readonly gMs2: Estimate | null;
}

export interface PairInput {
  readonly a: PairSite;
  readonly b: PairSite;
  /** permanent-tide system of the printed potentials */
  readonly tide: TideSystem;
  /** system in which both h, and both ζ or N, are given; null: not known, taken as tide-free and zero-tide with a warning */
  readonly hTide: TideSystem | null;
  readonly geoidTide: TideSystem | null;
  /** correlation of the errors of the two ζ or N, −1…1; null: not known, taken as 0 with a warning */
  readonly correlation: number | null;
  /** transition for the offset in hertz, with a recommended frequency; null: none wanted */
  readonly transition: string | null;
}

/** The campaign of two clocks that stand on their markers. Built from numbers, not read from a file: a page with two sites
 *  then needs nothing of the reader. */
export function campaignOfPair({ a, b, tide, hTide, geoidTide, correlation, transition }: PairInput): Campaign {
  const measured = ({ value, u }: Estimate, label: TideSystem | null, source: string | null): Measured => ({
    value,
    u,
    parts: u > 0 ? [{ u, source }] : [],
    distribution: 'normal',
    dof: null,
    tide: label,
    text: null,
  });
  const shared = correlation === null ? null : GEOID;
  const fitted = { check: false, candidate: false, cost: null, datum: 'ihrs', h: null } as const;
  const site = (id: string, { name, latitudeDeg, longitudeDeg, hM, zetaM, nM, gMs2 }: PairSite): Site => ({
    id,
    name,
    latitudeRad: degToRad(latitudeDeg),
    longitudeRad: degToRad(longitudeDeg),
    h: measured(hM, hTide, null),
    g: gMs2 && measured(gMs2, null, null),
    gradient: null,
    variable: null,
    determinations: [
      ...(zetaM ? [{ ...fitted, kind: 'gnss-quasigeoid' as const, zeta: measured(zetaM, geoidTide, shared) }] : []),
      ...(nM
        ? [
            {
              ...fitted,
              kind: 'gnss-geoid' as const,
              N: measured(nM, geoidTide, shared),
              g: null,
              meanGravityFactor: null,
            },
          ]
        : []),
    ],
    candidate: false,
    cost: null,
  });
  const instrument = {
    systematic: [],
    stability: { white: 0, flicker: 0, phase: 0 },
    uptime: 1,
    available: null,
    candidate: false,
    cost: null,
  };
  // y is that of gravity alone: any transition gives the same
  const clock = (id: string): Clock => ({ ...instrument, id, site: id, transition: transition ?? '87Sr', tie: [] });
  return {
    format: 'plumbtick-campaign/1',
    tide,
    window: null,
    targetM: null,
    effectM: null,
    love: LOVE_NUMBERS,
    sources: correlation === null ? [] : [{ id: GEOID, correlation }],
    datums: [],
    transitions: [],
    sites: [site('a', a), site('b', b)],
    clocks: [clock('a'), clock('b')],
    links: [{ ...instrument, id: 'ab', from: 'a', to: 'b', kind: null, lengthM: null, segments: 1 }],
    measurements: [],
    correlations: [],
  };
}

/** What the options' reader refuses, for callers that come with numbers. */
export function checkPair({ a, b, correlation }: PairInput): void {
  const faults: Fault[] = [];
  const refuse = (good: boolean, option: string, found: unknown, expected: string) => {
    if (!good) faults.push(faultAt('out-of-range', option, String(found), expected));
  };
  for (const [id, { latitudeDeg, longitudeDeg, hM, zetaM, nM, gMs2 }] of Object.entries({ a, b })) {
    refuse(Math.abs(latitudeDeg) <= 90, `${id}-lat`, latitudeDeg, 'a latitude from −90° to 90°');
    refuse(longitudeDeg >= -180 && longitudeDeg <= 360, `${id}-lon`, longitudeDeg, 'a longitude from −180° to 360°');
    for (const [name, measured, low, high] of [
      ['h', hM, -12_000, 9_000],
      ['zeta', zetaM, -120, 120],
      ['n', nM, -120, 120],
      ['g', gMs2, ...GRAVITY_RANGE_MS2],
    ] as const) {
      if (!measured) continue;
      const { value, u } = measured;
      refuse(value >= low && value <= high, `${id}-${name}`, value, `${low} to ${high}, SI`);
      refuse(
        u >= 0 && u < Number.POSITIVE_INFINITY,
        `${id}-${name}`,
        `u = ${u}`,
        'a standard uncertainty of 0 or more',
      );
    }
    refuse((zetaM === null) !== (nM === null), `${id}-zeta`, zetaM ? 'both' : 'none', 'either ζ or N');
  }
  refuse(correlation === null || Math.abs(correlation) <= 1, 'correlation', correlation, 'a number from −1 to 1');
  if (faults.length > 0) throw new CampaignError(faults);
}
