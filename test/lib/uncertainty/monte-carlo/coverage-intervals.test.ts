import { describe, expect, it } from 'vitest';
import { Stabilisation, trialsPerSequence } from '../../../../lib/uncertainty/monte-carlo/adaptive-stopping.js';
import {
  shortestInterval,
  symmetricInterval,
  symmetricRanks,
  symmetricStandardErrors,
} from '../../../../lib/uncertainty/monte-carlo/coverage-intervals.js';
import { normalScores } from '../../../../lib/uncertainty/monte-carlo/deviates.js';
import { numericalTolerance } from '../../../../lib/uncertainty/monte-carlo/numerical-tolerance.js';
import { OutputTrials } from '../../../../lib/uncertainty/monte-carlo/output-trials.js';
import { validate } from '../../../../lib/uncertainty/monte-carlo/validation.js';
import { Xoshiro128 } from '../../../../lib/uncertainty/random.js';
import { expectRelative, expectWithin } from '../expect-relative.js';

const whole = (values: Float64Array) => ({ trials: values.length, lowest: values, highest: values });

function normals(count: number, seed: number): Float64Array {
  const out = new Float64Array(count);
  Xoshiro128.fromSeed(seed).fillUniform(out, count);
  normalScores(out, count);
  return out;
}

describe('coverage intervals from sorted trials', () => {
  it('takes the ranks of JCGM 101:2008, 7.7.2: M = 1e6, p = 0.95 gives y_(25 000) and y_(975 000)', () => {
    expect(symmetricRanks(1_000_000, 0.95)).toEqual({ low: 24_999, high: 974_999, span: 950_000 });
    // odd M − q: r = (M − q + 1)/2, counted from 1; q = int(pM + ½) where pM is not whole
    expect(symmetricRanks(1001, 0.95)).toEqual({ low: 24, high: 975, span: 951 });
    expect(symmetricRanks(1010, 0.95)).toEqual({ low: 24, high: 984, span: 960 });
  });

  it('finds the shortest interval at the dense end, and is symmetric where trials are evenly spread', () => {
    const skew = Float64Array.from({ length: 1000 }, (_, i) => -Math.log(1 - (i + 0.5) / 1000));
    const { low, high } = shortestInterval(whole(skew), 0.95);
    expect(low).toBe(skew[0]);
    expect(high).toBe(skew[950]);
    const even = Float64Array.from({ length: 1000 }, (_, i) => i);
    expect(shortestInterval(whole(even), 0.95)).toEqual({ low: 24, high: 974 });
    expect(symmetricInterval(whole(even), 0.95)).toEqual({ low: 24, high: 974 });
  });

  it('tells the standard error of an end point: √(p(1−p)/M)/φ for normal trials', () => {
    const density = Math.exp(-0.5 * 1.959964 ** 2) / Math.sqrt(2 * Math.PI);
    const expected = Math.sqrt((0.025 * 0.975) / 200_000) / density;
    const { low, high } = symmetricStandardErrors(whole(normals(200_000, 3).sort()), 0.95);
    // 70 ranks apart on either side: the estimate itself is good to about 1/√140
    expectRelative(low, expected, 0.25);
    expectRelative(high, expected, 0.25);
  });
});

describe('trials of one output', () => {
  const values = normals(60_000, 11).map((z) => 3 + 0.5 * z ** 2 + z);
  const filled = (limit: number) => {
    const trials = new OutputTrials(60_000, limit);
    for (let i = 0; i < values.length; i += 1000) trials.add(values.subarray(i, i + 1000), 1000);
    return trials;
  };
  const sorted = values.slice().sort();

  it('gives the ends as a full sort does, kept or grown on the way', () => {
    const grown = new OutputTrials(10, 1e6);
    for (let i = 0; i < values.length; i += 500) grown.add(values.subarray(i, i + 500), 500);
    for (const trials of [filled(1e6), grown]) {
      expect(trials.resolution).toBe(0);
      expect(symmetricInterval(trials.ends(0.95), 0.95)).toEqual(symmetricInterval(whole(sorted), 0.95));
      expect(shortestInterval(trials.ends(0.95), 0.95)).toEqual(shortestInterval(whole(sorted), 0.95));
      expect(symmetricInterval(trials.ends(0.4), 0.4)).toEqual(symmetricInterval(whole(sorted), 0.4));
    }
  });

  it('counts in cells beyond the limit: the same moments, end points within one cell', () => {
    const exact = filled(1e6);
    const counted = filled(20_000);
    expect(counted.resolution).toBeGreaterThan(0);
    expect(counted.resolution).toBeLessThan(1e-3);
    expect(counted.mean).toBe(exact.mean);
    expect(counted.variance).toBe(exact.variance);
    for (const p of [0.5, 0.95, 0.9999]) {
      const a = symmetricInterval(exact.ends(p), p);
      const b = symmetricInterval(counted.ends(p), p);
      expectWithin(b.low, a.low, counted.resolution);
      expectWithin(b.high, a.high, counted.resolution);
      expectWithin(
        shortestInterval(counted.ends(p), p).high - shortestInterval(counted.ends(p), p).low,
        shortestInterval(exact.ends(p), p).high - shortestInterval(exact.ends(p), p).low,
        2 * counted.resolution,
      );
    }
    const coarse = exact.histogram(2.5, 6, 50);
    const same = counted.histogram(2.5, 6, 50);
    const shifted = coarse.counts.reduce((sum, c, i) => sum + Math.abs(c - same.counts[i]!), 0);
    expect(shifted).toBeLessThan(200); // trials that cross a bin's edge by half a cell
    expect(same.counts.reduce((s, c) => s + c, same.below + same.above)).toBe(60_000);
  });

  it('keeps far outliers as they are when counting', () => {
    const trials = new OutputTrials(20_000, 10_000);
    const block = normals(10_000, 5);
    trials.add(block, 10_000);
    trials.add(Float64Array.of(1e9, -1e12), 2);
    trials.add(block, 10_000);
    const ends = trials.ends(0.95);
    expect(ends.lowest[0]).toBe(-1e12);
    expect(ends.highest.at(-1)).toBe(1e9);
  });

  it('has mean and variance of the textbook, far from zero too', () => {
    const trials = new OutputTrials(4, 1e6);
    for (const v of [1e9 + 4, 1e9 + 7, 1e9 + 13, 1e9 + 16]) trials.add(Float64Array.of(v), 1);
    expect(trials.mean).toBe(1e9 + 10);
    expect(trials.variance).toBe(30);
    expect(trials.count).toBe(4);
  });

  it('makes densities that add up to the part inside', () => {
    const h = filled(1e6).histogram(2.5, 6, 40);
    const inside = h.counts.reduce((s, c) => s + c, 0);
    expect(inside + h.below + h.above).toBe(60_000);
    expectRelative(h.densities.reduce((s, d) => s + d, 0) * (3.5 / 40), inside / 60_000, 1e-12);
    expect(h.below).toBe(sorted.findIndex((v) => v >= 2.5));
  });
});

describe('numerical tolerance, JCGM 101:2008, 7.9.2 (from memory)', () => {
  it('is half a unit in the last meaningful digit', () => {
    expect(numericalTolerance(0.00035, 2)).toBe(0.5e-5); // 35 × 10⁻⁵ g
    expect(numericalTolerance(0.00035, 1)).toBe(0.5e-4); // 4 × 10⁻⁴ g
    expect(numericalTolerance(2, 1)).toBe(0.5); // 2 K
    expect(numericalTolerance(2, 2)).toBe(0.05);
    expect(numericalTolerance(1.4e-18, 2)).toBe(0.5e-19);
    expect(numericalTolerance(0.0996, 2)).toBe(0.5e-2); // rounds to 10 × 10⁻²
    expect(numericalTolerance(0.0994, 2)).toBe(0.5e-3); // 99 × 10⁻³
  });

  it('refuses what has none', () => {
    expect(() => numericalTolerance(0, 2)).toThrow('u = 0');
    expect(() => numericalTolerance(1, 3)).toThrow('significantDigits = 3');
  });
});

describe('validation, JCGM 101:2008, clause 8', () => {
  const linear = { value: 7, u: 2, coverageFactor: 1.96 };
  const none = { low: 0, high: 0 };

  it('passes within δ and fails beyond, at either end', () => {
    const ends = (low: number, high: number) => validate(linear, { low, high }, none, 2);
    expect(ends(-3.92, 3.92)).toMatchObject({ validated: true, tolerance: 0.05, resolved: true });
    expect(ends(-3.88, 3.88).validated).toBe(true);
    expect(ends(-3.86, 3.92).validated).toBe(false);
    expect(ends(-3.92, 3.98).validated).toBe(false);
    expectWithin(ends(-3.86, 3.92).differenceLow, 0.06, 1e-15);
    expectWithin(ends(-3.92, 3.98).differenceHigh, 0.06, 1e-15);
  });

  it('holds a difference against the linear result only beyond the noise of the trials, and says when that mattered', () => {
    const few = validate(linear, { low: -3.85, high: 3.92 }, { low: 0.03, high: 0.03 }, 2);
    expect(few).toMatchObject({ validated: true, resolved: false });
    expect(validate(linear, { low: -3.85, high: 3.92 }, { low: 0.005, high: 0.005 }, 2)).toMatchObject({
      validated: false,
      resolved: true,
    });
  });

  it('lets an exact output agree only with itself', () => {
    const exact = { value: 1, u: 0, coverageFactor: 1.96 };
    expect(validate(exact, { low: 0, high: 0 }, none, 2).validated).toBe(true);
    expect(validate(exact, { low: 0, high: 1e-30 }, none, 2).validated).toBe(false);
  });
});

describe('adaptive stopping, JCGM 101:2008, 7.9.4', () => {
  it('takes sequences of max(J, 10⁴) trials', () => {
    expect(trialsPerSequence(0.95)).toBe(10_000);
    expect(trialsPerSequence(0.99)).toBe(10_000);
    expect(trialsPerSequence(0.999)).toBe(100_000);
  });

  it('needs as many sequences as the spread of an end point asks for', () => {
    // σ = 2, δ = 0.05: an end of 1e4 trials spreads by 0.0534, so that 2·0.0534/√h < 0.05 from h ≈ 4.6 on
    const needed = [1, 2, 3].map((seed) => {
      const watch = new Stabilisation(0.95, true);
      const generator = Xoshiro128.fromSeed(seed);
      for (let h = 1; ; h++) {
        const out = new Float64Array(10_000);
        generator.fillUniform(out, 10_000);
        normalScores(out, 10_000);
        watch.add(out.map((z) => 2 * z));
        if (watch.isStable(2, 2)) return h;
      }
    });
    const mean = needed.reduce((s, h) => s + h, 0) / needed.length;
    expect(mean).toBeGreaterThanOrEqual(2.5);
    expect(mean).toBeLessThanOrEqual(9);
  });

  it('does not wait for a variance that is infinite', () => {
    const watch = new Stabilisation(0.95, false);
    const block = (outlier: number) => {
      const values = normals(10_000, 2);
      values[0] = outlier;
      return values;
    };
    watch.add(block(1e9));
    expect(watch.isStable(1, 2)).toBe(false);
    watch.add(block(-1e7));
    expect(watch.isStable(1, 2)).toBe(true);
    const strict = new Stabilisation(0.95, true);
    strict.add(block(1e9));
    strict.add(block(-1e7));
    expect(strict.isStable(1, 2)).toBe(false);
  });
});
