import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../constants/defining-constants.js';
import { GRS80 } from '../level-ellipsoid.js';
import { QuantityRangeError } from '../range-error.js';

/** Fractional frequency offset of a clock in a circular orbit against one resting at a distance from the centre, by its causes.
 *  The Earth is a point mass and does not turn here: an estimate, good to 1e-12. */
export interface OrbitingClockOffset {
  /** GM/c²·(1/r_ground − 1/r_orbit): positive, the clock is higher */
  readonly potential: number;
  /** −v²/(2c²): negative */
  readonly velocity: number;
}

/** @param orbitRadiusM distance of the orbit from the Earth's centre, m
 *  @param groundRadiusM distance of the resting clock from the centre, m
 *  @param speedMPerS speed of the orbiting clock; that of the circular orbit, √(GM/r), if it is left out
 *  @throws {QuantityRangeError} distances that are not above 6 000 km */
export function orbitingClockOffset(
  orbitRadiusM: number,
  groundRadiusM: number = GRS80.a,
  speedMPerS: number = Math.sqrt(GRS80.GM / orbitRadiusM),
): OrbitingClockOffset {
  for (const [name, r] of [
    ['orbitRadiusM', orbitRadiusM],
    ['groundRadiusM', groundRadiusM],
  ] as const)
    if (!(r > 6e6 && r < 1e9))
      throw new QuantityRangeError(name, r, 'a distance from the Earth’s centre, 6e6 m … 1e9 m');
  const c2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
  return {
    potential: (GRS80.GM / c2) * (1 / groundRadiusM - 1 / orbitRadiusM),
    velocity: -(speedMPerS * speedMPerS) / (2 * c2),
  };
}
