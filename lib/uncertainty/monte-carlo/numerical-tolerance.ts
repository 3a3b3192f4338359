import { DomainError } from '../distributions/domain-error.js';

/** Numerical tolerance δ of a standard uncertainty: half a unit in its last digit that is regarded as meaningful. Written
 *  u = c·10^l with c a whole number of `significantDigits` digits, δ = ½·10^l.
 * @param u > 0, finite
 * @param significantDigits 1 or 2
 * @see JCGM 101:2008, 7.9.2 */
export function numericalTolerance(u: number, significantDigits: number): number {
  if (!(u > 0 && u < Infinity)) throw new DomainError('u', u, 'a finite number above 0');
  if (significantDigits !== 1 && significantDigits !== 2)
    throw new DomainError('significantDigits', significantDigits, '1 or 2');
  // The exponent after rounding: 0.0996 to two digits is 10·10⁻², not 1.0·10⁻¹ with another l.
  const exponent = Number(u.toExponential(significantDigits - 1).split('e')[1]);
  return Number(`0.5e${exponent - significantDigits + 1}`);
}
