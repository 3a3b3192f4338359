import { CampaignError, faultAt } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { systematicGradient, transitionOffset } from '../model/frequency-comparison.js';
import { clocksOfLink, type Model } from '../model/model.js';
import { type SitePotentials, solveSitePotentials } from '../model/site-potentials.js';
import { InputCovariance } from '../uncertainty/covariance.js';
import { DETECTION_FACTOR } from '../uncertainty/detection.js';
import { combineGradients, type Dependent } from '../uncertainty/gradient.js';
import type { ErrorSource, Input } from '../uncertainty/inputs.js';
import { checkPositiveSemidefinite } from '../uncertainty/positive-semidefinite.js';
import { type GroupedBudget, groupedBudget } from './budget-groups.js';
import { expandedUncertaintyOf } from './coverage.js';
import { linkBudget, planPoint, wallClockForLength } from './plan-budget.js';
import type { Estimate } from './prediction.js';
import { clockPotential, estimateOf, type LinkQuantities, linkQuantities } from './quantities.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** How an uncertainty is changed: by a factor ≥ 0, or to a standard uncertainty ≥ 0, SI. */
export type Amount = { readonly factor: number } | { readonly u: number };

/** One thing that could be known better or worse. */
export type WhatIfChange =
  /** the part of an input that it has from a source; null: the part without a source. Stands before a change of the source */
  | { readonly kind: 'part'; readonly input: string; readonly source: string | null; readonly amount: Amount }
  /** every part that names the source, in the whole campaign */
  | { readonly kind: 'source'; readonly source: string; readonly amount: Amount }
  /** correlation between different sites, −1…1, in place of what is stated */
  | { readonly kind: 'correlation'; readonly source: string; readonly correlation: number }
  | { readonly kind: 'correlation-length'; readonly source: string; readonly lengthM: number };

/** The campaign as it would be solved with other uncertainties. Values stay; weights of redundant determinations follow their new
 *  uncertainties, so that combined values may move. The campaign itself is left as it is.
 * @throws {CampaignError} `unknown-input`, `unknown-source`, `out-of-range`, or correlations that no errors can have */
export function withChanges(
  { model, potentials }: Pick<SolvedCampaign, 'model' | 'potentials'>,
  changes: readonly WhatIfChange[],
): Pick<SolvedCampaign, 'model' | 'potentials'> {
  if (changes.length === 0) return { model, potentials };
  refuseImpossible(model, changes);
  const inputs = model.inputs.map((input) => changedInput(input, changes));
  const sources = model.covariance.sources.map((source) => changedSource(source, changes));
  const covariance = new InputCovariance(inputs, sources);
  if (changes.some(({ kind }) => kind === 'correlation'))
    checkPositiveSemidefinite(
      covariance,
      sources.map(({ id, correlation }) => (correlation === null ? { id } : { id, correlation })),
    );
  const changed: Model = { ...model, inputs, covariance };
  return {
    model: changed,
    // without redundancy the weights can't move
    potentials: potentials.solution.weights === null ? potentials : solveSitePotentials(changed),
  };
}

function refuseImpossible(model: Model, changes: readonly WhatIfChange[]): void {
  const faults = changes.flatMap((change) => {
    const path = change.kind === 'part' ? change.input : `sources.${change.source}`;
    if (change.kind === 'part' && !model.inputs.some((x) => x.path === change.input))
      return [faultAt('unknown-input', path, 'no such input', 'the path of an input of the campaign')];
    const { sources } = model.covariance;
    if (change.kind !== 'part' && !sources.some(({ id }) => id === change.source))
      return [faultAt('unknown-source', path, 'no such source', 'the id of a source of the campaign')];
    const refused = (found: number, expected: string) => [faultAt('out-of-range', path, String(found), expected)];
    if (change.kind === 'correlation')
      return change.correlation >= -1 && change.correlation <= 1 ? [] : refused(change.correlation, 'from −1 to 1');
    if (change.kind === 'correlation-length') {
      // where none is stated an input of the source may have no position
      if (!sources.some((s) => s.id === change.source && s.correlationLengthM !== null))
        return refused(change.lengthM, 'a source with a correlation length');
      return change.lengthM > 0 && change.lengthM < Infinity ? [] : refused(change.lengthM, 'a length above 0');
    }
    const size = 'u' in change.amount ? change.amount.u : change.amount.factor;
    return size >= 0 && size < Infinity ? [] : refused(size, 'a finite number, zero or positive');
  });
  if (faults.length > 0) throw new CampaignError(faults);
}

function changedInput(input: Input, changes: readonly WhatIfChange[]): Input {
  let changed = false;
  const amountFor = (source: string | null): Amount | null => {
    let amount: Amount | null = null;
    let own = false;
    for (const c of changes) {
      if (c.kind === 'part' && c.input === input.path && c.source === source) {
        amount = c.amount;
        own = true;
      } else if (c.kind === 'source' && c.source === source && !own) amount = c.amount;
    }
    if (amount) changed = true;
    return amount;
  };
  const shared = input.parts.flatMap((part) => {
    if (part.source === null) return [];
    const amount = amountFor(part.source);
    return [amount ? { ...part, u: 'u' in amount ? amount.u : part.u * amount.factor } : part];
  });
  const own = input.parts.filter(({ source }) => source === null);
  const amount = amountFor(null);
  const independent = !amount
    ? own
    : 'u' in amount
      ? [{ u: amount.u, source: null }]
      : own.map((part) => ({ ...part, u: part.u * amount.factor }));
  if (!changed) return input;
  const parts = [...shared, ...independent].filter(({ u }) => u > 0);
  return { ...input, parts, u: Math.hypot(...parts.map(({ u }) => u)) };
}

function changedSource(source: ErrorSource, changes: readonly WhatIfChange[]): ErrorSource {
  let changed = source;
  for (const c of changes) {
    if ((c.kind !== 'correlation' && c.kind !== 'correlation-length') || c.source !== source.id) continue;
    changed =
      c.kind === 'correlation'
        ? { id: source.id, correlation: c.correlation, correlationLengthM: null }
        : { id: source.id, correlation: null, correlationLengthM: c.lengthM };
  }
  return changed;
}

/** Expanded uncertainties of a link, coverage 95 %. */
export interface LinkExpanded {
  /** k from the t distribution on the effective degrees of freedom (GUM G.4.1, G.6.4) */
  readonly coverageFactor: number;
  readonly coverageProbability: number;
  /** null: infinitely many */
  readonly degreesOfFreedom: number | null;
  /** U = k·u */
  readonly dW: number;
  readonly y: number;
  readonly dH: number;
}

/** What a comparison over the link could show. */
export interface LinkOutlook {
  /** clocks, link and frequency ratio, grouped like the prediction's budget; of the comparison alone */
  readonly systematic: GroupedBudget;
  /** wall-clock s until the comparison is down to `target`; null without a target or where it never is */
  readonly timeToTargetS: number | null;
  /** smallest discrepancy against the prediction that the whole window shows, as length equivalent, m; null without a window */
  readonly smallestDetectableM: number | null;
}

/** Everything that the uncertainty panel says of one link, stated or as it would be. */
export interface LinkUncertainty {
  readonly id: string;
  readonly dW: Estimate;
  readonly y: Estimate;
  /** length equivalent */
  readonly dH: Estimate;
  readonly expanded: LinkExpanded;
  readonly budget: GroupedBudget;
  readonly outlook: LinkOutlook;
}

const COVERAGE = 0.95;
const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** Uncertainty of a link.
 * @param link index into campaign.links
 * @returns null where the ends of the link have no common level */
export function linkUncertainty(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
): LinkUncertainty | null {
  const { model } = solved;
  const stated = model.campaign.links[link]!;
  const q = quantitiesOfLink(solved, link);
  if (!q) return null;
  const { covariance } = model;
  const [dW, dH] = [estimateOf(covariance, q.dW), estimateOf(covariance, q.dH)];
  const { coverageFactor: k, degreesOfFreedom } = expandedUncertaintyOf(covariance, q.y.gradient, COVERAGE);
  return {
    id: stated.id,
    dW,
    y: { value: q.y.value, u: dW.u / C2 },
    dH,
    expanded: {
      coverageFactor: k,
      coverageProbability: COVERAGE,
      degreesOfFreedom: degreesOfFreedom === Infinity ? null : degreesOfFreedom,
      dW: k * dW.u,
      y: (k * dW.u) / C2,
      dH: k * dH.u,
    },
    budget: groupedBudget(covariance, q.y.gradient),
    outlook: outlookOf(solved, link, q),
  };
}

/** Uncertainty of a link with something known better or worse.
 * @throws {CampaignError} as {@link withChanges} */
export const whatIf = (
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  changes: readonly WhatIfChange[],
): LinkUncertainty | null => linkUncertainty(withChanges(solved, changes), link);

/** u of the length equivalent, m, with something known better or worse; null where the link has no prediction.
 * @throws {CampaignError} as {@link withChanges} */
export function lengthUncertaintyIf(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  changes: readonly WhatIfChange[],
): number | null {
  const changed = withChanges(solved, changes);
  const q = quantitiesOfLink(changed, link);
  return q && estimateOf(changed.model.covariance, q.dH).u;
}

/** Quantities of one link alone: with hundreds of links the others would take most of the time. */
export function quantitiesOfLink(
  { model, potentials }: { readonly model: Model; readonly potentials: SitePotentials },
  link: number,
): LinkQuantities | null {
  const stated = model.campaign.links[link]!;
  const clocks: Dependent[] = [];
  for (const id of [stated.from, stated.to]) {
    const index = model.clockIndex.get(id)!;
    clocks[index] = clockPotential(model, potentials, index);
  }
  return linkQuantities(model, potentials, clocks, stated);
}

function outlookOf(
  { model, potentials }: Pick<SolvedCampaign, 'model' | 'potentials'>,
  index: number,
  q: LinkQuantities,
): LinkOutlook {
  const { campaign, covariance } = model;
  const link = campaign.links[index]!;
  const links: (LinkQuantities | null)[] = [];
  links[index] = q;
  const budget = linkBudget({ model, potentials, clocks: [], links }, link);
  const { window, targetM } = campaign;
  const runs = budget.uptime > 0;
  const windowS = window && (window.endMs - window.startMs) / 1000;
  return {
    systematic: groupedBudget(
      covariance,
      combineGradients([
        [1, systematicGradient(model, link)],
        [1, transitionOffset(model, link).gradient],
      ]),
    ),
    timeToTargetS: targetM === null ? null : wallClockForLength(budget, targetM),
    smallestDetectableM:
      windowS === null || !runs || budget.uGeodesyM === null
        ? null
        : DETECTION_FACTOR * Math.hypot(planPoint(budget, windowS).uH, budget.uGeodesyM),
  };
}

/** Sites at the two ends of a link. */
export const sitesOfLink = (model: Model, link: number): readonly [string, string] => {
  const { from, to } = clocksOfLink(model, model.campaign.links[link]!);
  return [from.site, to.site];
};
