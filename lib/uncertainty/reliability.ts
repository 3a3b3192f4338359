import { type DetectionTest, detectionFactor, NETWORK_TEST } from './detection.js';
import type { LeastSquaresSolution } from './least-squares.js';
import { choleskySolve, forwardSolve, identity, transpose } from './matrix.js';

/** What the others say of one observation. All null for an exact one. */
export interface ObservationReliability {
  readonly standardised: number | null;
  readonly redundancy: number | null;
  readonly control: number | null;
  readonly smallestDetectable: number | null;
}

const EXACT: ObservationReliability = { standardised: null, redundancy: null, control: null, smallestDetectable: null };
const UNCONTROLLED: ObservationReliability = { ...EXACT, redundancy: 0, control: 0 };

/** Under this control an error in the observation cannot show at all. */
const MIN_CONTROL = 1e-10;

/** Redundancy, control, standardised residual and smallest detectable bias of correlated observations.
 *  With Q = V − A·N⁻¹·Aᵀ and r the residuals: redundancy = diag(Q·V⁻¹), control = (V⁻¹QV⁻¹)_ii/(V⁻¹)_ii, standardised residual
 *  (V⁻¹r)_i/√(V⁻¹QV⁻¹)_ii, smallest detectable bias δ₀/√(V⁻¹QV⁻¹)_ii (Baarda 1968; Teunissen, Testing Theory, 2006, ch. 4;
 *  for correlated observations Wang & Chen 1994, Acta Geod. Cart. Sinica). */
export function reliability(
  solution: LeastSquaresSolution,
  observations: number,
  test: DetectionTest = NETWORK_TEST,
): ObservationReliability[] {
  const factorOfTest = detectionFactor(test);
  const out: ObservationReliability[] = new Array(observations).fill(EXACT);
  const { weights, independent, residual } = solution;
  if (!weights) return out.fill(UNCONTROLLED);
  const { factor, reducedDesign, weightedDesign, normalFactor } = weights;
  const precision = choleskySolve(factor, identity(independent.length));
  const weightedResidual = choleskySolve(
    factor,
    independent.map((i) => Float64Array.of(residual[i]!)),
  );
  const free = normalFactor.length;
  // rows of N⁻¹·Mᵀ by observation, M = V⁻¹·B; |L_N⁻¹·Mᵀ|² column by column gives diag(M·N⁻¹·Mᵀ) without cancellation
  const half = forwardSolve(normalFactor, transpose(weightedDesign, free));
  const solved = choleskySolve(normalFactor, transpose(weightedDesign, free));
  independent.forEach((i, j) => {
    let explained = 0;
    let hat = 0;
    for (let f = 0; f < free; f++) {
      explained += half[f]![j]! ** 2;
      hat += reducedDesign[j]![f]! * solved[f]![j]!;
    }
    const weight = precision[j]![j]!;
    const tested = weight - explained;
    const control = Math.max(0, tested / weight);
    const controlled = control >= MIN_CONTROL;
    out[i] = {
      redundancy: 1 - hat,
      control,
      standardised: controlled ? weightedResidual[j]![0]! / Math.sqrt(tested) : null,
      smallestDetectable: controlled ? factorOfTest / Math.sqrt(tested) : null,
    };
  });
  return out;
}
