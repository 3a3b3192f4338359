import geographiclib from 'geographiclib-geodesic';
import { degToRad, type Radians, radToDeg } from '../quantity/radians.js';
import type { GeodeticPosition } from './geodesic-distance.js';
import { GRS80 } from './level-ellipsoid.js';

const { Geodesic } = geographiclib;
const grs80 = new Geodesic.Geodesic(GRS80.a, GRS80.f);

const position = (latitudeDeg: number, longitudeDeg: number): GeodeticPosition => ({
  latitudeRad: degToRad(latitudeDeg),
  longitudeRad: degToRad(longitudeDeg),
});

/** The geodesic from p to q on the GRS80 ellipsoid, in equal steps, both ends included (Karney 2013, J. Geodesy 87:43).
 *  Longitudes run on without a jump at 180°, from that of p: a line across the date line leaves −π…π.
 * @param segments at least 1 */
export function geodesicLine(
  p: GeodeticPosition,
  q: GeodeticPosition,
  segments: number,
): { readonly lengthM: number; readonly points: readonly GeodeticPosition[] } {
  const line = grs80.InverseLine(
    radToDeg(p.latitudeRad),
    radToDeg(p.longitudeRad),
    radToDeg(q.latitudeRad),
    radToDeg(q.longitudeRad),
    Geodesic.STANDARD | Geodesic.DISTANCE_IN,
  );
  const points = Array.from({ length: segments + 1 }, (_, i) => {
    const at = line.Position((line.s13 * i) / segments, Geodesic.STANDARD | Geodesic.LONG_UNROLL);
    return position(at.lat2 as number, at.lon2 as number);
  });
  return { lengthM: line.s13, points };
}

/** The points at a geodesic distance from a centre, as a closed ring on GRS80; longitudes run on without a jump.
 * @param radiusM shorter than a quarter of the meridian round the Earth, 10 000 km
 * @param segments at least 3 */
export function geodesicCircle(
  centre: GeodeticPosition,
  radiusM: number,
  segments: number,
): readonly GeodeticPosition[] {
  return Array.from({ length: segments + 1 }, (_, i) =>
    pointAtDistance(centre, radiusM, ((2 * Math.PI * i) / segments) as Radians),
  );
}

/** Where one comes out after a distance in a direction, azimuth clockwise from north. */
export function pointAtDistance(from: GeodeticPosition, distanceM: number, azimuthRad: Radians): GeodeticPosition {
  const at = grs80.Direct(
    radToDeg(from.latitudeRad),
    radToDeg(from.longitudeRad),
    radToDeg(azimuthRad),
    distanceM,
    Geodesic.STANDARD | Geodesic.LONG_UNROLL,
  );
  return position(at.lat2 as number, at.lon2 as number);
}
