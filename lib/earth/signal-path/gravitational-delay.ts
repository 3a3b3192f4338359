import { SPEED_OF_LIGHT } from '../../constants/defining-constants.js';
import type { GeocentricPosition } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { QuantityRangeError } from '../range-error.js';

/** Delay of a signal by the Earth's gravity on a straight leg, s: 2·GM/c³·ln((r₁ + r₂ + ρ)/(r₁ + r₂ − ρ)), r₁ and r₂ the distances
 *  of its ends from the centre, ρ its length (Shapiro delay; IERS Conventions 2010 (TN 36), eq. 11.17). Against the same leg in
 *  Terrestrial Time the speed of light's own change with potential, 7e-10 of the travel time, is no part of it.
 * @throws {QuantityRangeError} for a leg through the Earth's centre region, where the formula has no meaning */
export function gravitationalDelayS(from: GeocentricPosition, to: GeocentricPosition): number {
  const r1 = Math.hypot(from.xM, from.yM, from.zM);
  const r2 = Math.hypot(to.xM, to.yM, to.zM);
  const rho = Math.hypot(to.xM - from.xM, to.yM - from.yM, to.zM - from.zM);
  if (!(r1 + r2 - rho > 1e6))
    throw new QuantityRangeError('r1 + r2 − ρ', r1 + r2 - rho, 'a leg in sight of both ends, more than 1e6 m');
  return ((2 * GRS80.GM) / SPEED_OF_LIGHT.value ** 3) * Math.log((r1 + r2 + rho) / (r1 + r2 - rho));
}
