import type { ModelFunction } from './model-function.js';

/** A height among a function's arguments that moves with a rate of its own. */
export interface MovingArgument {
  /** position of the height among the function's inputs */
  readonly argument: number;
  /** register index of the rate, m/s */
  readonly rate: number;
  /** seconds over which it acts */
  readonly seconds: number;
}

/** The same function of heights brought to another epoch: h + rate·t in place of h, the rates as inputs of their own. */
export function withMotion(f: ModelFunction, moving: readonly MovingArgument[]): ModelFunction {
  if (moving.length === 0) return f;
  const count = f.inputs.length;
  const moved = (x: ArrayLike<number>): number[] => {
    const y = Array.from({ length: count }, (_, i) => x[i]!);
    moving.forEach(({ argument, seconds }, k) => {
      y[argument]! += seconds * x[count + k]!;
    });
    return y;
  };
  return {
    inputs: [...f.inputs, ...moving.map((m) => m.rate)],
    evaluate: (x) => f.evaluate(moved(x)),
    partials: (x) => {
      const partials = f.partials(moved(x));
      return [...partials, ...moving.map(({ argument, seconds }) => seconds * partials[argument]!)];
    },
  };
}
