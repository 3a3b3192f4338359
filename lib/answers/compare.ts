import type { Campaign } from '../campaign/campaign.js';
import type { Dependent } from '../uncertainty/gradient.js';
import type { Estimate } from './prediction.js';
import { estimateOf } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

/** One input's part in the change of y. */
export interface MovedInput {
  readonly path: string;
  /** as stated in the old and the new state, SI; null where it is not there */
  readonly before: Estimate | null;
  readonly after: Estimate | null;
  /** what its change of value moved y by: Δx times the mean of the old and the new sensitivity; null where it came or went */
  readonly moved: number | null;
}

export interface LinkComparison {
  readonly id: string;
  readonly before: Estimate | null;
  readonly after: Estimate | null;
  /** y now − y before */
  readonly change: number | null;
  /** inputs that changed, by falling part */
  readonly inputs: readonly MovedInput[];
  /** change − Σ moved: determinations that came or went, tide labels, datums, sources and weights */
  readonly rest: number | null;
}

/** The answer of `compare`. */
export interface CampaignComparison {
  readonly links: readonly LinkComparison[];
  /** links that only one state has */
  readonly onlyBefore: readonly string[];
  readonly onlyAfter: readonly string[];
}

/** What moved y between two states of a campaign, input by input: a new geoid model, a re-levelled tie.
 *  Links are matched by id, inputs by path. With the mean of both sensitivities the parts are exact to second order.
 * @throws {CampaignError} */
export function compare(before: Campaign, after: Campaign): CampaignComparison {
  const a = solveCampaign(before);
  const b = solveCampaign(after);
  const ids = (c: Campaign) => c.links.map((l) => l.id);
  const shared = ids(before).filter((id) => ids(after).includes(id));
  return {
    links: shared.map((id) => linkComparison(id, a, b)),
    onlyBefore: ids(before).filter((id) => !shared.includes(id)),
    onlyAfter: ids(after).filter((id) => !shared.includes(id)),
  };
}

function linkComparison(id: string, a: SolvedCampaign, b: SolvedCampaign): LinkComparison {
  const before = offsetOf(a, id);
  const after = offsetOf(b, id);
  const inputsA = before ? sensitivities(a, before) : new Map<string, number>();
  const inputsB = after ? sensitivities(b, after) : new Map<string, number>();
  const stated = (s: SolvedCampaign) => new Map(s.model.inputs.map((x) => [x.path, { value: x.value, u: x.u }]));
  const [xA, xB] = [stated(a), stated(b)];
  const inputs: MovedInput[] = [];
  for (const path of new Set([...inputsA.keys(), ...inputsB.keys()])) {
    const [p, q] = [xA.get(path) ?? null, xB.get(path) ?? null];
    if (p && q && p.value === q.value && p.u === q.u) continue;
    const moved = p && q ? ((inputsA.get(path) ?? 0) + (inputsB.get(path) ?? 0)) * 0.5 * (q.value - p.value) : null;
    inputs.push({ path, before: p, after: q, moved });
  }
  inputs.sort((x, y) => Math.abs(y.moved ?? 0) - Math.abs(x.moved ?? 0));
  const change = before && after ? after.value - before.value : null;
  return {
    id,
    before: before && estimateOf(a.model.covariance, before),
    after: after && estimateOf(b.model.covariance, after),
    change,
    inputs,
    rest: change === null ? null : change - inputs.reduce((s, x) => s + (x.moved ?? 0), 0),
  };
}

const offsetOf = (s: SolvedCampaign, id: string): Dependent | null =>
  s.links[s.model.campaign.links.findIndex((l) => l.id === id)]?.y ?? null;

const sensitivities = (s: SolvedCampaign, y: Dependent): Map<string, number> =>
  new Map(y.gradient.indices.map((i, k) => [s.model.inputs[i]!.path, y.gradient.values[k]!]));
