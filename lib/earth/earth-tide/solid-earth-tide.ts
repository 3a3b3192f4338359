import type { Radians } from '../../quantity/radians.js';
import { geodeticToGeocentric } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { LOVE_NUMBERS, type LoveNumbers, permanentTidePotentialM2s2 } from '../permanent-tide.js';
import type { SunAndMoon } from './sun-and-moon.js';
import { tideGeneratingPotential } from './tide-generating-potential.js';

/** Degree-3 Love numbers: IERS Conventions 2010 (TN 36), section 7.1.1 (h₃ = 0.292) and section 6.2, table 6.3 (k₃₀ = 0.093). */
export const DEGREE_3_LOVE_NUMBERS = { h3: 0.292, k3: 0.093 } as const;

/** A site as the tide needs it: fixed to the crust at its ellipsoidal height. */
export interface TideSite {
  /** geocentric, Earth-fixed, m */
  readonly position: readonly [number, number, number];
  /** permanent part W_T of the tide-generating potential, m²/s² */
  readonly permanentM2s2: number;
}

export function tideSite(latitudeRad: Radians, longitudeRad: Radians, heightM: number): TideSite {
  const { xM, yM, zM } = geodeticToGeocentric(GRS80, { latitudeRad, longitudeRad, heightM });
  return { position: [xM, yM, zM], permanentM2s2: permanentTidePotentialM2s2(latitudeRad) };
}

/** Potential that a clock fixed to the crust feels by the solid-Earth tide beyond the permanent one, m²/s²:
 *  δW = Σ_n (1 + k_n − h_n)·V_n(t) − (1 + k₂ − h₂)·W_T. The body's pull is V, the bulge's attraction adds k·V, and the crust
 *  rises by h·V/g with the clock on it, which takes h·V away. A positive δW slows the clock. Over the years its mean is zero,
 *  so it adds to a potential in mean tide.
 *
 *  How good the model is: about 1e-18 in frequency, because it has one real Love number for all degree-2 tides. Left out are
 *  the resonance of the liquid core in the diurnal tides (0.06·|sin 2φ| m²/s², 6.5e-19), inelasticity and the phase lag of
 *  the bulge (1e-19), the change of h₂ with latitude (3e-20), and all that is no solid-Earth tide: ocean loading
 *  (1e-18 … 5e-18 at a coast), pole tide (1e-18), air and water (1e-18); `omitted-tide.ts` adds them up. The arithmetic is
 *  exact against the model to 1e-19, the test of the Sun's and Moon's positions. */
export function solidEarthTideM2s2(site: TideSite, bodies: SunAndMoon, love: LoveNumbers = LOVE_NUMBERS): number {
  const v = tideGeneratingPotential(site.position, bodies);
  const { h3, k3 } = DEGREE_3_LOVE_NUMBERS;
  return (1 + love.k2 - love.h2) * (v.degree2M2s2 - site.permanentM2s2) + (1 + k3 - h3) * v.degree3M2s2;
}
