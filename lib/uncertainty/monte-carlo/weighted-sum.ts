/** out[t] = Σ_k weights[k]·terms[k][t] for t < count; zero weights cost nothing. Four terms at a time, for the loop is bound by
 *  reading and writing `out`. */
export function weightedSum(
  weights: ArrayLike<number>,
  terms: readonly Float64Array[],
  count: number,
  out: Float64Array,
): void {
  const used: number[] = [];
  for (let k = 0; k < weights.length; k++) if (weights[k] !== 0) used.push(k);
  out.fill(0, 0, count);
  let n = 0;
  for (; n + 3 < used.length; n += 4) {
    const [i, j, k, l] = [used[n]!, used[n + 1]!, used[n + 2]!, used[n + 3]!];
    const [a, b, c, d] = [weights[i]!, weights[j]!, weights[k]!, weights[l]!];
    const [s, t, u, v] = [terms[i]!, terms[j]!, terms[k]!, terms[l]!];
    for (let q = 0; q < count; q++) out[q]! += a * s[q]! + b * t[q]! + c * u[q]! + d * v[q]!;
  }
  for (; n < used.length; n++) {
    const a = weights[used[n]!]!;
    const s = terms[used[n]!]!;
    for (let q = 0; q < count; q++) out[q]! += a * s[q]!;
  }
}
