import type { Radians } from '../quantity/radians.js';
import { ellipsoidalQ, ellipsoidalQPrime, type LevelEllipsoid } from './level-ellipsoid.js';
import { QuantityRangeError } from './range-error.js';

/** Normal potential and gravity at one point. */
export interface NormalFieldPoint {
  /** normal potential U (gravitational + centrifugal), m²/s² */
  readonly potentialM2s2: number;
  /** magnitude of the normal gravity vector γ, m/s² */
  readonly gravityMs2: number;
  /** ∂U/∂h along the ellipsoidal normal, m/s²; negative. Differs from −γ by the angle of the plumb line, 1e-11 relative at 5 km */
  readonly potentialPerHeightMs2: number;
}

/** The height range for which the closed form is checked here against an independent solution. */
export const NORMAL_FIELD_MIN_HEIGHT_M = -12_000;
export const NORMAL_FIELD_MAX_HEIGHT_M = 1_000_000;

/** Normal field of a level ellipsoid in closed form, ellipsoidal coordinates u, β.
 *  Physical Geodesy (2006) eqs. (2-126) U, (2-131) and (2-132) γ; no series in height, valid at the poles.
 * @param latitudeRad geodetic latitude φ, −π/2…π/2
 * @param heightM ellipsoidal height h, −12 km … 1000 km
 * @returns U to about 1e-8 m²/s² (rounding of a number of 6e7), γ to 1e-14 m/s²
 * @throws {QuantityRangeError} outside those ranges */
export function normalField(ellipsoid: LevelEllipsoid, latitudeRad: Radians, heightM: number): NormalFieldPoint {
  checkLatitude(latitudeRad);
  if (!(heightM >= NORMAL_FIELD_MIN_HEIGHT_M && heightM <= NORMAL_FIELD_MAX_HEIGHT_M))
    throw new QuantityRangeError('heightM', heightM, `${NORMAL_FIELD_MIN_HEIGHT_M} m … ${NORMAL_FIELD_MAX_HEIGHT_M} m`);
  const { a, GM, omega, e2, E, q0 } = ellipsoid;
  const sinPhi = Math.sin(latitudeRad);
  const cosPhi = Math.cos(latitudeRad);
  const primeVertical = a / Math.sqrt(1 - e2 * sinPhi * sinPhi);
  const x = (primeVertical + heightM) * cosPhi;
  const z = (primeVertical * (1 - e2) + heightM) * sinPhi;

  const d = x * x + z * z - E * E;
  const u = Math.sqrt(0.5 * d * (1 + Math.sqrt(1 + (4 * E * E * z * z) / (d * d))));
  const v2 = u * u + E * E;
  const v = Math.sqrt(v2);
  const sinBeta = z / u;
  const cosBeta = x / v;
  const q = ellipsoidalQ(E / u) / q0;
  const qPrime = ellipsoidalQPrime(E / u) / q0;
  const omega2 = omega * omega;
  const omega2a2 = omega2 * a * a;

  const potentialM2s2 =
    (GM / E) * Math.atan(E / u) +
    0.5 * omega2a2 * q * (sinBeta * sinBeta - 1 / 3) +
    0.5 * omega2 * v2 * cosBeta * cosBeta;

  const w = Math.sqrt((u * u + E * E * sinBeta * sinBeta) / v2);
  const perU =
    -(GM / v2 + (omega2a2 * E * qPrime * (0.5 * sinBeta * sinBeta - 1 / 6)) / v2 - omega2 * u * cosBeta * cosBeta) / w;
  const perBeta = (sinBeta * cosBeta * (omega2a2 * q - omega2 * v2)) / (w * v);
  // unit vectors of u and β in the meridian plane, then the component along the ellipsoidal normal (cos φ, sin φ)
  const alongX = (perU * u * cosBeta) / (v * w) - (perBeta * sinBeta) / w;
  const alongZ = (perU * sinBeta) / w + (perBeta * u * cosBeta) / (v * w);
  return {
    potentialM2s2,
    gravityMs2: Math.hypot(perU, perBeta),
    potentialPerHeightMs2: alongX * cosPhi + alongZ * sinPhi,
  };
}

/** Normal gravity γ(φ, h), m/s². See {@link normalField}. */
export const normalGravity = (ellipsoid: LevelEllipsoid, latitudeRad: Radians, heightM: number): number =>
  normalField(ellipsoid, latitudeRad, heightM).gravityMs2;

/** U₀ − U(φ, H): the geopotential number of a point of normal height H, m²/s², and its derivative to H, m/s².
 *  Positive upwards. The normal plumb line is taken as the ellipsoidal normal: 1e-8 m at 5 km. */
export function geopotentialOfNormalHeight(
  ellipsoid: LevelEllipsoid,
  latitudeRad: Radians,
  normalHeightM: number,
): { readonly geopotentialM2s2: number; readonly perHeightMs2: number } {
  const p = normalField(ellipsoid, latitudeRad, normalHeightM);
  return { geopotentialM2s2: ellipsoid.U0 - p.potentialM2s2, perHeightMs2: -p.potentialPerHeightMs2 };
}

/** Normal height H* with U₀ − U(φ, H*) = C: the inverse of {@link geopotentialOfNormalHeight}, by Newton's method.
 * @param geopotentialM2s2 C = W₀ − W, m²/s²; the height must come out within the range of {@link normalField}
 * @returns H* to 1e-9 m, and dH* / dC = 1/(−∂U/∂h), s²/m */
export function normalHeightOfGeopotential(
  ellipsoid: LevelEllipsoid,
  latitudeRad: Radians,
  geopotentialM2s2: number,
): { readonly normalHeightM: number; readonly perGeopotentialS2PerM: number } {
  if (!Number.isFinite(geopotentialM2s2))
    throw new QuantityRangeError('geopotentialM2s2', geopotentialM2s2, 'a finite number of m²/s²');
  let height = geopotentialM2s2 / normalGravity(ellipsoid, latitudeRad, 0);
  for (let i = 0; i < 12; i++) {
    const c = geopotentialOfNormalHeight(ellipsoid, latitudeRad, height);
    const step = (geopotentialM2s2 - c.geopotentialM2s2) / c.perHeightMs2;
    height += step;
    // below 2e-9 m the step is the rounding of U₀ − U
    if (Math.abs(step) < 5e-9)
      return {
        normalHeightM: height,
        perGeopotentialS2PerM: 1 / geopotentialOfNormalHeight(ellipsoid, latitudeRad, height).perHeightMs2,
      };
  }
  throw new QuantityRangeError('geopotentialM2s2', geopotentialM2s2, 'a geopotential number of a point near the Earth');
}

export function checkLatitude(latitudeRad: Radians): void {
  if (!(Math.abs(latitudeRad) <= Math.PI / 2))
    throw new QuantityRangeError('latitudeRad', latitudeRad, '−π/2 … π/2; given in degrees? Use degToRad()');
}
