import { describe, expect, it } from 'vitest';
import { meanOf, phaseRecordOf } from '../../../lib/clocks/deviations/index.js';
import { meanUncertainty } from '../../../lib/clocks/mean-uncertainty.js';
import { powerLawFm, randomWalkFm, whiteFm, whitePm } from './simulated-noise.js';

const whole = (y: Float64Array) => phaseRecordOf(y, [{ first: 0, count: y.length }]);

describe('uncertainty of a mean by its noise', () => {
  it('white FM: covers the truth in 68 ± 3 % of 2000 records', () => {
    const n = 400;
    let covered = 0;
    let extrapolated = 0;
    for (let t = 0; t < 2000; t++) {
      const y = whiteFm(n, 1, 10_000 + t);
      const { u, basis } = meanUncertainty(whole(y), 1, n, null);
      if (Math.abs(meanOf(y)) < u!) covered++;
      if (basis === 'white-extrapolation') extrapolated++;
    }
    expect(Math.abs(covered / 2000 - 0.68)).toBeLessThan(0.03);
    expect(extrapolated).toBeGreaterThan(1900);
  });

  it('white FM with half the time missing: the valid time counts, 68 ± 4 % of 1200', () => {
    let covered = 0;
    for (let t = 0; t < 1200; t++) {
      const y = whiteFm(300, 1, 50_000 + t);
      const runs = [0, 1, 2].map((r) => ({ first: 100 * r, count: 100 }));
      if (Math.abs(meanOf(y)) < meanUncertainty(phaseRecordOf(y, runs), 1, 300, null).u!) covered++;
    }
    expect(Math.abs(covered / 1200 - 0.68)).toBeLessThan(0.04);
  });

  it('flicker FM: the mean of the next equal interval is covered at the stated rate, ± 4 % over 1200 records', () => {
    const n = 512;
    const trials = 1200;
    let within = 0;
    let withinRoot2 = 0;
    let stated = 0;
    let statedRoot2 = 0;
    let byDeviation = 0;
    for (let t = 0; t < trials; t++) {
      const both = powerLawFm(2 * n, -1, 1, 20_000 + t);
      const now = both.slice(0, n);
      const { u, basis, nextMean } = meanUncertainty(whole(now), 1, n, null);
      if (basis !== 'longest-trusted-tau') continue;
      byDeviation++;
      stated += nextMean!.withinU;
      statedRoot2 += nextMean!.withinRoot2U;
      const off = Math.abs(meanOf(both.slice(n)) - meanOf(now));
      if (off < u!) within++;
      if (off < Math.SQRT2 * u!) withinRoot2++;
    }
    expect(byDeviation).toBeGreaterThan(0.95 * trials);
    expect(Math.abs(within - stated) / byDeviation).toBeLessThan(0.04);
    expect(Math.abs(withinRoot2 - statedRoot2) / byDeviation).toBeLessThan(0.04);
    expect(Math.abs(stated / byDeviation - 0.51)).toBeLessThan(0.02);
  });

  it('random-walk FM: not averageable, and twice the time makes it worse', () => {
    for (let t = 0; t < 100; t++) {
      const y = randomWalkFm(2048, 1, 30_000 + t);
      const { basis, words } = meanUncertainty(whole(y), 1, 2048, null);
      expect(basis).toBe('not-averageable');
      expect(words).toMatch(/more data make it no smaller/);
    }
    const median = (n: number) => {
      const us = Array.from({ length: 61 }, (_, t) => meanUncertainty(whole(randomWalkFm(n, 1, 7 + t)), 1, n, null).u!);
      return us.sort((a, b) => a - b)[30]!;
    };
    expect(median(2048) / median(512)).toBeGreaterThan(1.6);
  });

  it('a flicker floor behind white noise stops the extrapolation', () => {
    const n = 1 << 15;
    const white = whiteFm(n, 1, 5);
    const floor = powerLawFm(n, -1, 0.08, 6);
    const { u, basis, noise, words } = meanUncertainty(whole(white.map((v, i) => v + floor[i]!)), 1, n, null);
    expect(noise!.averages).toBeGreaterThanOrEqual(128);
    expect(basis).toBe('longest-trusted-tau');
    // S_y = level²/(π f), so σ_y² = 2 ln 2·level²/π: a floor of 0.053, to 40 % from ten degrees of freedom. White alone gives 0.0055.
    expect(Math.abs(u! / 0.053 - 1)).toBeLessThan(0.4);
    expect(words).toMatch(/longest trusted τ/);
  });

  it('phase noise: an upper estimate, said so', () => {
    const y = whitePm(1000, 1, 4);
    const { u, basis, words } = meanUncertainty(whole(y), 1, 1000, null);
    expect(basis).toBe('white-extrapolation');
    expect(words).toMatch(/upper estimate/);
    expect(u!).toBeGreaterThan(Math.abs(meanOf(y)));
  });

  it('few samples, isolated samples, one sample', () => {
    const few = meanUncertainty(whole(whiteFm(12, 1, 8)), 1, 12, null);
    expect(few.basis).toBe('white-extrapolation');
    expect(few.noise).toBeNull();
    expect(few.words).toMatch(/assumed/);
    const lonely = [0, 1, 2].map((first) => ({ first, count: 1 }));
    const isolated = meanUncertainty(phaseRecordOf(Float64Array.of(1, 2, 4), lonely), 1, 3, 0.7);
    expect(isolated).toMatchObject({ u: 0.7, basis: 'scatter' });
    expect(meanUncertainty(phaseRecordOf(Float64Array.of(1), [{ first: 0, count: 1 }]), 1, 1, null)).toMatchObject({
      u: null,
      basis: 'none',
    });
  });
});
