/** Which line of the file a stored sample stood on. Lines that hold no sample shift the count: only those places are kept. */
export class LineMap {
  readonly #sample: number[] = [];
  readonly #line: number[] = [];

  /** Notes that sample `index` stands on `line`; called for every sample in turn. */
  note(index: number, line: number): void {
    const n = this.#sample.length;
    if (n > 0 && line - this.#line[n - 1]! === index - this.#sample[n - 1]!) return;
    this.#sample.push(index);
    this.#line.push(line);
  }

  /** Line of sample `index`, counted from 1. */
  lineOf(index: number): number {
    let lo = 0;
    let hi = this.#sample.length - 1;
    while (lo < hi) {
      const mid = (lo + hi + 1) >> 1;
      if (this.#sample[mid]! <= index) lo = mid;
      else hi = mid - 1;
    }
    return this.#line[lo]! + (index - this.#sample[lo]!);
  }
}
