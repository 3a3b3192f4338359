import type { Clock, Link, TimeInterval } from '../campaign/campaign.js';
import { type Calibration, combOver, deadTimeVariance, type Use } from '../clocks/dead-time.js';
import { intersectionOfIntervals } from '../clocks/intervals.js';
import { type Span, totalSpanS } from '../clocks/oscillator-noise.js';
import { clocksOfLink } from '../model/model.js';
import { formatInstant } from '../quantity/index.js';
import { type LinkBudget, type PlanPoint, pointOf, statisticalParts } from './plan-budget.js';
import type { Met } from './plan-calendar.js';

/** A comparison whose gaps a flywheel bridges: a clock with one counts for all the time the flywheel runs. */
export interface BridgedPoint extends PlanPoint {
  /** what the flywheels add over the gaps, as a fraction of frequency; part of uStat */
  readonly uDeadTime: number;
}

export interface BridgedPlan {
  /** clocks whose gaps are bridged */
  readonly clocks: readonly string[];
  /** at the times of the plan's curve. Where gaps are stated intervals: up to the window's length, times at which there is
   *  data of all */
  readonly curve: readonly BridgedPoint[];
  readonly window: BridgedPoint | null;
  /** first wall-clock time with uH down to the target, s; null if there is none */
  readonly timeToTarget: number | null;
  readonly targetMet: Met | null;
}

/** Longest time that is looked at for the target, s: three years. */
const LONGEST_S = 1e8;

/** The plan of a link with at least one flywheel; null without.
 *
 *  The link compares what stands for the clocks: clocks without flywheel while they run, flywheels all the time. A clock with one
 *  measures it in its own runs, and its noise averages over these. The flywheel adds the difference of its mean frequency
 *  between the two sets of times (dead-time.ts). Stated uptimes of everything else are taken as gaps that are short against
 *  the cycle. Plain means, without weights. */
export function bridgedPlan(budget: LinkBudget, timesS: readonly number[]): BridgedPlan | null {
  const { model, link } = budget;
  const { campaign } = model;
  const { from, to } = clocksOfLink(model, link);
  const bridged = [from, to].filter((c) => c.flywheel !== undefined);
  if (bridged.length === 0) return null;
  const { window, targetM } = campaign;
  const windowS = window ? (window.endMs - window.startMs) / 1000 : null;
  const stated = [from, to, link].some((x) => x.available !== null);
  const longestS = stated ? (windowS ?? 0) : LONGEST_S;
  const at = (T: number) => bridgedPoint(budget, bridged, T);
  const inPlan = (T: number) => (T <= longestS ? at(T) : null);
  const timeToTarget = targetM === null ? null : firstTime(at, candidateTimes(budget, longestS, stated), targetM);
  return {
    clocks: bridged.map(({ id }) => id),
    curve: timesS.flatMap((T) => inPlan(T) ?? []),
    window: windowS === null ? null : at(windowS),
    timeToTarget,
    targetMet:
      timeToTarget === null || !window
        ? null
        : {
            at: formatInstant(Math.ceil((window.startMs + 1000 * timeToTarget) / 1000) * 1000),
            inWindow: timeToTarget <= windowS!,
          },
  };
}

/** Null where one of the sets of times is empty so far. */
function bridgedPoint(budget: LinkBudget, bridged: readonly Clock[], T: number): BridgedPoint | null {
  const { link, model } = budget;
  const { from, to } = clocksOfLink(model, link);
  const start = model.campaign.window?.startMs ?? 0;
  const others = [link, from, to].filter((x) => !bridged.includes(x as Clock));
  const use = useOf(others, start, T);
  const usedS = use.thinned * totalSpanS(use.spans);
  if (!(usedS > 0)) return null;
  let statistical = 0;
  let deadTime = 0;
  const parts: ReturnType<typeof statisticalParts> = [];
  const take = (x: Clock | Link, timeS: number) => {
    const own = statisticalParts(budget, timeS).filter(({ of }) => of === x.id);
    for (const p of own) statistical += p.variance;
    parts.push(...own);
  };
  for (const x of others) take(x, usedS);
  for (const clock of bridged) {
    const calibration = calibrationOf(clock, start, T);
    const measuredS =
      calibration.kind === 'comb' ? calibration.periods * calibration.runS : totalSpanS(calibration.spans);
    if (!(measuredS > 0)) return null;
    take(clock, measuredS);
    const variance = deadTimeVariance(use, calibration, clock.flywheel!);
    deadTime += variance;
    parts.push({ kind: 'dead-time', of: clock.id, end: clock === from ? 'from' : 'to', variance });
  }
  return { ...pointOf(budget, T, statistical + deadTime, parts), uDeadTime: Math.sqrt(deadTime) };
}

/** When the link compares: while everything that isn't bridged runs. */
function useOf(others: readonly (Clock | Link)[], startMs: number, T: number): Use {
  const stated = others.flatMap((x) => (x.available ? [x.available] : []));
  const whole: TimeInterval = { startMs, endMs: startMs + 1000 * T };
  return {
    spans: spansFrom(intersectionOfIntervals([...stated, [whole]]), startMs),
    thinned: others.reduce((p, x) => (x.available ? p : p * x.uptime), 1),
  };
}

function calibrationOf(clock: Clock, startMs: number, T: number): Calibration {
  if (clock.available === null) return combOver(T, clock.flywheel!.cycleS!, clock.uptime);
  const whole: TimeInterval = { startMs, endMs: startMs + 1000 * T };
  return { kind: 'intervals', spans: spansFrom(intersectionOfIntervals([clock.available, [whole]]), startMs) };
}

const spansFrom = (intervals: readonly TimeInterval[], startMs: number): Span[] =>
  intervals.map((i) => ({ startS: (i.startMs - startMs) / 1000, endS: (i.endMs - startMs) / 1000 }));

/** Times at which the target is looked for: a fine grid, and the ends of stated intervals. */
function candidateTimes({ model, link }: LinkBudget, longestS: number, stated: boolean): number[] {
  if (!stated) return Array.from({ length: 241 }, (_, i) => 100 * (longestS / 100) ** (i / 240));
  const { from, to } = clocksOfLink(model, link);
  const start = model.campaign.window?.startMs ?? 0;
  const ends = [link, from, to].flatMap((x) => (x.available ?? []).map(({ endMs }) => (endMs - start) / 1000));
  const grid = Array.from({ length: 200 }, (_, i) => ((i + 1) * longestS) / 200);
  return [...ends, ...grid].filter((T) => T > 0 && T <= longestS).sort((a, b) => a - b);
}

/** First time at which uH is down to a length, by the grid and bisection between its times. */
function firstTime(at: (T: number) => BridgedPoint | null, times: readonly number[], lengthM: number): number | null {
  const isMet = (T: number) => (at(T)?.uH ?? Number.POSITIVE_INFINITY) <= lengthM;
  const k = times.findIndex(isMet);
  if (k < 0) return null;
  let [low, high] = [times[k - 1] ?? 0, times[k]!];
  while (high - low > 1) {
    const middle = (low + high) / 2;
    if (middle > 0 && isMet(middle)) high = middle;
    else low = middle;
  }
  return high;
}
