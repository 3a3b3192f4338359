/** Spacing of the nodes: for a semidiurnal tide of 1e-17 the cubic's error stays near 1e-23. */
const STEP_MS = 600_000;

/** A slowly varying function of time, called at nodes ten minutes apart and interpolated by the cubic through four of them: an
 *  ephemeris cannot be asked ten million times. Error (3/128)·h⁴·f⁗ at most: 1.2e-6 of the
 *  amplitude for a period of half a day. */
export class SmoothCorrection {
  readonly #f: (timeMs: number) => number;
  readonly #nodes = new Map<number, number>();

  constructor(f: (timeMs: number) => number) {
    this.#f = f;
  }

  #node(k: number): number {
    let value = this.#nodes.get(k);
    if (value === undefined) {
      value = this.#f(k * STEP_MS);
      if (!Number.isFinite(value))
        throw new RangeError(`the correction at ${new Date(k * STEP_MS).toISOString()} is ${value}`);
      this.#nodes.set(k, value);
    }
    return value;
  }

  /** Value at an instant. */
  at(timeMs: number): number {
    const k = Math.floor(timeMs / STEP_MS);
    const s = timeMs / STEP_MS - k;
    const a = this.#node(k - 1);
    const b = this.#node(k);
    const c = this.#node(k + 1);
    const d = this.#node(k + 2);
    // Lagrange's cubic through −1, 0, 1, 2.
    return (
      (-a * s * (s - 1) * (s - 2)) / 6 +
      (b * (s + 1) * (s - 1) * (s - 2)) / 2 -
      (c * (s + 1) * s * (s - 2)) / 2 +
      (d * (s + 1) * s * (s - 1)) / 6
    );
  }

  /** Mean over a sample: the middle for short ones, Simpson's rule in pieces of at most ten minutes for long ones. */
  meanOver(startMs: number, lengthMs: number): number {
    if (lengthMs <= 60_000) return this.at(startMs + 0.5 * lengthMs);
    const pieces = Math.ceil(lengthMs / STEP_MS);
    const h = lengthMs / pieces;
    let sum = 0;
    for (let p = 0; p < pieces; p++) {
      const t = startMs + p * h;
      sum += this.at(t) + 4 * this.at(t + 0.5 * h) + this.at(t + h);
    }
    return sum / (6 * pieces);
  }
}
