import { standardNormalQuantile } from '../distributions/normal.js';
import type { Xoshiro128 } from '../random.js';
import { polynomialFit } from './polynomial-fit.js';

const COEFFICIENTS = 6;
const CELLS = 512;
const FIRST = CELLS / 32;
const LAST = CELLS - FIRST;
/** Tail probabilities are looked at as whole multiples of 2⁻³¹. */
const UNIT = 2 ** 31;
/** From 2⁴, the least such multiple in the table, up to 2²⁶, which 31/32 itself falls on. */
const OCTAVES = 23;

/** Φ⁻¹ as a table of polynomials of degree 5, for the inner loop of the sampler: algorithm AS 241, from which the table is made,
 *  takes a division for every draw and a logarithm and a root for each seventh. Between 1/32 and 31/32 equal cells; in the tails
 *  sixteen cells for every halving of the probability; beyond 2⁻²⁷ AS 241 itself. Error below 1e-12 relative, and below
 *  3e-14 between 1/16 and 15/16 (test). */
interface Tables {
  readonly middle: Float64Array;
  readonly tail: Float64Array;
}

let tables: Tables | null = null;

function makeTables(): Tables {
  const middle = new Float64Array(CELLS * COEFFICIENTS);
  for (let cell = FIRST; cell < LAST; cell++) {
    middle.set(
      polynomialFit((x) => standardNormalQuantile((cell + x) / CELLS), COEFFICIENTS - 1),
      cell * COEFFICIENTS,
    );
  }
  const tail = new Float64Array(OCTAVES * 16 * COEFFICIENTS);
  for (let octave = 0; octave < OCTAVES; octave++) {
    for (let cell = 0; cell < 16; cell++) {
      tail.set(
        polynomialFit((x) => standardNormalQuantile(((16 + cell + x) * 2 ** octave) / UNIT), COEFFICIENTS - 1),
        (octave * 16 + cell) * COEFFICIENTS,
      );
    }
  }
  return { middle, tail };
}

/** Φ⁻¹(p) outside the middle cells. */
function tailScore(p: number, tail: Float64Array): number {
  const q = p < 0.5 ? p : 1 - p;
  const n = (q * UNIT) | 0;
  if (n < 16) return standardNormalQuantile(p);
  const octave = 27 - Math.clz32(n);
  const start = n >>> octave;
  const x = (q * UNIT) / (1 << octave) - start;
  const k = (octave * 16 + start - 16) * COEFFICIENTS;
  const z =
    tail[k]! + x * (tail[k + 1]! + x * (tail[k + 2]! + x * (tail[k + 3]! + x * (tail[k + 4]! + x * tail[k + 5]!))));
  return p < 0.5 ? z : -z;
}

/** Φ⁻¹(p) by the table. */
export function normalScore(p: number): number {
  const one = Float64Array.of(p);
  normalScores(one, 1);
  return one[0]!;
}

/** Replaces the first `count` uniform draws p on (0, 1) by scale·Φ⁻¹(p). */
export function normalScores(draws: Float64Array, count: number, scale = 1): void {
  tables ??= makeTables();
  const { middle, tail } = tables;
  for (let i = 0; i < count; i++) {
    const p = draws[i]!;
    const position = p * CELLS;
    const cell = position | 0;
    if (cell >= FIRST && cell < LAST) {
      const x = position - cell;
      const k = cell * COEFFICIENTS;
      draws[i] =
        scale *
        (middle[k]! +
          x *
            (middle[k + 1]! + x * (middle[k + 2]! + x * (middle[k + 3]! + x * (middle[k + 4]! + x * middle[k + 5]!)))));
    } else draws[i] = scale * tailScore(p, tail);
  }
}

/** Fills out[0 … count−1] with scale·Φ⁻¹(p) of the generator's next uniform draws p. */
export function fillNormalScores(generator: Xoshiro128, out: Float64Array, count: number, scale = 1): void {
  generator.fillUniform(out, count);
  normalScores(out, count, scale);
}
