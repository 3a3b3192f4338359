import type { TimeInterval } from '../campaign/campaign.js';
import { compensatedSum, phaseRecordOf, type Run } from './deviations/index.js';
import { intersectionOfIntervals } from './intervals.js';
import { type MeanUncertainty, meanUncertainty } from './mean-uncertainty.js';
import { type FrequencySeries, lengthOfSampleS } from './series/index.js';
import { SmoothCorrection } from './smooth-correction.js';

/** What goes into the mean of a series besides the series. */
export interface ReductionOptions {
  /** when each partner was valid: one list for clock A, one for clock B, one for the link … A sample counts only if all of it lies
   *  in all of them. Needs a series with dates. */
  readonly validity?: readonly (readonly TimeInterval[])[];
  /** time-variable part of what the clocks feel, to be taken off y: fraction as a function of UTC [ms since 1970]. The static part
   *  is not touched. Called every ten minutes and interpolated; must be smooth at that scale, as tides are. */
  readonly correction?: (timeMs: number) => number;
  /** fit a linear drift and give the mean at the middle of the valid time */
  readonly drift?: boolean;
}

export interface Reduction {
  /** mean fractional frequency, each sample weighing with its length */
  readonly mean: number;
  readonly uncertainty: MeanUncertainty;
  /** samples that went in */
  readonly samples: number;
  /** samples left out because they lie wholly or partly outside the validity */
  readonly outside: number;
  /** sum of the lengths of the samples used [s] */
  readonly validS: number;
  /** from the start of the first sample used to the end of the last [s] */
  readonly spanS: number;
  /** spanS − validS: what a clock did then is unknown and not guessed */
  readonly deadS: number;
  /** mean of the correction that was taken off; null without */
  readonly correctionMean: number | null;
  /** drift [1/s] with the standard uncertainty that white noise would give it; null if not asked for */
  readonly drift: { readonly perSecond: number; readonly u: number | null } | null;
  readonly startS: number;
  readonly endS: number;
}

/** Mean of a frequency series over the time in which all partners were valid, corrected for what varies with time.
 *  The weight of a sample is its length, so that the mean is that of all valid time. Dead time is stated, not bridged: a mean over
 *  valid time stands for the whole span only as far as the clocks did nothing else in between.
 * @throws {RangeError} if validity or a correction is given for a series without dates, or no sample is left */
export function reduceSeries(series: FrequencySeries, options: ReductionOptions = {}): Reduction {
  const { validity, correction } = options;
  if (series.originMs === null && (validity !== undefined || correction !== undefined)) {
    throw new RangeError('the series has no dates: validity and corrections cannot be matched to it');
  }
  const selected = validity === undefined ? everything(series) : within(series, intersectionOfIntervals(validity));
  if (selected.y.length === 0) throw new RangeError('no sample lies within the validity of all partners');
  const correctionMean = correction === undefined ? null : takeOff(selected, series.originMs!, correction);
  const { startS, lengthS } = selected;
  const validS = compensatedSum(lengthS);
  const drift = options.drift ? takeOffDrift(selected, validS) : null;
  const { y } = selected;
  const mean = weightedMean(y, lengthS, validS);
  const record = phaseRecordOf(y, selected.runs);
  const n = y.length;
  const scatter = n < 2 ? null : scatterOfMean(y, lengthS, mean, validS);
  const endS = startS[n - 1]! + lengthS[n - 1]!;
  const spanS = endS - startS[0]!;
  return {
    mean,
    // With dead time a sample stands for its whole spacing: it is the number of samples that white noise averages over.
    uncertainty: meanUncertainty(record, series.intervalS, (validS * series.intervalS) / series.sampleS, scatter),
    samples: n,
    outside: series.y.length - n,
    validS,
    spanS,
    deadS: Math.max(0, spanS - validS),
    correctionMean,
    drift,
    startS: startS[0]!,
    endS,
  };
}

/** The samples that go into the mean, freed of the correction: those wholly inside the validity of all partners.
 * @throws {RangeError} as `reduceSeries` does */
export function reducedSamples(series: FrequencySeries, options: Omit<ReductionOptions, 'drift'>): FrequencySeries {
  const { validity, correction } = options;
  if (series.originMs === null && (validity !== undefined || correction !== undefined))
    throw new RangeError('the series has no dates: validity and corrections cannot be matched to it');
  const selected = validity === undefined ? everything(series) : within(series, intersectionOfIntervals(validity));
  if (selected.y.length === 0) throw new RangeError('no sample lies within the validity of all partners');
  if (correction !== undefined) takeOff(selected, series.originMs!, correction);
  const { y, startS, lengthS, runs } = selected;
  return { ...series, y, startS, lengthS, runs, u: null };
}

interface Selected {
  y: Float64Array;
  startS: Float64Array;
  lengthS: Float64Array;
  runs: readonly Run[];
}

const lengthsOf = (series: FrequencySeries): Float64Array =>
  series.lengthS ?? new Float64Array(series.y.length).fill(series.sampleS);

const everything = (series: FrequencySeries): Selected => ({
  y: series.y,
  startS: series.startS,
  lengthS: lengthsOf(series),
  runs: series.runs,
});

/** Samples that lie wholly inside the valid time. A sample cut by an edge averages over time in which a partner was not right, so
 *  no part of it can be kept. Edges may be off by a millisecond, the unit in which validity is written. */
function within(series: FrequencySeries, valid: readonly TimeInterval[]): Selected {
  const n = series.y.length;
  const keep = new Uint8Array(n);
  let v = 0;
  let count = 0;
  for (let i = 0; i < n; i++) {
    const from = series.originMs! + 1000 * series.startS[i]!;
    const to = from + 1000 * lengthOfSampleS(series, i);
    while (v < valid.length && valid[v]!.endMs < to - 1) v++;
    if (v === valid.length) break;
    if (valid[v]!.startMs <= from + 1) {
      keep[i] = 1;
      count++;
    }
  }
  const y = new Float64Array(count);
  const startS = new Float64Array(count);
  const lengthS = new Float64Array(count);
  const runs: Run[] = [];
  let k = 0;
  for (const { first, count: samples } of series.runs) {
    let from = k;
    for (let i = first; i < first + samples; i++) {
      if (keep[i] === 1) {
        y[k] = series.y[i]!;
        startS[k] = series.startS[i]!;
        lengthS[k++] = lengthOfSampleS(series, i);
      } else {
        if (k > from) runs.push({ first: from, count: k - from });
        from = k;
      }
    }
    if (k > from) runs.push({ first: from, count: k - from });
  }
  return { y, startS, lengthS, runs };
}

/** y minus the correction averaged over each sample; the caller's array is left as it is. */
function takeOff(selected: Selected, originMs: number, correction: (timeMs: number) => number): number {
  const smooth = new SmoothCorrection(correction);
  const y = new Float64Array(selected.y.length);
  let weighted = 0;
  let total = 0;
  for (let i = 0; i < y.length; i++) {
    const length = selected.lengthS[i]!;
    const off = smooth.meanOver(originMs + 1000 * selected.startS[i]!, 1000 * length);
    y[i] = selected.y[i]! - off;
    weighted += off * length;
    total += length;
  }
  selected.y = y;
  return weighted / total;
}

function weightedMean(y: Float64Array, weights: Float64Array, total: number): number {
  // Twice, so that the rounding of the first mean is made good by the mean of the residuals.
  let first = 0;
  for (let i = 0; i < y.length; i++) first += y[i]! * (weights[i]! / total);
  let rest = 0;
  for (let i = 0; i < y.length; i++) rest += (y[i]! - first) * (weights[i]! / total);
  return first + rest;
}

/** Least-squares line through the samples, weighted by length and centred on the middle of the valid time; takes the slope out. */
function takeOffDrift(selected: Selected, validS: number): { perSecond: number; u: number | null } {
  const { y, startS, lengthS } = selected;
  const n = y.length;
  if (n < 3) throw new RangeError(`${n} samples: a drift needs three`);
  const middle = Float64Array.from(startS, (t, i) => t + 0.5 * lengthS[i]!);
  const centre = weightedMean(middle, lengthS, validS);
  const level = weightedMean(y, lengthS, validS);
  let tt = 0;
  let ty = 0;
  for (let i = 0; i < n; i++) {
    const t = middle[i]! - centre;
    tt += lengthS[i]! * t * t;
    ty += lengthS[i]! * t * (y[i]! - level);
  }
  const perSecond = ty / tt;
  const free = y.map((v, i) => v - perSecond * (middle[i]! - centre));
  let squares = 0;
  for (let i = 0; i < n; i++) squares += lengthS[i]! * (free[i]! - level) ** 2;
  selected.y = free;
  return { perSecond, u: Math.sqrt(squares / (n - 2) / tt) };
}

/** Standard uncertainty of the weighted mean from the scatter of independent samples whose variances go as 1/length. */
function scatterOfMean(y: Float64Array, lengthS: Float64Array, mean: number, validS: number): number {
  let squares = 0;
  for (let i = 0; i < y.length; i++) squares += lengthS[i]! * (y[i]! - mean) ** 2;
  return Math.sqrt(squares / (y.length - 1) / validS);
}
