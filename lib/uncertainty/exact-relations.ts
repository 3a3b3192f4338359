import { backwardSolve, type Matrix, zeros } from './matrix.js';

/** Two exact statements about the same thing that disagree. `row` and `others` are observation indices. */
export class ContradictionError extends Error {
  override readonly name = 'ContradictionError';
  readonly row: number;
  readonly others: readonly number[];
  readonly misclosure: number;
  constructor(row: number, others: readonly number[], misclosure: number) {
    super(`exact observations contradict by ${misclosure}`);
    this.row = row;
    this.others = others;
    this.misclosure = misclosure;
  }
}

/** How far two exact potentials may differ, m²/s²: their rounding in double precision is 1e-8. */
export const EXACT_AGREEMENT_M2S2 = 1e-6;

/** Share of its variance that an observation must keep, once all before it are known, to count as one of its own:
 *  rounding leaves up to 1e-13, and 1e-12 means a part of 1e-6 in u. */
const OWN_VARIANCE = 1e-12;

export interface ExactRelations {
  readonly independent: number[];
  /** Cholesky factor of the covariance of the independent observations */
  readonly factor: Matrix;
  readonly dependent: number[];
  /** T: each dependent observation's error is exactly Σ T·(errors of the independent ones) */
  readonly relation: Matrix;
}

/** Splits observations, in their order, into those with a variance of their own and those whose error is an exact combination
 *  of the errors before them (an exact observation being the empty combination). */
export function exactRelations(covariance: Matrix): ExactRelations {
  const independent: number[] = [];
  const dependent: number[] = [];
  const rows: Float64Array[] = [];
  const halfRelation: Float64Array[] = [];
  covariance.forEach((v, i) => {
    const row = new Float64Array(independent.length + 1);
    let own = v[i]!;
    for (let j = 0; j < independent.length; j++) {
      let sum = v[independent[j]!]!;
      const other = rows[j]!;
      for (let k = 0; k < j; k++) sum -= row[k]! * other[k]!;
      row[j] = sum / other[j]!;
      own -= row[j]! * row[j]!;
    }
    if (own > OWN_VARIANCE * v[i]!) {
      row[independent.length] = Math.sqrt(own);
      independent.push(i);
      rows.push(row);
    } else {
      dependent.push(i);
      halfRelation.push(row);
    }
  });
  const n = independent.length;
  const factor = rows.map((row) => {
    const full = new Float64Array(n);
    full.set(row);
    return full;
  });
  // e_d = r·L⁻¹·e_i, r the row above padded with zeros (observations accepted later are unrelated to it)
  const relation = halfRelation.map((row) => {
    const column = Array.from({ length: n }, (_, j) => Float64Array.of(row[j] ?? 0));
    return Float64Array.from(backwardSolve(factor, column), (x) => x[0]!);
  });
  return { independent, factor, dependent, relation };
}

/** Solves K·w = k for what it fixes: w = S·k + Z·z with z free.
 * @throws {ContradictionError} if rows of K that say the same thing disagree by more than {@link EXACT_AGREEMENT_M2S2} */
export function solveConstraints(
  k: Matrix,
  value: readonly number[],
  unknowns: number,
  name: (row: number) => { readonly row: number; readonly others: readonly number[] },
): { readonly particular: Matrix; readonly nullspace: Matrix; readonly free: number; readonly rank: number } {
  const a = k.map((row) => Float64Array.from(row));
  const combination = k.map((_, i) => {
    const row = new Float64Array(k.length);
    row[i] = 1;
    return row;
  });
  const pivotOf = new Map<number, number>();
  for (let r = 0; r < a.length; r++) {
    const row = a[r]!;
    for (const [column, pr] of pivotOf) reduce(row, combination[r]!, a[pr]!, combination[pr]!, row[column]!);
    let pivot = -1;
    for (let c = 0; c < unknowns; c++)
      if (Math.abs(row[c]!) > 1e-10 && (pivot < 0 || Math.abs(row[c]!) > Math.abs(row[pivot]!))) pivot = c;
    if (pivot < 0) {
      const misclosure = combination[r]!.reduce((s, f, i) => s + f * value[i]!, 0);
      if (!(Math.abs(misclosure) <= EXACT_AGREEMENT_M2S2)) {
        const involved = [...combination[r]!.keys()].filter((i) => i !== r && Math.abs(combination[r]![i]!) > 1e-9);
        const { row: own, others } = name(r);
        throw new ContradictionError(own, [...others, ...involved.map((i) => name(i).row)], misclosure);
      }
      continue;
    }
    const d = row[pivot]!;
    for (let c = 0; c < unknowns; c++) row[c]! /= d;
    for (let c = 0; c < k.length; c++) combination[r]![c]! /= d;
    for (const pr of pivotOf.values()) reduce(a[pr]!, combination[pr]!, row, combination[r]!, a[pr]![pivot]!);
    pivotOf.set(pivot, r);
  }
  const freeColumns = [...Array(unknowns).keys()].filter((c) => !pivotOf.has(c));
  const particular = zeros(unknowns, k.length);
  const nullspace = zeros(unknowns, freeColumns.length);
  freeColumns.forEach((c, j) => {
    nullspace[c]![j] = 1;
    for (const [pivot, r] of pivotOf) nullspace[pivot]![j] = -a[r]![c]!;
  });
  for (const [pivot, r] of pivotOf) particular[pivot]!.set(combination[r]!);
  return { particular, nullspace, free: freeColumns.length, rank: pivotOf.size };
}

function reduce(row: Float64Array, track: Float64Array, by: Float64Array, byTrack: Float64Array, factor: number): void {
  if (factor === 0) return;
  for (let c = 0; c < row.length; c++) row[c]! -= factor * by[c]!;
  for (let c = 0; c < track.length; c++) track[c]! -= factor * byTrack[c]!;
}
