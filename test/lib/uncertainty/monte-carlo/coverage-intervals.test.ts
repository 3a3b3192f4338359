import { describe, expect, it } from 'vitest';
import { Stabilisation, trialsPerSequence } from '../../../../lib/uncertainty/monte-carlo/adaptive-stopping.js';
import {
  shortestInterval,
  symmetricInterval,
  symmetricRanks,
  symmetricStandardErrors,
} from '../../../../lib/uncertainty/monte-carlo/coverage-intervals.js';
import { fillNormalScores } from '../../../../lib/uncertainty/monte-carlo/normal-scores.js';
import { numericalTolerance } from '../../../../lib/uncertainty/monte-carlo/numerical-tolerance.js';
import { OutputTrials } from '../../../../lib/uncertainty/monte-carlo/output-trials.js';
import { sortNumbers } from '../../../../lib/uncertainty/monte-carlo/sort-numbers.js';
import { validate } from '../../../../lib/uncertainty/monte-carlo/validation.js';
import { Xoshiro128 } from '../../../../lib/uncertainty/random.js';
import { expectRelative, expectWithin } from '../expect-relative.js';

const whole = (values: Float64Array) => ({ trials: values.length, lowest: values, highest: values });

function normals(count: number, seed: number): Float64Array {
  const out = new Float64Array(count);
  fillNormalScores(Xoshiro128.fromSeed(seed), out, count);
  return out;
}

describe('coverage intervals from sorted trials', () => {
  it('takes the ranks of JCGM 101:2008, 7.7.2: M = 1e6, p = 0.95 gives y_(25 000) and y_(975 000)', () => {
    expect(symmetricRanks(1_000_000, 0.95)).toEqual({ low: 24_999, high: 974_999, span: 950_000 });
    // odd M − q: r = (M − q + 1)/2, counted from 1; q = int(pM + ½) where pM is not whole
    expect(symmetricRanks(1030, 0.95)).toEqual({ low: 25, high: 1004, span: 979 });
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

describe('sorting numbers', () => {
  it('orders as the general sort does: normals, few, lumps, far outliers, all equal, infinities', () => {
    const lumps = normals(5000, 3).map((z) => Math.round(z));
    const outliers = normals(5000, 4);
    outliers[7] = 1e30;
    const infinite = normals(2000, 4);
    infinite[9] = -Infinity;
    for (const values of [
      normals(5000, 1),
      normals(999, 2),
      lumps,
      outliers,
      infinite,
      new Float64Array(3000).fill(0.3),
      Float64Array.of(),
    ]) {
      expect(sortNumbers(values.slice())).toEqual(values.slice().sort());
    }
  });
});

describe('trials of one output', () => {
  const N = 60_000;
  const values = normals(N, 11).map((z) => 3 + 0.5 * z ** 2 + z);
  const sorted = values.slice().sort();
  const filled = (limit: number, coverage = 0.95, block = 1000) => {
    const trials = new OutputTrials(coverage, limit);
    for (let i = 0; i < N; i += block) trials.add(values.subarray(i, i + block), Math.min(block, N - i));
    return trials;
  };

  it('gives the ends as a full sort does, in blocks of any length', () => {
    for (const block of [1000, 700, 37]) {
      const trials = filled(1e6, 0.95, block);
      expect(trials.resolution).toBe(0);
      expect(symmetricInterval(trials.ends(0.95), 0.95)).toEqual(symmetricInterval(whole(sorted), 0.95));
      expect(shortestInterval(trials.ends(0.95), 0.95)).toEqual(shortestInterval(whole(sorted), 0.95));
      expect(symmetricInterval(trials.ends(0.999), 0.999)).toEqual(symmetricInterval(whole(sorted), 0.999));
    }
  });

  it('gives them exactly of few trials, whatever the coverage', () => {
    const few = new OutputTrials(0.95, 1e6);
    for (let i = 0; i < 9000; i += 1000) few.add(values.subarray(i, i + 1000), 1000);
    const all = values.slice(0, 9000).sort();
    expect(symmetricInterval(few.ends(0.3), 0.3)).toEqual(symmetricInterval(whole(all), 0.3));
    const h = few.histogram(2.5, 6, 35);
    expect(h.counts[3]).toBe(all.filter((v) => v >= 2.8 && v < 2.9).length);
    expect(h.below).toBe(all.filter((v) => v < 2.5).length);
    expect(h.above).toBe(all.filter((v) => v > 6).length);
  });

  it('counts in cells beyond the limit, or for a low coverage: the same moments, end points within one cell', () => {
    const exact = filled(1e6);
    for (const [counted, coverages] of [
      [filled(5000), [0.5, 0.95, 0.9999]],
      [filled(1e6, 0.5), [0.5, 0.2]],
    ] as const) {
      expect(counted.resolution).toBeGreaterThan(0);
      expect(counted.resolution).toBeLessThan(5e-3);
      expect(counted.mean).toBe(exact.mean);
      expect(counted.variance).toBe(exact.variance);
      for (const p of coverages) {
        const a = symmetricInterval(whole(sorted), p);
        const b = symmetricInterval(counted.ends(p), p);
        expectWithin(b.low, a.low, counted.resolution);
        expectWithin(b.high, a.high, counted.resolution);
        const [s, t] = [shortestInterval(whole(sorted), p), shortestInterval(counted.ends(p), p)];
        expectWithin(t.high - t.low, s.high - s.low, 2 * counted.resolution);
      }
    }
  });

  it('keeps far outliers as they are, in the ends and when counting', () => {
    for (const limit of [1e6, 100]) {
      const trials = new OutputTrials(0.95, limit);
      const z = normals(12_000, 5);
      for (let i = 0; i < 12_000; i += 1000) trials.add(z.subarray(i, i + 1000), 1000);
      trials.add(Float64Array.of(1e9, -1e12), 2);
      const ends = trials.ends(0.95);
      expect(ends.lowest[0]).toBe(-1e12);
      expect(ends.highest.at(-1)).toBe(1e9);
    }
  });

  it('is exact for an output that never moves, and for one that hardly ever does', () => {
    const trials = new OutputTrials(0.95, 100);
    const block = new Float64Array(1000).fill(0.3);
    for (let i = 0; i < 30; i++) trials.add(block, 1000);
    expect(trials.resolution).toBe(0);
    expect(symmetricInterval(trials.ends(0.95), 0.95)).toEqual({ low: 0.3, high: 0.3 });
    trials.add(Float64Array.of(-5, 7, 8), 3);
    const ends = trials.ends(0.95);
    expect(ends.lowest.slice(0, 2)).toEqual(Float64Array.of(-5, 0.3));
    expect(ends.highest.slice(-3)).toEqual(Float64Array.of(0.3, 7, 8));
    const h = trials.histogram(0, 1, 10);
    expect(h.counts).toEqual(
      [0, 0, 0, 30_000, 0, 0, 0, 0, 0, 0].map((c, i) => (i === 3 || i === 2 ? h.counts[i]! : c)),
    );
    expect(h.counts[2]! + h.counts[3]!).toBe(30_000);
    expect([h.below, h.above]).toEqual([1, 2]);
  });

  it('has mean and variance of the textbook, far from zero too', () => {
    const trials = new OutputTrials(0.95, 1e6);
    for (const v of [1e9 + 4, 1e9 + 7, 1e9 + 13, 1e9 + 16]) trials.add(Float64Array.of(v), 1);
    expect(trials.mean).toBe(1e9 + 10);
    expect(trials.variance).toBe(30);
    expect(trials.count).toBe(4);
    const all = filled(1e6);
    const mean = values.reduce((s, v) => s + v, 0) / N;
    expectRelative(all.mean, mean, 1e-12);
    expectRelative(all.variance, values.reduce((s, v) => s + (v - mean) ** 2, 0) / (N - 1), 1e-12);
  });

  it('bins whole cells, so that every trial is on the right side of every edge', () => {
    for (const limit of [1e6, 5000]) {
      const h = filled(limit).histogram(2.5, 6, 40);
      const width = (h.high - h.low) / 40;
      expectWithin(h.low, 2.5, 5e-3);
      expect(h.high).toBeGreaterThanOrEqual(6 - 5e-3);
      expect(h.high).toBeLessThan(6.2);
      h.counts.forEach((c, i) => {
        // a trial may lie on the other side of an edge by rounding of the edge itself
        const inside = sorted.filter((v) => v >= h.low + i * width && v < h.low + (i + 1) * width).length;
        expectWithin(c, inside, 1);
      });
      expect(h.counts.reduce((s, c) => s + c, h.below + h.above)).toBe(N);
      expectWithin(h.below, sorted.filter((v) => v < h.low).length, 1);
      expectRelative(h.densities[7]!, h.counts[7]! / N / width, 1e-12);
    }
  });

  it('refuses more than a thousand at a time', () => {
    expect(() => new OutputTrials(0.95, 1e6).add(values, 1001)).toThrow('count = 1001');
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
        fillNormalScores(generator, out, 10_000);
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
