import type { SortedEnds } from './coverage-intervals.js';
import { FineHistogram } from './fine-histogram.js';

/** Counts of trials in equal bins, for drawing. */
export interface Histogram {
  /** lower edge of the first bin, upper edge of the last, as deviations from the estimate */
  readonly low: number;
  readonly high: number;
  readonly counts: readonly number[];
  /** estimated probability density in each bin, per unit of the output */
  readonly densities: readonly number[];
  /** trials outside */
  readonly below: number;
  readonly above: number;
}

const SAMPLE = 10_000;

/** All trials of one output quantity as deviations from its estimate: kept as they are up to a limit, counted in fine cells
 *  beyond it. Mean and variance run along (Chan, Golub & LeVeque 1983, Amer. Statist. 37:242, eq. 2.1). */
export class OutputTrials {
  readonly #limit: number;
  #kept: Float64Array;
  #fine: FineHistogram | null = null;
  #count = 0;
  #mean = 0;
  #squares = 0;

  /** @param expected trials to make room for at once
   *  @param limit largest number of trials to keep, at least 10 000 */
  constructor(expected: number, limit: number) {
    this.#limit = Math.max(SAMPLE, limit);
    this.#kept = new Float64Array(Math.min(expected, this.#limit));
  }

  get count(): number {
    return this.#count;
  }

  get mean(): number {
    return this.#mean;
  }

  /** Variance of the trials (JCGM 101:2008, eq. 17: divided by M − 1). */
  get variance(): number {
    return this.#squares / (this.#count - 1);
  }

  /** Width of the cells in which trials are counted; 0 while they are all kept. */
  get resolution(): number {
    return this.#fine?.cellWidth ?? 0;
  }

  add(values: Float64Array, count: number): void {
    let sum = 0;
    for (let i = 0; i < count; i++) sum += values[i]!;
    const mean = sum / count;
    let squares = 0;
    for (let i = 0; i < count; i++) {
      const d = values[i]! - mean;
      squares += d * d;
    }
    const total = this.#count + count;
    const shift = mean - this.#mean;
    this.#squares += squares + (shift * shift * this.#count * count) / total;
    this.#mean += (shift * count) / total;
    if (!this.#fine && total > this.#limit) {
      this.#fine = new FineHistogram(this.#kept.slice(0, Math.min(SAMPLE, this.#count)).sort());
      this.#fine.add(this.#kept, this.#count);
      this.#kept = new Float64Array(0);
    }
    if (this.#fine) this.#fine.add(values, count);
    else {
      if (total > this.#kept.length) {
        const larger = new Float64Array(Math.min(this.#limit, Math.max(total, 2 * this.#kept.length)));
        larger.set(this.#kept.subarray(0, this.#count));
        this.#kept = larger;
      }
      this.#kept.set(values.subarray(0, count), this.#count);
    }
    this.#count = total;
  }

  /** The trials sorted, as far as an interval of that coverage needs them. */
  ends(probability: number): SortedEnds {
    const trials = this.#count;
    const wanted = Math.min(trials, Math.ceil((1 - probability) * trials) + 2);
    if (this.#fine) return { trials, lowest: this.#fine.lowest(wanted), highest: this.#fine.highest(wanted) };
    const all = this.#kept.subarray(0, trials);
    // Sorting only the ends is several times faster: thresholds well inside them are read off the first trials.
    const sample = all.slice(0, SAMPLE).sort();
    const rank = Math.ceil(1.5 * (1 - probability) * sample.length) + 50;
    if (trials > 2 * SAMPLE && 2 * rank < sample.length) {
      const lowest = between(all, -Infinity, sample[rank]!);
      const highest = between(all, sample[sample.length - 1 - rank]!, Infinity);
      if (lowest.length >= wanted && highest.length >= wanted) return { trials, lowest, highest };
    }
    const sorted = all.slice().sort();
    return { trials, lowest: sorted, highest: sorted };
  }

  /** @param low,high edges, as deviations from the estimate, low < high */
  histogram(low: number, high: number, bins: number): Histogram {
    const counts = new Array<number>(bins).fill(0);
    const perBin = bins / (high - low);
    let below = 0;
    let above = 0;
    const visit = (value: number, count: number): void => {
      if (value < low) below += count;
      else if (value > high) above += count;
      else counts[Math.min(bins - 1, Math.floor((value - low) * perBin))]! += count;
    };
    if (this.#fine) this.#fine.forEach(visit);
    else for (let i = 0; i < this.#count; i++) visit(this.#kept[i]!, 1);
    return { low, high, counts, densities: counts.map((c) => (c / this.#count) * perBin), below, above };
  }
}

/** The values from low to high, both included, rising. */
function between(values: Float64Array, low: number, high: number): Float64Array {
  const found = new Float64Array(values.length);
  let n = 0;
  for (let i = 0; i < values.length; i++) {
    const v = values[i]!;
    if (v >= low && v <= high) found[n++] = v;
  }
  return found.slice(0, n).sort();
}
