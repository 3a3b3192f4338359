import type { Matrix } from '../matrix.js';
import { zeros } from '../matrix.js';

/** L with L·Lᵀ = m, one row per row of m, as many columns as the rank. */
export interface SemidefiniteFactor {
  readonly rows: Matrix;
  readonly rank: number;
}

/** How far below zero an eigenvalue of a correlation matrix may lie by rounding. */
const TOLERANCE = 1e-10;

/** Cholesky factor of a positive semidefinite correlation matrix, largest pivot first, so that a matrix without full rank (a
 *  fully shared error) is factored with as few columns as it needs.
 * @returns the factor, or the index of the row at which the matrix turns out to have a negative eigenvalue
 * @see N. J. Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. (2002), sec. 10.3 */
export function pivotedCholesky(m: Matrix): SemidefiniteFactor | { readonly indefiniteAt: number } {
  const n = m.length;
  const rest = m.map((row) => Float64Array.from(row));
  const columns: Float64Array[] = [];
  const left = new Set(Array.from({ length: n }, (_, i) => i));
  while (left.size > 0) {
    let pivot = -1;
    let most = TOLERANCE;
    for (const i of left) {
      const d = rest[i]![i]!;
      if (d < -TOLERANCE * n) return { indefiniteAt: i };
      if (d > most) {
        most = d;
        pivot = i;
      }
    }
    if (pivot < 0) break;
    const root = Math.sqrt(most);
    const column = new Float64Array(n);
    column[pivot] = root;
    left.delete(pivot);
    for (const i of left) column[i] = rest[i]![pivot]! / root;
    for (const i of left) for (const j of left) rest[i]![j]! -= column[i]! * column[j]!;
    columns.push(column);
  }
  // With vanishing diagonal a semidefinite rest must vanish altogether.
  for (const i of left) for (const j of left) if (Math.abs(rest[i]![j]!) > TOLERANCE * n) return { indefiniteAt: i };
  const rows = zeros(n, columns.length);
  columns.forEach((column, k) => {
    for (let i = 0; i < n; i++) rows[i]![k] = column[i]!;
  });
  return { rows, rank: columns.length };
}
