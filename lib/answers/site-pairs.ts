import { geodesicDistanceM } from '../earth/geodesic-distance.js';
import type { Model } from '../model/model.js';
import { gradientOf } from '../uncertainty/gradient.js';
import type { ErrorSource, Place } from '../uncertainty/inputs.js';
import { correlationBetweenPlaces } from '../uncertainty/place-correlation.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** What a shared error source does to the difference of the two inputs that name it, one at each of two sites. */
export interface SharedError {
  /** what the two inputs are: the key in the file, `zeta`, `N`, `h`, `g` … */
  readonly quantity: string;
  /** correlation of the source between the two sites */
  readonly correlation: number;
  /** standard uncertainty of the difference of the two inputs, SI */
  readonly uDifference: number;
  /** the same if the two were independent, SI */
  readonly uIfApart: number;
}

export interface SitePair {
  /** ids, in file order */
  readonly sites: readonly [string, string];
  /** geodesic distance on GRS80, m */
  readonly distanceM: number;
  /** ids of the links between clocks of the two */
  readonly links: readonly string[];
  /** null where not both sites have an input that names the source */
  readonly shared: SharedError | null;
}

/** The sites two by two, nearest first: how far apart they are, and what they have in common of a source's error.
 * @param source id of a source; null: distances only */
export function sitePairs({ model }: SolvedCampaign, source: string | null): readonly SitePair[] {
  const { sites, links, clocks } = model.campaign;
  const siteOf = new Map(clocks.map(({ id, site }) => [id, site]));
  const inputOf = new Map(sites.map(({ id }) => [id, source === null ? null : firstInputOf(model, id, source)]));
  const pairs = sites.flatMap((a, i) =>
    sites.slice(i + 1).map((b): SitePair => {
      const [p, q] = [inputOf.get(a.id) ?? null, inputOf.get(b.id) ?? null];
      return {
        sites: [a.id, b.id],
        distanceM: geodesicDistanceM(a, b),
        links: links
          .filter(({ from, to }) => {
            const ends = [siteOf.get(from), siteOf.get(to)];
            return ends.includes(a.id) && ends.includes(b.id) && ends[0] !== ends[1];
          })
          .map(({ id }) => id),
        shared: source === null || p === null || q === null ? null : sharedError(model, source, p, q),
      };
    }),
  );
  return pairs.sort((a, b) => a.distanceM - b.distanceM);
}

/** Ids of the sources that inputs of at least two sites name, in file order. */
export const sourcesBetweenSites = ({ model }: SolvedCampaign): readonly string[] =>
  model.campaign.sources
    .map(({ id }) => id)
    .filter((id) => model.campaign.sites.filter((site) => firstInputOf(model, site.id, id) !== null).length > 1);

/** Index of the first input of a site that names the source. */
function firstInputOf({ inputs }: Model, site: string, source: string): number | null {
  const found = inputs.findIndex(
    ({ path, parts }) => path.startsWith(`sites.${site}.`) && parts.some((part) => part.source === source),
  );
  return found < 0 ? null : found;
}

function sharedError({ inputs, covariance }: Model, source: string, p: number, q: number): SharedError {
  const of = covariance.sources.find(({ id }) => id === source)!;
  return {
    quantity: inputs[p]!.path.split('.').at(-1)!,
    correlation: correlationOf(of, inputs[p]!.place, inputs[q]!.place),
    uDifference: Math.sqrt(
      covariance.variance(
        gradientOf([
          [p, 1],
          [q, -1],
        ]),
      ),
    ),
    uIfApart: Math.hypot(inputs[p]!.u, inputs[q]!.u),
  };
}

function correlationOf(source: ErrorSource, a: Place, b: Place): number {
  if (source.correlationLengthM !== null) return correlationBetweenPlaces([a, b], source.correlationLengthM)[1]!;
  return source.between?.(a, b) ?? source.correlation ?? 1;
}
