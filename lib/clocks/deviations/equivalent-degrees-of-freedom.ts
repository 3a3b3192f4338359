import { continuousLimit, logarithmicFactor, modifiedLimit } from './edf-limits.js';

/** Exponent α of the power law S_y(f) ~ f^α: 2 white PM, 1 flicker PM, 0 white FM, −1 flicker FM, −2 random-walk FM,
 *  −3 flicker-walk FM, −4 random-run FM. */
export type NoiseExponent = 2 | 1 | 0 | -1 | -2 | -3 | -4;

/** Order of the phase difference: 2 Allan, 3 Hadamard. */
export type DifferenceOrder = 2 | 3;

export interface DifferenceEstimator {
  readonly order: DifferenceOrder;
  /** phase averaged over τ before differencing (MDEV, TDEV) */
  readonly modified: boolean;
  /** estimates spaced by one sample, or by τ */
  readonly overlapping: boolean;
}

/** Longest sum that is worked out term by term (Greenhall & Riley 2003, J_max). */
const LONGEST_SUM = 100;

const BINOMIAL: Readonly<Record<1 | DifferenceOrder, readonly number[]>> = {
  1: [2, 1],
  2: [6, 4, 1],
  3: [20, 15, 6, 1],
};

/** s_w: generalised autocovariance of integrated phase (eq. 7). A constant factor is left out: only ratios of s_z² are used. */
function sw(t: number, alpha: number): number {
  const a = Math.abs(t);
  if (a === 0) return 0;
  let power = a;
  for (let k = 2; k > alpha; k--) power *= a;
  return alpha % 2 === 0 ? (alpha === 2 ? -power : power) : power * Math.log(a);
}

/** s_x: autocovariance of phase averaged over 1/F of τ (eq. 8); F = ∞ is the continuous limit. */
function sx(t: number, f: number, alpha: number): number {
  if (f === Infinity) return sw(t, alpha + 2);
  const a = Math.abs(t);
  if (alpha === 1 && a * f > 100) {
    // The second difference of t² ln t, expanded in 1/(tF): as it stands it would lose all its digits once F nears 1e8.
    const r2 = 1 / (a * f) ** 2;
    return -(2 * Math.log(a) + 3 - r2 / 6 - (r2 * r2) / 30);
  }
  return f * f * (2 * sw(t, alpha) - sw(t - 1 / f, alpha) - sw(t + 1 / f, alpha));
}

/** s_z: autocovariance of the d-th difference of averaged phase (eq. 9), up to a factor and a sign that depend on α alone.
 * @param t lag in τ
 * @param f τ over the averaging time of phase; ∞ for phase read at instants
 * @param order d = 1, 2, 3; first differences of phase are averages of frequency */
export function differenceAutocovariance(t: number, f: number, alpha: number, order: 1 | DifferenceOrder): number {
  const c = BINOMIAL[order];
  let sum = c[0]! * sx(t, f, alpha);
  for (let k = 1; k <= order; k++) {
    sum += (k % 2 === 0 ? 1 : -1) * c[k]! * (sx(t - k, f, alpha) + sx(t + k, f, alpha));
  }
  return sum;
}

/** Eq. 10: J terms of the sum of squared autocovariances over M estimates spaced τ/S. */
function basicSum(j: number, m: number, s: number, f: number, alpha: number, order: DifferenceOrder): number {
  const square = (t: number): number => differenceAutocovariance(t, f, alpha, order) ** 2;
  let sum = square(0) + (1 - j / m) * square(j / s);
  for (let i = 1; i < j; i++) sum += 2 * (1 - i / m) * square(i / s);
  return sum;
}

/** White PM: differences correlate only at lags that are multiples of τ, so the sum is exact and short (case 4). */
function inverseForWhitePhase(m: number, r: number, order: DifferenceOrder): number {
  const c = BINOMIAL[order];
  let sum = 1;
  for (let k = 1; k <= order && k < r; k++) sum += 2 * (1 - k / r) * (c[k]! / c[0]!) ** 2;
  return sum / m;
}

/** Equivalent degrees of freedom of a difference variance: ν such that ν·s²/σ² is close to χ² with ν degrees of freedom.
 * @param estimator which variance
 * @param alpha noise exponent; α + 2·order > 1, so −2 is the lowest for Allan and −4 for Hadamard
 * @param points phase points of the unbroken record, one more than its samples
 * @param m averaging factor τ/τ0
 * @throws {RangeError} where the variance does not converge for the noise, or the record holds no term
 * @see Greenhall & Riley (2003), Proc. 35th PTTI, 267, eqs. 7–13 and the four cases; Riley (2008), NIST SP 1065, section 5.4.1 */
export function equivalentDegreesOfFreedom(
  estimator: DifferenceEstimator,
  alpha: NoiseExponent,
  points: number,
  m: number,
): number {
  const { order, modified, overlapping } = estimator;
  if (alpha + 2 * order <= 1) {
    throw new RangeError(
      `noise exponent ${alpha}: a difference of order ${order} converges only above ${1 - 2 * order}`,
    );
  }
  const filter = modified ? 1 : m;
  const s = overlapping ? m : 1;
  const length = m / filter + m * order;
  const terms = 1 + Math.floor((s * (points - length)) / m);
  if (!(terms >= 1)) throw new RangeError(`${points} phase points hold no term of length ${length}`);
  const r = terms / s;
  const j = Math.min(terms, (order + 1) * s);
  if (!modified && alpha === 2) return 1 / inverseForWhitePhase(terms, r, order);

  const inLimit = !modified && alpha <= 0;
  if (j <= LONGEST_SUM) {
    const f = inLimit && m * (order + 1) > LONGEST_SUM ? Infinity : filter;
    return (differenceAutocovariance(0, f, alpha, order) ** 2 * terms) / basicSum(j, terms, s, f, alpha, order);
  }
  const scale = !modified && alpha === 1 ? logarithmicFactor(order, m) ** 2 : 1;
  if (r > order + 1) {
    const { a0, a1 } = modified ? modifiedLimit(alpha, order) : continuousLimit(alpha, order);
    return (scale * r) / (a0 - a1 / r);
  }
  // A short record of a large m: the same sum on a coarser grid of 100 places.
  const coarse = LONGEST_SUM / r;
  const f = modified ? 1 : inLimit ? Infinity : coarse;
  const norm = scale === 1 ? differenceAutocovariance(0, f, alpha, order) ** 2 : scale;
  return (norm * LONGEST_SUM) / basicSum(LONGEST_SUM, LONGEST_SUM, coarse, f, alpha, order);
}

/** Coefficients of ν = b·N/m − c for the total variance of N phase points, by α. */
const TOTAL: Readonly<Record<0 | -1 | -2, readonly [b: number, c: number]>> = {
  0: [1.5, 0],
  [-1]: [1.17, 0.22],
  [-2]: [0.93, 0.36],
};

/** Degrees of freedom of the total variance for α = 0, −1, −2; for phase noise those of the overlapping Allan variance, which
 *  reflection does not improve. Stated for τ ≤ T/2. α below −2 is taken as −2.
 * @see Riley (2008), NIST SP 1065, section 5.4.2, table 7 */
export function totalVarianceDegreesOfFreedom(alpha: NoiseExponent, points: number, m: number): number {
  if (alpha > 0) return equivalentDegreesOfFreedom({ order: 2, modified: false, overlapping: true }, alpha, points, m);
  const [b, c] = TOTAL[Math.max(alpha, -2) as 0 | -1 | -2];
  return (b * points) / m - c;
}

/** Degrees of freedom of a variance pooled from stretches, each weighing with its number of terms: 1/ν = Σ w²/ν_k. The stretches
 *  are taken as independent, which holds for white noise and is slightly hopeful for flicker over short gaps. */
export function pooledDegreesOfFreedom(parts: readonly { readonly terms: number; readonly edf: number }[]): number {
  const all = parts.reduce((n, p) => n + p.terms, 0);
  return 1 / parts.reduce((sum, p) => sum + (p.terms / all) ** 2 / p.edf, 0);
}
