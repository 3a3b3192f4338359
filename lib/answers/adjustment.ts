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
  /** adjusted W₀ − stated W₀, m²/s²; only with `estimateOffset` */
  readonly offset?: UnknownEstimate;
  /** change of W₀ per metre of way to the north and to the east of the datum's origin, m²/s² per m; only with `estimateTilt` */
  readonly tilt?: { readonly north: UnknownEstimate; readonly east: UnknownEstimate };
}

/** value left out where the network is only planned */
export interface UnknownEstimate {
  readonly value?: number;
  readonly u: number;
  /** smallest offset or tilt that the test tells from none */
  readonly smallestDetectable: number;
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
  readonly loops: readonly LoopClosure[];
  /** observations whose standardised residual the test would reject, worst first; none is dropped */
  readonly outliers: readonly Outlier[];
  /** full covariance of the unknowns, SI */
  readonly covariance: { readonly unknowns: readonly string[]; readonly matrix: readonly (readonly number[])[] };
  readonly checks: readonly CheckResult[];
  readonly warnings: readonly Warning[];
}

/** Links around a loop: gravity, clocks and frequency ratios cancel, so the sum must be zero. */
export interface LoopClosure {
  /** link ids in the order of the walk, each with +1 where it is walked from → to */
  readonly links: readonly { readonly id: string; readonly sign: 1 | -1 }[];
  /** measured at the same time, so that the clocks' noise cancels too and only the links' is left */
  readonly simultaneous: boolean;
  /** Σ ±y of the measurements, in mean tide; u alone where the network is only planned */
  readonly closure: { readonly value?: number; readonly u: number };
  /** closure / u; null where only planned or exact */
  readonly z: number | null;
}

export interface Outlier {
  readonly id: string;
  readonly standardised: number;
  readonly warning: Warning;
}
