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
  const rows: { input: number; sensitivity: number; uy: number; part: number }[] = [];
  let variance = 0;
  gradient.indices.forEach((input, k) => {
    const sensitivity = gradient.values[k]!;
    const part = sensitivity * withInputs[input]!;
    variance += part;
    rows.push({ input, sensitivity, uy: Math.abs(sensitivity) * covariance.inputs[input]!.u, part });
  });
  const u = Math.sqrt(Math.max(0, variance));
  // where everything cancels, u(y) is 0 and so is every share worth a row
  return rows
    .filter((r) => r.uy > NEGLIGIBLE_PART * u && r.uy > 0 && variance > 0)
    .map(({ part, ...r }) => ({ ...r, share: part / variance }))
    .sort((a, b) => Math.abs(b.share) - Math.abs(a.share) || a.input - b.input);
}
