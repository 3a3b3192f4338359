/** Power-law noise of an oscillator, as Allan deviations: `white` and `phase` at 1 s, falling as τ^(−1/2) and τ^(−1); `flicker`
 *  the floor, the same at every τ; `randomWalk` at 1 s, rising as τ^(1/2). */
export interface OscillatorNoise {
  readonly white: number;
  readonly flicker: number;
  readonly randomWalk: number;
  readonly phase: number;
}

/** A phase reading x(t), taken with a weight: a mean frequency over [a, b] is (x(b) − x(a))/(b − a). */
export interface PhaseReading {
  readonly atS: number;
  /** s⁻¹ */
  readonly weightPerS: number;
}

/** Readings of the mean over a set of intervals: Σ (x(end) − x(start)) over their total length. */
export function readingsOfMean(intervals: readonly Span[], factor: number): PhaseReading[] {
  const weightPerS = factor / totalSpanS(intervals);
  return intervals.flatMap(({ startS, endS }) => [
    { atS: startS, weightPerS: -weightPerS },
    { atS: endS, weightPerS },
  ]);
}

/** An interval of time, s from any zero. */
export interface Span {
  readonly startS: number;
  readonly endS: number;
}

export const totalSpanS = (spans: readonly Span[]): number =>
  spans.reduce((s, { startS, endS }) => s + endS - startS, 0);

/** Variance of Σ w_i·x(t_i) for readings whose weights add up to 0 and whose mean frequency cancels too (Σ w_i = Σ w_i·t_i = 0):
 *  then Var = Σ_i Σ_j w_i·w_j·K(t_i − t_j) with the generalised covariance K of the noise (Matheron 1973, Adv. Appl. Prob. 5,
 *  439), which is the integral ∫ S_y(f)·|G(f)|² df over the spectrum with the transfer function G of the weights:
 *  white FM −σ²|τ|/2, flicker FM σ²τ²·ln|τ|/(4·ln 2), random walk FM σ²|τ|³/4. The factors are those that give the Allan
 *  variance for its own weights (Riley 2008, NIST SP 1065, section 3.2). White phase noise is independent from reading to
 *  reading, with σ_x² = σ_y²(1 s)·(1 s)²/3.
 *  Rounding: some 1e-14 of the Allan variance at the whole span, which matters only where next to nothing is left.
 * @param readings in any order; equal times are joined
 * @returns dimensionless, ≥ 0 */
export function varianceOfReadings(readings: readonly PhaseReading[], noise: OscillatorNoise): number {
  const { t, w, scale } = joined(readings);
  let flicker = 0;
  let white = 0;
  let walk = 0;
  let phase = 0;
  for (let i = 0; i < t.length; i++) {
    phase += w[i]! * w[i]!;
    for (let j = 0; j < i; j++) {
      const tau = t[i]! - t[j]!;
      const ww = w[i]! * w[j]!;
      white -= ww * tau;
      flicker += ww * tau * tau * Math.log(tau);
      walk += ww * tau * tau * tau;
    }
  }
  return Math.max(0, combined(noise, { white, flicker, walk, phase }, scale));
}

/** Sums over pairs i > j in units of `scale`, with the factors of the noises; each pair counts twice. */
const combined = (
  n: OscillatorNoise,
  sum: { readonly white: number; readonly flicker: number; readonly walk: number; readonly phase: number },
  scale: number,
): number =>
  n.white ** 2 * sum.white * scale +
  ((n.flicker ** 2 * sum.flicker) / (2 * Math.LN2)) * scale ** 2 +
  ((n.randomWalk ** 2 * sum.walk) / 2) * scale ** 3 +
  (n.phase ** 2 * sum.phase) / 3;

/** Times in units of the whole span: τ²·ln τ may be rescaled, since what that adds is Σ w_i·w_j·τ², which is 0. */
function joined(readings: readonly PhaseReading[]): {
  readonly t: Float64Array;
  readonly w: Float64Array;
  readonly scale: number;
} {
  const sorted = [...readings].sort((a, b) => a.atS - b.atS);
  const first = sorted[0]?.atS ?? 0;
  const scale = (sorted.at(-1)?.atS ?? 0) - first || 1;
  const t: number[] = [];
  const w: number[] = [];
  for (const { atS, weightPerS } of sorted) {
    const at = (atS - first) / scale;
    if (t.length > 0 && t.at(-1) === at) w[w.length - 1]! += weightPerS;
    else {
      t.push(at);
      w.push(weightPerS);
    }
  }
  return { t: Float64Array.from(t), w: Float64Array.from(w), scale };
}

/** The same for the mean over [0, nP] minus the mean over the first `runS` of each of n periods P, without going through all
 *  pairs: the lags of a comb repeat, so that the work grows with n and not with n².
 * @param periods n ≥ 1
 * @param periodS P
 * @param runS 0 < runS ≤ P */
export function varianceOfCombAgainstWhole(
  periods: number,
  periodS: number,
  runS: number,
  noise: OscillatorNoise,
): number {
  if (runS >= periodS) return 0;
  const whole = periods * periodS;
  // in units of the whole: periods of length p, runs of length r, weights of the comb c and of the whole 1
  const p = 1 / periods;
  const r = runS / whole;
  const c = 1 / (periods * r);
  const kernel = (tau: number): readonly [number, number, number] => {
    const a = Math.abs(tau);
    return a === 0 ? [0, 0, 0] : [-a, a * a * Math.log(a), a * a * a];
  };
  const sum = [0, 0, 0];
  const add = (weight: number, tau: number) => {
    const k = kernel(tau);
    for (let i = 0; i < 3; i++) sum[i]! += weight * k[i]!;
  };
  for (let d = -(periods - 1); d < periods; d++) {
    const pairs = periods - Math.abs(d);
    add(2 * c * c * pairs, d * p);
    add(-c * c * pairs, d * p + r);
    add(-c * c * pairs, d * p - r);
  }
  // the comb's readings are −c at each start and +c at each end, the whole's +1 at 0 and −1 at 1
  add(-2, 1);
  for (let k = 0; k < periods; k++) {
    add(-2 * c, k * p);
    add(2 * c, k * p + r);
    add(2 * c, 1 - k * p);
    add(-2 * c, 1 - k * p - r);
  }
  // the comb's first start and the whole's are one reading
  const phase = 2 * periods * c * c + 2 - 2 * c;
  // a pair counts once in what `combined` takes, and a weight of 1 here is 1/whole
  const pairs = (s: number) => s / 2 / whole ** 2;
  const sums = { white: pairs(sum[0]!), flicker: pairs(sum[1]!), walk: pairs(sum[2]!), phase: phase / whole ** 2 };
  return Math.max(0, combined(noise, sums, whole));
}
