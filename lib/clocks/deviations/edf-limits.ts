import type { DifferenceOrder } from './equivalent-degrees-of-freedom.js';

/** 1/ν → (a0 − a1/r)/r for many overlapping estimates, r = record length over τ. */
export interface LimitCoefficients {
  readonly a0: number;
  readonly a1: number;
}

type Row = Readonly<Record<DifferenceOrder, LimitCoefficients | null>>;

const row = (allan: readonly [number, number] | null, hadamard: readonly [number, number]): Row => ({
  2: allan && { a0: allan[0], a1: allan[1] },
  3: { a0: hadamard[0], a1: hadamard[1] },
});

/** Greenhall & Riley (2003), table 1: modified variances. */
const MODIFIED: Readonly<Record<number, Row>> = {
  2: row([7 / 9, 1 / 2], [22 / 25, 2 / 3]),
  1: row([0.997, 0.616], [1.141, 0.843]),
  0: row([1.033, 0.607], [1.184, 0.848]),
  [-1]: row([1.048, 0.534], [1.18, 0.816]),
  [-2]: row([1.302, 0.535], [1.175, 0.777]),
  [-3]: row(null, [1.194, 0.703]),
  [-4]: row(null, [1.489, 0.702]),
};

/** Greenhall & Riley (2003), table 2: unmodified variances. */
const UNMODIFIED: Readonly<Record<number, Row>> = {
  1: row([790, 410], [9950, 6520]),
  0: row([2 / 3, 1 / 3], [7 / 9, 1 / 2]),
  [-1]: row([0.852, 0.375], [0.997, 0.617]),
  [-2]: row([1.079, 0.368], [1.033, 0.607]),
  [-3]: row(null, [1.053, 0.553]),
  [-4]: row(null, [1.302, 0.535]),
};

const look = (table: Readonly<Record<number, Row>>, alpha: number, order: DifferenceOrder): LimitCoefficients => {
  const found = table[alpha]?.[order];
  if (!found) throw new RangeError(`no limit for noise exponent ${alpha} and difference order ${order}`);
  return found;
};

export const modifiedLimit = (alpha: number, order: DifferenceOrder): LimitCoefficients => look(MODIFIED, alpha, order);

export const continuousLimit = (alpha: number, order: DifferenceOrder): LimitCoefficients =>
  look(UNMODIFIED, alpha, order);

/** s_z(0) of flicker PM for an averaging factor m: b0 + b1·ln m (Greenhall & Riley 2003, table 3). */
export const logarithmicFactor = (order: DifferenceOrder, m: number): number =>
  order === 2 ? 15.23 + 12 * Math.log(m) : 47.8 + 40 * Math.log(m);
