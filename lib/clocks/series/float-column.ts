const CHUNK = 1 << 16;

/** A column of doubles that grows by chunks of half a mebibyte: no value is ever moved while the file is read. */
export class FloatColumn {
  readonly #chunks: Float64Array[] = [];
  #current = new Float64Array(CHUNK);
  #fill = 0;

  push(value: number): void {
    if (this.#fill === CHUNK) {
      this.#chunks.push(this.#current);
      this.#current = new Float64Array(CHUNK);
      this.#fill = 0;
    }
    this.#current[this.#fill++] = value;
  }

  get length(): number {
    return this.#chunks.length * CHUNK + this.#fill;
  }

  /** The whole column in one array; the chunks are let go as they are copied, so the peak is one column more. */
  take(): Float64Array {
    const all = new Float64Array(this.length);
    let at = 0;
    this.#chunks.reverse();
    for (let chunk = this.#chunks.pop(); chunk; chunk = this.#chunks.pop()) {
      all.set(chunk, at);
      at += CHUNK;
    }
    all.set(this.#current.subarray(0, this.#fill), at);
    this.#current = new Float64Array(0);
    this.#fill = 0;
    return all;
  }
}
