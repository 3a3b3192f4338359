/** Places where time goes back. */
export interface Disorder {
  /** sample index after which time went back, with the step [s, negative]; at most as many as asked for */
  readonly places: readonly { readonly sample: number; readonly stepS: number }[];
  readonly count: number;
}

const MOST_PLACES = 8;

/** Where a later sample has an earlier start. */
export function findDisorder(startS: Float64Array): Disorder {
  const places: { sample: number; stepS: number }[] = [];
  let count = 0;
  for (let i = 1; i < startS.length; i++) {
    if (startS[i]! >= startS[i - 1]!) continue;
    count++;
    if (places.length < MOST_PLACES) places.push({ sample: i, stepS: startS[i]! - startS[i - 1]! });
  }
  return { places, count };
}

/** Sample numbers in order of start, equal starts in file order. */
export const sortedOrder = (startS: Float64Array): Uint32Array =>
  Uint32Array.from(startS, (_, i) => i).sort((a, b) => startS[a]! - startS[b]! || a - b);

/** Values picked in that order. */
export function reordered(values: Float64Array, order: Uint32Array): Float64Array {
  const picked = new Float64Array(order.length);
  for (let i = 0; i < order.length; i++) picked[i] = values[order[i]!]!;
  return picked;
}

/** Median of a copy of the values; NaN-free input, at least one. */
export function median(values: Float64Array): number {
  const sorted = Float64Array.from(values).sort();
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[half]! : 0.5 * (sorted[half - 1]! + sorted[half]!);
}

/** At most `most` values of f(i), i evenly spread over 0 … count − 1. */
export function sampled(count: number, most: number, f: (i: number) => number): Float64Array {
  const n = Math.min(count, most);
  return Float64Array.from({ length: n }, (_, k) => f(Math.floor((k * count) / n)));
}

/** The commonest spacing of the samples [s]: the median of positive steps, freed from the rounding of the stamps by taking the
 *  plainest decimal that fits. Null without two samples at different times.
 * @param startS in time order
 * @param stampS how finely the stamps are written [s] */
export function spacingOf(startS: Float64Array, stampS: number): number | null {
  const steps = sampled(startS.length - 1, 20001, (i) => startS[i + 1]! - startS[i]!).filter((d) => d > 1e-9);
  if (steps.length === 0) return null;
  const rough = median(steps);
  // Close to the median the stamps' rounding averages out; other steps are gaps.
  const near = steps.filter((d) => Math.abs(d - rough) <= Math.max(0.25 * rough, 1.01 * stampS));
  const mean = near.reduce((sum, d) => sum + d, 0) / near.length;
  const spread = Math.max(2 * stampS, 1e-9 * rough) / Math.sqrt(near.length) + 1e-9;
  const fine = Math.abs(mean - rough) > spread ? mean : rough;
  for (let decimals = 0; decimals <= 9; decimals++) {
    const plain = Number(fine.toFixed(decimals));
    if (plain > 0 && Math.abs(plain - fine) <= spread) return plain;
  }
  return fine;
}
