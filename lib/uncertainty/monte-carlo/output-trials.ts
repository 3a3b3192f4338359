import { DomainError } from '../distributions/domain-error.js';
import type { SortedEnds } from './coverage-intervals.js';
import { FineHistogram } from './fine-histogram.js';
import { BLOCK } from './sampler.js';
import { sortNumbers } from './sort-numbers.js';

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

/** Trials that are kept whole; from them the places of the ends and of the cells are read. */
const SAMPLE = 10_000;

/** A growing list of trials at one end. */
class Tail {
  values: Float64Array;
  count = 0;

  constructor(room: number) {
    this.values = new Float64Array(room);
  }

  /** Makes room for so many more. */
  reserve(more: number): void {
    if (this.count + more <= this.values.length) return;
    const larger = new Float64Array(2 * this.values.length + more);
    larger.set(this.values.subarray(0, this.count));
    this.values = larger;
  }

  sorted(): Float64Array {
    return sortNumbers(this.values.slice(0, this.count));
  }
}

/** All trials of one output quantity as deviations from its estimate. The first 10 000 are kept as they are; then only the two ends
 *  are, with room to spare about the coverage interval, and the rest is counted in fine cells: order statistics of the intervals stay
 *  exact at an eighth of the memory. Beyond a limit the ends are counted in the cells too.
 *  Mean and variance run along (Chan, Golub & LeVeque 1983, Amer. Statist. 37:242, eq. 2.1). */
export class OutputTrials {
  readonly #coverage: number;
  readonly #limit: number;
  readonly #expected: number;
  #kept = new Float64Array(0);
  #fine: FineHistogram | null = null;
  #lowest: Tail | null = null;
  #highest: Tail | null = null;
  #lowThreshold = 0;
  #highThreshold = 0;
  #count = 0;
  #mean = 0;
  #squares = 0;

  /** @param coverage probability of the intervals that will be asked for
   *  @param limit largest number of trials to keep as they are
   *  @param expected number of trials to come, as far as known: room is made for them at once */
  constructor(coverage: number, limit: number, expected = 0) {
    this.#coverage = coverage;
    this.#limit = limit;
    this.#expected = expected;
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

  /** Width of the cells to which the ends are known; 0 while they are known exactly. */
  get resolution(): number {
    return this.#fine && !this.#lowest ? this.#fine.cellWidth : 0;
  }

  /** Adds values[0 … count−1]; at most a thousand at a time, so that the first sample can be had. */
  add(values: Float64Array, count: number): void {
    if (count > BLOCK) throw new DomainError('count', count, `at most ${BLOCK}`);
    // About the mean so far, so that the block's own mean is small against its spread and one pass is enough.
    const centre = this.#count > 0 ? this.#mean : values[0]!;
    let sum = 0;
    let squares = 0;
    for (let i = 0; i < count; i++) {
      const d = values[i]! - centre;
      sum += d;
      squares += d * d;
    }
    squares -= (sum * sum) / count;
    const total = this.#count + count;
    const shift = centre + sum / count - this.#mean;
    this.#squares += squares + (shift * shift * this.#count * count) / total;
    this.#mean += (shift * count) / total;
    if (!this.#fine && total > SAMPLE) this.#startCounting();
    if (this.#fine) {
      this.#fine.add(values, count);
      this.#addEnds(values, count);
    } else {
      if (this.#kept.length === 0) this.#kept = new Float64Array(SAMPLE);
      this.#kept.set(values.subarray(0, count), this.#count);
    }
    this.#count = total;
  }

  #startCounting(): void {
    const first = this.#kept.subarray(0, this.#count);
    const sorted = first.slice().sort();
    this.#fine = new FineHistogram(sorted);
    this.#fine.add(first, first.length);
    // A fifth more than the intervals need, and 50 for small numbers: six standard deviations of what the sample can be off.
    const rank = Math.ceil(1.2 * (1 - this.#coverage) * sorted.length) + 50;
    if (this.#fine.cellWidth > 0 && 4 * rank < sorted.length) {
      this.#lowThreshold = sorted[rank]!;
      this.#highThreshold = sorted[sorted.length - 1 - rank]!;
      const room = Math.min(this.#limit, Math.ceil((1.1 * rank * this.#expected) / sorted.length)) + BLOCK;
      this.#lowest = new Tail(room);
      this.#highest = new Tail(room);
      this.#addEnds(first, first.length);
    }
    this.#kept = new Float64Array(0);
  }

  /** Keeps what lies beyond the thresholds. Written so that the loop doesn't branch: every value is put down, and the place moves on
   *  only if it is to stay. */
  #addEnds(values: Float64Array, count: number): void {
    const lowest = this.#lowest;
    const highest = this.#highest;
    if (!lowest || !highest) return;
    lowest.reserve(count);
    highest.reserve(count);
    const low = this.#lowThreshold;
    const high = this.#highThreshold;
    const l = lowest.values;
    const h = highest.values;
    let nl = lowest.count;
    let nh = highest.count;
    for (let i = 0; i < count; i++) {
      const v = values[i]!;
      l[nl] = v;
      nl += v <= low ? 1 : 0;
      h[nh] = v;
      nh += v >= high ? 1 : 0;
    }
    lowest.count = nl;
    highest.count = nh;
    if (nl + nh > this.#limit) {
      this.#lowest = null;
      this.#highest = null;
    }
  }

  /** The trials sorted, as far as an interval of that coverage needs them. */
  ends(probability: number): SortedEnds {
    const trials = this.#count;
    if (!this.#fine) {
      const sorted = this.#kept.slice(0, trials).sort();
      return { trials, lowest: sorted, highest: sorted };
    }
    const wanted = Math.min(trials, Math.ceil((1 - probability) * trials) + 2);
    const enough = (tail: Tail | null): tail is Tail => tail !== null && tail.count >= wanted;
    return {
      trials,
      lowest: enough(this.#lowest) ? this.#lowest.sorted() : this.#fine.lowest(wanted),
      highest: enough(this.#highest) ? this.#highest.sorted() : this.#fine.highest(wanted),
    };
  }

  /** About `bins` equal bins that hold everything from … to, deviations from the estimate, from < to. */
  histogram(from: number, to: number, bins: number): Histogram {
    if (!this.#fine) {
      const counts = new Array<number>(bins).fill(0);
      const width = (to - from) / bins;
      let below = 0;
      let above = 0;
      for (let i = 0; i < this.#count; i++) {
        const v = this.#kept[i]!;
        if (v < from) below++;
        else if (v > to) above++;
        else counts[Math.min(bins - 1, Math.floor((v - from) / width))]! += 1;
      }
      return { low: from, high: to, counts, densities: this.#densities(counts, width), below, above };
    }
    const { low, width, counts } = this.#fine.binned(from, to, bins);
    const below = this.#fine.countBelow(low);
    const inside = counts.reduce((s, c) => s + c, 0);
    return {
      low,
      high: low + bins * width,
      counts,
      densities: this.#densities(counts, width),
      below,
      above: this.#count - below - inside,
    };
  }

  #densities(counts: readonly number[], width: number): number[] {
    return counts.map((c) => c / (this.#count * width));
  }
}
