/** A number outside the range in which a formula holds. */
export class QuantityRangeError extends RangeError {
  override readonly name = 'QuantityRangeError';
  readonly code = 'out-of-range';
  readonly quantity: string;
  readonly found: number;
  readonly expected: string;
  constructor(quantity: string, found: number, expected: string) {
    super(`${quantity} = ${found}; expected ${expected}`);
    this.quantity = quantity;
    this.found = found;
    this.expected = expected;
  }
}
