/** Partial derivatives ∂y/∂x_i to the inputs that matter, by rising input index; all others are 0. */
export interface Gradient {
  readonly indices: readonly number[];
  readonly values: readonly number[];
}

export const ZERO_GRADIENT: Gradient = { indices: [], values: [] };

/** A value with its partial derivatives. */
export interface Dependent {
  readonly value: number;
  readonly gradient: Gradient;
}

/** Σ weight·gradient. */
export function combineGradients(terms: readonly (readonly [weight: number, gradient: Gradient])[]): Gradient {
  if (terms.length === 1 && terms[0]![0] === 1) return terms[0]![1];
  const sum = new Map<number, number>();
  for (const [weight, { indices, values }] of terms) {
    if (weight === 0) continue;
    for (let k = 0; k < indices.length; k++) {
      const i = indices[k]!;
      sum.set(i, (sum.get(i) ?? 0) + weight * values[k]!);
    }
  }
  const indices = [...sum.keys()].sort((a, b) => a - b);
  return { indices, values: indices.map((i) => sum.get(i)!) };
}

/** Gradient from pairs of input index and derivative; an index named twice adds up. */
export function gradientOf(pairs: readonly (readonly [index: number, derivative: number])[]): Gradient {
  return combineGradients([...pairs.map(([i, d]) => [1, { indices: [i], values: [d] }] as const)]);
}

/** Gradient of a dense row of derivatives, exact zeros left out. */
export function gradientOfRow(row: Float64Array): Gradient {
  const indices: number[] = [];
  const values: number[] = [];
  row.forEach((v, i) => {
    if (v !== 0) {
      indices.push(i);
      values.push(v);
    }
  });
  return { indices, values };
}
