import type { Radians } from '../quantity/radians.js';
import { GRS80 } from './level-ellipsoid.js';
import { normalGravity } from './normal-field.js';

/** How far a geopotential number from a normal-orthometric height may be off, m²/s².
 *
 *  A normal-orthometric height is levelling reduced with normal gravity alone: C_normal = ∫γ dH, divided by the mean normal gravity.
 *  Taken for a normal height it gives C_normal back, W ≈ W₀ − (U₀ − U(φ, H)); the measured gravity that is not in it leaves out
 *  ∫(g − γ) dH along the line (Featherstone & Kuhn 2006, J. Spatial Sci. 51:21; Filmer, Featherstone & Kuhn 2010, J. Geodesy
 *  84:501). The gravity anomaly on the way is not known here; that at the site, g − γ(φ, H), stands for all of it.
 * @param gravityMs2 measured gravity at the site; null: 50 mGal and 50 mGal for each km of height, as for a default g
 * @returns |g − γ|·|H|, ≥ 0: 1 m²/s² (1e-17) for 100 mGal at 1000 m */
export function normalOrthometricShortfallM2s2(
  latitudeRad: Radians,
  normalOrthometricHeightM: number,
  gravityMs2: number | null,
): number {
  const H = Math.abs(normalOrthometricHeightM);
  const anomaly =
    gravityMs2 === null
      ? 5e-4 + 5e-7 * H
      : Math.abs(gravityMs2 - normalGravity(GRS80, latitudeRad, normalOrthometricHeightM));
  return anomaly * H;
}
