/** A level (equipotential) ellipsoid of revolution with its normal gravity field.
 *  Source of the formulas: Hofmann-Wellenhof & Moritz, Physical Geodesy (2006), sections 2.7–2.8;
 *  the ellipsoid from GM, a, J₂, ω: Moritz (2000), Geodetic Reference System 1980, J. Geodesy 74:128, eq. for e². */
export interface LevelEllipsoid {
  readonly name: string;
  /** semi-major axis, m */
  readonly a: number;
  /** semi-minor axis, m */
  readonly b: number;
  /** geocentric gravitational constant, m³/s² */
  readonly GM: number;
  /** angular velocity, rad/s */
  readonly omega: number;
  /** first eccentricity squared */
  readonly e2: number;
  /** flattening */
  readonly f: number;
  /** linear eccentricity, m */
  readonly E: number;
  /** q₀: the function q on the ellipsoid */
  readonly q0: number;
  /** normal potential on the ellipsoid U₀, m²/s² */
  readonly U0: number;
}

/** q of Physical Geodesy eq. (2-113) as a series in t = E/u: the closed form loses eleven digits to cancellation at t ≈ 0.08.
 *  q = 2·Σ_{k≥1} (−1)^{k+1}·k·t^{2k+1}/((2k+1)(2k+3)); the terms fall by t² ≈ 0.0067 each. */
export function ellipsoidalQ(t: number): number {
  const t2 = t * t;
  let power = t * t2;
  let sum = 0;
  for (let k = 1; k <= 12; k++) {
    sum += (k % 2 === 1 ? k : -k) * (power / ((2 * k + 1) * (2 * k + 3)));
    power *= t2;
  }
  return 2 * sum;
}

/** q′ of Physical Geodesy eq. (2-132) as a series: q′ = 6·Σ_{k≥1} (−1)^{k+1}·t^{2k}/((2k+1)(2k+3)). */
export function ellipsoidalQPrime(t: number): number {
  const t2 = t * t;
  let power = t2;
  let sum = 0;
  for (let k = 1; k <= 12; k++) {
    sum += (k % 2 === 1 ? power : -power) / ((2 * k + 1) * (2 * k + 3));
    power *= t2;
  }
  return 6 * sum;
}

function complete(name: string, a: number, GM: number, omega: number, e2: number): LevelEllipsoid {
  const b = a * Math.sqrt(1 - e2);
  const E = a * Math.sqrt(e2);
  const f = e2 / (1 + Math.sqrt(1 - e2));
  const U0 = (GM / E) * Math.atan(E / b) + (omega * omega * a * a) / 3;
  return { name, a, b, GM, omega, e2, f, E, q0: ellipsoidalQ(E / b), U0 };
}

/** From GM, a, J₂, ω: e² = 3J₂ + (4/15)(ω²a³/GM)·e³/(2q₀), iterated to the last digit. */
function fromDynamicFormFactor(name: string, a: number, GM: number, omega: number, J2: number): LevelEllipsoid {
  let e2 = 3 * J2;
  for (let i = 0; i < 20; i++) {
    const e = Math.sqrt(e2);
    const secondEccentricity = e / Math.sqrt(1 - e2);
    e2 = 3 * J2 + ((4 / 15) * (omega * omega * a * a * a) * e * e2) / (GM * 2 * ellipsoidalQ(secondEccentricity));
  }
  return complete(name, a, GM, omega, e2);
}

function fromFlattening(name: string, a: number, GM: number, omega: number, f: number): LevelEllipsoid {
  return complete(name, a, GM, omega, f * (2 - f));
}

/** Geodetic Reference System 1980: IUGG 1979 Resolution 7; Moritz (2000). */
export const GRS80: LevelEllipsoid = fromDynamicFormFactor('GRS80', 6378137, 3986005e8, 7292115e-11, 108263e-8);

/** World Geodetic System 1984: NIMA TR8350.2 (2000), tables 3.1 and 3.2. */
export const WGS84: LevelEllipsoid = fromFlattening('WGS84', 6378137, 3986004.418e8, 7292115e-11, 1 / 298.257223563);
