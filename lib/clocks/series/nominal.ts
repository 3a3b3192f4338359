import { Decimal } from 'decimal.js';

const Wide = /* @__PURE__ */ Decimal.clone({ precision: 80 });

/** What is taken off a value and what it is then divided by, to make a fraction of it. */
export interface Nominal {
  readonly subtract: Decimal;
  readonly divide: Decimal;
  /** `subtract` in the three exact pieces of a number field: whole part, decimals 1–15, decimals 16–30 */
  readonly pieces: readonly [number, number, number];
  readonly divisor: number;
}

/** y = (value − subtract)/divide. Both are decimal text, because no double holds 429 228 004 229 872.99 or 1 + 1e-18.
 * @param subtract what the column would read at y = 0: the recommended frequency in Hz, the expected beat in Hz, or the ratio
 * @param divide the frequency behind the column in Hz (for a beat the optical one; negative if the beat falls when the clock's
 *   frequency rises), or the ratio
 * @throws {RangeError} if either is no decimal number or `divide` is 0 */
export function nominal(subtract: string | Decimal, divide: string | Decimal): Nominal {
  const read = (text: string | Decimal, name: string): Decimal => {
    try {
      const value = new Wide(typeof text === 'string' ? text.replace(/[\s_]/g, '') : text);
      if (value.isFinite()) return value;
    } catch {
      // falls through: decimal.js says only that the text is no number
    }
    throw new RangeError(`${name} ${JSON.stringify(String(text))}: a decimal number is wanted`);
  };
  const s = read(subtract, 'nominal');
  const d = read(divide, 'divisor');
  if (d.isZero()) throw new RangeError('divisor 0: a frequency or a ratio is wanted');
  const whole = s.trunc();
  const shifted = s.minus(whole).times('1e15');
  const high = shifted.trunc();
  const low = shifted.minus(high).times('1e15');
  return {
    subtract: s,
    divide: d,
    pieces: [whole.toNumber(), high.toNumber(), low.toNumber()],
    divisor: d.toNumber(),
  };
}

/** The recommended ratio ν_B/ν_A of two transitions, to 60 digits, as the nominal of a `ratio` column. */
export function ratioNominal(frequencyBHz: string, frequencyAHz: string): Nominal {
  const ratio = nominal(frequencyBHz, '1').subtract.div(nominal(frequencyAHz, '1').subtract);
  return nominal(ratio, ratio);
}

/** y from a value in exact pieces: the large parts are subtracted as whole numbers, so nothing is lost however long the text is. */
export function fractionFromPieces(whole: number, high: number, low: number, { pieces, divisor }: Nominal): number {
  const dWhole = whole - pieces[0];
  const dHigh = high - pieces[1];
  const dLow = low - pieces[2];
  if (Math.abs(dWhole) > 7) return (dWhole + (dHigh * 1e-15 + dLow * 1e-30)) / divisor;
  // Joined as one whole number while that is exact: 1 − 0.999… would cancel after the rounding of 1e-15·dHigh, and −1 + 0.999…
  // in units of 1e-15 after that of 1e-15·dLow.
  const units = dWhole * 1e15 + dHigh;
  const difference = Math.abs(units) <= 7 ? (units * 1e15 + dLow) * 1e-30 : units * 1e-15 + dLow * 1e-30;
  return difference / divisor;
}

/** y from text that the exact pieces cannot hold (an exponent, a sign, more than sixteen digits before the point). */
export function fractionFromText(text: string, { subtract, divide }: Nominal): number | null {
  if (!/^[+\-−]?(\d+\.?\d*|\.\d+)([eEdD][+\-−]?\d{1,4})?$/.test(text)) return null;
  return new Wide(text.replaceAll('−', '-').replace(/[dD]/, 'e')).minus(subtract).div(divide).toNumber();
}
