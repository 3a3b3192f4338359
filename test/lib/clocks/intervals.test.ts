import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  complementOfIntervals,
  intersectionOfIntervals,
  totalLengthS,
  unionOfIntervals,
} from '../../../lib/clocks/intervals.js';

const i = (startMs: number, endMs: number) => ({ startMs, endMs });
const lists = fc.array(
  fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 0, max: 12 })).map(([s, l]) => i(s, s + l)),
  { maxLength: 8 },
);
/** The same sets by brute force: which of the unit cells are covered. */
const cells = (list: readonly { startMs: number; endMs: number }[]) =>
  Array.from({ length: 60 }, (_, k) => list.some((x) => x.startMs <= k && k + 1 <= x.endMs));

describe('sets of instants', () => {
  it('joins overlapping and touching intervals and leaves out empty ones', () => {
    expect(unionOfIntervals([i(5, 9), i(0, 2), i(2, 3), i(7, 12), i(20, 20)])).toEqual([i(0, 3), i(5, 12)]);
  });

  it('cuts three lists: clock A, clock B and the link', () => {
    expect(intersectionOfIntervals([[i(0, 10)], [i(2, 4), i(6, 20)], [i(3, 8)]])).toEqual([i(3, 4), i(6, 8)]);
  });

  it('is empty when one of the lists is empty, and refuses no list at all', () => {
    expect(intersectionOfIntervals([[i(0, 10)], []])).toEqual([]);
    expect(() => intersectionOfIntervals([])).toThrow(/at least one/);
  });

  it('refuses an end before its start and NaN', () => {
    expect(() => unionOfIntervals([i(3, 2)])).toThrow(/end must not lie before/);
    expect(() => totalLengthS([i(Number.NaN, 2)])).toThrow(RangeError);
  });

  it('counts what is covered twice once, in seconds', () => {
    expect(totalLengthS([i(0, 3000), i(1000, 4000), i(9000, 9500)])).toBe(4.5);
  });

  it('agrees with counting cells', () => {
    fc.assert(
      fc.property(lists, lists, (a, b) => {
        const inA = cells(a);
        const inB = cells(b);
        const window = i(0, 60);
        expect(cells(unionOfIntervals([...a, ...b]))).toEqual(inA.map((x, k) => x || inB[k]));
        expect(cells(intersectionOfIntervals([a, b]))).toEqual(inA.map((x, k) => x && inB[k]));
        expect(cells(complementOfIntervals(a, window))).toEqual(inA.map((x) => !x));
        expect(totalLengthS(a)).toBeCloseTo(inA.filter(Boolean).length / 1000, 12);
      }),
      { numRuns: 300 },
    );
  });
});
