import { requireProbability } from './distributions/domain-error.js';
import { chiSquareQuantile, studentTQuantile } from './distributions/index.js';

/** Expanded uncertainty with all that it takes to read it (GUM 7.2.3). */
export interface ExpandedUncertainty {
  /** U = k·u */
  readonly expandedUncertainty: number;
  readonly coverageFactor: number;
  readonly coverageProbability: number;
  /** ν_eff behind k; Infinity for the normal distribution */
  readonly degreesOfFreedom: number;
}

/** Coverage factor k_p: the half-width, in units of u, that holds the fraction p of a t distribution on ν degrees of freedom.
 *  ν is taken as it is; GUM G.4.1 also allows rounding it down to a whole number first, which gives a slightly larger k.
 * @param probability 0 < p < 1
 * @param degreesOfFreedom > 0, fractional or infinite
 * @throws {DomainError} if one is outside
 * @see JCGM 100:2008, G.3.2, eq. (G.1d), table G.2 */
export function coverageFactor(probability: number, degreesOfFreedom: number): number {
  requireProbability(probability, 'coverage probability');
  return studentTQuantile((1 + probability) / 2, degreesOfFreedom);
}

/** Expanded uncertainty U = k·u.
 * @throws {DomainError} as {@link coverageFactor} */
export function expandedUncertainty(
  standardUncertainty: number,
  probability: number,
  degreesOfFreedom: number,
): ExpandedUncertainty {
  const k = coverageFactor(probability, degreesOfFreedom);
  return {
    expandedUncertainty: k * standardUncertainty,
    coverageFactor: k,
    coverageProbability: probability,
    degreesOfFreedom,
  };
}

/** Coverage factor k_p of a hyper-ellipsoidal region (y − ŷ)ᵀ·U⁻¹·(y − ŷ) ≤ k_p² for m normal output quantities: √ of the
 *  χ² quantile on m degrees of freedom; 2.45 for two outputs and p = 0.95.
 * @throws {DomainError} if p is not between 0 and 1, or m is not a whole number above 0
 * @see JCGM 102:2011, 6.5.2 */
export function jointCoverageFactor(probability: number, outputs: number): number {
  requireProbability(probability, 'coverage probability');
  return Math.sqrt(chiSquareQuantile(probability, outputs));
}
