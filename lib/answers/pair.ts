import type { TideSystem } from '../campaign/campaign.js';
import { CampaignError, type Fault, type Warning } from '../campaign/fault.js';
import { geodesicDistanceM } from '../earth/geodesic-distance.js';
import { degToRad } from '../quantity/radians.js';
import { campaignOfPair, checkPair, GEOID, type PairInput, type PairSite } from './pair-campaign.js';
import { pairWarnings } from './pair-warnings.js';
import { predict } from './predict.js';
import type { BudgetRow, Estimate, Prediction } from './prediction.js';

export type { PairInput, PairSite } from './pair-campaign.js';

/** Rows of the budget that name one source stand together; the others are groups of one. */
export interface PairBudgetGroup {
  /** `geoid` for the two ζ or N where they are correlated; null for a single input */
  readonly source: 'geoid' | null;
  readonly correlation: number | null;
  /** root of the group's variance of y, as y; null where the group's share is negative */
  readonly uy: number | null;
  readonly share: number;
  readonly rows: readonly BudgetRow[];
}

export interface PairAnswer {
  readonly format: 'plumbtick-pair/1';
  readonly tide: TideSystem;
  readonly sites: readonly {
    readonly id: 'a' | 'b';
    readonly name: string;
    readonly W: Estimate;
    readonly C: Estimate;
  }[];
  /** geodesic distance on GRS80, m */
  readonly distanceM: number;
  /** W_A − W_B in `tide`, m²/s² */
  readonly dW: Estimate;
  /** (ν_B − ν_A)/ν by gravity alone, mean tide; positive when B is higher */
  readonly y: Estimate;
  /** length equivalent dW/ḡ, m */
  readonly dH: Estimate;
  /** normal height of B minus that of A, m */
  readonly dHNormal: Estimate;
  /** for the transition asked for, Hz */
  readonly offsetHz: Readonly<Record<string, Estimate>>;
  /** inputs by option name: `a-h`, `b-zeta`, `a-g`, … */
  readonly budget: readonly BudgetRow[];
  readonly groups: readonly PairBudgetGroup[];
  readonly warnings: readonly Warning[];
}

/** Warnings of a campaign that two sites with one model say better: by what they do to the difference. */
const RESTATED = new Set(['tide-label-missing', 'default-gravity']);

/** Two sites by GNSS and a (quasi)geoid model, marker to marker: potential difference, offset and what limits it.
 *  A campaign of two clocks at their markers, answered by {@link predict}.
 * @throws {CampaignError} with faults whose paths are option names (`a-lat`, `b-zeta`, `correlation`) */
export function pair(input: PairInput): PairAnswer {
  checkPair(input);
  const prediction = answer(input);
  const link = prediction.links[0]!;
  const { dW, y, dH, dHNormal, offsetHz } = link;
  if (!dW || !y || !dH || !dHNormal || !offsetHz) throw new Error('pair: a site without a level');
  const budget = link.budget.map((row) => ({ ...row, input: optionOf(row.input) }));
  return {
    format: 'plumbtick-pair/1',
    tide: prediction.tide,
    sites: prediction.sites.map(({ W, C }, i) => ({
      id: i === 0 ? 'a' : 'b',
      name: (i === 0 ? input.a : input.b).name,
      W: W!,
      C: C!,
    })),
    distanceM: distanceM(input),
    dW,
    y,
    dH,
    dHNormal,
    offsetHz: input.transition === null ? {} : { [input.transition]: offsetHz },
    budget,
    groups: groupsOf(budget, input, y),
    warnings: [
      ...prediction.warnings
        .filter(({ code }) => !RESTATED.has(code))
        .map((warning) => ({ ...warning, path: optionOf(warning.path) })),
      ...pairWarnings(input, link, (changed) => answer(changed).links[0]!),
    ],
  };
}

function distanceM({ a, b }: PairInput): number {
  const position = (site: PairSite) => ({
    latitudeRad: degToRad(site.latitudeDeg),
    longitudeRad: degToRad(site.longitudeDeg),
  });
  return geodesicDistanceM(position(a), position(b));
}

const answer = (input: PairInput): Prediction => {
  try {
    return predict(campaignOfPair(input));
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    throw new CampaignError(error.faults.map((fault): Fault => ({ ...fault, path: optionOf(fault.path) })));
  }
};

/** Path in the campaign → name of the option it came from. */
function optionOf(path: string): string {
  const place = /^(?:sites|clocks)\.([ab])\b(?:\.determinations\.0)?(?:\.(\w+))?/.exec(path);
  if (place) return place[2] === undefined ? place[1]! : `${place[1]}-${place[2].toLowerCase()}`;
  if (path.startsWith(`sources.${GEOID}`) || path.startsWith('sources.0')) return 'correlation';
  return path;
}

function groupsOf(budget: readonly BudgetRow[], { correlation }: PairInput, y: Estimate): PairBudgetGroup[] {
  const isGeoid = ({ input }: BudgetRow) => /-(zeta|n)$/.test(input);
  const geoid = budget.filter(isGeoid);
  const together = correlation !== null && correlation !== 0 && geoid.length === 2;
  const group = (source: 'geoid' | null, rows: readonly BudgetRow[]): PairBudgetGroup => {
    const share = rows.reduce((sum, row) => sum + row.share, 0);
    return {
      source,
      correlation: source ? correlation : null,
      uy: share >= 0 ? y.u * Math.sqrt(share) : null,
      share,
      rows,
    };
  };
  const groups = together
    ? [group('geoid', geoid), ...budget.filter((row) => !isGeoid(row)).map((row) => group(null, [row]))]
    : budget.map((row) => group(null, [row]));
  return groups.sort((one, other) => Math.abs(other.share) - Math.abs(one.share));
}
