import type { InputCovariance } from './covariance.js';
import type { Gradient } from './gradient.js';

/** One input's part in a result's variance. */
export interface Contribution {
  /** register index */
  readonly input: number;
  readonly sensitivity: number;
  /** |c|·u(x) */
  readonly uy: number;
  /** c_i·Σ_j cov_ij·c_j / u²(y) */
  readonly share: number;
}

/** Rows under this part of u(y) are left out of a budget. */
const NEGLIGIBLE_PART = 1e-12;

/** Uncertainty budget with covariance-true shares: cov(y, c_i·x_i)/u²(y), which add up to 1 and can be negative
 *  (GUM 5.2.2, eq. 16, split by input). Rows by falling |share|. */
export function contributions(covariance: InputCovariance, gradient: Gradient): Contribution[] {
  const withInputs = covariance.withInputs(gradient);
  const { indices, values } = gradient;
  let variance = 0;
  for (let k = 0; k < indices.length; k++) variance += values[k]! * withInputs[indices[k]!]!;
  // where everything cancels, u(y) is 0 and so is every share worth a row
  if (!(variance > 0)) return [];
  const least = NEGLIGIBLE_PART * Math.sqrt(variance);
  const rows: Contribution[] = [];
  for (let k = 0; k < indices.length; k++) {
    const input = indices[k]!;
    const sensitivity = values[k]!;
    const uy = Math.abs(sensitivity) * covariance.inputs[input]!.u;
    if (uy > least) rows.push({ input, sensitivity, uy, share: (sensitivity * withInputs[input]!) / variance });
  }
  return rows.sort((a, b) => Math.abs(b.share) - Math.abs(a.share) || a.input - b.input);
}
