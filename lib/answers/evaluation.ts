import type { Warning } from '../campaign/fault.js';
import type { CheckResult, Estimate } from './prediction.js';
import type { Suspect } from './suspects/suspects.js';

export type Verdict = 'agree' | 'differ' | 'inconclusive';

export interface LinkEvaluation {
  /** the link's id */
  readonly id: string;
  /** the measurement's id, else its position */
  readonly measurement: string | number;
  /** y in mean tide, u with systematics */
  readonly measured: Estimate;
  /** gravity's y plus offset(to) − offset(from); null without a level */
  readonly predicted: Estimate | null;
  /** offset(to) − offset(from), the part of `predicted` that unlike transitions add; null between equal ones */
  readonly ratioOffset: Estimate | null;
  /** measured − predicted */
  readonly residual: Estimate | null;
  /** the same as length equivalent, m */
  readonly residualLength: Estimate | null;
  readonly z: number | null;
  /** two-sided, normal */
  readonly p: number | null;
  /** metrological compatibility (VIM 2.47) at |z| ≤ 2; null where nothing can be said */
  readonly verdict: Verdict | null;
  /** smallest discrepancy the comparison shows at test size 0.05 and power 0.8, as length equivalent, m */
  readonly smallestDetectableM: number | null;
  /** the discrepancy asked about, as a fraction of frequency; null where none is stated */
  readonly effectOffset: number | null;
  /** single mistakes held against the residual, best first; empty unless the verdict is `differ` */
  readonly suspects: readonly Suspect[];
  /** what the clocks alone say, frequency offsets taken off, campaign's tide system */
  readonly inferred: {
    readonly dW: Estimate;
    readonly dH: Estimate;
    readonly dHNormal: Estimate | null;
  };
}

/** The answer of `evaluate`. */
export interface Evaluation {
  /** the discrepancy asked about, as length equivalent, m: as stated, else ten times the target; null without either */
  readonly effectM: number | null;
  readonly links: readonly LinkEvaluation[];
  /** rᵀ·V⁻¹·r over all comparable measurements */
  readonly chi2: number | null;
  readonly dof: number;
  readonly p: number | null;
  /** √(χ²/dof): an extra, never used to scale an uncertainty */
  readonly birge: number | null;
  readonly checks: readonly CheckResult[];
  readonly warnings: readonly Warning[];
}
