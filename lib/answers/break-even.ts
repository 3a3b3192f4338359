import type { Campaign, GnssModel, LevellingModel, Link } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { linkPhaseNoise } from '../clocks/averaging.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { geodesicDistanceM } from '../earth/geodesic-distance.js';
import { clocksOfLink, type Model, siteOfClock } from '../model/model.js';
import { combineGradients } from '../uncertainty/gradient.js';
import {
  fromGnssModel,
  type GnssOverDistance,
  gnssInFile,
  gnssUncertaintyM,
  type LevellingOverDistance,
  levellingDistanceForUncertaintyM,
  levellingInFile,
  levellingOverDistanceM,
  smallestDistanceM,
} from './classical-methods.js';
import { type LinkBudget, linkBudget, type PlanLimit, planPoint } from './plan-budget.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** What is taken instead of what the campaign says. */
export interface BreakEvenOptions {
  /** wall-clock time of the comparison, s; else the window's length */
  readonly timeS?: number;
  /** with where it comes from: the words for a table's note */
  readonly levelling?: LevellingModel & { readonly origin: string };
  readonly gnss?: GnssModel & { readonly origin: string };
}

/** Clocks against the classical methods over one link. All u are standard uncertainties of a height difference, m. */
export interface LinkBreakEven {
  readonly id: string;
  /** geodesic between the two sites, m */
  readonly distance: number;
  /** uH of the comparison; null for a link that never runs */
  readonly clocks: number | null;
  readonly limit: PlanLimit | null;
  /** uH if what limits were not there */
  readonly withoutLimit: number | null;
  /** part of uH² that is the phase noise of a fibre and grows with the third power of its length, m²; 0 without `fibre` */
  readonly fibreVariance: number;
  readonly levelling: number | null;
  readonly gnss: number | null;
  /** method of the smallest u; null where there is nothing to compare */
  readonly best: 'clocks' | 'levelling' | 'gnss' | null;
  /** distance beyond which clocks as good as these are better, m; 0: at any distance; null: at none, or nothing to compare */
  readonly beyond: { readonly levelling: number | null; readonly gnss: number | null };
  /** fraction of frequency per metre of length equivalent, ḡ/c², m⁻¹ */
  readonly yPerM: number;
  /** GNSS and (quasi)geoid over distance for sites such as these two; null where one has no such determination */
  readonly gnssModel: GnssOverDistance | null;
}

/** The answer of `break-even`. */
export interface BreakEven {
  /** wall-clock time of the clocks, s */
  readonly time: number;
  readonly levelling: LevellingOverDistance | null;
  readonly gnss: GnssOverDistance | null;
  readonly links: readonly LinkBreakEven[];
  /** both methods over distance, m */
  readonly curve: readonly {
    readonly distance: number;
    readonly levelling: number | null;
    readonly gnss: number | null;
  }[];
  readonly warnings: readonly Warning[];
}

/** Distances of the curve, m: 1, 2, 5 × 10³ … 10⁶ and 10⁷. */
export const BREAK_EVEN_DISTANCES_M: readonly number[] = [
  ...[1e3, 1e4, 1e5, 1e6].flatMap((decade) => [decade, 2 * decade, 5 * decade]),
  1e7,
];

/** Whether clocks are worth it: their u beside that of levelling and of GNSS with a (quasi)geoid, and where the curves cross.
 *  Models come from the options, else from `methods`, else from what the file states of its own lines and determinations; never
 *  from a starting value.
 * @throws {CampaignError} `missing`: no window and no time */
export const breakEven = (campaign: Campaign, options: BreakEvenOptions = {}): BreakEven =>
  breakEvenOf(solveCampaign(campaign), options);

export function breakEvenOf(solved: SolvedCampaign, options: BreakEvenOptions = {}): BreakEven {
  const { model } = solved;
  const { campaign } = model;
  const { window } = campaign;
  const time = options.timeS ?? (window ? (window.endMs - window.startMs) / 1000 : null);
  if (time === null)
    throw new CampaignError([faultAt('missing', 'window', 'no window', '"window", or the time of the comparison')]);
  const levelling: LevellingOverDistance | null =
    options.levelling ??
    (campaign.methods?.levelling ? { ...campaign.methods.levelling, origin: 'methods' } : levellingInFile(campaign));
  const gnss: GnssOverDistance | null = options.gnss
    ? fromGnssModel(options.gnss, options.gnss.origin)
    : campaign.methods?.gnss
      ? fromGnssModel(campaign.methods.gnss, 'methods')
      : gnssInFile(campaign);
  const links = campaign.links.map((link) => linkBreakEven(solved, link, time, levelling, gnss));
  return {
    time,
    levelling,
    gnss,
    links,
    curve: BREAK_EVEN_DISTANCES_M.map((distance) => ({
      distance,
      levelling: levelling && levellingOverDistanceM(levelling, distance),
      gnss: gnss && gnssUncertaintyM(gnss, distance),
    })),
    warnings: model.warnings,
  };
}

function linkBreakEven(
  solved: SolvedCampaign,
  link: Link,
  time: number,
  levelling: LevellingOverDistance | null,
  gnss: GnssOverDistance | null,
): LinkBreakEven {
  const { model } = solved;
  const { from, to } = clocksOfLink(model, link);
  const distance = geodesicDistanceM(siteOfClock(model, from), siteOfClock(model, to));
  const budget = linkBudget(solved, link);
  const point = budget.uptime > 0 ? planPoint(budget, time) : null;
  const clocks = point?.uH ?? null;
  const gnssModel = gnss?.ofFile ? gnssBetween(budget, distance) : gnss;
  const u = {
    clocks,
    levelling: levelling && levellingOverDistanceM(levelling, distance),
    gnss: gnssModel && gnssUncertaintyM(gnssModel, distance),
  };
  return {
    id: link.id,
    distance,
    ...u,
    limit: point?.limit ?? null,
    withoutLimit: point?.limit ? point.uH * Math.sqrt(Math.max(0, 1 - point.limit.share)) : null,
    fibreVariance: fibreVariance(budget, time),
    best: best(u),
    beyond: {
      levelling: clocks === null || levelling === null ? null : levellingDistanceForUncertaintyM(levelling, clocks),
      gnss:
        clocks === null || gnssModel === null ? null : smallestDistanceM((d) => gnssUncertaintyM(gnssModel, d), clocks),
    },
    yPerM: budget.gravityMs2 / C2,
    gnssModel,
  };
}

function best(u: Pick<LinkBreakEven, 'clocks' | 'levelling' | 'gnss'>): LinkBreakEven['best'] {
  const known = (['clocks', 'levelling', 'gnss'] as const).filter((m) => u[m] !== null);
  return known.reduce<LinkBreakEven['best']>((a, b) => (a !== null && u[a]! <= u[b]! ? a : b), null);
}

function fibreVariance({ link, uptime, gravityMs2 }: LinkBudget, time: number): number {
  if (!link.fibre || uptime === 0) return 0;
  const y2 = (link.segments * linkPhaseNoise(link) ** 2) / (time * uptime) ** 2;
  return y2 * (C2 / gravityMs2) ** 2;
}

/** GNSS between the two sites of a link, correlations as the file states them: what the covariance gives at their distance, and
 *  over other distances the same heights and (quasi)geoid farther apart or nearer. Null where a site has no such determination. */
function gnssBetween({ model, link, gravityMs2 }: LinkBudget, distanceM: number): GnssOverDistance | null {
  const { from, to } = clocksOfLink(model, link);
  const a = gnssGradient(model, from.site);
  const b = gnssGradient(model, to.site);
  const pieces = gnssInFile(model.campaign, [from.site, to.site]);
  if (a === null || b === null || pieces === null) return null;
  const difference = combineGradients([
    [1, a],
    [-1, b],
  ]);
  const variance = model.covariance.variance(difference) / gravityMs2 ** 2;
  // zero potentials and gravity, and what unlike sites share of a source: the same at any distance
  const rest = variance - gnssUncertaintyM(pieces, distanceM) ** 2;
  const piece = { variance: rest / 2, correlation: 0, correlationLengthM: null };
  return { ...pieces, pieces: [...pieces.pieces, piece] };
}

function gnssGradient(model: Model, siteId: string) {
  const site = model.campaign.sites[model.siteIndex.get(siteId)!]!;
  const n = site.determinations.findIndex((d) => d.kind === 'gnss-quasigeoid' || d.kind === 'gnss-geoid');
  return model.determinations.find(({ path }) => path === `sites.${siteId}.determinations.${n}`)?.gradient ?? null;
}

/** uH of a link's clocks if their sites were another distance apart: only the noise of a stated fibre depends on it.
 * @param distanceM geodesic, m; the fibre keeps its detour */
export function clocksOverDistanceM(
  { clocks, fibreVariance, distance }: LinkBreakEven,
  distanceM: number,
): number | null {
  if (clocks === null) return null;
  if (fibreVariance === 0 || distance === 0) return clocks;
  return Math.sqrt(clocks ** 2 - fibreVariance + fibreVariance * (distanceM / distance) ** 3);
}
