/** Covariance of the outputs, run along with the trials (JCGM 102:2011, 7.6). */
export class JointCovariance {
  readonly #sums: Float64Array;
  readonly #products: Float64Array[];
  #count = 0;

  constructor(outputs: number) {
    this.#sums = new Float64Array(outputs);
    this.#products = Array.from({ length: outputs }, () => new Float64Array(outputs));
  }

  /** Deviations from the estimates are small and nearly centred: plain sums of products lose nothing. */
  add(out: readonly Float64Array[], count: number): void {
    out.forEach((a, l) => {
      let sum = 0;
      for (let t = 0; t < count; t++) sum += a[t]!;
      this.#sums[l]! += sum;
      for (let m = 0; m <= l; m++) {
        const b = out[m]!;
        let product = 0;
        for (let t = 0; t < count; t++) product += a[t]! * b[t]!;
        this.#products[l]![m]! += product;
      }
    });
    this.#count += count;
  }

  matrix(): number[][] {
    const n = this.#count;
    return this.#products.map((_, l) =>
      this.#products.map((_, m) => {
        const product = l >= m ? this.#products[l]![m]! : this.#products[m]![l]!;
        return (product - (this.#sums[l]! * this.#sums[m]!) / n) / (n - 1);
      }),
    );
  }
}
