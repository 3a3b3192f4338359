import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../constants/defining-constants.js';
import type { GeocentricPosition } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';

/** Sagnac delay of a signal along a polyline of Earth-fixed points, s: 2·ω·A/c², A the area swept by the line from the Earth's
 *  axis, projected on the equator, positive eastwards (Petit & Wolf 1994, A&A 286:971; Ashby 2003, Living Rev. Relativity 6:1).
 *  So much later than over a resting Earth does a signal arrive that travels east; earlier if it travels west. It does not
 *  depend on the medium: a fibre's refractive index has no part in it. Exact for straight legs.
 * @param points Earth-fixed, m; at least two for a delay, else 0 */
export function sagnacDelayS(points: readonly GeocentricPosition[]): number {
  let twiceArea = 0;
  for (let i = 1; i < points.length; i++) {
    const a = points[i - 1]!;
    const b = points[i]!;
    twiceArea += a.xM * b.yM - a.yM * b.xM;
  }
  return (GRS80.omega * twiceArea) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
}
