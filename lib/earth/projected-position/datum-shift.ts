import type { Radians } from '../../quantity/radians.js';
import { type EllipsoidShape, geocentricToGeodetic, geodeticToGeocentric } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';

export interface LatitudeLongitude {
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
}

const ARCSEC = Math.PI / 648_000;

/** Latitude and longitude on GRS80 in ETRS89 or WGS 84 from those on a national datum: to geocentric on its own ellipsoid with
 *  height 0, seven parameters X₂ = T + (1 + s)·(X + R × X) (EPSG method 1033, "position vector"), back on GRS80. The height in
 *  it is of no use: heights do not come this way. At 1000 m instead of 0 the place moves by a centimetre.
 * @param seven T in m, R in arc-seconds, s in 1e-6: the order of PROJ's +towgs84 */
export function shiftDatum(
  from: LatitudeLongitude,
  ellipsoid: EllipsoidShape,
  seven: readonly number[],
): LatitudeLongitude {
  const [tx, ty, tz, rx, ry, rz, ppm] = seven as [number, number, number, number, number, number, number];
  const { xM, yM, zM } = geodeticToGeocentric(ellipsoid, { ...from, heightM: 0 });
  const m = 1 + ppm * 1e-6;
  const [r1, r2, r3] = [rx * ARCSEC, ry * ARCSEC, rz * ARCSEC];
  const { latitudeRad, longitudeRad } = geocentricToGeodetic(GRS80, {
    xM: tx + m * (xM - r3 * yM + r2 * zM),
    yM: ty + m * (r3 * xM + yM - r1 * zM),
    zM: tz + m * (-r2 * xM + r1 * yM + zM),
  });
  return { latitudeRad, longitudeRad };
}
