import { exactRelations, solveConstraints } from './exact-relations.js';
import {
  backwardSolve,
  cholesky,
  choleskySolve,
  forwardSolve,
  type Matrix,
  multiply,
  transpose,
  zeros,
} from './matrix.js';

/** Linear Gauss–Markov model l = A·w + e, E(e) = 0, cov(e) = V; V may be singular. */
export interface LeastSquaresProblem {
  /** A, one row per observation */
  readonly design: Matrix;
  /** l */
  readonly observed: Float64Array;
  /** V, the full covariance of the observations */
  readonly covariance: Matrix;
  /** number of unknowns (columns of A) */
  readonly unknowns: number;
}

export interface LeastSquaresSolution {
  /** ŵ */
  readonly estimate: Float64Array;
  /** G with ŵ = G·l at these weights: how each observation moves each unknown */
  readonly gain: Matrix;
  /** l − A·ŵ; 0 for an exact relation */
  readonly residual: Float64Array;
  readonly chi2: number;
  readonly dof: number;
  /** observations with a variance of their own; the others only state exact relations */
  readonly independent: readonly number[];
  /** what a test of the observations needs; null where nothing is redundant */
  readonly weights: {
    /** Cholesky factor of V of the independent observations */
    readonly factor: Matrix;
    /** B: design of the independent observations in the unknowns left free by exact relations */
    readonly reducedDesign: Matrix;
    /** V⁻¹·B */
    readonly weightedDesign: Matrix;
    /** Cholesky factor of N = Bᵀ·V⁻¹·B */
    readonly normalFactor: Matrix;
  } | null;
}

/** The observations leave some unknowns open. */
export class RankDeficiencyError extends Error {
  override readonly name = 'RankDeficiencyError';
  /** columns that cannot be determined */
  readonly unknowns: readonly number[];
  constructor(unknowns: readonly number[]) {
    super(`undetermined unknowns: ${unknowns.join(', ')}`);
    this.unknowns = unknowns;
  }
}

/** Best linear unbiased estimate by generalised least squares (Aitken 1935; Teunissen, Adjustment Theory, 2000, ch. 2),
 *  exact observations and exact combinations of observations being constraints.
 * @throws {ContradictionError} two exact relations disagree  @throws {RankDeficiencyError} an unknown is left open */
export function leastSquares(problem: LeastSquaresProblem): LeastSquaresSolution {
  const { design, observed, unknowns: n } = problem;
  const m = design.length;
  if (m === n) {
    // nothing redundant: the weights cannot matter, and A is close to the identity, so this costs next to nothing
    const gain = invertSparse(design);
    const estimate = applyRefined(gain, design, observed);
    return {
      estimate,
      gain,
      residual: new Float64Array(m),
      chi2: 0,
      dof: 0,
      independent: design.map((_, i) => i),
      weights: null,
    };
  }
  const { independent, factor, dependent, relation } = exactRelations(problem.covariance);
  const ai = independent.map((i) => design[i]!);
  // K·w = l_d − T·l_i holds exactly
  const k = dependent.map((d, row) => {
    const out = Float64Array.from(design[d]!);
    ai.forEach((a, j) => {
      const t = relation[row]![j]!;
      if (t !== 0) for (let c = 0; c < n; c++) out[c]! -= t * a[c]!;
    });
    return out;
  });
  const misclosure = dependent.map(
    (d, row) => observed[d]! - independent.reduce((s, i, j) => s + relation[row]![j]! * observed[i]!, 0),
  );
  const { particular, free, nullspace, rank } = solveConstraints(k, misclosure, n, (row) => ({
    row: dependent[row]!,
    others: independent.filter((_, j) => Math.abs(relation[row]![j]!) > 1e-9),
  }));

  const b = multiply(ai, nullspace, free);
  const whitened = forwardSolve(factor, b);
  const normal = multiply(transpose(whitened, free), whitened, free);
  const normalFactor = cholesky(normal);
  if (!normalFactor || !wellConditioned(normal, normalFactor))
    throw new RankDeficiencyError(openUnknowns(normal, nullspace));
  const weightedDesign = backwardSolve(factor, whitened);
  const toFree = choleskySolve(normalFactor, transpose(weightedDesign, free)); // P: free × independent
  const zp = multiply(nullspace, toFree, independent.length); // n × independent
  const gainOfMisclosure = subtract(
    particular,
    multiply(zp, multiply(ai, particular, dependent.length), dependent.length),
  );
  const gain = zeros(n, m);
  for (let u = 0; u < n; u++) {
    dependent.forEach((d, row) => {
      gain[u]![d]! += gainOfMisclosure[u]![row]!;
    });
    independent.forEach((i, j) => {
      let g = zp[u]![j]!;
      dependent.forEach((_, row) => {
        g -= gainOfMisclosure[u]![row]! * relation[row]![j]!;
      });
      gain[u]![i]! += g;
    });
  }
  const estimate = applyRefined(gain, design, observed);
  const residual = Float64Array.from(design, (row, i) => observed[i]! - dot(row, estimate));
  const white = forwardSolve(
    factor,
    independent.map((i) => Float64Array.of(residual[i]!)),
  );
  return {
    estimate,
    gain,
    residual,
    chi2: white.reduce((s, row) => s + row[0]! * row[0]!, 0),
    dof: independent.length + rank - n,
    independent,
    weights: { factor, reducedDesign: b, weightedDesign, normalFactor },
  };
}

const dot = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) if (a[i] !== 0) sum += a[i]! * b[i]!;
  return sum;
};

const subtract = (a: Matrix, b: Matrix): Matrix => a.map((row, i) => row.map((v, j) => v - b[i]![j]!));

/** ŵ = G·l, then twice on what is left: potentials are 6e7 and must come out to 1e-6, so the weights' rounding may only act
 *  on the small misclosures. */
function applyRefined(gain: Matrix, design: Matrix, observed: Float64Array): Float64Array {
  const estimate = new Float64Array(gain.length);
  for (let pass = 0; pass < 3; pass++) {
    const left = Float64Array.from(design, (row, i) => observed[i]! - dot(row, estimate));
    gain.forEach((row, u) => {
      estimate[u]! += dot(row, left);
    });
  }
  return estimate;
}

/** A pivot that lost twelve digits against its diagonal is rounding, not information. */
function wellConditioned(normal: Matrix, factor: Matrix): boolean {
  return factor.every((row, i) => row[i]! * row[i]! > 1e-12 * normal[i]![i]!);
}

/** Unknowns with a part in the null space of the normal matrix, found by Gauss–Jordan elimination with diagonal pivots. */
function openUnknowns(normal: Matrix, nullspace: Matrix): number[] {
  const n = normal.length;
  const a = normal.map((row) => Float64Array.from(row));
  const scale = a.map((row, i) => row[i]! || 1);
  const pivots: number[] = [];
  for (;;) {
    let pivot = -1;
    for (let i = 0; i < n; i++) {
      if (pivots.includes(i) || a[i]![i]! <= 1e-10 * scale[i]!) continue;
      if (pivot < 0 || a[i]![i]! / scale[i]! > a[pivot]![pivot]! / scale[pivot]!) pivot = i;
    }
    if (pivot < 0) break;
    pivots.push(pivot);
    const d = a[pivot]![pivot]!;
    for (let j = 0; j < n; j++) a[pivot]![j]! /= d;
    for (let i = 0; i < n; i++) {
      const f = a[i]![pivot]!;
      if (i !== pivot && f !== 0) for (let j = 0; j < n; j++) a[i]![j]! -= f * a[pivot]![j]!;
    }
  }
  const open = new Set<number>();
  for (let column = 0; column < n; column++) {
    if (pivots.includes(column)) continue;
    // the null vector of this column: 1 there, −a at each pivot
    const parts = [column, ...pivots.filter((p) => Math.abs(a[p]![column]!) > 1e-6)];
    nullspace.forEach((row, unknown) => {
      if (parts.some((c) => Math.abs(row[c]!) > 1e-9)) open.add(unknown);
    });
  }
  return [...open].sort((x, y) => x - y);
}

/** Inverse of a square, mostly empty matrix by Gauss–Jordan with partial pivoting; zeros are skipped. */
function invertSparse(design: Matrix): Matrix {
  const n = design.length;
  const a = design.map((row) => Float64Array.from(row));
  const rows: Map<number, number>[] = a.map((_, i) => new Map([[i, 1]]));
  for (let c = 0; c < n; c++) {
    let pivot = c;
    for (let r = c + 1; r < n; r++) if (Math.abs(a[r]![c]!) > Math.abs(a[pivot]![c]!)) pivot = r;
    if (Math.abs(a[pivot]![c]!) < 1e-12) throw new RankDeficiencyError([c]);
    [a[c], a[pivot]] = [a[pivot]!, a[c]!];
    [rows[c], rows[pivot]] = [rows[pivot]!, rows[c]!];
    const d = a[c]![c]!;
    if (d !== 1) {
      for (let j = c; j < n; j++) a[c]![j]! /= d;
      for (const [j, v] of rows[c]!) rows[c]!.set(j, v / d);
    }
    for (let r = 0; r < n; r++) {
      const f = a[r]![c]!;
      if (r === c || f === 0) continue;
      for (let j = c; j < n; j++) a[r]![j]! -= f * a[c]![j]!;
      for (const [j, v] of rows[c]!) rows[r]!.set(j, (rows[r]!.get(j) ?? 0) - f * v);
    }
  }
  return rows.map((row) => {
    const out = new Float64Array(n);
    for (const [j, v] of row) out[j] = v;
    return out;
  });
}
