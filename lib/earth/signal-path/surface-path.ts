import geographiclib from 'geographiclib-geodesic';
import { degToRad, type Radians, radToDeg } from '../../quantity/radians.js';
import { GRS80 } from '../level-ellipsoid.js';

const grs80 = new geographiclib.Geodesic.Geodesic(GRS80.a, GRS80.f);

/** A point of a path: geodetic position and height. */
export interface PathPoint {
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
  /** m, above sea level or the ellipsoid: what a path is used for does not need to tell them apart */
  readonly heightM: number;
}

/** A leg between two points along the geodesic of the ellipsoid, heights changing evenly: its points at most `spacingM` apart,
 *  both ends among them, and its length at its height, m. The chords between points 10 km apart cut 4e-7 of an area off. */
export function alongGeodesic(
  from: PathPoint,
  to: PathPoint,
  spacingM = 10_000,
): { readonly points: readonly PathPoint[]; readonly lengthM: number } {
  const line = grs80.InverseLine(
    radToDeg(from.latitudeRad),
    radToDeg(from.longitudeRad),
    radToDeg(to.latitudeRad),
    radToDeg(to.longitudeRad),
    geographiclib.Geodesic.STANDARD | geographiclib.Geodesic.DISTANCE_IN,
  );
  const length = line.s13;
  const pieces = Math.max(1, Math.ceil(length / spacingM));
  const points: PathPoint[] = [from];
  for (let i = 1; i < pieces; i++) {
    const p = line.Position((length * i) / pieces);
    points.push({
      latitudeRad: degToRad(p.lat2!),
      longitudeRad: degToRad(p.lon2!),
      heightM: from.heightM + ((to.heightM - from.heightM) * i) / pieces,
    });
  }
  points.push(to);
  // at height the arc is longer by h over the Earth's radius
  const atHeight = length * (1 + (from.heightM + to.heightM) / 2 / GRS80.a);
  return { points, lengthM: Math.hypot(atHeight, to.heightM - from.heightM) };
}
