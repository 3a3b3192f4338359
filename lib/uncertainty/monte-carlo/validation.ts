import type { TrialInterval } from './coverage-intervals.js';
import { numericalTolerance } from './numerical-tolerance.js';

/** What the law of propagation says of an output, to be judged by the trials. */
export interface LinearResult {
  /** estimate y = f(x̂) */
  readonly value: number;
  /** standard uncertainty by the linear law, ≥ 0 */
  readonly u: number;
  /** k of the coverage interval y ± k·u: the t quantile of the effective degrees of freedom */
  readonly coverageFactor: number;
}

/** The linear result judged by the trials. */
export interface Validation {
  readonly validated: boolean;
  /** end points y ± k·u, as deviations from the estimate */
  readonly linear: TrialInterval;
  /** end points from the trials (probabilistically symmetric interval), as deviations from the estimate */
  readonly trials: TrialInterval;
  /** |y − U − y_low| and |y + U − y_high| (JCGM 101:2008, eqs. 20, 21) */
  readonly differenceLow: number;
  readonly differenceHigh: number;
  /** δ of the linear u to two digits */
  readonly tolerance: number;
  /** two standard errors of each end point */
  readonly noiseLow: number;
  readonly noiseHigh: number;
  /** whether the trials are enough to tell a difference of δ: both noises at most δ */
  readonly resolved: boolean;
}

/** Whether the linear coverage interval agrees with that of the trials: both ends within δ, half a unit in the last of the digits
 *  of u that are given. A difference is held against the linear result only beyond twice its standard error in the trials, for a run
 *  of 1e5 cannot know an end point better than 0.01 u; `resolved` tells whether that allowance mattered.
 * @see JCGM 101:2008, clause 8 */
export function validate(
  linear: LinearResult,
  trials: TrialInterval,
  standardErrors: { readonly low: number; readonly high: number },
  significantDigits: number,
): Validation {
  const expanded = linear.coverageFactor * linear.u;
  const differenceLow = Math.abs(-expanded - trials.low);
  const differenceHigh = Math.abs(expanded - trials.high);
  const noiseLow = 2 * standardErrors.low;
  const noiseHigh = 2 * standardErrors.high;
  // An exact output, u = 0, has no digit to spare: only equal ends agree.
  const tolerance = linear.u > 0 ? numericalTolerance(linear.u, significantDigits) : 0;
  return {
    validated: differenceLow <= tolerance + noiseLow && differenceHigh <= tolerance + noiseHigh,
    linear: { low: -expanded, high: expanded },
    trials,
    differenceLow,
    differenceHigh,
    tolerance,
    noiseLow,
    noiseHigh,
    resolved: Math.max(noiseLow, noiseHigh) <= tolerance,
  };
}
