import type { TimeInterval } from '../campaign/campaign.js';

/** Nodes and weights of Gauss–Legendre quadrature with five points on −1…1 (Abramowitz & Stegun 1964, table 25.4). */
const GAUSS: readonly (readonly [node: number, weight: number])[] = [
  [-0.906179845938664, 0.2369268850561891],
  [-0.5384693101056831, 0.4786286704993665],
  [0, 0.5688888888888889],
  [0.5384693101056831, 0.4786286704993665],
  [0.906179845938664, 0.2369268850561891],
];

/** Pieces of at most this length: five points are exact to 1e-12 of a half-daily wave. */
const PIECE_MS = 2 * 3_600_000;

/** Mean of several functions of time over disjoint intervals, by integration.
 * @param at writes the values at an instant (ms since 1970) into the array given
 * @returns means and the total length, or null for no time at all */
export function meanOverIntervals(
  intervals: readonly TimeInterval[],
  count: number,
  at: (timeMs: number, into: Float64Array) => void,
): { readonly values: Float64Array; readonly seconds: number } | null {
  const sums = new Float64Array(count);
  const now = new Float64Array(count);
  let length = 0;
  for (const { startMs, endMs } of intervals) {
    const pieces = Math.ceil((endMs - startMs) / PIECE_MS);
    const half = (endMs - startMs) / pieces / 2;
    for (let p = 0; p < pieces; p++) {
      const middle = startMs + (2 * p + 1) * half;
      for (const [node, weight] of GAUSS) {
        at(middle + node * half, now);
        for (let i = 0; i < count; i++) sums[i]! += weight * half * now[i]!;
      }
    }
    length += endMs - startMs;
  }
  if (!(length > 0)) return null;
  return { values: sums.map((s) => s / length), seconds: length / 1000 };
}
