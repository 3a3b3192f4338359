/** A stretch of samples that follow each other without a gap: y[first] … y[first + count − 1]. */
export interface Run {
  readonly first: number;
  readonly count: number;
}

/** Phase of the same stretches, count + 1 points each, in units of one sampling interval: x_k = Σ_{i<k} (y_i − ȳ).
 *  The phase is not carried over a gap, because what the clock did there is unknown: every run starts at 0. */
export interface PhaseRecord {
  readonly x: Float64Array;
  /** `first` points into `x`; `count` is the number of phase points, one more than the samples */
  readonly runs: readonly Run[];
  /** ȳ, taken off before summing so that a clock offset of 1e-14 does not eat the digits of a noise of 1e-18 */
  readonly meanFractionalFrequency: number;
}

/** Sum with Neumaier's compensation: the rounding error of every addition is kept and added at the end. */
export function compensatedSum(values: Float64Array, from = 0, to = values.length): number {
  let sum = 0;
  let lost = 0;
  for (let i = from; i < to; i++) {
    const v = values[i]!;
    const t = sum + v;
    lost += Math.abs(sum) >= Math.abs(v) ? sum - t + v : v - t + sum;
    sum = t;
  }
  return sum + lost;
}

/** Mean with every sample equal. A second pass over the residuals takes away the rounding of the first. */
export function meanOf(values: Float64Array): number {
  if (values.length === 0) throw new RangeError('mean of no values');
  const first = compensatedSum(values) / values.length;
  let rest = 0;
  for (let i = 0; i < values.length; i++) rest += values[i]! - first;
  return first + rest / values.length;
}

/** Integrates fractional frequency to phase, run by run, with compensated summation.
 * @param y fractional frequency of every sample, dimensionless, finite
 * @param runs disjoint stretches of `y`, each of at least one sample
 * @throws {RangeError} if a run reaches outside `y`, or for no sample at all */
export function phaseRecordOf(y: Float64Array, runs: readonly Run[]): PhaseRecord {
  const mean = meanOf(y);
  const points = runs.reduce((n, run) => n + run.count + 1, 0);
  const x = new Float64Array(points);
  const phaseRuns: Run[] = [];
  let k = 0;
  for (const { first, count } of runs) {
    if (!(first >= 0 && count >= 1 && first + count <= y.length)) {
      throw new RangeError(`run of ${count} samples from ${first}: outside the ${y.length} samples given`);
    }
    phaseRuns.push({ first: k, count: count + 1 });
    let sum = 0;
    let lost = 0;
    x[k++] = 0;
    for (let i = first; i < first + count; i++) {
      const v = y[i]! - mean - lost;
      const t = sum + v;
      lost = t - sum - v;
      sum = t;
      x[k++] = sum;
    }
  }
  return { x, runs: phaseRuns, meanFractionalFrequency: mean };
}
