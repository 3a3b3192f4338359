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
  let sum = ZERO_GRADIENT;
  for (const [weight, gradient] of terms) if (weight !== 0) sum = addScaledGradient(sum, weight, gradient);
  return sum;
}

/** a + weight·b by merging the two sorted lists. */
function addScaledGradient(a: Gradient, weight: number, b: Gradient): Gradient {
  if (a.indices.length === 0) return weight === 1 ? b : { indices: b.indices, values: b.values.map((v) => weight * v) };
  if (sameIndices(a.indices, b.indices)) {
    // one solve gives every site the same inputs: no merging then
    const values = new Array<number>(a.values.length);
    for (let k = 0; k < values.length; k++) values[k] = a.values[k]! + weight * b.values[k]!;
    return { indices: a.indices, values };
  }
  const indices: number[] = [];
  const values: number[] = [];
  let i = 0;
  let j = 0;
  while (i < a.indices.length || j < b.indices.length) {
    const x = i < a.indices.length ? a.indices[i]! : Number.POSITIVE_INFINITY;
    const y = j < b.indices.length ? b.indices[j]! : Number.POSITIVE_INFINITY;
    indices.push(Math.min(x, y));
    values.push((x <= y ? a.values[i++]! : 0) + (y <= x ? weight * b.values[j++]! : 0));
  }
  return { indices, values };
}

function sameIndices(a: readonly number[], b: readonly number[]): boolean {
  if (a === b) return true;
  if (a.length !== b.length) return false;
  for (let k = 0; k < a.length; k++) if (a[k] !== b[k]) return false;
  return true;
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
