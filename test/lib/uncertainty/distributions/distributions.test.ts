import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  chiSquareCdf,
  chiSquareDensity,
  chiSquareQuantile,
  chiSquareUpperQuantile,
  chiSquareUpperTail,
  DomainError,
  normalCdf,
  normalDensity,
  normalQuantile,
  studentTCdf,
  studentTDensity,
  studentTQuantile,
} from '../../../../lib/uncertainty/distributions/index.js';
import values from '../../../data/distributions/values.json' with { type: 'json' };
import { expectRelative, expectWithin } from '../expect-relative.js';

const FINE = 1e-13;

describe('against 40-digit integration (test/data/distributions)', () => {
  it('normal distribution function, both tails', () => {
    for (const { z, cdf } of values.normal) expectRelative(normalCdf(z), Number(cdf), 1e-15, `Φ(${z})`);
  });

  it('normal quantile from 1e-300 to 0.99999999', () => {
    for (const { p, z } of values.normalQuantile) expectRelative(normalQuantile(p), Number(z), 1e-15, `Φ⁻¹(${p})`);
  });

  it('t distribution function, ν from 0.5 to 3e10, tails to 1e-203', () => {
    for (const { t, nu, upper } of values.t) {
      expectRelative(studentTCdf(-t, nu), Number(upper), FINE, `upper tail at ${t}, ν = ${nu}`);
      expectRelative(studentTCdf(t, nu), 1 - Number(upper), FINE, `P(T ≤ ${t}), ν = ${nu}`);
    }
  });

  it('t quantile', () => {
    for (const { t, nu, upper, centre } of values.t) {
      // Near the middle the probability, rounded at 1e-16, fixes t no better than 1e-16/centre.
      const tolerance = FINE + 1e-16 / Number(centre);
      expectRelative(-studentTQuantile(Number(upper), nu), t, tolerance, `t of ${upper}, ν = ${nu}`);
    }
  });

  it('χ² distribution function, both tails, ν from 0.7 to 2e5', () => {
    for (const { x, nu, lower, upper } of values.chiSquare) {
      expectRelative(chiSquareCdf(x, nu), Number(lower), FINE, `P(${x}), ν = ${nu}`);
      expectRelative(chiSquareUpperTail(x, nu), Number(upper), FINE, `Q(${x}), ν = ${nu}`);
    }
  });

  it('χ² quantile, lower and upper', () => {
    for (const { x, nu, lower, upper } of values.chiSquare) {
      if (Number(lower) <= 0.6) expectRelative(chiSquareQuantile(Number(lower), nu), x, FINE, `ν = ${nu}`);
      if (Number(upper) <= 0.6) expectRelative(chiSquareUpperQuantile(Number(upper), nu), x, FINE, `ν = ${nu}`);
    }
  });
});

describe('against published tables', () => {
  it('normal: Abramowitz & Stegun (1964), table 26.1 (from memory)', () => {
    expectWithin(normalCdf(1), 0.841344746068543, 5e-16);
    expectWithin(normalCdf(2), 0.97724986805182, 5e-15);
    expectWithin(normalCdf(3), 0.9986501019683699, 2e-16);
  });

  it('normal quantile: Wichura (1988), the three check values of AS 241 (from memory)', () => {
    expectRelative(normalQuantile(0.25), -0.6744897501960817, 3e-16);
    expectRelative(normalQuantile(0.001), -3.090232306167814, 3e-16);
    expectRelative(normalQuantile(1e-20), -9.262340089798408, 5e-16);
  });

  it("t: NIST/SEMATECH e-Handbook, 1.3.6.7.2, critical values of Student's t (as reprinted)", () => {
    const rows: [number, number[]][] = [
      [2, [1.886, 2.92, 4.303, 6.965, 9.925, 22.327]],
      [5, [1.476, 2.015, 2.571, 3.365, 4.032, 5.893]],
      [10, [1.372, 1.812, 2.228, 2.764, 3.169, 4.143]],
      [30, [1.31, 1.697, 2.042, 2.457, 2.75, 3.385]],
      [100, [1.29, 1.66, 1.984, 2.364, 2.626, 3.174]],
      [Infinity, [1.282, 1.645, 1.96, 2.326, 2.576, 3.09]],
    ];
    const tails = [0.1, 0.05, 0.025, 0.01, 0.005, 0.001];
    for (const [nu, row] of rows) {
      // Half of the last digit, and the 4.143 printed for ν = 10, 0.001 is one unit off (4.1437).
      row.forEach((t, i) => {
        expectWithin(studentTQuantile(1 - tails[i]!, nu), t, nu === 10 && i === 5 ? 8e-4 : 5.1e-4, `ν = ${nu}`);
      });
    }
  });

  it('t: JCGM 100:2008, table G.2, coverage factors (from memory)', () => {
    const probabilities = [0.6827, 0.9, 0.95, 0.9545, 0.99, 0.9973];
    const rows: [number, number[]][] = [
      [1, [1.84, 6.31, 12.71, 13.97, 63.66, 235.8]],
      [2, [1.32, 2.92, 4.3, 4.53, 9.92, 19.21]],
      [5, [1.11, 2.02, 2.57, 2.65, 4.03, 5.51]],
      [16, [1.03, 1.75, 2.12, 2.17, 2.92, 3.54]],
      [50, [1.01, 1.68, 2.01, 2.05, 2.68, 3.16]],
      [100, [1.005, 1.66, 1.984, 2.025, 2.626, 3.077]],
      [Infinity, [1, 1.645, 1.96, 2, 2.576, 3]],
    ];
    for (const [nu, row] of rows) {
      row.forEach((k, i) => {
        // p = 0.6827, 0.9545, 0.9973 stand for 1, 2 and 3 standard deviations exactly.
        const sigma = i === 0 ? 1 : i === 3 ? 2 : i === 5 ? 3 : null;
        const p = sigma === null ? (1 + probabilities[i]!) / 2 : normalCdf(sigma);
        const unit = nu > 50 ? 0.001 : 0.01;
        expectWithin(studentTQuantile(p, nu), k, 0.51 * unit, `ν = ${nu}, ${probabilities[i]}`);
      });
    }
  });

  it('χ²: table of percentage points (NIST/SEMATECH e-Handbook 1.3.6.7.4; Abramowitz & Stegun 26.8; as reprinted)', () => {
    const upper = [0.995, 0.99, 0.975, 0.95, 0.9, 0.1, 0.05, 0.025, 0.01, 0.005];
    const rows: [number, number[]][] = [
      [5, [0.41174, 0.5543, 0.83121, 1.14548, 1.61031, 9.23636, 11.0705, 12.8325, 15.08627, 16.7496]],
      [10, [2.15586, 2.55821, 3.24697, 3.9403, 4.86518, 15.98718, 18.30704, 20.48318, 23.20925, 25.18818]],
      [15, [4.60092, 5.22935, 6.26214, 7.26094, 8.54676, 22.30713, 24.99579, 27.48839, 30.57791, 32.80132]],
    ];
    for (const [nu, row] of rows) {
      row.forEach((x, i) => {
        expectWithin(chiSquareUpperQuantile(upper[i]!, nu), x, 1.1e-5, `ν = ${nu}`);
        expectWithin(chiSquareUpperTail(x, nu), upper[i]!, 1e-5, `ν = ${nu}`);
      });
    }
  });
});

describe('closed forms', () => {
  it('t on one degree of freedom is Cauchy; on two, t/√(2+t²)', () => {
    for (const t of [-300, -2, -0.1, 0.4, 7]) {
      expectRelative(studentTCdf(t, 1), t < 0 ? Math.atan(-1 / t) / Math.PI : 0.5 + Math.atan(t) / Math.PI, 2e-15);
      expectRelative(studentTDensity(t, 2), (2 + t * t) ** -1.5, 2e-15);
    }
    for (const p of [1e-9, 0.01, 0.3, 0.5001, 0.9]) {
      expectRelative(studentTQuantile(p, 1), -1 / Math.tan(Math.PI * p), 2e-13, `p = ${p}`);
    }
  });

  it('χ² on two degrees of freedom is exponential', () => {
    for (const x of [1e-6, 0.5, 2, 30, 600]) {
      expectRelative(chiSquareUpperTail(x, 2), Math.exp(-x / 2), 6e-14);
      expectRelative(chiSquareCdf(x, 2), -Math.expm1(-x / 2), 3e-14);
      expectRelative(chiSquareDensity(x, 2), Math.exp(-x / 2) / 2, 1e-13);
    }
  });

  it('χ² on one degree of freedom is the square of a normal deviate', () => {
    for (const z of [0.1, 1, 1.96, 6]) expectRelative(chiSquareUpperTail(z * z, 1), 2 * normalCdf(-z), 3e-14);
  });

  it('densities are the derivatives of the distribution functions', () => {
    // Central difference with h = 1e-5: its own error is about h²/6 + 1e-16/h.
    const h = 1e-5;
    for (const x of [0.4, 1.3, 3.7]) {
      expectRelative((normalCdf(x + h) - normalCdf(x - h)) / (2 * h), normalDensity(x), 1e-8);
      for (const nu of [0.8, 3, 41.5, 3000]) {
        expectRelative((studentTCdf(x + h, nu) - studentTCdf(x - h, nu)) / (2 * h), studentTDensity(x, nu), 1e-8);
      }
      for (const nu of [0.8, 3, 11.5]) {
        expectRelative((chiSquareCdf(x + h, nu) - chiSquareCdf(x - h, nu)) / (2 * h), chiSquareDensity(x, nu), 1e-8);
      }
    }
  });
});

describe('properties', () => {
  const probability = fc.double({ min: 1e-12, max: 1 - 1e-12, noNaN: true });
  const degrees = fc.double({ min: 0.6, max: 1e5, noNaN: true });

  it('quantile then distribution function returns the probability', () => {
    fc.assert(
      fc.property(probability, degrees, (p, nu) => {
        expectRelative(normalCdf(normalQuantile(p)), p, 1e-13);
        expectRelative(studentTCdf(studentTQuantile(p, nu), nu), p, 3e-13);
        expectRelative(chiSquareCdf(chiSquareQuantile(p, nu), nu), p, 3e-13 * (1 + Math.sqrt(nu)));
      }),
      { numRuns: 150, seed: 4 },
    );
  });

  it('t is symmetric and rises with p', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 0.499, noNaN: true }), degrees, (p, nu) => {
        const q = 1 - p;
        expectRelative(studentTQuantile(1 - q, nu), -studentTQuantile(q, nu), 1e-13);
        expect(studentTQuantile(p * 1.001, nu)).toBeGreaterThan(studentTQuantile(p, nu));
      }),
      { numRuns: 100, seed: 5 },
    );
  });

  it('goes over smoothly where Hill’s expansion takes over from the continued fraction', () => {
    for (const t of [0.3, 2, 3, 5]) {
      const nu = 120 * Math.max(t, 2) ** (11 / 6);
      expectRelative(studentTCdf(-t, nu * (1 - 1e-15)), studentTCdf(-t, nu * (1 + 1e-15)), 5e-15);
    }
  });
});

describe('edges', () => {
  it('infinite arguments and degrees of freedom', () => {
    expect(normalCdf(-Infinity)).toBe(0);
    expect(normalCdf(Infinity)).toBe(1);
    expect(normalDensity(-Infinity)).toBe(0);
    expect(studentTCdf(-Infinity, 3)).toBe(0);
    expect(studentTCdf(Infinity, 3)).toBe(1);
    expect(studentTCdf(-1e200, 3)).toBe(0);
    expect(studentTDensity(Infinity, 3)).toBe(0);
    expect(studentTCdf(1.2, Infinity)).toBe(normalCdf(1.2));
    expect(studentTDensity(1.2, Infinity)).toBe(normalDensity(1.2));
    expect(studentTQuantile(0.5, 7)).toBe(0);
    expect(chiSquareCdf(-1, 3)).toBe(0);
    expect(chiSquareUpperTail(0, 3)).toBe(1);
    expect(chiSquareUpperTail(Infinity, 3)).toBe(0);
  });

  it('refuses what has no answer, naming the argument', () => {
    const refused: [() => number, string][] = [
      [() => normalQuantile(0), 'probability'],
      [() => normalQuantile(1), 'probability'],
      [() => normalQuantile(Number.NaN), 'probability'],
      [() => normalCdf(Number.NaN), 'z'],
      [() => normalDensity(Number.NaN), 'z'],
      [() => studentTCdf(1, 0), 'degreesOfFreedom'],
      [() => studentTCdf(Number.NaN, 2), 't'],
      [() => studentTQuantile(0.1, -2), 'degreesOfFreedom'],
      [() => studentTQuantile(1e-300, 0.1), 'probability'],
      [() => chiSquareQuantile(1.2, 3), 'probability'],
      [() => chiSquareCdf(1, Number.NaN), 'degreesOfFreedom'],
      [() => chiSquareUpperTail(1, Infinity), 'shape'],
      [() => chiSquareDensity(0, 3), 'x'],
    ];
    for (const [call, argument] of refused) {
      expect(call).toThrow(DomainError);
      expect(call).toThrow(`${argument} = `);
    }
  });
});
