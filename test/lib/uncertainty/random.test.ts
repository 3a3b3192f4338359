import { describe, expect, it } from 'vitest';
import { chiSquareUpperTail } from '../../../lib/uncertainty/distributions/index.js';
import { Xoshiro128 } from '../../../lib/uncertainty/random.js';

describe('xoshiro128**', () => {
  it('gives the published sequence of state 1, 2, 3, 4 (reference C code of Blackman & Vigna, version 1.1)', () => {
    const generator = new Xoshiro128([1, 2, 3, 4]);
    expect(Array.from({ length: 8 }, () => generator.nextUint32())).toEqual([
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849,
    ]);
  });

  it('is seeded by SplitMix64: seed 1234567 (published test vector of SplitMix64)', () => {
    // 6457827717110365317, 3203168211198807973 (Rosetta Code, "Pseudo-random numbers/Splitmix64")
    const low = (v: bigint) => Number(v & 0xffffffffn);
    const high = (v: bigint) => Number(v >> 32n);
    const [first, second] = [6457827717110365317n, 3203168211198807973n];
    const expected = new Xoshiro128([low(first), high(first), low(second), high(second)]);
    const seeded = Xoshiro128.fromSeed(1234567);
    for (let i = 0; i < 5; i++) expect(seeded.nextUint32()).toBe(expected.nextUint32());
  });

  it('jumps by 2⁶⁴ steps: the same state as the transition matrix squared 64 times', () => {
    // The generator is linear over GF(2): a 128×128 bit matrix, as rows of BigInt; a 1 in row i, bit j: new bit i takes old bit j.
    const pack = (w: number[]) => w.reduce((sum, word, i) => sum | (BigInt(word >>> 0) << BigInt(32 * i)), 0n);
    const step = (state: bigint): bigint => {
      const w = Array.from({ length: 4 }, (_, i) => Number((state >> BigInt(32 * i)) & 0xffffffffn));
      const t = w[1]! << 9;
      w[2]! ^= w[0]!;
      w[3]! ^= w[1]!;
      w[1]! ^= w[2]!;
      w[0]! ^= w[3]!;
      w[2]! ^= t;
      w[3] = (w[3]! << 11) | (w[3]! >>> 21);
      return pack(w);
    };
    // columns of the matrix; applying it is the sum of the columns of the set bits
    let columns = Array.from({ length: 128 }, (_, j) => step(1n << BigInt(j)));
    const apply = (m: bigint[], v: bigint): bigint => {
      let sum = 0n;
      for (let j = 0; v > 0n; j++, v >>= 1n) if (v & 1n) sum ^= m[j]!;
      return sum;
    };
    for (let i = 0; i < 64; i++) {
      const m = columns;
      columns = m.map((column) => apply(m, column));
    }
    const start = [0x12345678, 0x9abcdef0, 0x0f1e2d3c, 0x4b5a6978];
    const jumped = apply(columns, pack(start));
    const words = Array.from({ length: 4 }, (_, i) => Number((jumped >> BigInt(32 * i)) & 0xffffffffn));
    const direct = new Xoshiro128(words as [number, number, number, number]);
    const generator = new Xoshiro128(start as [number, number, number, number]);
    generator.jump();
    for (let i = 0; i < 4; i++) expect(generator.nextUint32()).toBe(direct.nextUint32());
  });

  it('makes 53-bit uniforms from two words, upper first, whatever the length of the pieces', () => {
    const words = Xoshiro128.fromSeed(7);
    const expected = Array.from({ length: 50 }, () => {
      const upper = words.nextUint32();
      const lower = words.nextUint32();
      return Math.floor(upper / 32) / 2 ** 27 + Math.floor(lower / 64) / 2 ** 53;
    });
    const generator = Xoshiro128.fromSeed(7);
    const out = new Float64Array(30);
    generator.fillUniform(out, 20);
    expect(Array.from(out.subarray(0, 20))).toEqual(expected.slice(0, 20));
    expect(out[20]).toBe(0);
    generator.fillUniform(out, 30);
    expect(Array.from(out)).toEqual(expected.slice(20));
  });

  it('draws these numbers for seed 2027 (independent Python program, whole-number arithmetic)', () => {
    const generator = Xoshiro128.fromSeed(2027);
    const copy = generator.clone();
    for (const stream of [generator, copy]) {
      const out = new Float64Array(3);
      stream.fillUniform(out, 3);
      expect(Array.from(out)).toEqual([0.7037151350883236, 0.9011369454270403, 0.5789591072068688]);
    }
  });

  it('fills 1000 cells evenly, and pairs of neighbours too (χ² at 1e-4 both ways)', () => {
    const n = 200_000;
    const out = new Float64Array(n);
    Xoshiro128.fromSeed(4).fillUniform(out, n);
    const cells = new Float64Array(1000);
    const pairs = new Float64Array(32 * 32);
    for (let i = 0; i < n; i++) cells[Math.floor(out[i]! * 1000)]! += 1;
    for (let i = 0; i + 1 < n; i += 2) pairs[Math.floor(out[i]! * 32) * 32 + Math.floor(out[i + 1]! * 32)]! += 1;
    for (const [count, total] of [
      [cells, n],
      [pairs, n / 2],
    ] as const) {
      const e = total / count.length;
      const chi2 = count.reduce((sum, c) => sum + (c - e) ** 2 / e, 0);
      const p = chiSquareUpperTail(chi2, count.length - 1);
      expect(p).toBeGreaterThan(1e-4);
      expect(p).toBeLessThan(1 - 1e-4);
    }
  });

  it('refuses a seed that is not a whole number from 0 to 2⁵³ − 1, and the state that never moves', () => {
    for (const seed of [-1, 0.5, 2 ** 53, Number.NaN]) expect(() => Xoshiro128.fromSeed(seed)).toThrow('seed = ');
    expect(() => new Xoshiro128([0, 0, 0, 0])).toThrow('state = ');
  });
});
