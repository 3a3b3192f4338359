import { describe, expect, it } from 'vitest';
import { continuousLimit, logarithmicFactor, modifiedLimit } from '../../../../lib/clocks/deviations/edf-limits.js';
import {
  differenceAutocovariance,
  equivalentDegreesOfFreedom,
  type NoiseExponent,
  pooledDegreesOfFreedom,
  totalVarianceDegreesOfFreedom,
} from '../../../../lib/clocks/deviations/equivalent-degrees-of-freedom.js';
import { deviationInterval, deviationsAt, phaseRecordOf } from '../../../../lib/clocks/deviations/index.js';
import { whiteFm } from '../simulated-noise.js';

const OADEV = { order: 2, modified: false, overlapping: true } as const;
const ADEV = { order: 2, modified: false, overlapping: false } as const;
const OHDEV = { order: 3, modified: false, overlapping: true } as const;

/** ν = M²/Σ_ij ρ_ij² from the weights with which independent values enter each estimate: no approximation. */
function exact(weights: (at: number) => Map<number, number>, places: readonly number[]): number {
  const dot = (a: Map<number, number>, b: Map<number, number>): number => {
    let sum = 0;
    for (const [k, v] of a) sum += v * (b.get(k) ?? 0);
    return sum;
  };
  const rows = places.map(weights);
  const self = dot(rows[0]!, rows[0]!);
  let sum = 0;
  for (const a of rows) for (const b of rows) sum += (dot(a, b) / self) ** 2;
  return places.length ** 2 / sum;
}

/** Second (third) difference of white phase at spacing m. */
const ofPhase = (m: number, order: 2 | 3) => (at: number) =>
  new Map((order === 2 ? [1, -2, 1] : [-1, 3, -3, 1]).map((c, k) => [at + k * m, c]));

/** The same of phase that is the sum of white frequency: m values of weight −1, then m of weight +1. */
const ofFrequency = (m: number) => (at: number) => {
  const w = new Map<number, number>();
  for (let i = 0; i < 2 * m; i++) w.set(at + i, i < m ? -1 : 1);
  return w;
};

const range = (n: number, step = 1): number[] => Array.from({ length: n }, (_, k) => k * step);

describe('degrees of freedom against exact sums', () => {
  it.each([
    [41, 1],
    [41, 5],
    [41, 13],
    [41, 19],
    [60, 29],
  ])('white PM, overlapping Allan, %i points, m = %i: exact', (points, m) => {
    const expected = exact(ofPhase(m, 2), range(points - 2 * m));
    expect(Math.abs(equivalentDegreesOfFreedom(OADEV, 2, points, m) / expected - 1)).toBeLessThan(1e-12);
  });

  it.each([
    [61, 2],
    [61, 11],
    [61, 19],
  ])('white PM, overlapping Hadamard, %i points, m = %i: exact', (points, m) => {
    const expected = exact(ofPhase(m, 3), range(points - 3 * m));
    expect(Math.abs(equivalentDegreesOfFreedom(OHDEV, 2, points, m) / expected - 1)).toBeLessThan(1e-12);
  });

  it.each([
    [81, 20, 5],
    [129, 40, 2],
    [201, 40, 2],
  ])('white FM, overlapping Allan, %i points, m = %i: to %i %%', (points, m, percent) => {
    // The method supposes phase averaged over τ0; frequency averages do without, which matters at m of a few only.
    const expected = exact(ofFrequency(m), range(points - 2 * m));
    expect(Math.abs(equivalentDegreesOfFreedom(OADEV, 0, points, m) / expected - 1)).toBeLessThan(percent / 100);
  });

  it('white FM, Allan without overlap: ν = 2M²/(3M − 1) for M differences at long τ', () => {
    const m = 64;
    const terms = 9;
    const expected = exact(ofFrequency(m), range(terms, m));
    expect(Math.abs(expected / ((2 * terms ** 2) / (3 * terms - 1)) - 1)).toBeLessThan(1e-12);
    expect(Math.abs(equivalentDegreesOfFreedom(ADEV, 0, 1 + m * (terms + 1), m) / expected - 1)).toBeLessThan(0.01);
  });
});

describe('limits for many terms: the printed coefficients by integration of the autocovariance', () => {
  const integrals = (alpha: number, order: 2 | 3, f: number, norm: number) => {
    const n = 20_000;
    let a0 = 0;
    let a1 = 0;
    for (let i = 0; i < n; i++) {
      const t = ((i + 0.5) * (order + 1)) / n;
      const q = (2 * (differenceAutocovariance(t, f, alpha, order) / norm) ** 2 * (order + 1)) / n;
      a0 += q;
      a1 += q * t;
    }
    return { a0, a1 };
  };
  for (const order of [2, 3] as const) {
    for (const alpha of [2, 1, 0, -1, -2, -3, -4] as NoiseExponent[]) {
      if (alpha + 2 * order <= 1) continue;
      it(`order ${order}, α = ${alpha}`, () => {
        const modified = integrals(alpha, order, 1, differenceAutocovariance(0, 1, alpha, order));
        // Half of the third decimal printed, with a little for the integration.
        expect(Math.abs(modifiedLimit(alpha, order).a0 - modified.a0)).toBeLessThan(6e-4);
        expect(Math.abs(modifiedLimit(alpha, order).a1 - modified.a1)).toBeLessThan(6e-4);
        if (alpha === 2) return;
        const flicker = alpha === 1;
        const f = flicker ? 1e6 : Number.POSITIVE_INFINITY;
        const plain = integrals(alpha, order, f, flicker ? 1 : differenceAutocovariance(0, f, alpha, order));
        const unit = flicker ? 2e-3 : 6e-4;
        const { a0, a1 } = continuousLimit(alpha, order);
        expect(Math.abs(a0 - plain.a0)).toBeLessThan(unit * (flicker ? a0 : 1));
        expect(Math.abs(a1 - plain.a1)).toBeLessThan(2 * unit * (flicker ? a1 : 1));
      });
    }
    it(`flicker PM at lag 0 grows with ln m, order ${order}`, () => {
      for (const m of [30, 3000]) {
        const at = differenceAutocovariance(0, m, 1, order);
        // b0 is printed with two decimals for order 2, with one for order 3
        expect(Math.abs(logarithmicFactor(order, m) - at)).toBeLessThan(order === 2 ? 5e-3 : 5e-2);
      }
    });
  }
});

describe('behaviour', () => {
  it('is smooth where the method changes from sum to limit', () => {
    for (const alpha of [2, 1, 0, -1, -2] as NoiseExponent[]) {
      for (const estimator of [OADEV, OHDEV, { order: 2, modified: true, overlapping: true } as const]) {
        const at = (m: number) => equivalentDegreesOfFreedom(estimator, alpha, 2001, m) * m;
        for (let m = 20; m < 60; m++) expect(Math.abs(at(m + 1) / at(m) - 1)).toBeLessThan(0.05);
      }
    }
  });

  it('is one for a single term', () => {
    for (const alpha of [2, 1, 0, -1, -2] as NoiseExponent[]) {
      expect(Math.abs(equivalentDegreesOfFreedom(ADEV, alpha, 2 * 50 + 1, 50) - 1)).toBeLessThan(1e-9);
    }
  });

  it('survives flicker PM at a million samples per τ', () => {
    const nu = equivalentDegreesOfFreedom({ ...ADEV }, 1, 1e7 + 1, 1e6);
    expect(nu).toBeGreaterThan(4);
    expect(nu).toBeLessThan(9);
  });

  it('refuses noise for which the variance does not converge, and a record too short', () => {
    expect(() => equivalentDegreesOfFreedom(OADEV, -3, 100, 1)).toThrow(/converges only above/);
    expect(() => equivalentDegreesOfFreedom(OADEV, 0, 20, 10)).toThrow(/no term/);
  });

  it('total variance: table of the handbook', () => {
    expect(totalVarianceDegreesOfFreedom(0, 1001, 10)).toBeCloseTo(150.15, 12);
    expect(totalVarianceDegreesOfFreedom(-1, 1001, 10)).toBeCloseTo(1.17 * 100.1 - 0.22, 12);
    expect(totalVarianceDegreesOfFreedom(-2, 1001, 10)).toBeCloseTo(0.93 * 100.1 - 0.36, 12);
    expect(totalVarianceDegreesOfFreedom(2, 1001, 10)).toBe(equivalentDegreesOfFreedom(OADEV, 2, 1001, 10));
  });

  it('pools equal stretches by adding their degrees of freedom, unequal ones to less', () => {
    expect(
      pooledDegreesOfFreedom([
        { terms: 7, edf: 5 },
        { terms: 7, edf: 5 },
      ]),
    ).toBeCloseTo(10, 12);
    expect(
      pooledDegreesOfFreedom([
        { terms: 30, edf: 5 },
        { terms: 1, edf: 5 },
      ]),
    ).toBeLessThan(6);
  });

  it('interval: symmetric about nothing, ends as χ² has them', () => {
    // χ² on 10 degrees at 0.158655… and 0.841344…: scipy 1.17, stats.chi2.ppf.
    const { lo, hi } = deviationInterval(1, 10);
    expect(lo).toBeCloseTo(Math.sqrt(10 / 14.325506344521887), 9);
    expect(hi).toBeCloseTo(Math.sqrt(10 / 5.680617711186441), 9);
  });
});

describe('the intervals cover', () => {
  it('white FM with a gap: 68 ± 5 % of 600 records hold the true deviation, at τ of 1, 8 and 32 samples', () => {
    const inside = [0, 0, 0];
    const trials = 600;
    const factors = [1, 8, 32];
    for (let t = 0; t < trials; t++) {
      const y = whiteFm(300, 1, 900 + t);
      const record = phaseRecordOf(y, [
        { first: 0, count: 180 },
        { first: 180, count: 120 },
      ]);
      deviationsAt(record, 1, factors, ['oadev']).forEach((row, k) => {
        const truth = 1 / Math.sqrt(factors[k]!);
        if (row.lo < truth && truth < row.hi) inside[k]!++;
      });
    }
    for (const count of inside) expect(Math.abs(count / trials - 0.683)).toBeLessThan(0.05);
  });
});
