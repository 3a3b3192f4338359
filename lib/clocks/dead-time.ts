import {
  type OscillatorNoise,
  readingsOfMean,
  type Span,
  totalSpanS,
  varianceOfCombAgainstWhole,
  varianceOfReadings,
} from './oscillator-noise.js';

/** A flywheel: an oscillator that runs without gaps and carries a clock's frequency over the times in which the clock does not. */
export interface FlywheelNoise extends OscillatorNoise {
  /** standard uncertainty of its linear frequency drift, per day */
  readonly driftPerDay: number;
}

const DAY_S = 86_400;

/** When a clock measures its flywheel: stated intervals, or a run at the beginning of each of n equal periods from 0 on. */
export type Calibration =
  | { readonly kind: 'intervals'; readonly spans: readonly Span[] }
  | { readonly kind: 'comb'; readonly periods: number; readonly periodS: number; readonly runS: number };

/** When the flywheel stands for its clock in the comparison: the spans, of which a fraction `thinned` is used in gaps that are
 *  short against everything else (1: all of it). */
export interface Use {
  readonly spans: readonly Span[];
  readonly thinned: number;
}

/** Variance that a flywheel adds to a comparison: that of its mean frequency while it is used, minus its mean frequency while the
 *  clock measures it. The dead time of the clock enters by where its gaps lie, not only by how long they are.
 *  Fine thinning costs white noise alone: red noise is the same on both sides of a short gap.
 * @param use spans sorted and disjoint, not empty, s from the beginning
 * @throws {RangeError} nothing used, or nothing measured
 * @see Yu, Weiss & Parker 2007, Metrologia 44, 91 (distributed dead time and offset of the intervals); Douglas & Boulanger 1997,
 *  Proc. 29th PTTI, 345; Leute et al. 2016, IEEE Trans. UFFC 63, 981 (bridged by masers in optical comparisons). The closed form by
 *  generalised covariances is this library's own, checked against the integral over the spectrum and by simulation. */
export function deadTimeVariance(use: Use, calibration: Calibration, noise: FlywheelNoise): number {
  const usedS = totalSpanS(use.spans);
  if (!(usedS > 0 && use.thinned > 0)) throw new RangeError('dead time of a flywheel that is never used');
  const thinning = noise.white ** 2 * (1 / (use.thinned * usedS) - 1 / usedS);
  const [only, ...more] = use.spans;
  if (calibration.kind === 'comb' && more.length === 0 && only!.startS === 0 && isWhole(calibration, only!.endS)) {
    const { periods, periodS, runS } = calibration;
    const drift = driftVariance(noise, usedS / 2 - ((periods - 1) * periodS + runS) / 2);
    return thinning + varianceOfCombAgainstWhole(periods, periodS, runS, noise) + drift;
  }
  const calibrated = calibration.kind === 'intervals' ? calibration.spans : spansOfComb(calibration);
  if (!(totalSpanS(calibrated) > 0)) throw new RangeError('dead time of a flywheel that is never measured');
  const readings = [...readingsOfMean(use.spans, 1), ...readingsOfMean(calibrated, -1)];
  return (
    thinning +
    varianceOfReadings(readings, noise) +
    driftVariance(noise, meanEpochS(use.spans) - meanEpochS(calibrated))
  );
}

/** A drift that was not known is the same error all the time: it grows with the distance of the mean epochs. */
const driftVariance = ({ driftPerDay }: FlywheelNoise, offsetS: number): number =>
  ((driftPerDay * offsetS) / DAY_S) ** 2;

const meanEpochS = (spans: readonly Span[]): number =>
  spans.reduce((s, { startS, endS }) => s + ((endS - startS) * (endS + startS)) / 2, 0) / totalSpanS(spans);

const isWhole = ({ periods, periodS }: { periods: number; periodS: number }, endS: number): boolean =>
  Math.abs(periods * periodS - endS) <= 1e-12 * endS;

export const spansOfComb = ({ periods, periodS, runS }: Calibration & { readonly kind: 'comb' }): Span[] =>
  Array.from({ length: periods }, (_, k) => ({ startS: k * periodS, endS: k * periodS + runS }));

/** A run of `share` at the beginning of each period, as many whole periods of about `cycleS` as fit into T: at least one. */
export function combOver(T: number, cycleS: number, share: number): Calibration & { readonly kind: 'comb' } {
  const periods = Math.max(1, Math.round(T / cycleS));
  const periodS = T / periods;
  return { kind: 'comb', periods, periodS, runS: share * periodS };
}
