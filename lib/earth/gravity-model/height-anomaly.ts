import type { Radians } from '../../quantity/radians.js';
import { GRS80 } from '../level-ellipsoid.js';
import { normalHeightOfGeopotential } from '../normal-field.js';

/** Height anomaly ζ = h − H*, with H* the normal height of the point: U₀ − U(φ, H*) = W₀ − W (Molodensky; Hofmann-Wellenhof & Moritz,
 *  Physical Geodesy 2006, section 8.3), GRS80 the normal field. No series and no first-order Bruns formula, so the zero-degree
 *  term, from GM and from W₀ − U₀, is in it whole.
 * @param heightM ellipsoidal height h; @param potentialM2s2 W there, same tide system
 * @param W0M2s2 potential of the zero level; that of the IHRS is 62 636 853.4, GRS80's own U₀ gives ζ without (W₀ − U₀)/γ
 * @returns ζ, m, and ∂ζ/∂W = 1/γ, s²/m */
export function heightAnomaly(
  latitudeRad: Radians,
  heightM: number,
  potentialM2s2: number,
  W0M2s2: number,
): { readonly heightAnomalyM: number; readonly perPotentialS2PerM: number } {
  const { normalHeightM, perGeopotentialS2PerM } = normalHeightOfGeopotential(
    GRS80,
    latitudeRad,
    W0M2s2 - potentialM2s2,
  );
  return { heightAnomalyM: heightM - normalHeightM, perPotentialS2PerM: perGeopotentialS2PerM };
}
