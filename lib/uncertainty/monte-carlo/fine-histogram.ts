/** Number of cells: with a width of some twelve standard deviations a cell is 2e-4 of one. */
const CELLS = 2 ** 16;

/** Trials counted in fine equal cells, for runs whose trials wouldn't fit in memory; those beyond the cells are kept as they are,
 *  so that heavy tails lose nothing. Order statistics come out to within one cell, which is far below the spread of an end point
 *  from run to run (3e-3 standard deviations after 1e6 trials, 1e-3 after 1e7). */
export class FineHistogram {
  readonly #low: number;
  readonly #width: number;
  readonly #counts = new Uint32Array(CELLS);
  readonly #below: number[] = [];
  readonly #above: number[] = [];

  /** @param sample the first trials (at least some thousand), sorted: the cells cover them from the 0.1 % to the 99.9 % quantile
   *  and as much again to either side */
  constructor(sample: Float64Array) {
    const tail = Math.floor(sample.length / 1000);
    const low = sample[tail]!;
    const high = sample[sample.length - 1 - tail]!;
    const spread = high - low || Math.abs(low) * 1e-9 || Number.MIN_VALUE * CELLS;
    this.#low = low - 0.5 * spread;
    this.#width = (2 * spread) / CELLS;
  }

  get cellWidth(): number {
    return this.#width;
  }

  add(values: Float64Array, count: number): void {
    const perCell = 1 / this.#width;
    for (let i = 0; i < count; i++) {
      const v = values[i]!;
      const cell = Math.floor((v - this.#low) * perCell);
      if (cell < 0) this.#below.push(v);
      else if (cell >= CELLS) this.#above.push(v);
      else this.#counts[cell]! += 1;
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

  /** Calls back with the middle of each cell that isn't empty, and with each trial outside the cells. */
  forEach(visit: (value: number, count: number) => void): void {
    for (const v of this.#below) visit(v, 1);
    for (let cell = 0; cell < CELLS; cell++) {
      const c = this.#counts[cell]!;
      if (c > 0) visit(this.#low + (cell + 0.5) * this.#width, c);
    }
    for (const v of this.#above) visit(v, 1);
  }
}
