import type { Warning } from '../campaign/fault.js';
import type { DetectionTest } from '../uncertainty/detection.js';
import type { CheckResult } from './prediction.js';

export interface AdjustedSite {
  readonly id: string;
  /** adjusted W, campaign's tide system, m²/s²; left out where only planned */
  readonly W?: number;
  /** predict's u(W); null if it had none */
  readonly uBefore: number | null;
  readonly uAfter: number;
}

export interface AdjustedDatum {
  readonly id: string;
  /** adjusted W₀ − stated W₀, m²/s² */
  readonly offset: { readonly value?: number; readonly u: number };
}

export interface AdjustedObservation {
  readonly id: string;
  /** observed − adjusted, m²/s²; null where only planned */
  readonly residual: number | null;
  /** (V⁻¹r)_i / √(V⁻¹QV⁻¹)_ii: standard normal if all is as stated */
  readonly standardised: number | null;
  /** (Q·V⁻¹)_ii: adds up to dof; outside 0…1 possible when correlated */
  readonly redundancy: number | null;
  /** (V⁻¹QV⁻¹)_ii / (V⁻¹)_ii, 0…1: how well the others control it */
  readonly control: number | null;
  /** smallest error of this observation that the test shows, m²/s² */
  readonly smallestDetectable: number | null;
}

/** The answer of `adjust`. */
export interface Adjustment {
  readonly sites: readonly AdjustedSite[];
  readonly datums: readonly AdjustedDatum[];
  readonly observations: readonly AdjustedObservation[];
  readonly test: DetectionTest;
  readonly chi2?: number;
  readonly dof: number;
  readonly p?: number | null;
  readonly checks: readonly CheckResult[];
  readonly warnings: readonly Warning[];
}
