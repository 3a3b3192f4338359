import { describe, it } from 'vitest';
import { delayLimitedPhaseNoise, fibreDelayS, servoBandwidthHz } from '../../../lib/clocks/fibre-noise.js';
import { expectWithin } from '../../expect-within.js';

const fibre = { lengthM: 100_000, noiseRad2HzPerM: 0.01, bandwidthHz: 10, carrierHz: 194.4e12, groupIndex: 1.468 };

describe('delayLimitedPhaseNoise', () => {
  it('is the integral of S = a·(2πfτ)²·h·L/f² over the bandwidth', () => {
    // independent route: white phase noise of variance σ_φ² = S·f_h, read with σ_y(1 s) = √3·σ_φ/(2πν·1 s)
    const delay = (1.468 * 1e5) / 299_792_458;
    let variance = 0;
    const n = 1000;
    for (let i = 0; i < n; i++) {
      const f = ((i + 0.5) * 10) / n;
      variance += (((2 * Math.PI * f * delay) ** 2 / 3) * ((10 * 100) / (f * f)) * 10) / n;
    }
    const expected = (Math.sqrt(3) * Math.sqrt(variance)) / (2 * Math.PI * 194.4e12);
    expectWithin(delayLimitedPhaseNoise(fibre), expected, 1e-12 * expected);
  });

  it('grows as L^(3/2) and with the root of bandwidth and noise', () => {
    const base = delayLimitedPhaseNoise(fibre);
    expectWithin(delayLimitedPhaseNoise({ ...fibre, lengthM: 400_000 }), 8 * base, 1e-12 * base);
    expectWithin(delayLimitedPhaseNoise({ ...fibre, bandwidthHz: 40 }), 2 * base, 1e-12 * base);
    expectWithin(delayLimitedPhaseNoise({ ...fibre, noiseRad2HzPerM: 0.09 }), 3 * base, 1e-12 * base);
  });

  it('has a delay of 4.9 µs per km', () => {
    expectWithin(fibreDelayS(fibre), 4.8967e-4, 5e-9);
    expectWithin(servoBandwidthHz(fibre), 510.5, 0.1);
  });
});
