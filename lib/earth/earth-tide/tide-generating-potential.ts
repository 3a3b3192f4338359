import type { SunAndMoon } from './sun-and-moon.js';
import { GM_MOON, GM_SUN } from './tide-raising-bodies.js';

/** Tide-generating potential at a point by degree, m²/s², positive under and opposite the body. */
export interface TideGeneratingPotential {
  /** degree 2 of Moon and Sun */
  readonly degree2M2s2: number;
  /** degree 3 of the Moon */
  readonly degree3M2s2: number;
}

/** V_n = (GM/d)·(r/d)ⁿ·P_n(cos ψ) with ψ the angle at the Earth's centre between site and body, r and d their distances:
 *  IERS Conventions 2010 (TN 36), section 7.1.1; Hofmann-Wellenhof & Moritz, Physical Geodesy (2006).
 *  Left out: the Sun's degree 3 and the Moon's degree 4 (together 1e-3 m²/s²), the planets (1e-4 m²/s²).
 * @param site geocentric, Earth-fixed, m
 * @param bodies see sun-and-moon.ts, same axes */
export function tideGeneratingPotential(
  site: readonly [number, number, number],
  bodies: SunAndMoon,
): TideGeneratingPotential {
  const r2 = site[0] * site[0] + site[1] * site[1] + site[2] * site[2];
  const [mx, my, mz] = bodies.moon;
  const moonD2 = mx * mx + my * my + mz * mz;
  const moonD = Math.sqrt(moonD2);
  // r·cos ψ: P₂·r² = (3·(r cos ψ)² − r²)/2 and P₃·r³ = r cos ψ·(5·(r cos ψ)² − 3 r²)/2 need no division by r
  const alongMoon = (site[0] * mx + site[1] * my + site[2] * mz) / moonD;
  const [sx, sy, sz] = bodies.sun;
  const sunD2 = sx * sx + sy * sy + sz * sz;
  const sunD = Math.sqrt(sunD2);
  const alongSun = (site[0] * sx + site[1] * sy + site[2] * sz) / sunD;
  return {
    degree2M2s2:
      (GM_MOON.value * 0.5 * (3 * alongMoon * alongMoon - r2)) / (moonD2 * moonD) +
      (GM_SUN.value * 0.5 * (3 * alongSun * alongSun - r2)) / (sunD2 * sunD),
    degree3M2s2: (GM_MOON.value * 0.5 * alongMoon * (5 * alongMoon * alongMoon - 3 * r2)) / (moonD2 * moonD2),
  };
}
