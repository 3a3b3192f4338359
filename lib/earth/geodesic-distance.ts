import geographiclib from 'geographiclib-geodesic';
import { type Radians, radToDeg } from '../quantity/radians.js';
import { GRS80 } from './level-ellipsoid.js';

const grs80 = new geographiclib.Geodesic.Geodesic(GRS80.a, GRS80.f);

export interface GeodeticPosition {
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
}

/** Length of the geodesic between two points on the GRS80 ellipsoid, m (Karney 2013, J. Geodesy 87:43; exact to nanometres). */
export function geodesicDistanceM(p: GeodeticPosition, q: GeodeticPosition): number {
  const line = grs80.Inverse(
    radToDeg(p.latitudeRad),
    radToDeg(p.longitudeRad),
    radToDeg(q.latitudeRad),
    radToDeg(q.longitudeRad),
    geographiclib.Geodesic.DISTANCE,
  );
  return line.s12 as number;
}

/** A lower bound of {@link geodesicDistanceM} in a few operations: the chord between the points on the ellipsoid. */
export function chordDistanceM(p: GeodeticPosition, q: GeodeticPosition): number {
  const [x1, y1, z1] = surfacePoint(p);
  const [x2, y2, z2] = surfacePoint(q);
  return Math.hypot(x1 - x2, y1 - y2, z1 - z2);
}

function surfacePoint({ latitudeRad, longitudeRad }: GeodeticPosition): [number, number, number] {
  const s = Math.sin(latitudeRad);
  const c = Math.cos(latitudeRad);
  const n = GRS80.a / Math.sqrt(1 - GRS80.e2 * s * s);
  return [n * c * Math.cos(longitudeRad), n * c * Math.sin(longitudeRad), n * (1 - GRS80.e2) * s];
}
