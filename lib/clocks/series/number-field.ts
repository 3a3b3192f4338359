import { LARGEST_POWER, scaledByPowerOfTen } from './powers-of-ten.js';

const ZERO = 48;
const DOT = 46;
const PLUS = 43;
const MINUS = 45;

/** 10^k for k = 0…15, exact. */
const TEN = Float64Array.from({ length: 16 }, (_, k) => Number(`1e${k}`));

/** U+2212 in UTF-8: the minus that word processors and journals print. */
const isMinusSign = (b: Uint8Array, i: number): boolean => b[i] === 0xe2 && b[i + 1] === 0x88 && b[i + 2] === 0x92;

/** Where a sign ends: its length in bytes, 0 without one. */
const signLength = (b: Uint8Array, i: number): number =>
  b[i] === MINUS || b[i] === PLUS ? 1 : isMinusSign(b, i) ? 3 : 0;

/** Reads a decimal number from UTF-8 without making an object: the hot path of ten million rows.
 * @param out out[slot] receives the value, correctly rounded
 * @returns position after the number, or −1 if none stands there or its power of ten is beyond ±80 */
export function readNumber(b: Uint8Array, from: number, end: number, out: Float64Array, slot: number): number {
  const sign = signLength(b, from);
  const negative = sign > 0 && b[from] !== PLUS;
  let i = from + sign;
  let high = 0;
  let low = 0;
  let digits = 0;
  let seen = 0;
  let dropped = 0;
  let fraction = 0;
  for (; i < end; i++) {
    const c = b[i]! - ZERO;
    if (c >= 0 && c <= 9) {
      seen++;
      if (digits < 15) high = high * 10 + c;
      else if (digits < 30) low = low * 10 + c;
      else dropped++;
      if (digits > 0 || c > 0) digits++;
      if (fraction > 0) fraction++;
    } else if (c === DOT - ZERO && fraction === 0) fraction = 1;
    else break;
  }
  if (seen === 0) return -1;
  let exponent = dropped - (fraction > 0 ? fraction - 1 : 0);
  if (i < end && (b[i] === 101 || b[i] === 69 || b[i] === 68 || b[i] === 100)) {
    const esign = signLength(b, i + 1);
    const minus = esign > 0 && b[i + 1] !== PLUS;
    let e = 0;
    let k = i + 1 + esign;
    const first = k;
    for (; k < end; k++) {
      const c = b[k]! - ZERO;
      if (!(c >= 0 && c <= 9)) break;
      if (e < 10000) e = e * 10 + c;
    }
    if (k === first) return -1;
    exponent += minus ? -e : e;
    i = k;
  }
  const lowDigits = digits <= 15 ? 0 : Math.min(digits, 30) - 15;
  if (high === 0) out[slot] = 0;
  else {
    if (exponent > LARGEST_POWER || exponent < -LARGEST_POWER) return -1;
    const value = scaledByPowerOfTen(high, low, lowDigits, exponent);
    out[slot] = negative ? -value : value;
  }
  return i;
}

/** Reads an unsigned decimal number in three exact pieces: out[slot] the whole part, out[slot + 1] the first fifteen decimals
 *  and out[slot + 2] the next fifteen, both as whole numbers. So 1.000000000000000001 keeps its last digit.
 * @returns position after the number; −1 for a sign, an exponent, a whole part above 2^53 or no number: those go the slow way */
export function readDecimalPieces(b: Uint8Array, from: number, end: number, out: Float64Array, slot: number): number {
  let i = from;
  let whole = 0;
  let digits = 0;
  for (; i < end; i++) {
    const c = b[i]! - ZERO;
    if (!(c >= 0 && c <= 9)) break;
    whole = whole * 10 + c;
    digits++;
  }
  if (digits === 0 || whole > Number.MAX_SAFE_INTEGER) return -1;
  let high = 0;
  let low = 0;
  let decimals = 0;
  if (i < end && b[i] === DOT) {
    for (i++; i < end; i++) {
      const c = b[i]! - ZERO;
      if (!(c >= 0 && c <= 9)) break;
      if (decimals < 15) high = high * 10 + c;
      else if (decimals < 30) low = low * 10 + c;
      decimals++;
    }
  }
  if (i < end && ((b[i]! | 32) === 101 || (b[i]! | 32) === 100)) return -1;
  out[slot] = whole;
  out[slot + 1] = decimals < 15 ? high * TEN[15 - decimals]! : high;
  out[slot + 2] = decimals <= 15 ? 0 : decimals < 30 ? low * TEN[30 - decimals]! : low;
  return i;
}
