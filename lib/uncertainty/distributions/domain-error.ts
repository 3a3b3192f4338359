/** An argument outside the domain of a distribution, a generator or an algorithm of this folder.
 *  The message names the argument, what was found and what would be right; `code` is stable. */
export class DomainError extends RangeError {
  override readonly name = 'DomainError';
  readonly code: string;
  readonly argument: string;
  readonly found: string;
  readonly expected: string;
  constructor(argument: string, found: number | string, expected: string, code = 'out-of-domain') {
    super(`${argument} = ${found}; expected ${expected}`);
    this.code = code;
    this.argument = argument;
    this.found = String(found);
    this.expected = expected;
  }
}

/** @throws {DomainError} unless 0 < p < 1 */
export const requireProbability = (p: number, argument = 'probability'): void => {
  if (!(p > 0 && p < 1)) throw new DomainError(argument, p, 'a probability between 0 and 1, both excluded');
};

/** @throws {DomainError} unless ν > 0; infinity passes */
export const requireDegreesOfFreedom = (nu: number): void => {
  if (!(nu > 0)) throw new DomainError('degreesOfFreedom', nu, 'a number above 0');
};

/** @throws {DomainError} if x is NaN */
export const requireNumber = (x: number, argument: string): void => {
  if (Number.isNaN(x)) throw new DomainError(argument, x, 'a number');
};
