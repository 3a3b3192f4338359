import type { Radians } from '../quantity/radians.js';
import { QuantityRangeError } from './range-error.js';

/** Size and shape of an ellipsoid of revolution: semi-major axis a in m, first eccentricity squared e². */
export interface EllipsoidShape {
  readonly a: number;
  readonly e2: number;
}

/** Earth-centred, Earth-fixed rectangular coordinates, m: z to the north pole, x to latitude 0, longitude 0. */
export interface GeocentricPosition {
  readonly xM: number;
  readonly yM: number;
  readonly zM: number;
}

export interface EllipsoidalPosition {
  /** geodetic latitude φ, north positive */
  readonly latitudeRad: Radians;
  /** longitude λ, east positive */
  readonly longitudeRad: Radians;
  /** ellipsoidal height h, m */
  readonly heightM: number;
}

/** Unit vectors east, north and up (along the ellipsoidal normal) at a place, in geocentric axes. */
export interface LocalAxes {
  readonly east: readonly [number, number, number];
  readonly north: readonly [number, number, number];
  readonly up: readonly [number, number, number];
}

/** Nothing a clock stands on or a satellite that carries its signal flies at is outside this range of distances from the
 *  Earth's centre; and the inverse below is good to a nanometre inside it. */
const MIN_RADIUS_M = 6_200_000;
const MAX_RADIUS_M = 500_000_000;

/** Geodetic to geocentric. Exact. Hofmann-Wellenhof & Moritz, Physical Geodesy (2006), eq. (5-27). */
export function geodeticToGeocentric(ellipsoid: EllipsoidShape, position: EllipsoidalPosition): GeocentricPosition {
  const { latitudeRad, longitudeRad, heightM } = position;
  if (!(Math.abs(latitudeRad) <= Math.PI / 2))
    throw new QuantityRangeError('latitudeRad', latitudeRad, '−π/2 … π/2; given in degrees? Use degToRad()');
  if (!Number.isFinite(longitudeRad)) throw new QuantityRangeError('longitudeRad', longitudeRad, 'a finite angle');
  if (!Number.isFinite(heightM)) throw new QuantityRangeError('heightM', heightM, 'a finite height in m');
  const sinPhi = Math.sin(latitudeRad);
  const primeVertical = ellipsoid.a / Math.sqrt(1 - ellipsoid.e2 * sinPhi * sinPhi);
  const fromAxis = (primeVertical + heightM) * Math.cos(latitudeRad);
  return {
    xM: fromAxis * Math.cos(longitudeRad),
    yM: fromAxis * Math.sin(longitudeRad),
    zM: (primeVertical * (1 - ellipsoid.e2) + heightM) * sinPhi,
  };
}

/** Geocentric to geodetic by Bowring's iteration on the reduced latitude (Bowring 1976, Survey Review 23:323), poles included.
 *  The height is formed as p·cos φ + z·sin φ − a·√(1 − e²·sin²φ), which is stationary in φ, so it keeps its digits.
 * @returns φ, λ to 1e-15 rad and h to 2e-9 m, from 150 km below the surface to beyond the Moon
 * @throws {QuantityRangeError} nearer to the centre than 6 200 km, farther than 500 000 km, or not finite */
export function geocentricToGeodetic(ellipsoid: EllipsoidShape, position: GeocentricPosition): EllipsoidalPosition {
  const { xM, yM, zM } = position;
  const radius = Math.hypot(xM, yM, zM);
  if (!(radius >= MIN_RADIUS_M && radius <= MAX_RADIUS_M))
    throw new QuantityRangeError('distance from the centre of the Earth', radius, '6 200 km … 500 000 km, in m');
  const { a, e2 } = ellipsoid;
  const b = a * Math.sqrt(1 - e2);
  const fromAxis = Math.hypot(xM, yM);
  let reduced = Math.atan2(a * zM, b * fromAxis);
  let latitude = 0;
  for (let i = 0; i < 10; i++) {
    const previous = latitude;
    const s = Math.sin(reduced);
    const c = Math.cos(reduced);
    latitude = Math.atan2(zM + ((e2 * a * a) / b) * s * s * s, fromAxis - e2 * a * c * c * c);
    reduced = Math.atan2(b * Math.sin(latitude), a * Math.cos(latitude));
    if (i > 0 && Math.abs(latitude - previous) < 1e-16) break;
  }
  const sinPhi = Math.sin(latitude);
  return {
    latitudeRad: latitude as Radians,
    longitudeRad: Math.atan2(yM, xM) as Radians,
    heightM: fromAxis * Math.cos(latitude) + zM * sinPhi - a * Math.sqrt(1 - e2 * sinPhi * sinPhi),
  };
}

/** East, north and up at a geodetic latitude and longitude. */
export function localAxes(latitudeRad: Radians, longitudeRad: Radians): LocalAxes {
  const sp = Math.sin(latitudeRad);
  const cp = Math.cos(latitudeRad);
  const sl = Math.sin(longitudeRad);
  const cl = Math.cos(longitudeRad);
  return { east: [-sl, cl, 0], north: [-sp * cl, -sp * sl, cp], up: [cp * cl, cp * sl, sp] };
}
