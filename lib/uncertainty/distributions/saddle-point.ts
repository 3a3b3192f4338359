const INV_SQRT_2PI = 0.3989422804014327;

/** δ(n) = ln Γ(n+1) − ln(√(2πn)·(n/e)ⁿ), the error of Stirling's formula, for n > 0 (not only integers).
 *  From the asymptotic series at n ≥ 16 (error below 2e-16), carried down by
 *  δ(n) = δ(n+1) + (n+½)·ln(1+1/n) − 1, which loses nothing to cancellation.
 * @see C. Loader, "Fast and accurate computation of binomial probabilities" (2000), sec. 2 */
export const stirlingError = (n: number): number => {
  let shift = 0;
  let m = n;
  while (m < 16) {
    shift += (m + 0.5) * Math.log1p(1 / m) - 1;
    m += 1;
  }
  const s = 1 / (m * m);
  return shift + (1 / 12 - (1 / 360 - (1 / 1260 - (1 / 1680 - s / 1188) * s) * s) * s) / m;
};

/** D(x, m) = x·ln(x/m) + m − x ≥ 0, the deviance, without cancellation where x ≈ m; x, m > 0.
 * @see C. Loader (2000), sec. 3 */
export const deviance = (x: number, m: number): number => {
  const v = (x - m) / (x + m);
  // x·ln(x/m) = 2x·artanh(v): the series in v is used up to |v| = ½, where 30 terms reach the last bit.
  if (Math.abs(v) >= 0.5 || !Number.isFinite(v)) return x * Math.log(x / m) + m - x;
  let sum = (x - m) * v;
  let power = 2 * x * v;
  for (let k = 3; ; k += 2) {
    power *= v * v;
    const next = sum + power / k;
    if (next === sum) return sum;
    sum = next;
  }
};

/** xᵃ·e⁻ˣ/Γ(a+1) for a, x > 0: good to a few 1e-16 times 1 + |ln result|, for a of any size, where the textbook
 *  exp(a·ln x − x − ln Γ) loses a factor a·ln a. */
export const poissonTerm = (a: number, x: number): number =>
  (INV_SQRT_2PI / Math.sqrt(a)) * Math.exp(-stirlingError(a) - deviance(a, x));

/** Γ(a+b+1)/(Γ(a+1)·Γ(b+1))·xᵃ·yᵇ for a, b > 0 and x + y = 1, both given so that neither loses digits near 0. */
export const binomialTerm = (a: number, b: number, x: number, y: number): number => {
  const n = a + b;
  const exponent = stirlingError(n) - stirlingError(a) - stirlingError(b) - deviance(a, n * x) - deviance(b, n * y);
  return INV_SQRT_2PI * Math.sqrt(n / a / b) * Math.exp(exponent);
};
