import { describe, it } from 'vitest';
import { normalCdf, studentTCdf } from '../../../../lib/uncertainty/distributions/index.js';
import { deviatesOf } from '../../../../lib/uncertainty/monte-carlo/deviates.js';
import { TScoreTable, tAtNormalScore } from '../../../../lib/uncertainty/monte-carlo/t-scores.js';
import type { Shape } from '../../../../lib/uncertainty/monte-carlo/trial-input.js';
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
    const draws = Float64Array.of(1.2e-16, 1e-9, 0.003, 0.074, 0.2, 0.4999999, 0.5, 0.61, 0.93, 0.99999);
    for (const [shape, cdf] of shapes) {
      const d = draws.slice();
      deviatesOf(shape, U).fromUniforms(d, d.length);
      d.forEach((x, i) => {
        // the triangular and uniform functions above lose the far lower tail to 1 + s
        const tolerance = shape.kind === 'normal' || shape.kind === 't' ? 1e-10 * draws[i]! : 2e-16 + 1e-12 * draws[i]!;
        expectWithin(cdf(x), draws[i]!, tolerance, `${shape.kind} at ${draws[i]}`);
      });
    }
  });

  it('are the same from a normal score as from its probability', () => {
    const scores = Float64Array.of(-8, -3.2, -0.7, -0.01, 0, 0.3, 1.96, 5);
    for (const [shape] of shapes) {
      const direct = scores.slice();
      deviatesOf(shape, U).fromScores(direct, scores.length);
      const through = scores.map(normalCdf);
      deviatesOf(shape, U).fromUniforms(through, scores.length);
      direct.forEach((x, i) => {
        expectWithin(x, through[i]!, 1e-8 * Math.abs(x) + 1e-15, `${shape.kind} at ${scores[i]}`);
      });
    }
  });

  it('leave the rest of a longer array alone', () => {
    for (const [shape] of shapes) {
      const d = Float64Array.of(0.3, 0.4, 0.25);
      deviatesOf(shape, U).fromUniforms(d, 2);
      expectWithin(d[2]!, 0.25, 0);
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
