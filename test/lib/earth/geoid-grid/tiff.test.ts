import { deflateSync } from 'node:zlib';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DecompressionError, inflateZlib } from '../../../../lib/earth/geoid-grid/tiff/inflate.js';
import { unpackLzw } from '../../../../lib/earth/geoid-grid/tiff/lzw.js';
import { undoPredictor } from '../../../../lib/earth/geoid-grid/tiff/predictor.js';
import { packLzw } from './tiff-fixtures.js';

const bytes = fc.oneof(
  fc.uint8Array({ maxLength: 400 }),
  // runs and repeats, which the packers make long references of
  fc
    .array(fc.tuple(fc.uint8Array({ minLength: 1, maxLength: 5 }), fc.integer({ min: 1, max: 300 })), { maxLength: 4 })
    .map((parts) => Uint8Array.from(parts.flatMap(([p, n]) => Array.from({ length: n }, () => [...p]).flat()))),
);
const same = (a: Uint8Array, b: Uint8Array) => a.length === b.length && a.every((v, i) => v === b[i]);
const noise = (length: number, values: number) => {
  let x = 12345;
  return Uint8Array.from({ length }, () => {
    x = (Math.imul(x, 1103515245) + 12345) >>> 0;
    return (x >>> 16) % values;
  });
};

describe('inflate', () => {
  it('unpacks what zlib packs, at every level and strategy', () => {
    fc.assert(
      fc.property(bytes, fc.integer({ min: 0, max: 9 }), fc.constantFrom(0, 1, 2, 3, 4), (data, level, strategy) => {
        const packed = new Uint8Array(deflateSync(data, { level, strategy }));
        expect(same(inflateZlib(packed, data.length), data)).toBe(true);
        expect(same(inflateZlib(packed, data.length + 7), data)).toBe(true);
      }),
      { numRuns: 100, seed: 2 },
    );
    for (const values of [2, 30, 256]) {
      const data = noise(70_000, values);
      for (const level of [0, 1, 6, 9])
        expect(same(inflateZlib(new Uint8Array(deflateSync(data, { level })), data.length), data)).toBe(true);
    }
  });

  it('stops at the size that a block may have, however far the stream expands', () => {
    const packed = new Uint8Array(deflateSync(new Uint8Array(1 << 24)));
    const before = process.memoryUsage().arrayBuffers;
    expect(() => inflateZlib(packed, 1000)).toThrow(/more than the 1000 bytes/);
    expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1 << 20);
    expect(() => inflateZlib(new Uint8Array(deflateSync(noise(99, 256), { level: 0 })), 98)).toThrow(
      /more than the 98 bytes/,
    );
    expect(() => inflateZlib(new Uint8Array(deflateSync(noise(99, 256), { strategy: 2 })), 98)).toThrow(
      /more than the 98 bytes/,
    );
  });

  it('refuses damaged data: every cut, and any changed byte', () => {
    const data = noise(500, 20);
    const packed = new Uint8Array(deflateSync(data));
    for (let length = 0; length < packed.length; length++)
      expect(() => inflateZlib(packed.subarray(0, length), 600)).toThrow(DecompressionError);
    for (let i = 0; i < packed.length; i++)
      for (const flip of [1, 0x80]) {
        const damaged = packed.slice();
        damaged[i]! ^= flip;
        let result: Uint8Array | null = null;
        try {
          result = inflateZlib(damaged, 600);
        } catch (error) {
          expect(error).toBeInstanceOf(DecompressionError);
        }
        // the level in the head carries no data; all else is covered by the checksum
        if (result) expect(same(result, data)).toBe(true);
      }
  });
});

describe('LZW', () => {
  it('unpacks what the encoder of the specification packs', () => {
    fc.assert(
      fc.property(bytes, (data) => {
        expect(same(unpackLzw(packLzw(data), data.length + 1), data)).toBe(true);
      }),
      { numRuns: 150, seed: 3 },
    );
    // through all code widths and several clears
    for (const values of [3, 40, 256]) {
      const data = noise(60_000, values);
      expect(same(unpackLzw(packLzw(data), data.length), data)).toBe(true);
    }
  });

  it('stops at the size that a block may have, and refuses damaged data', () => {
    const packed = packLzw(new Uint8Array(100_000));
    expect(() => unpackLzw(packed, 999)).toThrow(/more than the 999 bytes/);
    expect(() => unpackLzw(packed.subarray(0, 40), 100_000)).toThrow(/end too early/);
    expect(() => unpackLzw(Uint8Array.of(0x80, 0x7f, 0xff, 0xff), 100)).toThrow(/stands for nothing/);
    expect(() => unpackLzw(Uint8Array.of(0, 1, 2, 3), 100)).toThrow(/before TIFF 5.0/);
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 60 }), (junk) => {
        try {
          expect(unpackLzw(junk, 500).length).toBeLessThanOrEqual(500);
        } catch (error) {
          expect(error).toBeInstanceOf(DecompressionError);
        }
      }),
      { numRuns: 2000, seed: 4 },
    );
  });
});

describe('predictors', () => {
  it('undo differences in both byte orders and all widths', () => {
    // 16 bit, two channels interleaved: 1000, 5 / +1, −2 / +65535 (−1), +7
    for (const little of [true, false]) {
      const view = new DataView(new ArrayBuffer(12));
      for (const [i, v] of [1000, 5, 1, 65534, 65535, 7].entries()) view.setUint16(2 * i, v, little);
      expect(undoPredictor(new Uint8Array(view.buffer), 2, 6, 2, 2, little)).toBe(true);
      expect(Array.from({ length: 6 }, (_, i) => view.getUint16(2 * i, little))).toEqual([1000, 5, 1001, 3, 1000, 10]);
    }
    const wide = new DataView(new ArrayBuffer(16));
    wide.setBigUint64(0, 2n ** 64n - 1n, false);
    wide.setBigUint64(8, 3n, false);
    expect(undoPredictor(new Uint8Array(wide.buffer), 2, 2, 1, 8, false)).toBe(true);
    expect(wide.getBigUint64(8, false)).toBe(2n);
    expect(undoPredictor(Uint8Array.of(250, 10, 250), 2, 3, 1, 1, true)).toBe(true);
    // 3: bytes by significance, the first plane the highest, then differences of bytes: 1.5 = 3f c0 00 00, −2 = c0 00 00 00
    for (const little of [true, false]) {
      const planes = [0x3f, 0xc0, 0xc0, 0, 0, 0, 0, 0];
      const packed = Uint8Array.from(planes.map((b, i) => (i === 0 ? b : b - planes[i - 1]!)));
      expect(undoPredictor(packed, 3, 2, 1, 4, little)).toBe(true);
      const floats = new DataView(packed.buffer);
      expect([floats.getFloat32(0, little), floats.getFloat32(4, little)]).toEqual([1.5, -2]);
    }
    expect(undoPredictor(new Uint8Array(6), 2, 2, 1, 3, true)).toBe(false);
    expect(undoPredictor(new Uint8Array(8), 34892, 2, 1, 4, true)).toBe(false);
  });
});
