import { differenceAutocovariance, type NoiseExponent } from './deviations/equivalent-degrees-of-freedom.js';
import type { PhaseRecord } from './deviations/phase-record.js';

/** Power-law noises of a clock by the exponent α of S_y(f) ~ f^α (IEEE Std 1139). */
export const NOISE_NAMES: Readonly<Record<NoiseExponent, string>> = {
  2: 'white PM',
  1: 'flicker PM',
  0: 'white FM',
  [-1]: 'flicker FM',
  [-2]: 'random-walk FM',
  [-3]: 'flicker-walk FM',
  [-4]: 'random-run FM',
};

/** Fewest averages from which a noise is named at all (Riley & Greenhall 2004). */
export const FEWEST_AVERAGES = 30;

/** Most averages that are looked at, and the length of the blocks they are taken in. */
const MOST_AVERAGES = 1 << 18;
const BLOCK = 4096;

/** What the lag-1 autocorrelation says of the noise at one averaging time. */
export interface NoiseIdentification {
  readonly averagingFactor: number;
  /** the noise whose lag-1 autocorrelation is nearest, −4…2 */
  readonly alpha: NoiseExponent;
  /** −2(δ + d) as found */
  readonly exponent: number;
  /** how often the averages were differenced until they were stationary */
  readonly differences: number;
  /** averages that the record holds, all runs together */
  readonly averages: number;
}

/** Lag-1 autocorrelation about the common mean, pairs inside a run only. */
function lagOneAutocorrelation(z: Float64Array, ends: readonly number[], length: number): number {
  let sum = 0;
  for (let i = 0; i < length; i++) sum += z[i]!;
  const mean = sum / length;
  let pairs = 0;
  let squares = 0;
  let start = 0;
  for (const end of ends) {
    let before = 0;
    for (let i = start; i < end; i++) {
      const d = z[i]! - mean;
      squares += d * d;
      if (i > start) pairs += before * d;
      before = d;
    }
    start = end;
  }
  return squares === 0 ? 0 : pairs / squares;
}

/** Replaces z by its first differences run by run; each run loses one value, and a run of one value vanishes. */
function differenceInPlace(z: Float64Array, ends: readonly number[]): number[] {
  const next: number[] = [];
  let to = 0;
  let start = 0;
  for (const end of ends) {
    for (let i = start + 1; i < end; i++) z[to++] = z[i]! - z[i - 1]!;
    if (end - start > 1) next.push(to);
    start = end;
  }
  return next;
}

const ALL: readonly NoiseExponent[] = [2, 1, 0, -1, -2, -3, -4];

/** The exponent −2(δ + d) that a pure noise gives. Averages of flicker or random walk are smoother than fractionally differenced
 *  white noise: −1.45 for flicker FM, −2.4 for random walk, where rounding alone would take flicker for random walk in every
 *  second case. At the sampling interval itself data may be either, so the middle is taken. Phase noise needs a bandwidth: 1/(2τ0). */
function expectedExponent(alpha: NoiseExponent, m: number, d: number): number {
  const order = (d + 1) as 1 | 2 | 3;
  const filter = alpha <= 0 ? Infinity : Math.max(m, 2);
  const r1 = differenceAutocovariance(1, filter, alpha, order) / differenceAutocovariance(0, filter, alpha, order);
  const averaged = -2 * (r1 / (1 + r1) + d);
  return m === 1 ? (averaged + alpha) / 2 : averaged;
}

function nearestNoise(exponent: number, m: number, d: number): NoiseExponent {
  let best: NoiseExponent = 2;
  let distance = Infinity;
  for (const alpha of ALL) {
    if (alpha + 2 * (d + 1) <= 1) continue; // does not converge, so it would have been differenced again
    const away = Math.abs(exponent - expectedExponent(alpha, m, d));
    if (away < distance) {
      distance = away;
      best = alpha;
    }
  }
  return best;
}

/** Names the noise at τ = m·τ0 from the lag-1 autocorrelation r1 of the averages ȳ: noise of fractional order δ has r1 = δ/(1 − δ),
 *  so δ = r1/(1 + r1); while δ ≥ ¼ the averages are differenced once more, d times in all, and the exponent is −2(δ + d), to be
 *  compared with what each noise gives. Differencing also takes out an offset and a linear drift. Works on one τ alone, unlike a
 *  slope of the deviation against τ.
 *  Gaps: averages are made inside runs, from each run's start, and no pair reaches over a gap.
 * @param record phase in sampling intervals
 * @param m averaging factor, whole, ≥ 1
 * @returns null with fewer than 30 averages: below that the answer is chance
 * @see Riley & Greenhall (2004), Power law noise identification using the lag 1 autocorrelation, 18th EFTF; Riley (2008), NIST
 *   SP 1065, section 5.5.6 */
export function identifyNoise(record: PhaseRecord, m: number): NoiseIdentification | null {
  let averages = 0;
  for (const { count } of record.runs) averages += Math.floor((count - 1) / m);
  if (averages < FEWEST_AVERAGES) return null;
  // r1 of 2.6e5 averages is known to 0.002: more would only cost time. Blocks are taken evenly over the record.
  const every = Math.ceil(averages / MOST_AVERAGES);
  const z = new Float64Array(Math.min(averages, 2 * MOST_AVERAGES));
  let ends: number[] = [];
  let length = 0;
  let block = 0;
  for (const { first, count } of record.runs) {
    const here = Math.floor((count - 1) / m);
    for (let from = 0; from < here; from += BLOCK) {
      if (block++ % every !== 0) continue;
      const to = Math.min(here, from + BLOCK, from + z.length - length);
      for (let k = from; k < to; k++) z[length++] = record.x[first + (k + 1) * m]! - record.x[first + k * m]!;
      ends.push(length);
    }
  }
  for (let d = 0; ; d++) {
    const r1 = lagOneAutocorrelation(z, ends, length);
    const delta = r1 / (1 + r1);
    if (delta < 0.25 || d === 2) {
      const exponent = -2 * (delta + d);
      return { averagingFactor: m, alpha: nearestNoise(exponent, m, d), exponent, differences: d, averages };
    }
    const next = differenceInPlace(z, ends);
    const left = next.at(-1) ?? 0;
    if (left < FEWEST_AVERAGES / 2) return null;
    ends = next;
    length = left;
  }
}
