import type { VarianceEstimate } from './difference-variance.js';
import type { PhaseRecord } from './phase-record.js';

/** Σ_{i=1}^{N−2} (x*_{i−m} − 2x_i + x*_{i+m})², x* the phase continued beyond both ends by its own mirror image through the end
 *  point: x*_{−j} = 2x_0 − x_j. In three stretches, so that the long middle one has no branch; needs m ≤ (N − 1)/2. */
function squaredTotalDifferences(x: Float64Array, first: number, points: number, m: number): number {
  const last = first + points - 1;
  let total = 0;
  let block = 0;
  for (let i = first + 1; i < first + m; i++) {
    const mirrored = 2 * x[first]! - x[2 * first + m - i]!;
    const d = mirrored - 2 * x[i]! + x[i + m]!;
    block += d * d;
  }
  total += block;
  block = 0;
  for (let i = first + m; i <= last - m; i++) {
    const d = x[i - m]! - 2 * x[i]! + x[i + m]!;
    block += d * d;
    if ((i & 8191) === 0) {
      total += block;
      block = 0;
    }
  }
  total += block;
  block = 0;
  for (let i = last - m + 1; i < last; i++) {
    const mirrored = 2 * x[last]! - x[2 * last - m - i]!;
    const d = x[i - m]! - 2 * x[i]! + mirrored;
    block += d * d;
  }
  return total + block;
}

/** Total variance at τ = m·τ0: the overlapping Allan variance of a record continued by reflection, which gives long τ more
 *  degrees of freedom. Not corrected for its bias, −0.481·τ/T for flicker and −0.750·τ/T for random-walk frequency noise.
 *  Gaps: each run is continued at its own ends and counts with its own number of terms; a run joins while τ ≤ half its length.
 * @returns null when no run is 2m samples long
 * @see Riley (2008), NIST SP 1065, eq. 25, bias section 5.4.2; Greenhall, Howe & Percival (1999), IEEE Trans. UFFC 46:1183 */
export function totalVariance(record: PhaseRecord, m: number): VarianceEstimate | null {
  if (!Number.isSafeInteger(m) || m < 1) throw new RangeError(`averaging factor ${m}: must be a whole number ≥ 1`);
  const byRun: { points: number; terms: number }[] = [];
  let sum = 0;
  let terms = 0;
  for (const { first, count } of record.runs) {
    if (count - 1 < 2 * m) continue;
    sum += squaredTotalDifferences(record.x, first, count, m);
    terms += count - 2;
    byRun.push({ points: count, terms: count - 2 });
  }
  return terms === 0 ? null : { variance: sum / (2 * m * m * terms), terms, byRun };
}
