import { DomainError } from './domain-error.js';
import { poissonTerm } from './saddle-point.js';

const TINY = 1e-300;
const EPSILON = 2 ** -53;

/** Above this shape the number of terms, which grows as √a, is no longer worth waiting for. */
const LARGEST_SHAPE = 1e8;

/** P(a, x) by its power series (DLMF 8.7.1 with the factor taken out): all terms positive. */
const series = (a: number, x: number): number => {
  let term = 1;
  let sum = 1;
  for (let n = 1; term > sum * EPSILON; n++) {
    term *= x / (a + n);
    sum += term;
  }
  return poissonTerm(a, x) * sum;
};

/** Q(a, x) by Legendre's continued fraction (DLMF 8.9.2), evaluated by the modified Lentz method. */
const continuedFraction = (a: number, x: number): number => {
  let b = x + 1 - a;
  let c = 1 / TINY;
  let d = 1 / b;
  let h = d;
  for (let i = 1; ; i++) {
    const an = -i * (i - a);
    b += 2;
    d = an * d + b;
    if (Math.abs(d) < TINY) d = TINY;
    c = b + an / c;
    if (Math.abs(c) < TINY) c = TINY;
    d = 1 / d;
    const step = d * c;
    h *= step;
    // Not EPSILON: the factor can hover one rounding off 1 for ever.
    if (Math.abs(step - 1) <= 4 * EPSILON) return a * poissonTerm(a, x) * h;
  }
};

/** Regularised incomplete gamma functions P(a, x) and Q(a, x) = 1 − P, each to its own relative accuracy
 *  (1e-13 for 0.35 ≤ a ≤ 1e7).
 * @param a shape, 0 < a ≤ 1e8
 * @param x ≥ 0, infinity included
 * @throws {DomainError} outside that domain
 * @see DLMF 8.2.4, 8.7.1, 8.9.2 */
export const regularisedGamma = (a: number, x: number): { readonly lower: number; readonly upper: number } => {
  if (!(a > 0 && a <= LARGEST_SHAPE)) throw new DomainError('shape', a, `a number above 0, at most ${LARGEST_SHAPE}`);
  if (!(x >= 0)) throw new DomainError('x', x, 'a number not below 0');
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Infinity) return { lower: 1, upper: 0 };
  if (x < a + 1) {
    const lower = series(a, x);
    return { lower, upper: 1 - lower };
  }
  const upper = continuedFraction(a, x);
  return { lower: 1 - upper, upper };
};
