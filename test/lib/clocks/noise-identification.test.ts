import { describe, expect, it } from 'vitest';
import { phaseRecordOf } from '../../../lib/clocks/deviations/index.js';
import { dominantNoise } from '../../../lib/clocks/mean-uncertainty.js';
import { identifyNoise } from '../../../lib/clocks/noise-identification.js';
import { powerLawFm, randomWalkFm, whiteFm, whitePm } from './simulated-noise.js';

const whole = (y: Float64Array) => phaseRecordOf(y, [{ first: 0, count: y.length }]);

const MAKERS: readonly (readonly [string, number, (n: number, seed: number) => Float64Array])[] = [
  ['white PM', 2, (n, seed) => whitePm(n, 1e-15, seed)],
  ['flicker PM', 1, (n, seed) => powerLawFm(n, 1, 1e-15, seed)],
  ['white FM', 0, (n, seed) => whiteFm(n, 1e-15, seed)],
  ['flicker FM', -1, (n, seed) => powerLawFm(n, -1, 1e-15, seed)],
  ['random-walk FM', -2, (n, seed) => randomWalkFm(n, 1e-15, seed)],
];

describe('noise of known kind, seeded', () => {
  for (const [name, alpha, make] of MAKERS) {
    it(`${name}: named rightly in ≥ 95 % of 200 records of 1024 samples`, () => {
      let sampling = 0;
      let named = 0;
      for (let t = 0; t < 200; t++) {
        const record = whole(make(1024, 40 + 17 * t));
        if (identifyNoise(record, 1)!.alpha === alpha) sampling++;
        if (dominantNoise(record)!.alpha === alpha) named++;
      }
      expect(sampling).toBeGreaterThanOrEqual(190);
      expect(named).toBeGreaterThanOrEqual(190);
    });
  }

  it('averages of flicker noise are not taken for random walk: 16 samples each, 256 averages, ≥ 95 % of 60', () => {
    let right = 0;
    for (let t = 0; t < 60; t++) if (identifyNoise(whole(powerLawFm(4096, -1, 1, 300 + t)), 16)!.alpha === -1) right++;
    expect(right).toBeGreaterThanOrEqual(57);
  });

  it('white noise on a drift is white noise', () => {
    let right = 0;
    for (let t = 0; t < 50; t++) {
      const y = whiteFm(1000, 1, 70 + t).map((v, i) => v + 0.02 * i);
      if (identifyNoise(whole(y), 1)!.alpha === 0) right++;
    }
    expect(right).toBeGreaterThanOrEqual(48);
  });

  it('takes no pair over a gap: random walk restarting in each of fifty runs', () => {
    const y = new Float64Array(2000);
    for (let r = 0; r < 50; r++) y.set(randomWalkFm(40, 1, 500 + r), 40 * r);
    const runs = Array.from({ length: 50 }, (_, r) => ({ first: 40 * r, count: 40 }));
    expect(identifyNoise(phaseRecordOf(y, runs), 1)!.alpha).toBe(-2);
  });

  it('says nothing with fewer than 30 averages', () => {
    expect(identifyNoise(whole(whiteFm(29, 1, 3)), 1)).toBeNull();
    expect(identifyNoise(whole(whiteFm(30, 1, 3)), 1)).not.toBeNull();
    expect(identifyNoise(whole(whiteFm(119, 1, 3)), 4)).toBeNull();
  });

  it('looks at blocks of a long record: the same answer as from the whole', () => {
    const found = identifyNoise(whole(whiteFm(600_000, 1, 9)), 1)!;
    expect(found.alpha).toBe(0);
    expect(found.averages).toBe(600_000);
    // r1 of 2.6e5 values has a standard deviation of 0.002, the exponent of 0.004
    expect(Math.abs(found.exponent)).toBeLessThan(0.02);
  });
});
