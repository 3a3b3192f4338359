/** out[t] = Σ_k weights[k]·terms[k][t] for t < count; zero weights cost nothing. Four terms at a time, for the loop is bound by
 *  reading and writing `out`, which must not be one of the terms. */
export function weightedSum(
  weights: ArrayLike<number>,
  terms: readonly Float64Array[],
  count: number,
  out: Float64Array,
): void {
  const used: number[] = [];
  for (let k = 0; k < weights.length; k++) if (weights[k] !== 0) used.push(k);
  // the first, shorter bundle sets `out`, the others add to it
  const first = used.length % 4 || Math.min(4, used.length);
  setSum(weights, terms, used.slice(0, first), count, out);
  for (let n = first; n < used.length; n += 4) {
    const [i, j, k, l] = [used[n]!, used[n + 1]!, used[n + 2]!, used[n + 3]!];
    const [a, b, c, d] = [weights[i]!, weights[j]!, weights[k]!, weights[l]!];
    const [s, t, u, v] = [terms[i]!, terms[j]!, terms[k]!, terms[l]!];
    for (let q = 0; q < count; q++) out[q]! += a * s[q]! + b * t[q]! + c * u[q]! + d * v[q]!;
  }
}

/** The sum of up to four terms. */
function setSum(
  weights: ArrayLike<number>,
  terms: readonly Float64Array[],
  [i, j, k, l]: readonly number[],
  count: number,
  out: Float64Array,
): void {
  if (i === undefined) {
    out.fill(0, 0, count);
    return;
  }
  const a = weights[i]!;
  const s = terms[i]!;
  if (j === undefined) {
    for (let q = 0; q < count; q++) out[q] = a * s[q]!;
    return;
  }
  const b = weights[j]!;
  const t = terms[j]!;
  if (k === undefined) {
    for (let q = 0; q < count; q++) out[q] = a * s[q]! + b * t[q]!;
    return;
  }
  const c = weights[k]!;
  const u = terms[k]!;
  if (l === undefined) {
    for (let q = 0; q < count; q++) out[q] = a * s[q]! + b * t[q]! + c * u[q]!;
    return;
  }
  const d = weights[l]!;
  const v = terms[l]!;
  for (let q = 0; q < count; q++) out[q] = a * s[q]! + b * t[q]! + c * u[q]! + d * v[q]!;
}
