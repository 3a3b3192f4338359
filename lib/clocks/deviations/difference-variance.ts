import type { PhaseRecord } from './phase-record.js';

/** An estimate of a variance: Σ of squares and the number of terms in it, with the terms each run gave. */
export interface VarianceEstimate {
  /** variance of fractional frequency, dimensionless */
  readonly variance: number;
  readonly terms: number;
  /** terms and phase points of each run that gave any, for the degrees of freedom */
  readonly byRun: readonly { readonly points: number; readonly terms: number }[];
}

export type Stride = 'tau' | 'sample';

/** Sums in blocks: a plain sum of 1e7 squares would lose three digits, one of 8192 at a time loses none that count. */
const BLOCK = 8192;

function squaredSecondDifferences(x: Float64Array, first: number, terms: number, m: number, step: number): number {
  let total = 0;
  for (let done = 0; done < terms; done += BLOCK) {
    const n = Math.min(BLOCK, terms - done);
    let a = first + done * step;
    let block = 0;
    for (let k = 0; k < n; k++, a += step) {
      const d = x[a + 2 * m]! - 2 * x[a + m]! + x[a]!;
      block += d * d;
    }
    total += block;
  }
  return total;
}

function squaredThirdDifferences(x: Float64Array, first: number, terms: number, m: number, step: number): number {
  let total = 0;
  for (let done = 0; done < terms; done += BLOCK) {
    const n = Math.min(BLOCK, terms - done);
    let a = first + done * step;
    let block = 0;
    for (let k = 0; k < n; k++, a += step) {
      const d = x[a + 3 * m]! - 3 * (x[a + 2 * m]! - x[a + m]!) - x[a]!;
      block += d * d;
    }
    total += block;
  }
  return total;
}

function overRuns(
  record: PhaseRecord,
  m: number,
  order: 2 | 3,
  stride: Stride,
  sumOf: typeof squaredSecondDifferences,
): Omit<VarianceEstimate, 'variance'> & { sum: number } {
  if (!Number.isSafeInteger(m) || m < 1) throw new RangeError(`averaging factor ${m}: must be a whole number ≥ 1`);
  const step = stride === 'tau' ? m : 1;
  const byRun: { points: number; terms: number }[] = [];
  let sum = 0;
  let terms = 0;
  for (const { first, count } of record.runs) {
    const room = count - 1 - order * m;
    if (room < 0) continue;
    const n = 1 + Math.floor(room / step);
    sum += sumOf(record.x, first, n, m, step);
    terms += n;
    byRun.push({ points: count, terms: n });
  }
  return { sum, terms, byRun };
}

/** Allan variance at τ = m·τ0 from second differences of phase: ½⟨(ȳ_{k+1} − ȳ_k)²⟩.
 *  Gaps: a term is used only if all of its 2m samples are there and follow each other, so nothing is filled in or joined over a
 *  gap; terms of all runs weigh the same. With stride `tau` the averages of each run start at the run's first sample.
 * @param record phase in sampling intervals
 * @param m averaging factor, whole, ≥ 1
 * @param stride `tau`: neighbouring averages share no sample; `sample`: overlapping estimator
 * @returns null when no run holds 2m samples
 * @see Riley (2008), NIST SP 1065, sections 5.2.2 (ADEV) and 5.2.4 (overlapping) */
export function allanVariance(record: PhaseRecord, m: number, stride: Stride): VarianceEstimate | null {
  const { sum, terms, byRun } = overRuns(record, m, 2, stride, squaredSecondDifferences);
  return terms === 0 ? null : { variance: sum / (2 * m * m * terms), terms, byRun };
}

/** Hadamard variance at τ = m·τ0 from third differences of phase: ⅙⟨(ȳ_{k+2} − 2ȳ_{k+1} + ȳ_k)²⟩; blind to a linear frequency
 *  drift. Gaps and stride as in {@link allanVariance}, with 3m samples to a term.
 * @see Riley (2008), NIST SP 1065, eqs. 18 (HDEV) and 20 (overlapping) */
export function hadamardVariance(record: PhaseRecord, m: number, stride: Stride): VarianceEstimate | null {
  const { sum, terms, byRun } = overRuns(record, m, 3, stride, squaredThirdDifferences);
  return terms === 0 ? null : { variance: sum / (6 * m * m * terms), terms, byRun };
}
