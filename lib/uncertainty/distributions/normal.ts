import { requireNumber, requireProbability } from './domain-error.js';

const SQRT_HALF = Math.SQRT1_2;
/** 0.46875·√2, the end of Cody's first interval. */
const CENTRE = 0.46875 * Math.SQRT2;
const INV_SQRT_PI = 0.5641895835477563;
const INV_SQRT_2PI = 0.3989422804014327;

/** exp(−z²/2) without the loss that squaring a large z brings: z² is split at a multiple of 1/16, whose square is exact
 *  (Cody 1969, as in his function ERFC). */
const halfSquareExponential = (z: number): number => {
  const head = Math.trunc(z * 16) / 16;
  return Math.exp(-0.5 * head * head) * Math.exp(-0.5 * (z - head) * (z + head));
};

/** exp(x²)·erfc(x) for x > 0.46875, rational Chebyshev approximations of W. J. Cody, Math. Comp. 23 (1969) 631–637. */
const scaledComplementaryError = (x: number): number => {
  if (x <= 4) {
    let num = 2.15311535474403846e-8 * x;
    let den = x;
    num = (num + 5.64188496988670089e-1) * x;
    den = (den + 1.57449261107098347e1) * x;
    num = (num + 8.88314979438837594) * x;
    den = (den + 1.17693950891312499e2) * x;
    num = (num + 6.61191906371416295e1) * x;
    den = (den + 5.37181101862009858e2) * x;
    num = (num + 2.98635138197400131e2) * x;
    den = (den + 1.62138957456669019e3) * x;
    num = (num + 8.8195222124176909e2) * x;
    den = (den + 3.29079923573345963e3) * x;
    num = (num + 1.71204761263407058e3) * x;
    den = (den + 4.36261909014324716e3) * x;
    num = (num + 2.05107837782607147e3) * x;
    den = (den + 3.43936767414372164e3) * x;
    return (num + 1.23033935479799725e3) / (den + 1.23033935480374942e3);
  }
  const s = 1 / (x * x);
  let num = 1.63153871373020978e-2 * s;
  let den = s;
  num = (num + 3.05326634961232344e-1) * s;
  den = (den + 2.56852019228982242) * s;
  num = (num + 3.60344899949804439e-1) * s;
  den = (den + 1.87295284992346725) * s;
  num = (num + 1.25781726111229246e-1) * s;
  den = (den + 5.27905102951428412e-1) * s;
  num = (num + 1.60837851487422766e-2) * s;
  den = (den + 6.05183413124413191e-2) * s;
  const r = (s * (num + 6.58749161529837803e-4)) / (den + 2.33520497626869185e-3);
  return (INV_SQRT_PI - r) / x;
};

/** Φ(z) − ½ = ½·erf(z/√2) for |z| ≤ 0.66, to its own relative accuracy. */
const centralArea = (z: number): number => {
  const x = z * SQRT_HALF;
  const s = x * x;
  let num = 1.85777706184603153e-1 * s;
  let den = s;
  num = (num + 3.1611237438705656) * s;
  den = (den + 2.36012909523441209e1) * s;
  num = (num + 1.13864154151050156e2) * s;
  den = (den + 2.44024637934444173e2) * s;
  num = (num + 3.77485237685302021e2) * s;
  den = (den + 1.28261652607737228e3) * s;
  return (0.5 * x * (num + 3.20937758913846947e3)) / (den + 2.84423683343917062e3);
};

/** Φ(z) with no check of z, for the inner loop of the sampler. */
export const standardNormalCdf = (z: number): number => {
  const a = Math.abs(z);
  if (a <= CENTRE) return 0.5 + centralArea(z);
  const tail = 0.5 * halfSquareExponential(a) * scaledComplementaryError(a * SQRT_HALF);
  return z < 0 ? tail : 1 - tail;
};

/** Φ(z) − ½ to its own relative accuracy, however small z is. */
export const standardNormalCentre = (z: number): number =>
  Math.abs(z) <= CENTRE ? centralArea(z) : standardNormalCdf(z) - 0.5;

/** Distribution function Φ(z) of the standard normal distribution.
 *  Relative error below 2e-15 in the lower tail down to Φ = 1e-307; the upper tail 1 − Φ(z) is Φ(−z).
 * @param z any number, ±∞ included
 * @throws {DomainError} if z is NaN
 * @see W. J. Cody, Math. Comp. 23 (1969) 631–637 */
export const normalCdf = (z: number): number => {
  requireNumber(z, 'z');
  if (z === Infinity) return 1;
  if (z < -39) return 0; // below the smallest double
  return standardNormalCdf(z);
};

/** Density φ(z) of the standard normal distribution. */
export const normalDensity = (z: number): number => {
  requireNumber(z, 'z');
  const a = Math.abs(z);
  return a > 39 ? 0 : INV_SQRT_2PI * halfSquareExponential(a);
};

/** Φ⁻¹(½ + q) for |q| ≤ 0.425: the central branch of AS 241, a rational function and nothing else. */
const centralQuantile = (q: number): number => {
  const r = 0.180625 - q * q;
  return (
    (q *
      (((((((2509.0809287301226727 * r + 33430.575583588128105) * r + 67265.770927008700853) * r +
        45921.953931549871457) *
        r +
        13731.693765509461125) *
        r +
        1971.5909503065514427) *
        r +
        133.14166789178437745) *
        r +
        3.387132872796366608)) /
    (((((((5226.495278852545925 * r + 28729.085735721942674) * r + 39307.89580009271061) * r + 21213.794301586595867) *
      r +
      5394.1960214247511077) *
      r +
      687.1870074920579083) *
      r +
      42.313330701600911252) *
      r +
      1)
  );
};

/** −Φ⁻¹(p) for 0 < p < 0.075: the tail branches of AS 241. */
const tailQuantile = (p: number): number => {
  let r = Math.sqrt(-Math.log(p));
  if (r <= 5) {
    r -= 1.6;
    return (
      (((((((7.7454501427834140764e-4 * r + 0.0227238449892691845833) * r + 0.24178072517745061177) * r +
        1.27045825245236838258) *
        r +
        3.64784832476320460504) *
        r +
        5.7694972214606914055) *
        r +
        4.6303378461565452959) *
        r +
        1.42343711074968357734) /
      (((((((1.05075007164441684324e-9 * r + 5.475938084995344946e-4) * r + 0.0151986665636164571966) * r +
        0.14810397642748007459) *
        r +
        0.68976733498510000455) *
        r +
        1.6763848301838038494) *
        r +
        2.05319162663775882187) *
        r +
        1)
    );
  }
  r -= 5;
  return (
    (((((((2.01033439929228813265e-7 * r + 2.71155556874348757815e-5) * r + 0.0012426609473880784386) * r +
      0.026532189526576123093) *
      r +
      0.29656057182850489123) *
      r +
      1.7848265399172913358) *
      r +
      5.4637849111641143699) *
      r +
      6.6579046435011037772) /
    (((((((2.04426310338993978564e-15 * r + 1.4215117583164458887e-7) * r + 1.8463183175100546818e-5) * r +
      7.868691311456132591e-4) *
      r +
      0.0148753612908506148525) *
      r +
      0.13692988092273580531) *
      r +
      0.59983220655588793769) *
      r +
      1)
  );
};

/** Φ⁻¹(p) with no check, for the inner loop of the sampler. */
export const standardNormalQuantile = (p: number): number => {
  const q = p - 0.5;
  if (q <= 0.425 && q >= -0.425) return centralQuantile(q);
  return q < 0 ? -tailQuantile(p) : tailQuantile(1 - p);
};

/** Quantile Φ⁻¹(p) of the standard normal distribution, to 2e-15 relative in both tails (p from 1e-307).
 *  For an upper-tail probability q too small to be written as 1 − q use −normalQuantile(q).
 * @param p probability, 0 < p < 1
 * @throws {DomainError} if p is not between 0 and 1
 * @see M. J. Wichura, Algorithm AS 241 (PPND16), Appl. Statist. 37 (1988) 477–484 */
export const normalQuantile = (p: number): number => {
  requireProbability(p);
  return standardNormalQuantile(p);
};
