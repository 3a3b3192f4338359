import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../constants/defining-constants.js';
import { geodeticToGeocentric } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../normal-field.js';
import { QuantityRangeError } from '../range-error.js';
import { sagnacDelayS } from './sagnac.js';
import { alongGeodesic, type PathPoint } from './surface-path.js';

/** A way point of a moved clock. */
export interface WayPoint extends PathPoint {
  /** UTC, milliseconds since 1970 */
  readonly timeMs: number;
}

/** Time that a moved clock gains (positive) on one that stayed at its starting point, s, by its causes. */
export interface MovedClockTime {
  /** from the first way point to the last, s */
  readonly durationS: number;
  /** ∫ΔW/c² dt: the clock gains where it is higher */
  readonly potentialS: number;
  /** −∫v²/(2c²) dt, v over the ground */
  readonly velocityS: number;
  /** −2ωA/c²: the clock loses on its way east. It belongs to coordinate time over the rotating Earth; a round trip that
   *  encloses no area has none */
  readonly rotationS: number;
  readonly totalS: number;
}

/** Time accumulated by a clock along a route: ∫(ΔW/c² − v²/2c²) dt and the Sagnac term (Ashby 2003, Living Rev. Relativity 6:1;
 *  Hafele & Keating 1972, Science 177:166). Between way points the clock moves along the geodesic with even speed and climb; at
 *  rest where two follow in one place. ΔW comes from the normal field at the height above sea level: its error against the real
 *  potential, that of the heights, is 1e-16 of the time for each metre.
 * @param route in order of time, at least two
 * @throws {QuantityRangeError} times that do not rise, or a speed beyond 12 km/s */
export function movedClockTime(route: readonly WayPoint[]): MovedClockTime {
  const first = route[0];
  const last = route.at(-1);
  if (first === undefined || last === undefined || route.length < 2)
    throw new QuantityRangeError('way points', route.length, 'two or more');
  const geopotential = (p: PathPoint) => geopotentialOfNormalHeight(GRS80, p.latitudeRad, p.heightM).geopotentialM2s2;
  const start = geopotential(first);
  let potential = 0;
  let velocity = 0;
  let rotation = 0;
  for (let i = 1; i < route.length; i++) {
    const from = route[i - 1]!;
    const to = route[i]!;
    const seconds = (to.timeMs - from.timeMs) / 1000;
    if (!(seconds > 0))
      throw new QuantityRangeError('time between way points', seconds, 'more than 0 s: times must rise');
    const { points, lengthM } = alongGeodesic(from, to);
    const speed = lengthM / seconds;
    if (!(speed < 12_000)) throw new QuantityRangeError('speed between way points, m/s', speed, 'less than 12 km/s');
    velocity -= 0.5 * speed * speed * seconds;
    // trapezoids over pieces of 10 km: C is all but straight in them
    const piece = seconds / (points.length - 1);
    for (let j = 1; j < points.length; j++)
      potential += piece * ((geopotential(points[j - 1]!) + geopotential(points[j]!)) / 2 - start);
    rotation -= sagnacDelayS(points.map((p) => geodeticToGeocentric(GRS80, p)));
  }
  const c2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
  return {
    durationS: (last.timeMs - first.timeMs) / 1000,
    potentialS: potential / c2,
    velocityS: velocity / c2,
    rotationS: rotation,
    totalS: potential / c2 + velocity / c2 + rotation,
  };
}
