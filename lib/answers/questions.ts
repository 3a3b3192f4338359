import type { TideSystem } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import type { TideQuantity } from '../earth/permanent-tide.js';
import { clocksOfLink, type Model } from '../model/model.js';
import { errorOfLabel, type TideLabelledValue, tideLabelledValues } from '../model/tide-labelled-values.js';
import type { Gradient } from '../uncertainty/gradient.js';
import { type BudgetPart, type GroupedBudget, groupedBudget } from './budget-groups.js';
import type { LinkQuantities } from './quantities.js';
import type { SolvedCampaign } from './solve-campaign.js';
import { lengthUncertaintyIf, quantitiesOfLink, type WhatIfChange } from './what-if.js';

/** What one better value would bring: a single input, or a whole shared source. */
export interface Improvement {
  /** path of the input; null for a source */
  readonly input: string | null;
  /** the source itself, or of which source the input's part is; null: an independent part */
  readonly source: string | null;
  /** share of the variance now */
  readonly share: number;
  /** u of the length equivalent, m, with half its u */
  readonly halvedM: number;
  /** and if it were known exactly */
  readonly exactM: number;
}

/** Kinds of work that make an input better. */
export type Effort =
  | 'gravity'
  | 'ties'
  | 'GNSS heights'
  | '(quasi)geoid'
  | 'datums'
  | 'levelling'
  | 'loading'
  | 'stated potentials'
  | 'gravity model'
  | 'normal gravity of a dynamic height';

/** What a gravity visit to one end of the link would bring. */
export interface GravityVisit {
  readonly site: string;
  readonly clock: string;
  /** g and its gradient stand in the file; else they are defaults */
  readonly gStated: boolean;
  readonly gradientStated: boolean;
  /** height of the atoms over the marker: what g works on in the tie, m */
  readonly tieM: number;
  /** u of y through g and through the gradient, as fractions of frequency */
  readonly uyG: number;
  readonly uyGradient: number;
  /** u of the length equivalent, m, if g and gradient of the site were exact, weights as they are */
  readonly exactM: number;
  /** that is less than 99 % of u now */
  readonly isWorthIt: boolean;
}

/** What y would be wrong by if a permanent-tide label were another. */
export interface LabelError {
  readonly system: TideSystem;
  /** y with that label minus y as it is */
  readonly y: number;
  /** as length equivalent, m */
  readonly lengthM: number;
}

export interface TideLabel {
  readonly path: string;
  readonly quantity: TideQuantity;
  /** null: none stands there, and `used` is assumed */
  readonly stated: TideSystem | null;
  readonly used: TideSystem;
  /** of the two other systems, the larger first */
  readonly errors: readonly LabelError[];
}

/** All values of a kind at once: what a wrong line in the header of one model does. */
export interface CommonLabel {
  readonly quantity: TideQuantity;
  readonly used: TideSystem;
  readonly paths: readonly string[];
  readonly errors: readonly LabelError[];
}

/** Questions about one link, answered from its Jacobian. */
export interface LinkQuestions {
  readonly id: string;
  /** u of the length equivalent now, m */
  readonly uM: number;
  /** single inputs, best first; beyond the first those that would change u by 1 % or more if they were exact */
  readonly inputs: readonly Improvement[];
  /** shared sources, best first */
  readonly sources: readonly Improvement[];
  /** inputs whose error takes part of the others' away: a better value alone would not help, or make u larger */
  readonly harmful: readonly BudgetPart[];
  /** kinds of work that would change u by less than 1 % even if all their inputs became exact */
  readonly idle: readonly Effort[];
  readonly gravity: readonly GravityVisit[];
  /** those that could move y by 1e-20 or more */
  readonly tideLabels: readonly TideLabel[];
  readonly commonLabels: readonly CommonLabel[];
}

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
/** Improvements below this are not worth the name: u changes by less than 1 %. */
const WORTH = 0.99;
/** Negative shares of less size than this are not worth a word. */
const SMALL_SHARE = 1e-3;
/** Labels that move y by less are left out. */
const SMALL_OFFSET = 1e-20;
/** So many are solved anew; the others are behind them already by the weights as they are. */
const CANDIDATES = 6;
const SYSTEMS: readonly TideSystem[] = ['mean', 'zero', 'free'];

/** Which single measurement would help a link most, whether a gravity visit is needed at its ends, and what a wrong permanent-tide
 *  label would do.
 *
 *  Improvements are ranked by the Jacobian as it is, and the first of them computed with the weights that the better value would
 *  get; gravity, idle work and labels stay at the weights as they are.
 * @param link index into campaign.links
 * @returns null where the ends of the link have no common level */
export function linkQuestions(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
): LinkQuestions | null {
  const { model } = solved;
  const { campaign, covariance } = model;
  const q = quantitiesOfLink(solved, link);
  if (!q) return null;
  const budget = groupedBudget(covariance, q.y.gradient);
  const uM = Math.sqrt(covariance.variance(q.dH.gradient));
  const improvement = (source: string | null, part: BudgetPart | null, share: number): Improvement => {
    const u = (factor: number) => lengthUncertaintyIf(solved, link, [changeOf(source, part, factor)])!;
    return { input: part?.input ?? null, source, share, halvedM: u(0.5), exactM: u(0) };
  };
  const best = <T>(items: readonly T[], gain: (item: T) => number, make: (item: T) => Improvement): Improvement[] =>
    [...items]
      .sort((a, b) => gain(b) - gain(a))
      .slice(0, CANDIDATES)
      .filter((item) => gain(item) > 0)
      .map(make)
      .sort((a, b) => a.halvedM - b.halvedM)
      .filter(({ exactM }, i) => i === 0 || exactM < WORTH * uM);
  const parts = budget.groups.flatMap((group) => group.parts);
  const shared = budget.groups.filter((group) => group.source !== null && group.parts.length > 1);
  return {
    id: campaign.links[link]!.id,
    uM,
    inputs: best(
      parts,
      (part) => varianceGain(budget, part, 0.5),
      (part) => improvement(part.source, part, part.share),
    ),
    sources: best(
      shared,
      (group) => group.share,
      (group) => improvement(group.source, null, group.share),
    ),
    harmful: parts.filter(
      (part) => part.share < -SMALL_SHARE || varianceGain(budget, part, 0) < (WORTH ** 2 - 1) * budget.u ** 2,
    ),
    idle: idleEfforts(solved, link, budget),
    gravity: gravityVisits(model, link, q, uM),
    ...labels(solved, link, q),
  };
}

const changeOf = (source: string | null, part: BudgetPart | null, factor: number): WhatIfChange =>
  part
    ? { kind: 'part', input: part.input, source, amount: { factor } }
    : { kind: 'source', source: source!, amount: { factor } };

/** What scaling the u of one part by a factor takes out of u²(y), the weights as they are: of a part with variance q alone and
 *  covariance share·u² with y, (1 − f²)·q + 2·(1 − f)·(share·u² − q). Negative where its error takes part of others' away. */
export function varianceGain({ u }: GroupedBudget, { effect, share }: BudgetPart, factor: number): number {
  const alone = effect * effect;
  return (1 - factor * factor) * alone + 2 * (1 - factor) * (share * u * u - alone);
}

const EFFORTS: Readonly<Record<string, Effort>> = {
  g: 'gravity',
  gradient: 'gravity',
  meanGravityFactor: 'gravity',
  h: 'GNSS heights',
  zeta: '(quasi)geoid',
  N: '(quasi)geoid',
  W0: 'datums',
  C: 'levelling',
  H: 'levelling',
  variable: 'loading',
  W: 'stated potentials',
  commission: 'gravity model',
  omission: 'gravity model',
  gammaRef: 'normal gravity of a dynamic height',
};

/** The kind of work that makes an input better, by its path. */
export function effortOf(path: string): Effort | null {
  if (path.startsWith('clocks.')) return path.includes('.tie.') ? 'ties' : null;
  const key = path.split('.').at(-1)!;
  return key === 'dH' || key === 'b' || key === 'k' ? 'levelling' : (EFFORTS[key] ?? null);
}

/** Kinds of work that would change u(y) by less than 1 % even if they made all their inputs exact, at the weights as they are. */
export function idleEfforts(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  { groups }: GroupedBudget,
): Effort[] {
  const q = quantitiesOfLink(solved, link);
  if (!q) return [];
  const { covariance } = solved.model;
  const efforts = new Set(groups.flatMap(({ parts }) => parts.flatMap(({ input }) => effortOf(input) ?? [])));
  const variance = covariance.variance(q.y.gradient);
  return [...efforts].filter((effort) => {
    const left = without(q.y.gradient, (i) => effortOf(covariance.inputs[i]!.path) === effort);
    const ratio = covariance.variance(left) / variance;
    return ratio > WORTH ** 2 && ratio <= 1;
  });
}

/** A gradient with some inputs exact. */
function without({ indices, values }: Gradient, isExact: (index: number) => boolean): Gradient {
  const kept = indices.flatMap((index, k) => (isExact(index) ? [] : [k]));
  return { indices: kept.map((k) => indices[k]!), values: kept.map((k) => values[k]!) };
}

function gravityVisits(model: Model, link: number, q: LinkQuantities, uM: number): GravityVisit[] {
  const { campaign, covariance, inputs } = model;
  const { from, to } = clocksOfLink(model, campaign.links[link]!);
  const uyOf = (index: number) =>
    Math.abs(q.y.gradient.values[q.y.gradient.indices.indexOf(index)] ?? 0) * inputs[index]!.u;
  return [from, to].map((clock) => {
    const s = model.siteIndex.get(clock.site)!;
    const { g, gradient } = model.siteInputs[s]!;
    const site = campaign.sites[s]!;
    const exactM = Math.sqrt(covariance.variance(without(q.dH.gradient, (index) => index === g || index === gradient)));
    return {
      site: site.id,
      clock: clock.id,
      gStated: site.g !== null,
      gradientStated: site.gradient !== null,
      tieM: clock.tie.reduce((sum, { dH }) => sum + dH.value, 0),
      uyG: uyOf(g),
      uyGradient: uyOf(gradient),
      exactM,
      isWorthIt: exactM < WORTH * uM,
    };
  });
}

function labels(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  q: LinkQuantities,
): Pick<LinkQuestions, 'tideLabels' | 'commonLabels'> {
  const { model } = solved;
  const { campaign } = model;
  const index = new Map(model.inputs.map(({ path }, i) => [path, i]));
  const derivative = new Map(q.y.gradient.indices.map((i, k) => [i, q.y.gradient.values[k]!]));
  const perValue = (value: TideLabelledValue): number =>
    value.determinations === null
      ? (derivative.get(index.get(value.path)!) ?? 0)
      : weightsOfDeterminations(solved, link, value.determinations);
  const lengthOf = (y: number) => (y * C2) / q.meanGravity.value;
  const errorsOf = (used: TideSystem, y: (other: TideSystem) => number): LabelError[] =>
    SYSTEMS.filter((system) => system !== used)
      .map((system) => ({ system, y: y(system), lengthM: lengthOf(y(system)) }))
      .sort((a, b) => Math.abs(b.y) - Math.abs(a.y));
  const values = tideLabelledValues(campaign).flatMap((value) => {
    const c = perValue(value);
    const error = (other: TideSystem) => c * errorOfLabel(value, other, campaign);
    return SYSTEMS.some((system) => Math.abs(error(system)) >= SMALL_OFFSET) ? [{ value, error }] : [];
  });
  const tideLabels = values.map(({ value: { path, quantity, stated, used }, error }) => ({
    path,
    quantity,
    stated,
    used,
    errors: errorsOf(used, error),
  }));
  const kinds = new Map<string, typeof values>();
  for (const one of values) {
    const key = `${one.value.quantity} ${one.value.used}`;
    kinds.set(key, [...(kinds.get(key) ?? []), one]);
  }
  const commonLabels = [...kinds.values()].flatMap((same) =>
    same.length < 2
      ? []
      : [
          {
            quantity: same[0]!.value.quantity,
            used: same[0]!.value.used,
            paths: same.map(({ value }) => value.path),
            errors: errorsOf(same[0]!.value.used, (other) => same.reduce((sum, { error }) => sum + error(other), 0)),
          },
        ],
  );
  return { tideLabels, commonLabels };
}

/** Σ ∂y/∂W over determinations: what a common change of their potentials does to y. */
function weightsOfDeterminations(
  { model, potentials }: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  paths: readonly string[],
): number {
  const { from, to } = clocksOfLink(model, model.campaign.links[link]!);
  const gainOf = (site: string): number => {
    const column = potentials.columns[model.siteIndex.get(site)!]!;
    if (column < 0) return 0;
    return potentials.fitted.reduce(
      (sum, d, i) => (paths.includes(d.path) ? sum + potentials.solution.gain[column]![i]! : sum),
      0,
    );
  };
  return (gainOf(from.site) - gainOf(to.site)) / C2;
}
