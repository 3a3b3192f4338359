import type { VarianceEstimate } from './difference-variance.js';
import type { PhaseRecord } from './phase-record.js';

/** Σ over all places j of (Σ_{i=j}^{j+m−1} x_{i+2m} − 2x_{i+m} + x_i)², the inner sum moved along by its difference
 *  x_{j+3m} − 3x_{j+2m} + 3x_{j+m} − x_j: O(N) whatever m is. The rounding of the moves adds up to some 1e-12 of
 *  the result in the worst noise, random walk, over 3e5 moves. */
function squaredMovingSums(x: Float64Array, first: number, terms: number, m: number): number {
  let moving = 0;
  for (let i = first; i < first + m; i++) moving += x[i + 2 * m]! - 2 * x[i + m]! + x[i]!;
  let block = moving * moving;
  let total = 0;
  for (let k = 1; k < terms; k++) {
    const a = first + k - 1;
    moving += x[a + 3 * m]! - 3 * (x[a + 2 * m]! - x[a + m]!) - x[a]!;
    block += moving * moving;
    if ((k & 8191) === 0) {
      total += block;
      block = 0;
    }
  }
  return total + block;
}

/** Modified Allan variance at τ = m·τ0: phase averaged over m points before the second difference, which tells white from
 *  flicker phase noise. Gaps: only terms whose 3m − 1 samples all follow each other.
 * @returns null when no run holds 3m − 1 samples
 * @see Riley (2008), NIST SP 1065, eqs. 14, 15; Allan & Barnes (1981), Proc. 35th Freq. Control Symp., 470 */
export function modifiedAllanVariance(record: PhaseRecord, m: number): VarianceEstimate | null {
  if (!Number.isSafeInteger(m) || m < 1) throw new RangeError(`averaging factor ${m}: must be a whole number ≥ 1`);
  const byRun: { points: number; terms: number }[] = [];
  let sum = 0;
  let terms = 0;
  for (const { first, count } of record.runs) {
    const n = count - 3 * m + 1;
    if (n < 1) continue;
    sum += squaredMovingSums(record.x, first, n, m);
    terms += n;
    byRun.push({ points: count, terms: n });
  }
  return terms === 0 ? null : { variance: sum / (2 * m ** 4 * terms), terms, byRun };
}
