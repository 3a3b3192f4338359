import type { Radians } from '../quantity/radians.js';
import { GRS80 } from './level-ellipsoid.js';
import { checkLatitude, normalGravity } from './normal-field.js';
import type { TideSystem } from './tide-system.js';

/** Degree-2 Love numbers by which the permanent tide deforms the Earth and its potential. */
export interface LoveNumbers {
  readonly h2: number;
  readonly k2: number;
}

/** IERS Conventions 2010 (TN 36): h₂ of section 7.1.1, nominal k₂₀ of section 6.2. */
export const LOVE_NUMBERS: LoveNumbers = { h2: 0.6078, k2: 0.3019 };

/** Time-independent part W_T of the tide-generating potential on the GRS80 ellipsoid, m²/s².
 *  W_T = 0.9722 − 2.8841·sin²φ − 0.0195·sin⁴φ, φ geodetic: the form A·(r/r₀)²·(sin²ψ − 1/3), A = −2.9166 m²/s²
 *  (Mäkinen 2021, J. Geodesy 95:106, eq. 18) on the ellipsoid. At height it grows by 2h/r: 4e-3 m²/s² at 5 km at a pole. */
export function permanentTidePotentialM2s2(latitudeRad: Radians): number {
  checkLatitude(latitudeRad);
  const s2 = Math.sin(latitudeRad) ** 2;
  return 0.9722 - 2.8841 * s2 - 0.0195 * s2 * s2;
}

/** Permanent displacement of the crust from conventional tide free to mean (= zero), upwards, m.
 *  IERS Conventions 2010 eq. (7.14a): (−0.1206 + 0.0001·P₂)·P₂ with P₂ of the GEOCENTRIC latitude, made with h₂ = 0.6078;
 *  another h₂ scales it. */
export function permanentCrustDisplacementM(latitudeRad: Radians, love: LoveNumbers = LOVE_NUMBERS): number {
  checkLatitude(latitudeRad);
  // tan φ′ = (1 − e²)·tan φ on the ellipsoid, written with sines so that the pole needs no branch
  const s = (1 - GRS80.e2) * Math.sin(latitudeRad);
  const c = Math.cos(latitudeRad);
  const sin2Geocentric = (s * s) / (s * s + c * c);
  const p2 = (3 * sin2Geocentric - 1) / 2;
  return (love.h2 / 0.6078) * (-0.1206 + 0.0001 * p2) * p2;
}

/** What a permanent-tide conversion is applied to. `fixed-point-potential`: W at a point given in space (a gravity model's
 *  synthesis), in contrast to `potential`, W of a marker on the crust, which moves with the crust between the systems. */
export type TideQuantity =
  | 'ellipsoidal-height'
  | 'geoid-height'
  | 'geopotential-number'
  | 'physical-height'
  | 'potential'
  | 'fixed-point-potential';

/** Value in `system` minus value in the tide-free system, in the quantity's SI unit.
 *  Zero = the crust keeps its permanent deformation, the external permanent potential is left out; mean = both kept.
 *  - ellipsoidal height h: zero = mean = free + crust displacement
 *  - geoid height N, height anomaly ζ: zero = free + k₂·w, mean = zero + w, w = W_T/γ₀
 *  - geopotential number C of a marker: zero = free + (h₂ − k₂)·W_T, mean = zero − W_T; physical heights alike, with w
 *  - potential W of a marker: opposite to C
 *  Ekman (1989), Bull. Géod. 63:281, eqs. 9–11; Mäkinen (2021). */
export function tideShiftFromFree(
  quantity: TideQuantity,
  system: TideSystem,
  latitudeRad: Radians,
  love: LoveNumbers = LOVE_NUMBERS,
): number {
  if (system === 'free') return 0;
  const wt = permanentTidePotentialM2s2(latitudeRad);
  const mean = system === 'mean' ? 1 : 0;
  switch (quantity) {
    case 'ellipsoidal-height':
      return permanentCrustDisplacementM(latitudeRad, love);
    case 'geoid-height':
      return ((love.k2 + mean) * wt) / normalGravity(GRS80, latitudeRad, 0);
    case 'geopotential-number':
      return (love.h2 - love.k2 - mean) * wt;
    case 'physical-height':
      return ((love.h2 - love.k2 - mean) * wt) / normalGravity(GRS80, latitudeRad, 0);
    case 'potential':
      return -(love.h2 - love.k2 - mean) * wt;
    case 'fixed-point-potential':
      return (love.k2 + mean) * wt;
  }
}

/** What to add to a value given in `from` to have it in `to`. Antisymmetric: from → to = −(to → from). */
export const tideConversion = (
  quantity: TideQuantity,
  from: TideSystem,
  to: TideSystem,
  latitudeRad: Radians,
  love: LoveNumbers = LOVE_NUMBERS,
): number =>
  from === to
    ? 0
    : tideShiftFromFree(quantity, to, latitudeRad, love) - tideShiftFromFree(quantity, from, latitudeRad, love);
