import { chiSquareQuantile } from '../../uncertainty/distributions/index.js';

/** Probability of the intervals printed beside deviations, 68.3 %: that of ±1 standard deviation of a normal law, erf(1/√2). */
export const CONFIDENCE = 0.6826894921370859;

/** Interval for a deviation σ: σ·√(ν/χ²) at the two ends of a central interval.
 * @param deviation estimate, any unit, ≥ 0
 * @param edf equivalent degrees of freedom ν > 0
 * @param confidence probability between the ends
 * @see Riley (2008), NIST SP 1065, eq. 45 */
export function deviationInterval(
  deviation: number,
  edf: number,
  confidence: number = CONFIDENCE,
): { lo: number; hi: number } {
  const tail = (1 - confidence) / 2;
  return {
    lo: deviation * Math.sqrt(edf / chiSquareQuantile(1 - tail, edf)),
    hi: deviation * Math.sqrt(edf / chiSquareQuantile(tail, edf)),
  };
}
