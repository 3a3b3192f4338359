import { describe, it } from 'vitest';
import { normalCdf, normalQuantile, studentTCdf } from '../../../../lib/uncertainty/distributions/index.js';
import { deviatesOf } from '../../../../lib/uncertainty/monte-carlo/deviates.js';
import { fillNormalScores, normalScore } from '../../../../lib/uncertainty/monte-carlo/normal-scores.js';
import { TScoreTable, tAtNormalScore } from '../../../../lib/uncertainty/monte-carlo/t-scores.js';
import type { Shape } from '../../../../lib/uncertainty/monte-carlo/trial-input.js';
import { Xoshiro128 } from '../../../../lib/uncertainty/random.js';
import { expectRelative, expectWithin } from '../expect-relative.js';

const U = 0.7;
/** Distribution functions of deviates with standard uncertainty (for t: scale) U. */
const shapes: [Shape, (x: number) => number][] = [
  [{ kind: 'normal' }, (x) => normalCdf(x / U)],
  [{ kind: 'uniform' }, (x) => 0.5 + x / (2 * Math.sqrt(3) * U)],
  [
    { kind: 'triangular' },
    (x) => {
      const s = x / (Math.sqrt(6) * U);
      return s < 0 ? 0.5 * (1 + s) ** 2 : 1 - 0.5 * (1 - s) ** 2;
    },
  ],
  [{ kind: 't', dof: 3 }, (x) => studentTCdf(x / U, 3)],
  [{ kind: 't', dof: 1.5 }, (x) => studentTCdf(x / U, 1.5)],
];

describe('deviates by the inverse distribution function', () => {
  it('come back to the uniform draw under the distribution function', () => {
    const n = 2000;
    for (const [shape, cdf] of shapes) {
      const draws = new Float64Array(n);
      Xoshiro128.fromSeed(6).fillUniform(draws, n);
      const d = new Float64Array(n);
      deviatesOf(shape, U).fill(Xoshiro128.fromSeed(6), d, n);
      for (let i = 0; i < n; i++)
        expectWithin(cdf(d[i]!), draws[i]!, 1e-11 * draws[i]! + 2e-16, `${shape.kind} at ${draws[i]}`);
    }
  });

  it('are the same from a normal score as from its draw', () => {
    const n = 500;
    for (const [shape] of shapes) {
      const direct = new Float64Array(n);
      deviatesOf(shape, U).fill(Xoshiro128.fromSeed(6), direct, n);
      const through = new Float64Array(n);
      fillNormalScores(Xoshiro128.fromSeed(6), through, n);
      deviatesOf(shape, U).fromScores(through, n);
      for (let i = 0; i < n; i++) expectWithin(through[i]!, direct[i]!, 1e-11 * (1 + Math.abs(direct[i]!)), shape.kind);
    }
  });

  it('leave the rest of a longer array alone, and take as many draws as they make deviates', () => {
    for (const [shape] of shapes) {
      const generator = Xoshiro128.fromSeed(8);
      const d = Float64Array.of(0.3, 0.4, 0.25);
      deviatesOf(shape, U).fill(generator, d, 2);
      expectWithin(d[2]!, 0.25, 0);
      const other = Xoshiro128.fromSeed(8);
      other.fillUniform(d, 2);
      expectWithin(generator.nextUint32(), other.nextUint32(), 0);
    }
  });
});

describe('table of normal scores', () => {
  it('agrees with AS 241 to 1e-12 relative, 3e-14 between 1/16 and 15/16, at the seams of its cells too', () => {
    const tails = [
      3e-16,
      7.4e-9,
      7.45e-9,
      7.46e-9,
      2 ** -27,
      1e-6,
      0.001,
      0.0312,
      1 / 32,
      0.03126,
      0.06,
      0.0624999,
      1 / 16,
    ];
    for (const p of tails) {
      expectRelative(normalScore(p), normalQuantile(p), 1e-12, `at ${p}`);
      expectRelative(normalScore(1 - p), normalQuantile(1 - p), 1e-12, `at 1 − ${p}`);
    }
    for (const p of [1 / 16, 0.0625001, 0.1, 0.25, 0.2500001, 0.4999, 0.5, 0.50001, 0.77, 15 / 16 - 1e-12]) {
      expectWithin(normalScore(p), normalQuantile(p), 3e-14, `at ${p}`);
    }
  });
});

describe('table of t at normal scores', () => {
  it('agrees with the quantile to 1e-11 from ν = 0.7 to 1e6, and beyond its end', () => {
    for (const nu of [0.7, 1, 2.5, 4.5, 30, 1e6]) {
      const table = new TScoreTable(nu);
      for (const z of [-8.49, -6.011, -2.22, -0.602, -0.598, -0.031, 0.002, 0.0313, 0.777, 3.2, 8.2, 9.1]) {
        const out = Float64Array.of(z);
        table.apply(out, 1, 2);
        expectRelative(out[0]!, 2 * tAtNormalScore(z, nu), 1e-11, `ν = ${nu}, z = ${z}`);
      }
    }
  });
});
