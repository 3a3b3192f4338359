/** Coefficients, lowest power first, of the polynomial of that degree through f at the Chebyshev nodes of [0, 1] (Newton's divided
 *  differences, expanded). */
export function polynomialFit(f: (x: number) => number, degree: number): Float64Array {
  const n = degree + 1;
  const x = Array.from({ length: n }, (_, k) => 0.5 + 0.5 * Math.cos((Math.PI * (k + 0.5)) / n));
  const d = x.map(f);
  for (let order = 1; order < n; order++) {
    for (let i = n - 1; i >= order; i--) d[i] = (d[i]! - d[i - 1]!) / (x[i]! - x[i - order]!);
  }
  const c = new Float64Array(n);
  for (let i = n - 1; i >= 0; i--) {
    for (let k = n - 1; k > 0; k--) c[k] = c[k - 1]! - x[i]! * c[k]!;
    c[0] = d[i]! - x[i]! * c[0]!;
  }
  return c;
}
