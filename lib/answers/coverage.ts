import type { InputCovariance } from '../uncertainty/covariance.js';
import { type ExpandedUncertainty, expandedUncertainty } from '../uncertainty/coverage.js';
import { effectiveDegreesOfFreedom, varianceBlocks } from '../uncertainty/effective-degrees-of-freedom.js';
import type { Gradient } from '../uncertainty/gradient.js';

/** Expanded uncertainty of a quantity of the model: k from the t distribution on the effective degrees of freedom of its variance,
 *  one block per source and per independent part.
 * @param probability wanted coverage, 0 < p < 1
 * @see GUM G.4.1, G.6.4 */
export function expandedUncertaintyOf(
  covariance: InputCovariance,
  gradient: Gradient,
  probability: number,
): ExpandedUncertainty {
  const dof = effectiveDegreesOfFreedom(varianceBlocks(covariance, gradient));
  return expandedUncertainty(Math.sqrt(covariance.variance(gradient)), probability, dof);
}
