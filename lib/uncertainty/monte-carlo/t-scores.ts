import { standardNormalCdf, standardNormalCentre } from '../distributions/normal.js';
import { studentTQuantile } from '../distributions/student-t.js';
import { polynomialFit } from './polynomial-fit.js';

/** t_ν at the normal score z, exactly: the t with the same probability below it as z has. Odd in z. */
export function tAtNormalScore(z: number, nu: number): number {
  const a = Math.abs(z);
  const t =
    a < 0.6 ? studentTQuantile(0.5 + standardNormalCentre(a), nu) : -studentTQuantile(standardNormalCdf(-a), nu);
  return z < 0 ? -t : t;
}

const END = 8.5;
const CELLS = 136;
const DEGREE = 5;
const COEFFICIENTS = DEGREE + 1;
const CELLS_PER_UNIT = CELLS / END;

/** The map from normal scores to t_ν deviates as a table of polynomials for ln(t/z), which is even and smooth however heavy the
 *  tails; relative error below 1e-11 (test). One quantile of t takes microseconds, and a run draws millions. */
export class TScoreTable {
  readonly #nu: number;
  readonly #table = new Float64Array(CELLS * COEFFICIENTS);

  constructor(nu: number) {
    this.#nu = nu;
    for (let cell = 0; cell < CELLS; cell++) {
      const logRatio = (x: number): number => {
        const z = (cell + x) / CELLS_PER_UNIT;
        return Math.log(tAtNormalScore(z, nu) / z);
      };
      this.#table.set(polynomialFit(logRatio, DEGREE), cell * COEFFICIENTS);
    }
  }

  /** Replaces the first `count` normal scores by scale·t_ν. */
  apply(z: Float64Array, count: number, scale: number): void {
    const table = this.#table;
    for (let i = 0; i < count; i++) {
      const score = z[i]!;
      const position = Math.abs(score) * CELLS_PER_UNIT;
      const cell = Math.floor(position);
      if (!(cell < CELLS)) {
        // a correlated score can lie further out than any single draw (8.2)
        z[i] = scale * tAtNormalScore(score, this.#nu);
        continue;
      }
      const x = position - cell;
      const k = cell * COEFFICIENTS;
      const log =
        ((((table[k + 5]! * x + table[k + 4]!) * x + table[k + 3]!) * x + table[k + 2]!) * x + table[k + 1]!) * x +
        table[k]!;
      z[i] = scale * score * Math.exp(log);
    }
  }
}
