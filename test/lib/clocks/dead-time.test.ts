import { describe, expect, it } from 'vitest';
import { combOver, deadTimeVariance, type FlywheelNoise, spansOfComb } from '../../../lib/clocks/dead-time.js';
import {
  type OscillatorNoise,
  readingsOfMean,
  type Span,
  varianceOfCombAgainstWhole,
  varianceOfReadings,
} from '../../../lib/clocks/oscillator-noise.js';
import { expectWithin } from '../../expect-within.js';
import { normalDeviates, powerLawFm } from './simulated-noise.js';

const QUIET: FlywheelNoise = { white: 0, flicker: 0, randomWalk: 0, phase: 0, driftPerDay: 0 };
const only = (noise: Partial<FlywheelNoise>): FlywheelNoise => ({ ...QUIET, ...noise });
const spans = (...ends: readonly (readonly [number, number])[]): Span[] =>
  ends.map(([startS, endS]) => ({ startS, endS }));

// hours of a day's work against two days of link, in s
const RUNS = spans([1_000, 30_000], [50_000, 61_000], [100_000, 100_500], [140_000, 171_000]);
const LINK = spans([0, 90_000], [95_000, 172_800]);
const difference = [...readingsOfMean(LINK, 1), ...readingsOfMean(RUNS, -1)];

describe('varianceOfReadings', () => {
  it.each([
    ['white', (tau: number) => 1 / Math.sqrt(tau)],
    ['flicker', () => 1],
    ['randomWalk', (tau: number) => Math.sqrt(tau)],
    ['phase', (tau: number) => 1 / tau],
  ] as const)('gives the Allan deviation of %s noise for its own weights', (kind, law) => {
    for (const tau of [1, 37, 86_400]) {
      const w = 1 / (Math.SQRT2 * tau);
      const allan = [
        { atS: 5, weightPerS: w },
        { atS: 5 + tau, weightPerS: -2 * w },
        { atS: 5 + 2 * tau, weightPerS: w },
      ];
      const expected = 1e-15 * law(tau);
      expectWithin(Math.sqrt(varianceOfReadings(allan, only({ [kind]: 1e-15 }))), expected, 1e-12 * expected);
    }
  });

  it('is the integral over the spectrum, for gaps of any pattern', () => {
    // S_y = h₋₁/f, h₋₁ = σ²/(2·ln 2); S_y = h₋₂/f², h₋₂ = 3σ²/(2π²)·(1/s): Riley (2008), NIST SP 1065, section 3.2
    const integral = (spectrum: (f: number) => number): number => {
      let sum = 0;
      // points beside the beats of the longest and shortest interval; beyond, what is left falls as f⁻³
      const n = 60_000;
      const [low, high] = [1e-9, 0.2];
      const step = Math.log(high / low) / n;
      for (let i = 0; i < n; i++) {
        const f = low * Math.exp((i + 0.5) * step);
        let re = 0;
        let im = 0;
        for (const { atS, weightPerS } of difference) {
          re += weightPerS * Math.cos(2 * Math.PI * f * atS);
          im += weightPerS * Math.sin(2 * Math.PI * f * atS);
        }
        sum += ((spectrum(f) * (re * re + im * im)) / (2 * Math.PI * f) ** 2) * f * step;
      }
      return sum;
    };
    const flicker = integral((f) => 1e-30 / (2 * Math.LN2) / f);
    expectWithin(varianceOfReadings(difference, only({ flicker: 1e-15 })), flicker, 2e-3 * flicker);
    const walk = integral((f) => (3 * 1e-38) / (2 * Math.PI ** 2) / (f * f));
    expectWithin(varianceOfReadings(difference, only({ randomWalk: 1e-19 })), walk, 2e-3 * walk);
  });

  it('of white noise depends on the overlap alone', () => {
    const [a, b] = [60_000 - 1_000 - 19_000 + 31_500, 167_800]; // lengths: runs 71 500 s, link 167 800 s
    const overlap = 71_500; // no run lies in the gap of the link
    const expected = 1e-26 * (1 / a + 1 / b - (2 * overlap) / (a * b));
    expectWithin(varianceOfReadings(difference, only({ white: 1e-13 })), expected, 1e-9 * expected);
  });
});

describe('a run at the beginning of every cycle', () => {
  it.each([
    [1, 86_400, 30_000],
    [7, 86_400, 30_000],
    [40, 3_600, 3_000],
  ])('%i cycles of %i s with runs of %i s: the comb is what all pairs give', (periods, periodS, runS) => {
    const comb = { kind: 'comb', periods, periodS, runS } as const;
    const whole = spans([0, periods * periodS]);
    const pairs = [...readingsOfMean(whole, 1), ...readingsOfMean(spansOfComb(comb), -1)];
    for (const kind of ['white', 'flicker', 'randomWalk', 'phase'] as const) {
      const noise: OscillatorNoise = only({ [kind]: 1e-15 });
      const expected = varianceOfReadings(pairs, noise);
      expectWithin(varianceOfCombAgainstWhole(periods, periodS, runS, noise), expected, 1e-6 * expected);
    }
  });

  it('costs nothing while the clock always runs', () => {
    const comb = combOver(1e6, 86_400, 1);
    expect(deadTimeVariance({ spans: spans([0, 1e6]), thinned: 1 }, comb, only({ flicker: 1e-15 }))).toBe(0);
  });

  it('has whole cycles, at least one', () => {
    expect(combOver(1e6, 86_400, 0.5)).toEqual({ kind: 'comb', periods: 12, periodS: 1e6 / 12, runS: 1e6 / 24 });
    expect(combOver(100, 86_400, 0.25)).toEqual({ kind: 'comb', periods: 1, periodS: 100, runS: 25 });
  });

  it('drifts by the distance of the mean epochs', () => {
    // run in the first quarter of one day: mean epochs 3/8 of a day apart
    const use = { spans: spans([0, 86_400]), thinned: 1 };
    const comb = combOver(86_400, 86_400, 0.25);
    const drift = only({ driftPerDay: 1e-16 });
    expectWithin(Math.sqrt(deadTimeVariance(use, comb, drift)), 3.75e-17, 1e-28);
    // the same where the run lies in the middle of the second half: mean epochs 1/4 of a day apart
    const later = { kind: 'intervals', spans: spans([54_000, 75_600]) } as const;
    expectWithin(Math.sqrt(deadTimeVariance(use, later, drift)), 2.5e-17, 1e-28);
    const intervals = { kind: 'intervals', spans: spansOfComb(comb) } as const;
    expectWithin(Math.sqrt(deadTimeVariance(use, intervals, drift)), 3.75e-17, 1e-28);
  });
});

describe('deadTimeVariance', () => {
  it('takes thinning as white noise of what is used alone', () => {
    const noise = only({ white: 1e-13, flicker: 1e-15 });
    const calibration = { kind: 'intervals', spans: RUNS } as const;
    const full = deadTimeVariance({ spans: LINK, thinned: 1 }, calibration, noise);
    const half = deadTimeVariance({ spans: LINK, thinned: 0.5 }, calibration, noise);
    expectWithin(half - full, 1e-26 / 167_800, 1e-9 * full);
    const comb = combOver(864_000, 86_400, 0.5);
    const whole = (thinned: number) => deadTimeVariance({ spans: spans([0, 864_000]), thinned }, comb, noise);
    expectWithin(whole(0.25) - whole(1), (3 * 1e-26) / 864_000, 1e-9 * whole(1));
  });

  it('refuses what has no mean', () => {
    const calibration = { kind: 'intervals', spans: RUNS } as const;
    expect(() => deadTimeVariance({ spans: [], thinned: 1 }, calibration, QUIET)).toThrow(RangeError);
    expect(() => deadTimeVariance({ spans: LINK, thinned: 1 }, { kind: 'intervals', spans: [] }, QUIET)).toThrow(
      RangeError,
    );
  });

  // simulated flywheels, sampled every 400 s over the two days; the spread of 600 has a sampling error of 3 %
  const mean = (y: Float64Array, over: readonly Span[], stepS: number): number => {
    let sum = 0;
    let n = 0;
    for (const { startS, endS } of over)
      for (let i = Math.round(startS / stepS); i < Math.round(endS / stepS); i++) {
        sum += y[i]!;
        n++;
      }
    return sum / n;
  };
  const STEP = 400;
  const N = 432;
  const ROUND = spans([800, 30_000], [50_000, 61_200], [140_000, 171_200]);
  const ROUND_LINK = spans([0, 90_000], [95_200, 172_800]);
  const spread = (record: (seed: number) => Float64Array): number => {
    let sum = 0;
    for (let seed = 1; seed <= 600; seed++) {
      const y = record(seed);
      sum += (mean(y, ROUND_LINK, STEP) - mean(y, ROUND, STEP)) ** 2;
    }
    return Math.sqrt(sum / 600);
  };
  const planned = (noise: Partial<FlywheelNoise>): number =>
    Math.sqrt(deadTimeVariance({ spans: ROUND_LINK, thinned: 1 }, { kind: 'intervals', spans: ROUND }, only(noise)));

  it('is what simulated flicker noise shows', () => {
    // fractional differencing of unit white noise: S_y = 1/(πf), σ² = 2·ln 2/π (Kasdin & Walter 1992)
    const seen = spread((seed) => powerLawFm(N, -1, 1, 9_000 + seed));
    const expected = planned({ flicker: Math.sqrt((2 * Math.LN2) / Math.PI) });
    expectWithin(seen, expected, 3 * 0.03 * expected);
  });

  it('is what a simulated random walk shows', () => {
    // steps of s each τ0: σ²(τ) = s²·τ/(3·τ0)
    const seen = spread((seed) => {
      const next = normalDeviates(20_000 + seed);
      const y = new Float64Array(N);
      for (let i = 1; i < N; i++) y[i] = y[i - 1]! + next();
      return y;
    });
    const expected = planned({ randomWalk: Math.sqrt(1 / (3 * STEP)) });
    expectWithin(seen, expected, 3 * 0.03 * expected);
  });
});
