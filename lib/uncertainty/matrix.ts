/** Dense matrices as rows; small helpers for the adjustment. */
export type Matrix = Float64Array[];

export const zeros = (rows: number, columns: number): Matrix =>
  Array.from({ length: rows }, () => new Float64Array(columns));

export const identity = (n: number): Matrix => {
  const m = zeros(n, n);
  for (let i = 0; i < n; i++) m[i]![i] = 1;
  return m;
};

export const transpose = (m: Matrix, columns = m[0]?.length ?? 0): Matrix => {
  const t = zeros(columns, m.length);
  m.forEach((row, i) => {
    for (let j = 0; j < columns; j++) t[j]![i] = row[j]!;
  });
  return t;
};

/** a·b; zeros of `a` are skipped, since design matrices are mostly zeros. */
export function multiply(a: Matrix, b: Matrix, columns = b[0]?.length ?? 0): Matrix {
  return a.map((row) => {
    const out = new Float64Array(columns);
    for (let k = 0; k < row.length; k++) {
      const f = row[k]!;
      if (f === 0) continue;
      const other = b[k]!;
      for (let j = 0; j < columns; j++) out[j]! += f * other[j]!;
    }
    return out;
  });
}

/** Lower Cholesky factor of a symmetric positive definite matrix, or null if a pivot is not positive. */
export function cholesky(m: Matrix): Matrix | null {
  const n = m.length;
  const l = zeros(n, n);
  for (let i = 0; i < n; i++) {
    const li = l[i]!;
    for (let j = 0; j <= i; j++) {
      const lj = l[j]!;
      let sum = m[i]![j]!;
      for (let k = 0; k < j; k++) sum -= li[k]! * lj[k]!;
      if (j < i) li[j] = sum / lj[j]!;
      else if (sum > 0) li[i] = Math.sqrt(sum);
      else return null;
    }
  }
  return l;
}

/** L⁻¹·b for a lower triangular L, column by column of b. */
export function forwardSolve(l: Matrix, b: Matrix): Matrix {
  const x = b.map((row) => Float64Array.from(row));
  for (let i = 0; i < l.length; i++) {
    const xi = x[i]!;
    for (let k = 0; k < i; k++) {
      const f = l[i]![k]!;
      if (f === 0) continue;
      const xk = x[k]!;
      for (let j = 0; j < xi.length; j++) xi[j]! -= f * xk[j]!;
    }
    const d = l[i]![i]!;
    for (let j = 0; j < xi.length; j++) xi[j]! /= d;
  }
  return x;
}

/** L⁻ᵀ·b for a lower triangular L. */
export function backwardSolve(l: Matrix, b: Matrix): Matrix {
  const x = b.map((row) => Float64Array.from(row));
  for (let i = l.length - 1; i >= 0; i--) {
    const xi = x[i]!;
    const d = l[i]![i]!;
    for (let j = 0; j < xi.length; j++) xi[j]! /= d;
    for (let k = 0; k < i; k++) {
      const f = l[i]![k]!;
      if (f === 0) continue;
      const xk = x[k]!;
      for (let j = 0; j < xi.length; j++) xk[j]! -= f * xi[j]!;
    }
  }
  return x;
}

/** m⁻¹·b from the Cholesky factor of m. */
export const choleskySolve = (l: Matrix, b: Matrix): Matrix => backwardSolve(l, forwardSolve(l, b));
