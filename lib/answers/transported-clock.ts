import type { Campaign, Clock, Link, SideBySide } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { measuredOffset, toMeanTideOffset } from '../model/frequency-comparison.js';
import { clocksOfLink, siteIndexOfClock } from '../model/model.js';
import {
  localGradient,
  localPotentialDifference,
  remoteGradient,
  type TransportInputs,
  transportInputs,
} from '../model/side-by-side.js';
import { normalCdf } from '../uncertainty/distributions/index.js';
import { ContradictionError } from '../uncertainty/exact-relations.js';
import { combineGradients, type Dependent, type Gradient } from '../uncertainty/gradient.js';
import { leastSquares } from '../uncertainty/least-squares.js';
import { linkBudget, planPoint } from './plan-budget.js';
import type { Estimate } from './prediction.js';
import { estimateOf, lengthEquivalent, meanGravity } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';
import { type TransportComponent, transportComponents } from './transport-components.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** One comparison in one place. */
export interface LocalComparison {
  readonly when: 'before' | 'after';
  /** as measured; null where only planned */
  readonly y: Estimate | null;
  /** W(from) − W(to) of the two clocks there, m²/s² */
  readonly dW: Estimate;
  /** y less gravity's part: what the clocks differ by, with all that is uncertain in it; value null where only planned */
  readonly difference: { readonly value: number | null; readonly u: number };
}

/** A comparison before the journey against one after it. */
export interface BeforeAfter {
  /** positions in `sideBySide` */
  readonly before: number;
  readonly after: number;
  /** before − after, as a fraction of frequency; u without what both share */
  readonly difference: Estimate;
  /** difference/u; null where u is 0 */
  readonly z: number | null;
}

/** The potential difference by one remote comparison. */
export interface TransportedResult {
  /** the measurement's id or position; null: planned over the window */
  readonly measurement: string | number | null;
  /** weights of the comparisons side by side */
  readonly weights: readonly number[];
  /** W(from) − W(to), campaign's tide system, m²/s²; value null where only planned */
  readonly dW: { readonly value: number | null; readonly u: number };
  /** length equivalent, m */
  readonly dH: { readonly value: number | null; readonly u: number };
  /** predict's dW; null without a level */
  readonly predicted: Estimate | null;
  /** measured − predicted, m²/s² */
  readonly residual: Estimate | null;
  readonly z: number | null;
  /** two-sided, normal */
  readonly p: number | null;
  readonly components: readonly TransportComponent[];
}

export interface TransportedLink {
  readonly id: string;
  /** the clock that travels */
  readonly clock: string;
  readonly sideBySide: readonly LocalComparison[];
  readonly beforeAfter: readonly BeforeAfter[];
  readonly results: readonly TransportedResult[];
}

/** The answer of `transported`. */
export interface TransportedClocks {
  readonly links: readonly TransportedLink[];
  readonly warnings: readonly Warning[];
}

/** |z| beyond which before and after disagree. */
const DISAGREE = 2;

/** Potential differences by a clock that travels: ΔW = c²·(R_remote/R_local − 1) + ΔW_local with R = ν_to/ν_from, so that the
 *  frequency ratio of unlike clocks cancels, and with it whatever a source makes the same in both places.
 *  R_remote/R_local is taken over each comparison side by side with its own height difference taken off; they are combined with
 *  the weights of least squares, after their differences before − after have been said.
 * @throws {CampaignError}
 * @see Grotti et al. 2018, Nat. Phys. 14, 437 (side by side and remote); Müller et al. 2018, Space Sci. Rev. 214, 5 (from memory) */
export const transportedClocks = (campaign: Campaign): TransportedClocks =>
  transportedClocksOf(solveCampaign(campaign));

export function transportedClocksOf(solved: SolvedCampaign): TransportedClocks {
  const links = solved.model.campaign.links.flatMap((link) =>
    link.transported ? [transportedLink(solved, link)] : [],
  );
  return {
    links,
    // the ratio of unlike transitions cancels: that it was not measured costs nothing here
    warnings: [
      ...solved.model.warnings.filter(({ code }) => code !== 'default-frequency-offset'),
      ...links.flatMap(disagreements),
    ],
  };
}

function disagreements({ id, beforeAfter }: TransportedLink): Warning[] {
  return beforeAfter.flatMap(({ after, z }) =>
    z !== null && Math.abs(z) > DISAGREE
      ? [
          {
            code: 'side-by-side-differ',
            path: `links.${id}.transported.sideBySide.${after}`,
            message: `before and after differ by ${Math.abs(z).toFixed(1)} times their u: what changed on the way is larger than the reproducibility stated, and their mean hides it.`,
          },
        ]
      : [],
  );
}

/** A remote comparison: measured, or planned over the window. */
interface Remote {
  readonly measurement: string | number | null;
  /** in mean tide; null where only planned */
  readonly y: number | null;
  readonly variance: number;
}

function transportedLink(solved: SolvedCampaign, link: Link): TransportedLink {
  const { model } = solved;
  const entries = link.transported!.sideBySide;
  const remote = remotes(solved, link);
  const { from, to } = clocksOfLink(model, link);
  const variances = entries.map((e, k) => localVariance(e, from, to, `links.${link.id}.transported.sideBySide.${k}`));
  const t = transportInputs(
    model,
    link,
    variances,
    remote.map(({ variance }) => variance),
  );
  const local = entries.map((e, k): Dependent & { readonly dW: Dependent; readonly known: boolean } => {
    const dW = localPotentialDifference(model, t, k);
    const gravity = dW.value / C2;
    return {
      dW,
      known: e.y !== null,
      value: ((e.y?.value ?? 0) - gravity) / (1 + gravity),
      gradient: localGradient(model, t, k, dW),
    };
  });
  const u = (gradient: Gradient) => Math.sqrt(t.covariance.variance(gradient));
  return {
    id: link.id,
    clock: t.travels.id,
    sideBySide: entries.map((e, k) => ({
      when: e.when,
      y: e.y && { value: e.y.value, u: e.y.u },
      dW: estimateOf(t.covariance, local[k]!.dW),
      difference: { value: local[k]!.known ? local[k]!.value : null, u: u(local[k]!.gradient) },
    })),
    beforeAfter: pairs(entries).flatMap(([before, after]) => {
      const [a, b] = [local[before]!, local[after]!];
      if (!a.known || !b.known) return [];
      const difference = estimateOf(t.covariance, {
        value: a.value - b.value,
        gradient: combineGradients([
          [1, a.gradient],
          [-1, b.gradient],
        ]),
      });
      return [{ before, after, difference, z: difference.u > 0 ? difference.value / difference.u : null }];
    }),
    results: remote.map((r, i) => result(solved, link, t, local, r, i)),
  };
}

const pairs = (entries: readonly SideBySide[]): [number, number][] =>
  entries.flatMap((a, i) =>
    a.when === 'before' ? entries.flatMap((b, j) => (b.when === 'after' ? [[i, j] as [number, number]] : [])) : [],
  );

/** Statistics of a comparison side by side: as stated, or of two clocks over the time that is planned. */
function localVariance({ y, timeS }: SideBySide, from: Clock, to: Clock, path: string): number {
  if (y !== null) return y.u * y.u;
  if (timeS === null)
    throw new CampaignError([
      faultAt(
        'missing',
        `${path}.y`,
        'neither y nor time',
        '"y" as measured, or "time", the time of data that is planned',
      ),
    ]);
  return [from, to].reduce((s, { stability: { white, flicker } }) => s + white ** 2 / timeS + flicker ** 2, 0);
}

function remotes(solved: SolvedCampaign, link: Link): Remote[] {
  const { model } = solved;
  const { campaign } = model;
  const measured = campaign.measurements.flatMap((m, i): Remote[] => {
    if (m.link !== link.id || m.check) return [];
    const { yMean, statisticalVariance } = measuredOffset(model, i);
    return [{ measurement: m.id ?? i, y: yMean, variance: Math.max(0, statisticalVariance) }];
  });
  if (measured.length > 0) return measured;
  const { window } = campaign;
  const budget = linkBudget(solved, link);
  if (!window || budget.uptime === 0) return [];
  const { uStat } = planPoint(budget, (window.endMs - window.startMs) / 1000);
  return [{ measurement: null, y: null, variance: uStat * uStat }];
}

function result(
  solved: SolvedCampaign,
  link: Link,
  t: TransportInputs,
  local: readonly (Dependent & { readonly known: boolean })[],
  remote: Remote,
  index: number,
): TransportedResult {
  const { model } = solved;
  const { campaign } = model;
  // a value needs what was measured; a plan counts everything
  const used = local.flatMap((l, k) => (remote.y === null || l.known ? [k] : []));
  const valued = remote.y !== null && used.length > 0;
  const counted = used.length > 0 ? used : local.map((_, k) => k);
  const far = remoteGradient(model, t, link, index);
  const each = counted.map((k): Dependent => {
    const { value, gradient } = local[k]!;
    return {
      value: valued ? ((remote.y! - value) / (1 + value)) * C2 : 0,
      gradient: combineGradients([...far.map(([w, g]) => [w * C2, g] as const), [-C2, gradient]]),
    };
  });
  const weight = weights(t, each, `links.${link.id}.transported`);
  const toCampaignTide = C2 * toMeanTideOffset(model, link, campaign.tide);
  const dW: Dependent = {
    value: each.reduce((s, e, n) => s + weight[n]! * e.value, 0) - toCampaignTide,
    gradient: combineGradients(each.map((e, n) => [weight[n]!, e.gradient] as const)),
  };
  const { from, to } = clocksOfLink(model, link);
  const g = meanGravity(model, siteIndexOfClock(model, from), siteIndexOfClock(model, to));
  const estimate = estimateOf(t.covariance, dW);
  const length = estimateOf(t.covariance, lengthEquivalent(dW, g));
  const predicted = solved.links[campaign.links.indexOf(link)]?.dW ?? null;
  const residual =
    predicted && valued
      ? estimateOf(t.covariance, {
          value: dW.value - predicted.value,
          gradient: combineGradients([
            [1, dW.gradient],
            [-1, predicted.gradient],
          ]),
        })
      : null;
  const z = residual && residual.u > 0 ? residual.value / residual.u : null;
  const value = (e: Estimate) => ({ value: valued ? e.value : null, u: e.u });
  const whole = local.map((_, k) => (counted.includes(k) ? weight[counted.indexOf(k)]! : 0));
  return {
    measurement: remote.measurement,
    weights: whole,
    dW: value(estimate),
    // without a value the length equivalent has only its scale: u(dW)/g
    dH: valued ? value(length) : { value: null, u: estimate.u / g.value },
    predicted: predicted && estimateOf(model.covariance, predicted),
    residual,
    z,
    p: z === null ? null : 2 * normalCdf(-Math.abs(z)),
    components: transportComponents(link, t, whole),
  };
}

/** Weights of least squares of what the comparisons side by side say each. */
function weights(t: TransportInputs, each: readonly Dependent[], path: string): readonly number[] {
  if (each.length === 1) return [1];
  try {
    const { gain } = leastSquares({
      design: each.map(() => Float64Array.of(1)),
      observed: Float64Array.from(each, ({ value }) => value),
      covariance: t.covariance.matrix(each.map(({ gradient }) => gradient)),
      unknowns: 1,
    });
    return [...gain[0]!];
  } catch (error) {
    if (!(error instanceof ContradictionError)) throw error;
    throw new CampaignError([
      faultAt(
        'contradiction',
        path,
        'comparisons side by side that differ without any uncertainty',
        'an uncertainty of y, or a reproducibility',
      ),
    ]);
  }
}
