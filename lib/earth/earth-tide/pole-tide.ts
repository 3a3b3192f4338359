import { GRS80 } from '../level-ellipsoid.js';
import { LOVE_NUMBERS, type LoveNumbers } from '../permanent-tide.js';
import { J2000_MS } from './sun-and-moon.js';

/** Coordinates of the pole at an instant, rad, in the sense of the IERS: x towards Greenwich, y towards 90° west. */
export interface PolePosition {
  /** UTC, milliseconds since 1970; null: holds at all times */
  readonly timeMs: number | null;
  readonly xRad: number;
  readonly yRad: number;
}

const MAS_TO_RAD = Math.PI / (180 * 3600 * 1000);
const YEAR_MS = 365.25 * 86_400_000;

/** The secular pole, from which the pole tide is counted: 55.0 + 1.677·t and 320.5 + 3.460·t mas, t years since 2000.0
 *  (IERS Conventions 2010 as updated in 2018, eq. 7.21). */
export function secularPole(timeMs: number): { readonly xRad: number; readonly yRad: number } {
  const years = (timeMs - J2000_MS) / YEAR_MS;
  return { xRad: (55.0 + 1.677 * years) * MAS_TO_RAD, yRad: (320.5 + 3.46 * years) * MAS_TO_RAD };
}

/** Potential felt at a clock by the pole tide, m²/s²: (1 + k₂ − h₂) times the change of the centrifugal potential
 *  ΔV = −½·ω²·r²·sin 2θ·(m₁·cos λ + m₂·sin λ), θ the geocentric colatitude, m₁ = x − x_s, m₂ = −(y − y_s) (IERS Conventions 2010,
 *  eqs. 7.22, 7.24). The ocean's own pole tide is left out: a tenth of it.
 * @param site geocentric, Earth-fixed, m */
export function poleTideM2s2(
  site: readonly [number, number, number],
  pole: { readonly xRad: number; readonly yRad: number },
  timeMs: number,
  love: LoveNumbers = LOVE_NUMBERS,
): number {
  const mean = secularPole(timeMs);
  const m1 = pole.xRad - mean.xRad;
  const m2 = -(pole.yRad - mean.yRad);
  // r²·sin 2θ·cos λ = 2·x·z, r²·sin 2θ·sin λ = 2·y·z
  return -(1 + love.k2 - love.h2) * GRS80.omega * GRS80.omega * site[2] * (m1 * site[0] + m2 * site[1]);
}

/** The pole at an instant from given positions in order of time: the one position for all times, or straight lines between dates.
 * @returns null outside the dates given: the pole is not known there, and is not guessed */
export function poleAt(
  positions: readonly PolePosition[],
  timeMs: number,
): { readonly xRad: number; readonly yRad: number } | null {
  const only = positions[0];
  if (only === undefined) return null;
  if (only.timeMs === null) return only;
  for (let i = 0; i < positions.length; i++) {
    const b = positions[i] as PolePosition & { timeMs: number };
    if (b.timeMs === timeMs) return b;
    if (b.timeMs > timeMs) {
      if (i === 0) return null;
      const a = positions[i - 1] as PolePosition & { timeMs: number };
      const share = (timeMs - a.timeMs) / (b.timeMs - a.timeMs);
      return { xRad: a.xRad + share * (b.xRad - a.xRad), yRad: a.yRad + share * (b.yRad - a.yRad) };
    }
  }
  return null;
}
