import { describe, expect, it } from 'vitest';
import { fundamentalArguments, readConstituent } from '../../../../lib/earth/earth-tide/astronomical-arguments.js';
import { oceanLoadingM2s2 } from '../../../../lib/earth/earth-tide/ocean-loading.js';
import { degToRad } from '../../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

describe('fundamental arguments of the tides', () => {
  it('are those of the epoch J2000 (Meeus 1998, chapters 22, 25, 47)', () => {
    const a = fundamentalArguments(Date.UTC(2000, 0, 1, 12));
    within(a.s, 218.3164477, 1e-7);
    within(a.h, 280.46646, 1e-7);
    within(a.p, 83.3532465, 1e-7);
    within(a.node, 125.04452, 1e-7);
    within(a.ps, 282.93735, 1e-7);
    within(a.tau, 180 - 218.3164477 + 280.46646, 1e-7);
  });

  it('turn with the frequencies of the tide tables: M2 12.4206012 h, K1 23.9344696 h, O1 25.8193417 h, Mf 13.6607908 d', () => {
    // periods: Schwiderski (1980); common to every tide table
    const start = Date.UTC(2027, 4, 3);
    const period = (dTau: number, dS: number, dH: number) => {
      const days = 100;
      const a = fundamentalArguments(start);
      const b = fundamentalArguments(start + days * 86_400_000);
      // τ loses a whole number of turns with every midnight
      const tau = b.tau - a.tau + 360 * days;
      return (360 * days * 24) / (dTau * tau + dS * (b.s - a.s) + dH * (b.h - a.h));
    };
    within(period(2, 0, 0), 12.4206012, 2e-7);
    within(period(1, 1, 0), 23.9344696, 2e-7);
    within(period(1, -1, 0), 25.8193417, 6e-7);
    within(period(0, 2, 0) / 24, 13.6607908, 1e-5);
  });
});

describe('ocean loading', () => {
  const midnight = Date.UTC(2027, 4, 3);

  it('has the S2 maximum at 0 h and 12 h UT for phase lag 0, and later for a positive lag: 30° is one hour', () => {
    const s2 = (lag: number, hours: number) =>
      oceanLoadingM2s2(
        [{ constituent: 'S2', amplitudeM2s2: 0.2, phaseLagRad: degToRad(lag) }],
        fundamentalArguments(midnight + hours * 3_600_000),
      );
    within(s2(0, 0), 0.2, 1e-9);
    within(s2(0, 12), 0.2, 1e-9);
    within(s2(0, 6), -0.2, 1e-9);
    within(s2(30, 1), 0.2, 1e-9);
    within(s2(30, 0), 0.2 * Math.cos(Math.PI / 6), 1e-9);
  });

  it('adds its constituents, with the nodal factor of each', () => {
    const at = fundamentalArguments(midnight);
    const m2 = { constituent: 'M2', amplitudeM2s2: 0.3, phaseLagRad: degToRad(-63) } as const;
    const o1 = { constituent: 'O1', amplitudeM2s2: 0.1, phaseLagRad: degToRad(200) } as const;
    within(oceanLoadingM2s2([m2, o1], at), oceanLoadingM2s2([m2], at) + oceanLoadingM2s2([o1], at), 1e-15);
    // over a day the M2 amplitude is that of the node: 1 − 0.037·cos N
    let largest = 0;
    for (let i = 0; i < 1440; i++)
      largest = Math.max(largest, oceanLoadingM2s2([m2], fundamentalArguments(midnight + i * 60_000)));
    within(largest, 0.3 * (1 - 0.037 * Math.cos(degToRad(at.node))), 1e-5);
    expect(oceanLoadingM2s2([], at)).toBe(0);
  });

  it('reads the names of the constituents in any case and no others', () => {
    expect(readConstituent(' m2')).toBe('M2');
    expect(readConstituent('SSA')).toBe('Ssa');
    expect(readConstituent('M4')).toBeNull();
    expect(readConstituent('')).toBeNull();
  });
});
