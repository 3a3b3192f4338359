import type { Campaign } from '../campaign/campaign.js';
import { CampaignError, faultAt } from '../campaign/fault.js';
import { candidatePaths, costOf } from '../model/candidates.js';
import { covarianceOfUnknowns, type NetworkProblem, networkProblem, solveNetwork } from './network.js';
import { solveCampaign } from './solve-campaign.js';

/** What the network is to become good at: the u of its worst site, the mean u of its sites (m²/s²), the u of a datum's offset
 *  (m²/s²), or the larger of the two u of its tilt (m²/s² per m). Always the smaller the better. */
export type DesignAim =
  | { readonly kind: 'worst-site' }
  | { readonly kind: 'mean' }
  | { readonly kind: 'offset'; readonly datum: string }
  | { readonly kind: 'tilt'; readonly datum: string };

export interface DesignStep {
  /** path of the candidate added, or of the observation removed */
  readonly id: string;
  /** value of the aim with it (removed: without it), all steps before included; null where something is left undetermined */
  readonly aim: number | null;
  /** by how much the aim falls; negative when something is removed; null where it was or becomes undetermined */
  readonly gain: number | null;
  readonly cost: number | null;
}

/** The answer of `design`. */
export interface Design {
  /** value of the aim now; null where the network as it stands leaves it undetermined */
  readonly aim: number | null;
  readonly unit: 'm²/s²' | 'm²/s² per m';
  /** each candidate (or observation) alone, best first */
  readonly ranking: readonly DesignStep[];
  /** greedy: the best one, then the best beside it, … */
  readonly steps: readonly DesignStep[];
  /** the best set of that many, by trying all; null with more than 12 candidates */
  readonly best: { readonly ids: readonly string[]; readonly aim: number | null; readonly cost: number | null } | null;
}

export interface DesignOptions {
  /** how many candidates to add; default all of them, one after the other */
  readonly add?: number;
  /** instead: how many observations to take away */
  readonly remove?: number;
}

/** With more candidates than this not every set is tried: 2¹² = 4096. */
export const MAX_EXACT_CANDIDATES = 12;

/** What each candidate would bring, or which observation is idle, with every link taken as run through the window.
 * @throws {CampaignError} the aim cannot be computed for this campaign at all */
export function design(campaign: Campaign, aim: DesignAim, options: DesignOptions = {}): Design {
  const problem = networkProblem(solveCampaign(campaign), true);
  const evaluate = aimEvaluator(campaign, problem, aim);
  return options.remove === undefined
    ? additions(campaign, evaluate, options.add)
    : removals(problem, evaluate, options.remove);
}

/** Aim with these candidates added and these observations left out; null where it is undetermined. */
type Evaluate = ((added: ReadonlySet<string>, leftOut: ReadonlySet<string>) => number | null) & {
  readonly unit: Design['unit'];
};

const NOTHING: ReadonlySet<string> = new Set();

function additions(campaign: Campaign, evaluate: Evaluate, add?: number): Design {
  const candidates = candidatePaths(campaign);
  const base = evaluate(NOTHING, NOTHING);
  const step = (id: string, before: number | null, beside: readonly string[]) => {
    const value = evaluate(new Set([...beside, id]), NOTHING);
    return { id, aim: value, gain: gainOf(before, value), cost: costOf(campaign, id) };
  };
  const ranking = candidates.map((id) => step(id, base, [])).sort(byAim);
  const steps: DesignStep[] = [];
  let before = base;
  const wanted = Math.min(add ?? candidates.length, candidates.length);
  while (steps.length < wanted) {
    const beside = steps.map((s) => s.id);
    const [next] = candidates
      .filter((id) => !beside.includes(id))
      .map((id) => step(id, before, beside))
      .sort(byAim);
    steps.push(next!);
    before = next!.aim;
  }
  return {
    aim: base,
    unit: evaluate.unit,
    ranking,
    steps,
    best: candidates.length <= MAX_EXACT_CANDIDATES ? bestSet(campaign, candidates, wanted, evaluate) : null,
  };
}

function bestSet(campaign: Campaign, candidates: readonly string[], size: number, evaluate: Evaluate): Design['best'] {
  let best: { ids: string[]; aim: number | null } = { ids: [], aim: null };
  for (const ids of subsets(candidates, size)) {
    const aim = evaluate(new Set(ids), NOTHING);
    if (best.ids.length === 0 || (aim ?? Number.POSITIVE_INFINITY) < (best.aim ?? Number.POSITIVE_INFINITY))
      best = { ids, aim };
  }
  const costs = best.ids.map((id) => costOf(campaign, id));
  return { ...best, cost: costs.includes(null) ? null : costs.reduce<number>((s, c) => s + c!, 0) };
}

function* subsets(items: readonly string[], size: number, from = 0): Generator<string[]> {
  if (size === 0) {
    yield [];
    return;
  }
  for (let i = from; i <= items.length - size; i++)
    for (const rest of subsets(items, size - 1, i + 1)) yield [items[i]!, ...rest];
}

function removals(problem: NetworkProblem, evaluate: Evaluate, remove: number): Design {
  const base = evaluate(NOTHING, NOTHING);
  const all = problem.observations.filter((o) => !o.candidate).map((o) => o.id);
  const step = (id: string, before: number | null, without: readonly string[]) => {
    const value = evaluate(NOTHING, new Set([...without, id]));
    return { id, aim: value, gain: gainOf(before, value), cost: null };
  };
  const ranking = all.map((id) => step(id, base, [])).sort(byAim);
  const steps: DesignStep[] = [];
  let before = base;
  while (steps.length < Math.min(remove, all.length)) {
    const without = steps.map((s) => s.id);
    const [next] = all
      .filter((id) => !without.includes(id))
      .map((id) => step(id, before, without))
      .sort(byAim);
    steps.push(next!);
    before = next!.aim;
  }
  return { aim: base, unit: evaluate.unit, ranking, steps, best: null };
}

/** Smallest aim first; undetermined last; a tie stays in file order. */
const byAim = (a: DesignStep, b: DesignStep): number => (a.aim ?? Number.MAX_VALUE) - (b.aim ?? Number.MAX_VALUE);

const gainOf = (before: number | null, after: number | null): number | null =>
  before === null || after === null ? null : before - after;

function aimEvaluator(campaign: Campaign, problem: NetworkProblem, aim: DesignAim): Evaluate {
  const { unknowns } = problem;
  const datum = 'datum' in aim ? unknowns.datums.find((d) => d.id === aim.datum) : undefined;
  const wanted: number[] = [];
  if (aim.kind === 'offset') {
    if (datum?.offset == null) throw notAsked(campaign, aim.datum, 'estimateOffset');
    wanted.push(datum.offset);
  } else if (aim.kind === 'tilt') {
    if (!datum?.tilt) throw notAsked(campaign, aim.datum, 'estimateTilt');
    wanted.push(datum.tilt.north, datum.tilt.east);
  } else wanted.push(...campaign.sites.flatMap((s, i) => (s.candidate ? [] : [i])));
  const evaluate = (added: ReadonlySet<string>, leftOut: ReadonlySet<string>): number | null => {
    try {
      const network = solveNetwork(campaign, problem, added, leftOut);
      const covariance = covarianceOfUnknowns(network);
      const u = wanted.map((unknown) => {
        const c = network.columns.indexOf(unknown);
        return Math.sqrt(Math.max(0, covariance[c]![c]!));
      });
      return aim.kind === 'mean' ? u.reduce((s, x) => s + x, 0) / u.length : Math.max(...u);
    } catch (e) {
      // a network that leaves something open has no value of the aim; anything else is the campaign's own fault
      if (e instanceof CampaignError && e.faults.every((f) => f.code === 'undetermined')) return null;
      throw e;
    }
  };
  return Object.assign(evaluate, { unit: aim.kind === 'tilt' ? ('m²/s² per m' as const) : ('m²/s²' as const) });
}

function notAsked(campaign: Campaign, id: string, key: string): CampaignError {
  const known = campaign.datums.some((d) => d.id === id);
  return new CampaignError([
    known
      ? faultAt(
          'aim-not-estimated',
          `datums.${id}.${key}`,
          'false',
          `"${key}": true, so that the network has it as an unknown`,
        )
      : faultAt(
          'unknown-datum',
          'datums',
          JSON.stringify(id),
          `one of ${campaign.datums.map((d) => d.id).join(', ') || 'none in the file'}`,
        ),
  ]);
}
