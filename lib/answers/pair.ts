import type { TideSystem } from '../campaign/campaign.js';
import { CampaignError, type Fault, type Warning } from '../campaign/fault.js';
import { readCampaignValue } from '../campaign/read.js';
import { geodesicDistanceM } from '../earth/geodesic-distance.js';
import { degToRad } from '../quantity/radians.js';
import { predict } from './predict.js';
import type { BudgetRow, Estimate, LinkPrediction, Prediction } from './prediction.js';

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

const SYSTEMS: readonly TideSystem[] = ['mean', 'zero', 'free'];
const GEOID = 'geoid';
/** An example of what one model at both sites does, for the warning that none was stated. */
const SHARED_EXAMPLE = 0.9;

/** Two sites by GNSS and a (quasi)geoid model, marker to marker: potential difference, offset and what limits it.
 *  A campaign of two clocks at their markers, answered by {@link predict}.
 * @throws {CampaignError} with faults whose paths are option names (`a-lat`, `b-zeta`, `correlation`) */
export function pair(input: PairInput): PairAnswer {
  const { prediction, warnings } = answer(input);
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
      ...[...warnings, ...prediction.warnings]
        .filter(({ code }) => code !== 'tide-label-missing')
        .map((warning) => ({ ...warning, path: optionOf(warning.path) })),
      ...tideWarnings(input, link),
      ...correlationWarning(input, y, dW, dH),
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

function answer(input: PairInput): { readonly prediction: Prediction; readonly warnings: readonly Warning[] } {
  try {
    const { campaign, warnings } = readCampaignValue(campaignValue(input));
    return { prediction: predict(campaign), warnings };
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
    throw new CampaignError(error.faults.map((fault): Fault => ({ ...fault, path: optionOf(fault.path) })));
  }
}

/** The campaign of two clocks that stand on their markers. */
function campaignValue({ a, b, tide, hTide, geoidTide, correlation, transition }: PairInput) {
  const measured = ({ value, u }: Estimate, more: Record<string, unknown> = {}) => ({ value, u, ...more });
  const labelled = (system: TideSystem | null) => (system === null ? {} : { tide: system });
  const shared = correlation === null ? {} : { source: GEOID };
  const site = (id: string, { latitudeDeg, longitudeDeg, hM, zetaM, nM, gMs2 }: PairSite) => ({
    id,
    lat: latitudeDeg,
    lon: longitudeDeg,
    h: measured(hM, labelled(hTide)),
    ...(gMs2 ? { g: measured(gMs2) } : {}),
    determinations: [
      zetaM
        ? { kind: 'gnss-quasigeoid', zeta: measured(zetaM, { ...labelled(geoidTide), ...shared }) }
        : { kind: 'gnss-geoid', ...(nM ? { N: measured(nM, { ...labelled(geoidTide), ...shared }) } : {}) },
    ],
  });
  const clock = (id: string) => ({ id, site: id, transition: transition ?? '87Sr' });
  return {
    format: 'plumbtick-campaign/1',
    tide,
    sources: correlation === null ? [] : [{ id: GEOID, correlation }],
    sites: [site('a', a), site('b', b)],
    clocks: [clock('a'), clock('b')],
    links: [{ id: 'ab', from: 'a', to: 'b' }],
  };
}

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

/** A label missing at both sites is the same mistake twice: what counts is its difference, found by trying the other systems. */
function tideWarnings(input: PairInput, { dH, y }: LinkPrediction): Warning[] {
  const missing = [
    { option: 'h-tide', key: 'hTide', what: 'h', taken: 'free' },
    { option: 'geoid-tide', key: 'geoidTide', what: input.a.zetaM ? 'ζ' : 'N', taken: 'zero' },
  ] as const;
  return missing.flatMap(({ option, key, what, taken }) => {
    if (input[key] !== null) return [];
    const others = SYSTEMS.filter((system) => system !== taken).map((system) => {
      const link = answer({ ...input, [key]: system }).prediction.links[0]!;
      return { system, dH: link.dH!.value - dH!.value, y: link.y!.value - y!.value };
    });
    const worst = others.reduce((one, other) => (Math.abs(other.y) > Math.abs(one.y) ? other : one));
    return [
      {
        code: 'tide-label-missing',
        path: option,
        message: `no permanent-tide label for ${what}; taken as ${taken} at both sites. If it is ${worst.system}, the difference is off by ${sizeText(worst.dH, worst.y)}. Write ${option}="${taken}" or what is right.`,
      },
    ];
  });
}

function correlationWarning(input: PairInput, y: Estimate, dW: Estimate, dH: Estimate): Warning[] {
  const geoid = [input.a.zetaM ?? input.a.nM, input.b.zetaM ?? input.b.nM];
  if (input.correlation !== null || geoid.some((one) => !one || one.u === 0)) return [];
  const metresPerY = dW.value === 0 ? 0 : dH.value / y.value;
  const shared = answer({ ...input, correlation: SHARED_EXAMPLE }).prediction.links[0]!.y!;
  const length = (uy: number) => `${(1000 * Math.abs(metresPerY) * uy).toPrecision(2)} mm`;
  const symbol = input.a.zetaM && input.b.zetaM ? 'ζ' : input.a.zetaM || input.b.zetaM ? 'ζ and N' : 'N';
  return [
    {
      code: 'correlation-missing',
      path: 'correlation',
      message: `the errors of ${symbol} at the two sites are taken as independent. If one model serves both, what they share cancels: with ρ = ${SHARED_EXAMPLE} u would be ${length(shared.u)} instead of ${length(y.u)}. Write correlation="0" or what is right.`,
    },
  ];
}

const sizeText = (metres: number, y: number): string =>
  `${Number((1000 * Math.abs(metres)).toPrecision(2))} mm (${Math.abs(y).toExponential(1)})`;
