import { standardNormalCdf, standardNormalCentre } from '../distributions/normal.js';
import type { Xoshiro128 } from '../random.js';
import { fillNormalScores } from './normal-scores.js';
import { TScoreTable } from './t-scores.js';
import type { Shape } from './trial-input.js';

const SQRT_3 = Math.sqrt(3);
const SQRT_6 = Math.sqrt(6);

/** Draws deviations from the estimate. Everything goes by the inverse distribution function, one uniform draw per deviate (JCGM
 *  101:2008, C.2): unlike rejection methods no decision hangs on the last bit of a logarithm, which differs between engines, so two
 *  engines can never fall out of step; and a correlated and an independent draw of one input are made alike. */
export interface Deviates {
  /** u × standardised deviates of the generator's next draws */
  fill(generator: Xoshiro128, out: Float64Array, count: number): void;
  /** standard normal scores → u × standardised deviates, in place */
  fromScores(scores: Float64Array, count: number): void;
}

/** Deviates of a shape with standard uncertainty u (for t: scale u). */
export function deviatesOf(shape: Shape, u: number): Deviates {
  switch (shape.kind) {
    case 'normal':
      return {
        fill: (generator, out, count) => fillNormalScores(generator, out, count, u),
        fromScores: (scores, count) => {
          for (let i = 0; i < count; i++) scores[i]! *= u;
        },
      };
    case 'uniform': {
      const width = 2 * SQRT_3 * u;
      return {
        fill: (generator, out, count) => {
          generator.fillUniform(out, count);
          for (let i = 0; i < count; i++) out[i] = width * (out[i]! - 0.5);
        },
        fromScores: (scores, count) => {
          for (let i = 0; i < count; i++) scores[i] = width * standardNormalCentre(scores[i]!);
        },
      };
    }
    case 'triangular': {
      // JCGM 101 6.4.4, here from the nearer end: half-width − half-width·√(2·tail).
      const half = SQRT_6 * u;
      return {
        fill: (generator, out, count) => {
          generator.fillUniform(out, count);
          for (let i = 0; i < count; i++) {
            const p = out[i]!;
            out[i] = p < 0.5 ? half * (Math.sqrt(2 * p) - 1) : half * (1 - Math.sqrt(2 * (1 - p)));
          }
        },
        fromScores: (scores, count) => {
          for (let i = 0; i < count; i++) {
            const z = scores[i]!;
            const rest = 1 - Math.sqrt(2 * standardNormalCdf(-Math.abs(z)));
            scores[i] = z < 0 ? -half * rest : half * rest;
          }
        },
      };
    }
    case 't': {
      const table = new TScoreTable(shape.dof);
      return {
        fill: (generator, out, count) => {
          fillNormalScores(generator, out, count);
          table.apply(out, count, u);
        },
        fromScores: (scores, count) => table.apply(scores, count, u),
      };
    }
  }
}
