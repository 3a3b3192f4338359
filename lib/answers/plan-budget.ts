import type { Link } from '../campaign/campaign.js';
import {
  type ComparisonNoise,
  comparisonNoise,
  effectiveTimeForVariance,
  linkPhaseNoise,
  statisticalVariance,
} from '../clocks/averaging.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { systematicGradient, transitionOffset } from '../model/frequency-comparison.js';
import { jointUptime } from '../model/joint-uptime.js';
import { clocksOfLink, type Model, siteIndexOfClock } from '../model/model.js';
import { combineGradients } from '../uncertainty/gradient.js';
import { estimateOf, meanGravity } from './quantities.js';
import type { SolvedCampaign } from './solve-campaign.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** What a comparison's uncertainty is made of. `white`, `flicker`, `phase`: noise of a clock or the link; `dead-time`: of a
 *  flywheel over the gaps of its clock; `ratio`: a transition whose offset is uncertain; `geodesy`: the prediction. */
export type PlanPartKind = 'white' | 'flicker' | 'phase' | 'dead-time' | 'systematic' | 'ratio' | 'geodesy';

export interface PlanPart {
  readonly kind: PlanPartKind;
  /** id of the clock, link or transition; the link's for geodesy */
  readonly of: string;
}

/** The largest part, and its share of the variance: covariance-true, so that it can pass 1. */
export interface PlanLimit extends PlanPart {
  readonly share: number;
}

/** Where a part belongs in the sums of `shares`. */
export type PlanEnd = 'from' | 'to' | 'link' | 'ratio';

/** A part whose variance does not depend on time. Covariance-true: a shared source that cancels makes it small or negative. */
interface FixedPart extends PlanPart {
  readonly end: PlanEnd;
  readonly variance: number;
}

/** Shares of uY², covariance-true; they add up to 1, and one can be negative. */
export interface PlanShares {
  readonly statisticsFrom: number;
  readonly statisticsTo: number;
  readonly statisticsLink: number;
  readonly systematicFrom: number;
  readonly systematicTo: number;
  readonly systematicLink: number;
  readonly ratio: number;
}

/** Uncertainty of one comparison after a wall-clock time. */
export interface PlanPoint {
  /** wall-clock time, s */
  readonly T: number;
  /** statistics alone, as a fraction of frequency */
  readonly uStat: number;
  /** with systematics and the frequency ratio */
  readonly uY: number;
  /** uY as length equivalent, m */
  readonly uH: number;
  /** null where uY is 0 */
  readonly shares: PlanShares | null;
  /** the largest part of uY²; null where uY is 0 */
  readonly limit: PlanLimit | null;
}

/** Everything about a link that its plan needs, worked out once. */
export interface LinkBudget {
  readonly model: Model;
  readonly link: Link;
  /** share of the time in which both clocks and the link run */
  readonly uptime: number;
  readonly noise: ComparisonNoise;
  readonly gravityMs2: number;
  readonly fixed: readonly FixedPart[];
  readonly systematicVariance: number;
  /** u of the predicted length equivalent, m; null where there is no prediction */
  readonly uGeodesyM: number | null;
}

export function linkBudget(solved: SolvedCampaign, link: Link): LinkBudget {
  const { model } = solved;
  const { from, to } = clocksOfLink(model, link);
  const fixed = fixedParts(model, link);
  const dH = solved.links[model.campaign.links.indexOf(link)]?.dH;
  return {
    model,
    link,
    uptime: jointUptime(model.campaign, from, to, link),
    noise: comparisonNoise(from, to, link),
    gravityMs2: meanGravity(model, siteIndexOfClock(model, from), siteIndexOfClock(model, to)).value,
    fixed,
    systematicVariance: model.covariance.variance(wholeGradient(model, link)),
    uGeodesyM: dH ? estimateOf(model.covariance, dH).u : null,
  };
}

const wholeGradient = (model: Model, link: Link) =>
  combineGradients([
    [1, systematicGradient(model, link)],
    [1, transitionOffset(model, link).gradient],
  ]);

function fixedParts(model: Model, link: Link): FixedPart[] {
  const gradient = wholeGradient(model, link);
  const withInputs = model.covariance.withInputs(gradient);
  const { clock, link: links, transition } = model.frequencyInputs;
  const places = new Map<number, PlanPart & { readonly end: PlanEnd }>([
    [clock[model.clockIndex.get(link.from)!]!, { kind: 'systematic', of: link.from, end: 'from' }],
    [clock[model.clockIndex.get(link.to)!]!, { kind: 'systematic', of: link.to, end: 'to' }],
    [links[model.campaign.links.indexOf(link)]!, { kind: 'systematic', of: link.id, end: 'link' }],
    ...[...transition].map(
      ([id, input]) => [input, { kind: 'ratio', of: id, end: 'ratio' }] as [number, PlanPart & { end: PlanEnd }],
    ),
  ]);
  return gradient.indices.flatMap((input, k) => {
    const variance = gradient.values[k]! * withInputs[input]!;
    return variance === 0 ? [] : [{ ...places.get(input)!, variance }];
  });
}

/** Parts of the statistics after an effective time, s. */
export function statisticalParts({ model, link }: LinkBudget, effectiveS: number): FixedPart[] {
  const { from, to } = clocksOfLink(model, link);
  const ends = [
    { x: from, end: 'from' },
    { x: to, end: 'to' },
    { x: link, end: 'link' },
  ] as const;
  return ends.flatMap(({ x: { id, stability }, end }) => {
    const phase = end === 'link' ? link.segments * linkPhaseNoise(link) ** 2 : 0;
    const parts: FixedPart[] = [
      { kind: 'white', of: id, end, variance: stability.white ** 2 / effectiveS },
      { kind: 'flicker', of: id, end, variance: stability.flicker ** 2 },
      { kind: 'phase', of: id, end, variance: phase / (effectiveS * effectiveS) },
    ];
    return parts.filter(({ variance }) => variance > 0);
  });
}

/** The comparison after wall-clock T.
 * @param T s, > 0; the uptime must not be 0 */
export function planPoint(budget: LinkBudget, T: number): PlanPoint {
  const effectiveS = T * budget.uptime;
  const statistical = statisticalVariance(budget.noise, effectiveS);
  return pointOf(budget, T, statistical, statisticalParts(budget, effectiveS));
}

/** The point of given statistics, with what they are made of. */
export function pointOf(
  { systematicVariance, gravityMs2, fixed }: LinkBudget,
  T: number,
  statistical: number,
  statisticalPartsOfIt: readonly FixedPart[],
): PlanPoint {
  const variance = statistical + systematicVariance;
  const uY = Math.sqrt(variance);
  const parts = [...statisticalPartsOfIt, ...fixed];
  return {
    T,
    uStat: Math.sqrt(statistical),
    uY,
    uH: (uY * C2) / gravityMs2,
    shares: variance > 0 ? sharesOf(statisticalPartsOfIt, fixed, variance) : null,
    limit: variance > 0 ? largest(parts, variance) : null,
  };
}

function largest(parts: readonly FixedPart[], variance: number): PlanLimit | null {
  const first = parts.reduce<FixedPart | null>((best, p) => (best && best.variance >= p.variance ? best : p), null);
  return first && { kind: first.kind, of: first.of, share: first.variance / variance };
}

function sharesOf(statistics: readonly FixedPart[], fixed: readonly FixedPart[], variance: number): PlanShares {
  const sum = (parts: readonly FixedPart[], end: PlanEnd) =>
    parts.reduce((s, p) => (p.end === end ? s + p.variance : s), 0) / variance;
  return {
    statisticsFrom: sum(statistics, 'from'),
    statisticsTo: sum(statistics, 'to'),
    statisticsLink: sum(statistics, 'link'),
    systematicFrom: sum(fixed, 'from'),
    systematicTo: sum(fixed, 'to'),
    systematicLink: sum(fixed, 'link'),
    ratio: sum(fixed, 'ratio'),
  };
}

/** What limits the comparison with the prediction: the largest part of uY², or geodesy where that is larger. */
export function comparisonLimit(budget: LinkBudget, { uY, limit, T }: PlanPoint): PlanLimit | null {
  const { uGeodesyM, gravityMs2, link } = budget;
  if (uGeodesyM === null) return limit;
  const parts = [...statisticalParts(budget, T * budget.uptime), ...budget.fixed];
  const geodesy = ((uGeodesyM * gravityMs2) / C2) ** 2;
  if (uY === 0 && geodesy === 0) return null;
  return largest([...parts, { kind: 'geodesy', of: link.id, end: 'link', variance: geodesy }], uY * uY + geodesy);
}

/** Floor that no averaging passes, as length equivalent, m: flicker and systematics. */
export const floorM = ({ noise, systematicVariance, gravityMs2 }: LinkBudget): number =>
  (Math.sqrt(noise.flicker2 + systematicVariance) * C2) / gravityMs2;

/** Wall-clock time after which uH is down to a length, s; null if it never is. */
export function wallClockForLength(budget: LinkBudget, lengthM: number): number | null {
  const { noise, uptime, gravityMs2, systematicVariance } = budget;
  if (uptime === 0 || !(lengthM > 0)) return null;
  const effective = effectiveTimeForVariance(noise, ((lengthM * gravityMs2) / C2) ** 2 - systematicVariance);
  return effective === null ? null : effective / uptime;
}
