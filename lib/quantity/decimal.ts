import { Decimal } from 'decimal.js';

/** Longest text that is read as a number; longer ones are refused before anything looks at them. */
export const MAX_TEXT_LENGTH = 200;

/** Decimal arithmetic of this folder. 250 digits hold every text of MAX_TEXT_LENGTH characters times a unit's factor, so
 *  sums, products and powers of ten are exact; only quotients (°, mm/a) and √km are rounded, far below a double's last bit. */
export const D = /* @__PURE__ */ Decimal.clone({ defaults: true, precision: 250, rounding: 6 });

/** Rounding to the nearest, ties to the even digit (decimal.js numbers its modes; 6 is ROUND_HALF_EVEN). */
export const HALF_EVEN = 6;

export type { Decimal };
