import type { TideSystem } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';

/** A result with its standard uncertainty, SI. */
export interface Estimate {
  readonly value: number;
  readonly u: number;
}

/** One row of an uncertainty budget. */
export interface BudgetRow {
  /** path of the input */
  readonly input: string;
  /** the input as stated, SI */
  readonly value: number;
  readonly u: number;
  /** c = ∂y/∂x, in y per SI unit of the input */
  readonly sensitivity: number;
  /** |c|·u */
  readonly uy: number;
  /** c_i·Σ_j cov_ij·c_j / u²(y); the shares add up to 1, one can be negative */
  readonly share: number;
}

/** A determination or measurement that is compared, not fitted: residual = its value − the result. */
export interface CheckResult {
  readonly path: string;
  readonly residual: Estimate;
  /** residual / u; null where both are exact */
  readonly z: number | null;
}

export interface SitePrediction {
  readonly id: string;
  /** gravity potential at the marker, campaign's tide system, m²/s²; null without a level */
  readonly W: Estimate | null;
  /** geopotential number W₀ − W to the datum of the site's first determination, m²/s² */
  readonly C: Estimate | null;
  readonly determinations: readonly { readonly kind: string; readonly W: Estimate | null }[];
}

export interface ClockPrediction {
  readonly id: string;
  readonly site: string;
  readonly W: Estimate | null;
  /** (W₀_TT − W_mean)/c²: how much faster the clock runs than Terrestrial Time; the correction is its negative */
  readonly redshift: Estimate | null;
}

export interface LinkPrediction {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  /** W_from − W_to, campaign's tide system, m²/s² */
  readonly dW: Estimate | null;
  /** (ν_to − ν_from)/ν by gravity alone, mean tide; positive when `to` is higher and runs fast */
  readonly y: Estimate | null;
  /** length equivalent dW/ḡ, m */
  readonly dH: Estimate | null;
  /** normal-height difference H*_to − H*_from of the clocks, m; null without a level */
  readonly dHNormal: Estimate | null;
  /** y times the recommended frequency of the `to` clock, Hz */
  readonly offsetHz: Estimate | null;
  readonly budget: readonly BudgetRow[];
}

/** The answer of `predict`. */
export interface Prediction {
  readonly format: 'plumbtick-prediction/1';
  readonly title?: string;
  readonly tide: TideSystem;
  readonly sites: readonly SitePrediction[];
  /** null when nothing is redundant */
  readonly combination: { readonly chi2: number; readonly dof: number; readonly p: number } | null;
  readonly clocks: readonly ClockPrediction[];
  readonly links: readonly LinkPrediction[];
  readonly checks: readonly CheckResult[];
  /** correlations of y, of the links that have one */
  readonly correlations: { readonly links: readonly string[]; readonly matrix: readonly (readonly number[])[] };
  readonly warnings: readonly Warning[];
}
