import type { Gradient } from '../uncertainty/gradient.js';
import { gradientOf } from '../uncertainty/gradient.js';

/** A function of a handful of inputs with its analytic derivatives. `inputs` are register indices, arguments come in that order. */
export interface ModelFunction {
  readonly inputs: readonly number[];
  /** value at these arguments, SI */
  evaluate(x: ArrayLike<number>): number;
  /** ∂/∂x_k at these arguments, in the order of `inputs` */
  partials(x: ArrayLike<number>): number[];
  /** For a function that is slow to evaluate: f(x̂ + d) − f(x̂) for many deviations d at once. See trial-differences.ts */
  differences?(estimates: ArrayLike<number>): TrialDifferences;
}

/** Writes f(x̂ + d) − f(x̂) into out[t] for trials t < count; d in the order of the function's inputs. */
export type TrialDifferences = (d: readonly Float64Array[], count: number, out: Float64Array) => void;

/** Value and gradient at the inputs' estimates. */
export function atEstimates(
  f: ModelFunction,
  estimates: (index: number) => number,
): { readonly value: number; readonly gradient: Gradient } {
  const x = f.inputs.map(estimates);
  const partials = f.partials(x);
  return { value: f.evaluate(x), gradient: gradientOf(f.inputs.map((i, k) => [i, partials[k]!] as const)) };
}
