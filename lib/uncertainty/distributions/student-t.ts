import { DomainError, requireDegreesOfFreedom, requireNumber, requireProbability } from './domain-error.js';
import { regularisedBeta } from './incomplete-beta.js';
import { normalDensity, standardNormalCdf, standardNormalCentre, standardNormalQuantile } from './normal.js';
import { stirlingError } from './saddle-point.js';

/** Relative step after which the next, by Newton's squaring, would be below rounding; a smaller bound could be missed for
 *  ever by the rounding of the distribution function. */
const CONVERGED = 1e-10;

/** Whether Hill's expansion is exact to the last digit for this t: its error is about 8e-15·(t/6)¹¹·(1000/ν)⁶ from t = 2 on, measured
 *  against 40-digit values. The continued fraction is slow there. */
const isNearlyNormal = (t: number, nu: number): boolean => nu > 120 * Math.max(t, 2) ** (11 / 6);

/** The normal deviate with the same tail as t on many degrees of freedom: G. W. Hill, Algorithm 395,
 *  Comm. ACM 13 (1970) 617–619, first three terms. */
const equivalentNormalDeviate = (t: number, nu: number): number => {
  const a = nu - 0.5;
  const b = 48 * a * a;
  const y2 = a * Math.log1p((t / nu) * t);
  const third = (((0.4 * y2 + 3.3) * y2 + 24) * y2 + 85.5) / b;
  return Math.sqrt(y2) * (1 + (y2 + 3 - third) / b);
};

/** For t ≥ 0: the probability above t, and that between 0 and t, each to its own relative accuracy. */
const halves = (t: number, nu: number): { readonly tail: number; readonly centre: number } => {
  if (t === Infinity) return { tail: 0, centre: 0.5 };
  if (isNearlyNormal(t, nu)) {
    const z = nu === Infinity ? t : equivalentNormalDeviate(t, nu);
    return z > 39 ? { tail: 0, centre: 0.5 } : { tail: standardNormalCdf(-z), centre: standardNormalCentre(z) };
  }
  const s = (t / nu) * t;
  const { lower, upper } = regularisedBeta(nu / 2, 0.5, 1 / (1 + s), s === Infinity ? 1 : s / (1 + s));
  return { tail: lower / 2, centre: upper / 2 };
};

/** Distribution function P(T ≤ t) of Student's t on ν degrees of freedom, ν > 0, fractional or infinite.
 *  1e-13 relative in the lower tail down to 1e-200; the upper tail is studentTCdf(−t, ν).
 * @throws {DomainError} if t is NaN or ν ≤ 0
 * @see Abramowitz & Stegun (1964), 26.7.1; DLMF 8.17; Hill (1970) near the normal distribution */
export const studentTCdf = (t: number, nu: number): number => {
  requireNumber(t, 't');
  requireDegreesOfFreedom(nu);
  const { tail, centre } = halves(Math.abs(t), nu);
  if (t < 0) return tail;
  return tail < 0.25 ? 1 - tail : 0.5 + centre;
};

/** ln of the density relative to φ(0), by Stirling's formula with its exact error for Γ(a+½)/Γ(a), a = ν/2, so that no Γ and no
 *  power grows large. */
const logRelativeDensity = (t: number, nu: number): number => {
  const a = nu / 2;
  const gammas = stirlingError(a + 0.5) - stirlingError(a) + a * Math.log1p(1 / nu) - 0.5;
  return gammas - (a + 0.5) * Math.log1p((t / nu) * t);
};

/** Density of Student's t on ν degrees of freedom (ν = ∞: normal). */
export const studentTDensity = (t: number, nu: number): number => {
  requireNumber(t, 't');
  requireDegreesOfFreedom(nu);
  if (Math.abs(t) === Infinity) return 0;
  if (nu === Infinity) return normalDensity(t);
  return normalDensity(0) * Math.exp(logRelativeDensity(t, nu));
};

/** t > 0 with the given probability above it, q < ¼: Newton's method on ln(tail) against ln t, which is concave, so that
 *  from the first step on the iterates fall monotonically to the root. */
const fromTail = (q: number, nu: number): number => {
  const z = -standardNormalQuantile(q);
  // Start: first terms of the Cornish–Fisher series (A&S 26.7.5), or the power law of the far tail, whichever is larger.
  const powerLaw = Math.sqrt(nu) * (q * nu ** 0.5 * 2) ** (-1 / nu) * 0.3;
  let t = Math.max(z * (1 + (z * z + 1) / (4 * nu)), Number.isFinite(powerLaw) && nu < 50 ? powerLaw : 0);
  for (let i = 0; i < 200; i++) {
    const { tail } = halves(t, nu);
    if (tail === 0) {
      t /= 2;
      continue;
    }
    // t·density in one exponential: the density alone underflows long before the tail does
    const slope = normalDensity(0) * Math.exp(logRelativeDensity(t, nu) + Math.log(t));
    const step = (tail * Math.log(tail / q)) / slope;
    const next = step < -0.9 * 700 ? t / 2 : t * Math.exp(step);
    if (Math.abs(step) < CONVERGED) return next;
    t = next;
  }
  throw new DomainError(
    'probability',
    q,
    `a probability whose quantile on ${nu} degrees of freedom is a finite number`,
  );
};

/** t > 0 with the given probability c ≤ ¼ between 0 and t: Newton's method, the density falling, so monotone. */
const fromCentre = (c: number, nu: number): number => {
  let t = c / studentTDensity(0, nu);
  for (let i = 0; i < 100; i++) {
    const step = (c - halves(t, nu).centre) / studentTDensity(t, nu);
    t += step;
    if (Math.abs(step) < CONVERGED * t) return t;
  }
  return t;
};

/** Quantile of Student's t on ν degrees of freedom: the t with P(T ≤ t) = p, to 1e-13 relative.
 *  The coverage factor for probability P is studentTQuantile((1 + P)/2, ν).
 * @param p probability, 0 < p < 1
 * @param nu degrees of freedom > 0, fractional or infinite
 * @throws {DomainError} if p or ν is outside, or the quantile is beyond the largest number (ν below 0.01)
 * @see JCGM 100:2008, annex G; Abramowitz & Stegun (1964), 26.7 */
export const studentTQuantile = (p: number, nu: number): number => {
  requireProbability(p);
  requireDegreesOfFreedom(nu);
  if (p === 0.5) return 0;
  if (nu === Infinity) return standardNormalQuantile(p);
  if (p < 0.25) return -fromTail(p, nu);
  if (p > 0.75) return fromTail(1 - p, nu);
  return p < 0.5 ? -fromCentre(0.5 - p, nu) : fromCentre(p - 0.5, nu);
};
