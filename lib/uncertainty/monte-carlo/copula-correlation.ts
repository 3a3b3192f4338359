import { CampaignError, faultAt } from '../../campaign/fault.js';
import { HALF_LINE, hermiteCoefficients, ORDERS, standardisedAtScore } from './hermite-coefficients.js';
import { type Shape, sameShape, shapeName, standardDeviationInU } from './trial-input.js';

/** Correlation of normal scores that gives two deviates a stated product-moment correlation. In a Gaussian copula the scores are
 *  normal and jointly so; a monotone map to another shape weakens their correlation, for two uniforms with ρ = 0.9 to 0.891.
 *  The score correlation is therefore solved for: ρ itself for two normals, ρ/E[Z·h(Z)] where one is normal, 2·sin(πρ/6) for two
 *  uniforms (Pearson 1907), the root of Mehler's series otherwise. */
export class CopulaCorrelations {
  readonly #coefficients = new Map<string, Float64Array>();

  #of(shape: Shape): Float64Array {
    const key = shapeName(shape);
    let known = this.#coefficients.get(key);
    if (!known) {
      known = hermiteCoefficients(shape);
      this.#coefficients.set(key, known);
    }
    return known;
  }

  /** Score correlation r for deviates of these shapes with correlation ρ.
   * @throws {CampaignError} `correlation-unreachable` where no r reaches ρ; `correlation-undefined` for a t with ν ≤ 2, which has
   *   no variance and so no correlation */
  scoreCorrelation(a: { name: string; shape: Shape }, b: { name: string; shape: Shape }, rho: number): number {
    for (const { name, shape } of [a, b]) {
      if (standardDeviationInU(shape) === null) {
        throw new CampaignError([
          faultAt(
            'correlation-undefined',
            name,
            `a ${shapeName(shape)} correlated with ${name === a.name ? b.name : a.name}`,
            'more than 2 degrees of freedom, for below it the variance is infinite and a correlation has no meaning; or no shared source',
          ),
        ]);
      }
    }
    const limit = largestCorrelation(a.shape, b.shape);
    // identical shapes reach ±1; the last digits of a stated 1 or of u₁·u₂/(u₁·u₂) are no fault
    if (!(Math.abs(rho) <= limit + 1e-12)) {
      throw new CampaignError([
        faultAt(
          'correlation-unreachable',
          a.name,
          `correlation ${rho} with ${b.name}`,
          `at most ${limit.toFixed(4)} between a ${shapeName(a.shape)} and a ${shapeName(b.shape)} distribution: give both the same distribution, or a lower correlation`,
        ),
      ]);
    }
    if (Math.abs(rho) >= limit) return Math.sign(rho);
    if (a.shape.kind === 'uniform' && b.shape.kind === 'uniform') return 2 * Math.sin((Math.PI * rho) / 6);
    return rootOf(this.#series(a.shape, b.shape, limit), rho);
  }

  /** Coefficients of r, r³, r⁵ … of the product-moment correlation. */
  #series(a: Shape, b: Shape, limit: number): Float64Array {
    const x = this.#of(a);
    const y = this.#of(b);
    const out = new Float64Array(ORDERS + 1);
    let sum = 0;
    for (let k = 0; k < ORDERS; k++) {
      out[k] = x[k]! * y[k]!;
      sum += out[k]!;
    }
    // What the cut-off series lacks at r = 1, where its value is known, is put into one further term.
    out[ORDERS] = limit - sum;
    return out;
  }
}

/** E[h_a(Z)·h_b(Z)]: the correlation of the two shapes when one is a function of the other. */
function largestCorrelation(a: Shape, b: Shape): number {
  if (sameShape(a, b)) return 1;
  let sum = 0;
  for (const { z, weight } of HALF_LINE) {
    if (weight > 0) sum += weight * standardisedAtScore(a, z) * standardisedAtScore(b, z);
  }
  return sum;
}

/** Σ c_n·r^(2n+1) by Horner's rule. */
function valueAt(series: Float64Array, r: number): number {
  let sum = 0;
  for (let n = series.length - 1; n >= 0; n--) sum = sum * r * r + series[n]!;
  return sum * r;
}

/** The r of that value: the sum rises with r (Price 1958: its slope is the mean of the product of two positive slopes). */
function rootOf(series: Float64Array, value: number): number {
  let low = -1;
  let high = 1;
  let r = value;
  for (let i = 0; i < 200; i++) {
    const error = valueAt(series, r) - value;
    if (error > 0) high = r;
    else low = r;
    // secant on the bracket's slope, kept inside by halving
    const h = 1e-7;
    const slope = (valueAt(series, Math.min(1, r + h)) - valueAt(series, r - h)) / (Math.min(1, r + h) - (r - h));
    let next = r - error / slope;
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - r) <= 1e-15) return next;
    r = next;
  }
  return r;
}
