import { normalDensity, standardNormalCdf, standardNormalCentre } from '../distributions/normal.js';
import { tAtNormalScore } from './t-scores.js';
import { type Shape, standardDeviationInU } from './trial-input.js';

/** Standardised deviate (mean 0, variance 1) of a shape at the normal score z ≥ 0; t needs ν > 2. */
export function standardisedAtScore(shape: Shape, z: number): number {
  switch (shape.kind) {
    case 'normal':
      return z;
    case 'uniform':
      return 2 * Math.sqrt(3) * standardNormalCentre(z);
    case 'triangular':
      return Math.sqrt(6) * (1 - Math.sqrt(2 * standardNormalCdf(-z)));
    case 't':
      return tAtNormalScore(z, shape.dof) / standardDeviationInU(shape)!;
  }
}

/** Eight-point Gauss–Legendre rule on [−1, 1] (Abramowitz & Stegun 1964, table 25.4). */
const NODES = [0.1834346424956498, 0.525532409916329, 0.7966664774136267, 0.9602898564975363];
const WEIGHTS = [0.362683783378362, 0.3137066458778873, 0.2223810344533745, 0.1012285362903763];

const END = 37;
const PANELS = 74;

/** Quadrature points on [0, 37] with weights that hold 2·φ(z): the integral over all z of an even function times φ. */
export const HALF_LINE: readonly { readonly z: number; readonly weight: number }[] = (() => {
  const half = END / PANELS / 2;
  const points: { z: number; weight: number }[] = [];
  for (let panel = 0; panel < PANELS; panel++) {
    const middle = (2 * panel + 1) * half;
    NODES.forEach((node, k) => {
      for (const z of [middle - half * node, middle + half * node]) {
        points.push({ z, weight: 2 * normalDensity(z) * half * WEIGHTS[k]! });
      }
    });
  }
  return points;
})();

/** Odd orders 1, 3, …: every shape here is symmetric, so the even ones vanish. */
export const ORDERS = 100;

/** Coefficients of h(z), the standardised deviate at the normal score z, in normalised Hermite polynomials of odd order:
 *  a_k = E[h(Z)·He_k(Z)]/√k!. Two deviates whose scores have correlation r then have the product-moment correlation
 *  Σ a_k·b_k·rᵏ (Mehler 1866; Lancaster 1957, Biometrika 44:289). */
export function hermiteCoefficients(shape: Shape): Float64Array {
  const out = new Float64Array(ORDERS);
  for (const { z, weight } of HALF_LINE) {
    if (weight === 0) continue;
    const h = weight * standardisedAtScore(shape, z);
    // normalised polynomials: √(k+1)·He_{k+1} = z·He_k − √k·He_{k−1}
    let even = 1;
    let odd = z;
    for (let n = 0; n < ORDERS; n++) {
      out[n]! += h * odd;
      const k = 2 * n + 1;
      even = (z * odd - Math.sqrt(k) * even) / Math.sqrt(k + 1);
      odd = (z * even - Math.sqrt(k + 1) * odd) / Math.sqrt(k + 2);
    }
  }
  return out;
}
