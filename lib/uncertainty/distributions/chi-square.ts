import { DomainError, requireDegreesOfFreedom, requireNumber, requireProbability } from './domain-error.js';
import { regularisedGamma } from './incomplete-gamma.js';
import { standardNormalQuantile } from './normal.js';
import { poissonTerm } from './saddle-point.js';

const check = (x: number, nu: number): void => {
  requireNumber(x, 'x');
  requireDegreesOfFreedom(nu);
};

/** Distribution function P(χ² ≤ x) on ν degrees of freedom; relative accuracy kept in the lower tail.
 * @param x any number; 0 below 0
 * @param nu degrees of freedom, 0 < ν ≤ 2e8, fractional allowed
 * @throws {DomainError} if x is NaN or ν outside
 * @see Abramowitz & Stegun (1964), 26.4.1 */
export const chiSquareCdf = (x: number, nu: number): number => {
  check(x, nu);
  return x <= 0 ? 0 : regularisedGamma(nu / 2, x / 2).lower;
};

/** Probability Q(χ² > x) on ν degrees of freedom, the p-value of a χ² test; relative accuracy kept down to 1e-300.
 * @param x any number; 1 below 0
 * @param nu degrees of freedom, 0 < ν ≤ 2e8, fractional allowed
 * @throws {DomainError} if x is NaN or ν outside
 * @see Abramowitz & Stegun (1964), 26.4.2 */
export const chiSquareUpperTail = (x: number, nu: number): number => {
  check(x, nu);
  return x <= 0 ? 1 : regularisedGamma(nu / 2, x / 2).upper;
};

/** Density of χ² on ν degrees of freedom at x > 0. */
export const chiSquareDensity = (x: number, nu: number): number => {
  check(x, nu);
  if (!(x > 0)) throw new DomainError('x', x, 'a number above 0');
  return x === Infinity ? 0 : ((nu / 2) * poissonTerm(nu / 2, x / 2)) / x;
};

/** The x whose lower (or upper) tail is the given probability, at most ½: Newton's method on ln(tail) against ln x. Both
 *  tails are log-concave in ln x, so the iterates approach the root from one side and cannot leave. */
const fromTail = (tail: 'lower' | 'upper', probability: number, nu: number): number => {
  const a = nu / 2;
  const sign = tail === 'lower' ? 1 : -1;
  const z = sign * standardNormalQuantile(probability);
  // Starts: Wilson–Hilferty (A&S 26.4.17), or near zero the first term of the series for P.
  const cube = 1 - 2 / (9 * nu) + z * Math.sqrt(2 / (9 * nu));
  let x = nu * cube ** 3;
  if (tail === 'lower') {
    const first = 2 * Math.exp((Math.log(probability) - Math.log(poissonTerm(a, 1)) - 1) / a);
    if (!(cube > 0.3)) x = first;
  } else if (!(x > 0)) x = nu;
  if (!(x > 0)) {
    throw new DomainError('probability', probability, `a probability whose χ² on ${nu} degrees of freedom is above 0`);
  }
  for (let i = 0; i < 200; i++) {
    const p = regularisedGamma(a, x / 2)[tail];
    const step = (-sign * p * Math.log(p / probability)) / (a * poissonTerm(a, x / 2));
    const next = x * Math.exp(Math.max(-2, Math.min(2, step)));
    // Newton squares the error: what is left is below rounding. A smaller bound could be missed for ever.
    if (Math.abs(step) < 1e-10) return next;
    x = next;
  }
  return x;
};

/** Quantile of χ² on ν degrees of freedom: the x with P(χ² ≤ x) = p, to 1e-13 relative.
 * @param p probability, 0 < p < 1
 * @param nu degrees of freedom, 0 < ν ≤ 2e8, fractional allowed
 * @throws {DomainError} if p or ν is outside
 * @see Abramowitz & Stegun (1964), 26.4 */
export const chiSquareQuantile = (p: number, nu: number): number => {
  requireProbability(p);
  requireDegreesOfFreedom(nu);
  return p <= 0.5 ? fromTail('lower', p, nu) : fromTail('upper', 1 - p, nu);
};

/** The x that χ² on ν degrees of freedom exceeds with probability q: critical values of small q without 1 − q.
 * @throws {DomainError} as for chiSquareQuantile */
export const chiSquareUpperQuantile = (q: number, nu: number): number => {
  requireProbability(q);
  requireDegreesOfFreedom(nu);
  return q <= 0.5 ? fromTail('upper', q, nu) : fromTail('lower', 1 - q, nu);
};
