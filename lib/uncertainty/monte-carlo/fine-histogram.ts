/** Number of cells: with a range of some twelve standard deviations a cell is 1.5e-3 of one. More would no longer stay in a
 *  processor's cache for a campaign of many links. */
const CELLS = 2 ** 13;

/** Trials counted in fine equal cells; those beyond the cells are kept as they are, so that heavy tails lose nothing. Order statistics
 *  come out to within one cell, about the spread of an end point from run to run (3e-3 standard deviations after 1e6 trials, 1e-3
 *  after 1e7), and mostly far better, for the trials of a cell are spread evenly over it. */
export class FineHistogram {
  readonly #low: number;
  readonly #width: number;
  readonly #counts = new Uint32Array(CELLS);
  readonly #below: number[] = [];
  readonly #above: number[] = [];

  /** @param sample the first trials (at least some thousand), sorted: the cells cover them from the 0.1 % to the 99.9 % quantile
   *  and half as much again to either side. If those are all one number, as for an exact output, the cells have no width: trials of
   *  that number are counted, others kept */
  constructor(sample: Float64Array) {
    const tail = Math.floor(sample.length / 1000);
    const low = sample[tail]!;
    const high = sample[sample.length - 1 - tail]!;
    const spread = high - low;
    this.#low = low - 0.5 * spread;
    this.#width = (2 * spread) / CELLS;
  }

  get cellWidth(): number {
    return this.#width;
  }

  add(values: Float64Array, count: number): void {
    const low = this.#low;
    const counts = this.#counts;
    const perCell = 1 / this.#width;
    const isConstant = this.#width === 0;
    for (let i = 0; i < count; i++) {
      const v = values[i]!;
      const cell = isConstant && v === low ? 0 : Math.floor((v - low) * perCell);
      if (cell >= 0 && cell < CELLS) counts[cell]! += 1;
      else if (cell < 0) this.#below.push(v);
      else this.#above.push(v);
    }
  }

  /** The `wanted` lowest trials, rising; those of one cell spread evenly over it. */
  lowest(wanted: number): Float64Array {
    const out = new Float64Array(wanted);
    const below = Float64Array.from(this.#below).sort();
    let n = Math.min(wanted, below.length);
    out.set(below.subarray(0, n));
    for (let cell = 0; n < wanted && cell < CELLS; cell++) {
      const c = this.#counts[cell]!;
      for (let j = 0; j < c && n < wanted; j++) out[n++] = this.#low + (cell + (j + 0.5) / c) * this.#width;
    }
    const above = Float64Array.from(this.#above).sort();
    for (let j = 0; n < wanted; j++) out[n++] = above[j]!;
    return out;
  }

  /** The `wanted` highest trials, rising. */
  highest(wanted: number): Float64Array {
    const out = new Float64Array(wanted);
    const above = Float64Array.from(this.#above).sort();
    let n = Math.max(0, wanted - above.length);
    out.set(above.subarray(above.length - (wanted - n)), n);
    for (let cell = CELLS - 1; n > 0 && cell >= 0; cell--) {
      const c = this.#counts[cell]!;
      for (let j = c - 1; j >= 0 && n > 0; j--) out[--n] = this.#low + (cell + (j + 0.5) / c) * this.#width;
    }
    const below = Float64Array.from(this.#below).sort();
    for (let j = below.length - 1; n > 0; j--) out[--n] = below[j]!;
    return out;
  }

  /** Counts in `bins` equal bins that hold from … to: bins are whole numbers of cells, so that no trial falls on the wrong side of an
   *  edge. `low` and `width` tell where they came to lie. */
  binned(from: number, to: number, bins: number): { low: number; width: number; counts: number[] } {
    if (this.#width === 0) {
      const width = (to - from) / bins;
      const counts = new Array<number>(bins).fill(0);
      const count = (v: number, n: number): void => {
        if (v >= from && v <= to) counts[Math.min(bins - 1, Math.floor((v - from) / width))]! += n;
      };
      count(this.#low, this.#counts[0]!);
      for (const v of [...this.#below, ...this.#above]) count(v, 1);
      return { low: from, width, counts };
    }
    const cellOf = (v: number) => Math.max(0, Math.min(CELLS - 1, Math.floor((v - this.#low) / this.#width)));
    const first = cellOf(from);
    const perBin = Math.max(1, Math.ceil((cellOf(to) - first + 1) / bins));
    const counts = new Array<number>(bins).fill(0);
    for (let cell = first; cell < Math.min(CELLS, first + bins * perBin); cell++) {
      counts[Math.floor((cell - first) / perBin)]! += this.#counts[cell]!;
    }
    return { low: this.#low + first * this.#width, width: perBin * this.#width, counts };
  }

  /** Trials below an edge of the bins of {@link binned}. */
  countBelow(edge: number): number {
    if (this.#width === 0) {
      const others = [...this.#below, ...this.#above].filter((v) => v < edge).length;
      return others + (this.#low < edge ? this.#counts[0]! : 0);
    }
    const end = Math.min(CELLS, Math.round((edge - this.#low) / this.#width));
    let sum = this.#below.length;
    for (let cell = 0; cell < end; cell++) sum += this.#counts[cell]!;
    return sum;
  }
}
