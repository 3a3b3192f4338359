import { Decimal } from 'decimal.js';

/** Largest power of ten of the double-double table. */
export const LARGEST_POWER = 80;

const HI = new Float64Array(2 * LARGEST_POWER + 1);
const LO = new Float64Array(2 * LARGEST_POWER + 1);
const Wide = /* @__PURE__ */ Decimal.clone({ precision: 60 });
for (let k = -LARGEST_POWER; k <= LARGEST_POWER; k++) {
  const hi = Number(`1e${k}`);
  HI[k + LARGEST_POWER] = hi;
  // toPrecision prints the double's own digits, which Decimal(number) would not: that takes the shortest text.
  LO[k + LARGEST_POWER] = new Wide(`1e${k}`).minus(hi.toPrecision(60)).toNumber();
}

const SPLIT = 134217729; // 2^27 + 1 (Dekker 1971)

/** (high·10^lowDigits + low)·10^exponent rounded once to a double: exact integers below 2^53 in, one rounding out except where
 *  the value lies within 1e-31 of the middle between two doubles.
 * @param high whole number, 0 ≤ high < 2^53
 * @param low whole number, 0 ≤ low < 10^lowDigits
 * @param lowDigits 0…15
 * @param exponent power of ten, −80…80
 * @see Dekker (1971), Numer. Math. 18:224 (exact product); Clinger (1990) for the short case */
export function scaledByPowerOfTen(high: number, low: number, lowDigits: number, exponent: number): number {
  let mh = high;
  let ml = 0;
  if (lowDigits > 0) {
    const p = HI[lowDigits + LARGEST_POWER]!;
    const product = high * p;
    const error = productError(high, p, product);
    mh = product + low;
    ml = error + (low - (mh - product));
  } else if (exponent >= 0 && exponent <= 22) return high * HI[exponent + LARGEST_POWER]!;
  else if (exponent < 0 && exponent >= -22) return high / HI[LARGEST_POWER - exponent]!;
  const ph = HI[exponent + LARGEST_POWER]!;
  const pl = LO[exponent + LARGEST_POWER]!;
  const product = mh * ph;
  return product + (productError(mh, ph, product) + (mh * pl + ml * ph));
}

function productError(a: number, b: number, product: number): number {
  const ca = SPLIT * a;
  const ah = ca - (ca - a);
  const al = a - ah;
  const cb = SPLIT * b;
  const bh = cb - (cb - b);
  const bl = b - bh;
  return al * bl - (product - ah * bh - al * bh - ah * bl);
}
