/** Fully normalised associated Legendre functions split so that nothing overflows at high degree:
 *    P̄_nm(sin ψ) = α_nm · s_m · cosᵐψ · p_nm(sin ψ),
 *  s_m = P̄_mm/cosᵐψ, p_mm = 1, p_{m+1,m} = 2t, p_{n+1,m} = 2t·p_nm − (1 − (4m² − 1)/(4n² − 1))·p_{n−1,m}.
 *  From P̄_nm = a_nm·t·P̄_{n−1,m} − b_nm·P̄_{n−2,m} (Holmes & Featherstone 2002, J. Geodesy 76:279, eqs. 11–12) with α_nm = α_{n−1,m}·a_nm/2. */

/** Results of the recursion grow as P̄_nm/cosᵐψ, which reaches 1e386 at degree 2190 and 1e476 at 2700 near a pole; they are carried
 *  times 2⁻⁸⁰⁰ ≈ 1.5e-241 (Holmes & Featherstone take 1e-280), a power of two so that no digit is lost. */
export const RECURSION_SCALE = 2 ** -800;

/** α_nm for one order and n = m … maxDegree into out[n]. */
export function associatedLegendreGrowth(order: number, maxDegree: number, out: Float64Array): void {
  let alpha = 1;
  out[order] = 1;
  for (let n = order + 1; n <= maxDegree; n++) {
    alpha *= 0.5 * Math.sqrt(((2 * n - 1) * (2 * n + 1)) / ((n - order) * (n + order)));
    out[n] = alpha;
  }
}

/** s_m = P̄_mm/cosᵐψ: 1, √3, then s_m = s_{m−1}·√((2m + 1)/(2m)). */
export function sectorialFactors(maxDegree: number): Float64Array {
  const s = new Float64Array(maxDegree + 1);
  s[0] = 1;
  if (maxDegree > 0) s[1] = Math.sqrt(3);
  for (let m = 2; m <= maxDegree; m++) s[m] = s[m - 1]! * Math.sqrt((2 * m + 1) / (2 * m));
  return s;
}

/** a_nm and b_nm of P̄_nm = a_nm·t·P̄_{n−1,m} − b_nm·P̄_{n−2,m} for one order and n = m … maxDegree
 *  (Holmes & Featherstone 2002, eq. 12). */
export function columnRecursion(order: number, maxDegree: number, a: Float64Array, b: Float64Array): void {
  a[order] = 0;
  b[order] = 0;
  for (let n = order + 1; n <= maxDegree; n++) {
    const across = (n - order) * (n + order);
    a[n] = Math.sqrt(((2 * n - 1) * (2 * n + 1)) / across);
    b[n] = Math.sqrt(((2 * n + 1) * (n + order - 1) * (n - order - 1)) / (across * (2 * n - 3)));
  }
}

/** qⁿ·P̄_nm for one order and n = m … maxDegree into out[n], upwards in degree; zero where it is below 1e-160. Upwards the p_nm above
 *  would underflow (they fall by α), so the functions run with their norm, divided by cosᵐψ only.
 * @param a @param b of {@link columnRecursion}
 * @param sectorial s_m·(cos ψ·q)ᵐ/{@link RECURSION_SCALE}
 * @param t sin ψ; @param q R/r */
export function legendreColumn(
  order: number,
  maxDegree: number,
  a: Float64Array,
  b: Float64Array,
  sectorial: number,
  t: number,
  q: number,
  out: Float64Array,
): void {
  const tq = t * q;
  const q2 = q * q;
  let before = 0;
  let p = RECURSION_SCALE;
  out[order] = p * sectorial;
  for (let n = order + 1; n <= maxDegree; n++) {
    const next = a[n]! * tq * p - b[n]! * q2 * before;
    before = p;
    p = next;
    out[n] = p * sectorial;
  }
}
