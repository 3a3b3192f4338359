import { DomainError } from './distributions/domain-error.js';

const MASK_64 = 2n ** 64n - 1n;

/** SplitMix64 (Steele, Lea & Flood, OOPSLA 2014): spreads a seed over the state of another generator. */
function* splitMix64(seed: bigint): Generator<bigint, never> {
  let state = seed & MASK_64;
  while (true) {
    state = (state + 0x9e3779b97f4a7c15n) & MASK_64;
    let z = state;
    z = ((z ^ (z >> 30n)) * 0xbf58476d1ce4e5b9n) & MASK_64;
    z = ((z ^ (z >> 27n)) * 0x94d049bb133111ebn) & MASK_64;
    yield z ^ (z >> 31n);
  }
}

/** Coefficients of the polynomial that advances xoshiro128 by 2⁶⁴ steps (Blackman & Vigna). */
const JUMP = [0x8764000b, 0xf542d2d3, 0x6fa035c3, 0x77f2db5b] as const;

/** xoshiro128** 1.1, period 2¹²⁸ − 1: 32-bit integer operations only, so that the draws are the same bit for bit in every
 *  JavaScript engine. Seeded by SplitMix64. `jump` gives streams that do not overlap in 2⁶⁴ draws.
 * @see D. Blackman & S. Vigna, ACM Trans. Math. Softw. 47 (2021) 36 */
export class Xoshiro128 {
  readonly #state: Int32Array;

  /** @param state four 32-bit words, not all zero */
  constructor(state: readonly [number, number, number, number]) {
    this.#state = Int32Array.from(state, (word) => word | 0);
    if (this.#state.every((word) => word === 0)) throw new DomainError('state', '0, 0, 0, 0', 'at least one bit set');
  }

  /** @param seed whole number from 0 to 2⁵³ − 1
   *  @throws {DomainError} if it is not */
  static fromSeed(seed: number): Xoshiro128 {
    if (!Number.isSafeInteger(seed) || seed < 0) {
      throw new DomainError('seed', seed, `a whole number from 0 to ${Number.MAX_SAFE_INTEGER}`);
    }
    const words = splitMix64(BigInt(seed));
    const first = words.next().value;
    const second = words.next().value;
    return new Xoshiro128([
      Number(first & 0xffffffffn),
      Number(first >> 32n),
      Number(second & 0xffffffffn),
      Number(second >> 32n),
    ]);
  }

  /** The same stream from here on, independent of this one. */
  clone(): Xoshiro128 {
    const [a, b, c, d] = this.#state;
    return new Xoshiro128([a!, b!, c!, d!]);
  }

  /** Whole number from 0 to 2³² − 1. */
  nextUint32(): number {
    const s = this.#state;
    const b = s[1]!;
    const scaled = Math.imul(b, 5);
    const result = Math.imul((scaled << 7) | (scaled >>> 25), 9);
    s[2]! ^= s[0]!;
    s[3]! ^= b;
    s[1]! ^= s[2]!;
    s[0]! ^= s[3]!;
    s[2]! ^= b << 9;
    s[3] = (s[3]! << 11) | (s[3]! >>> 21);
    return result >>> 0;
  }

  /** Advances by 2⁶⁴ steps. */
  jump(): void {
    const sum = [0, 0, 0, 0];
    for (const word of JUMP) {
      for (let bit = 0; bit < 32; bit++) {
        if ((word >>> bit) & 1) for (let i = 0; i < 4; i++) sum[i]! ^= this.#state[i]!;
        this.nextUint32();
      }
    }
    this.#state.set(sum);
  }

  /** Fills out[0 … count−1] with draws from the uniform distribution on (0, 1): k/2⁵³ with k from 1 to 2⁵³ − 1, so that
   *  neither 0 nor 1 comes up and the mean is exactly ½. Two 32-bit draws make one; the upper word comes first. */
  fillUniform(out: Float64Array, count: number): void {
    // The generator written out twice on local variables: it is the inner loop of every Monte Carlo run.
    const s = this.#state;
    let a = s[0]!;
    let b = s[1]!;
    let c = s[2]!;
    let d = s[3]!;
    let i = 0;
    while (i < count) {
      let upper = Math.imul(b, 5);
      upper = Math.imul((upper << 7) | (upper >>> 25), 9);
      let t = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= t;
      d = (d << 11) | (d >>> 21);
      let lower = Math.imul(b, 5);
      lower = Math.imul((lower << 7) | (lower >>> 25), 9);
      t = b << 9;
      c ^= a;
      d ^= b;
      b ^= c;
      a ^= d;
      c ^= t;
      d = (d << 11) | (d >>> 21);
      const u = ((upper >>> 5) * 67108864 + (lower >>> 6)) * 1.1102230246251565e-16;
      out[i] = u;
      // A zero, once in 9e15 draws, is overwritten by the next.
      if (u !== 0) i++;
    }
    s[0] = a;
    s[1] = b;
    s[2] = c;
    s[3] = d;
  }
}
