/** A size for a sentence: two digits (or as many as asked), plain where that is readable: `120`, `0.075`, `3.4e-18`. */
export function sizeText(value: number, digits = 2): string {
  const magnitude = Math.abs(value);
  const plain = magnitude === 0 || (magnitude >= 1e-3 && magnitude < 1e6);
  return plain ? String(Number(value.toPrecision(digits))) : String(Number(value.toExponential(digits - 1)));
}

/** A fractional frequency in units of 1e-18, as all sizes of y are given in warnings: `8.2e-18`, `120e-18`. */
export const offsetSizeText = (y: number): string => `${sizeText(y * 1e18)}e-18`;
