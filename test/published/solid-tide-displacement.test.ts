import { describe, expect, it } from 'vitest';
import { tideGeneratingPotential } from '../../lib/earth/earth-tide/tide-generating-potential.js';

type Vector = readonly [number, number, number];

/** Cases of the routine DEHANTTIDEINEL of the IERS Conventions 2010 (chapter 7 software, Dehant, Mathews & Gipson), as printed
 *  in its own header: station, Sun, Moon, displacement, m, Earth-fixed axes. */
const CASES: readonly { station: Vector; sun: Vector; moon: Vector; displacement: Vector }[] = [
  {
    station: [4075578.385, 931852.89, 4801570.154],
    sun: [137859926952.015, 54228127881.435, 23509422341.696],
    moon: [-179996231.920342, -312468450.131567, -169288918.59216],
    displacement: [0.07700420357108126, 0.06304056321824968, 0.05516568152597247],
  },
  {
    station: [1112189.66, -4842955.026, 3985352.284],
    sun: [-54537460436.2357, 130244288385.279, 56463429031.5996],
    moon: [300396716.912, 243238281.451, 120548075.939],
    displacement: [-0.02036831479592076, 0.05658254776225972, -0.07597679676871742],
  },
];

describe('the tide-generating potential through the displacement it makes', () => {
  it.each(CASES)('moves the station at $station as the IERS routine does, but for the diurnal resonance', (c) => {
    const g = 3.986004418e14 / 6378136.6 ** 2;
    const radius = Math.hypot(...c.station);
    const up = c.station.map((v) => v / radius) as unknown as Vector;
    const potential = (degree: 2 | 3, x: Vector) => {
      const v = tideGeneratingPotential(x, c);
      return degree === 2 ? v.degree2M2s2 : v.degree3M2s2;
    };
    // IERS 2010 eqs. (7.5), (7.6): h·V/g upwards and l·∇V/g along the sphere; h₂ with its latitude term, section 7.1.1
    const p2 = (3 * up[2] ** 2 - 1) / 2;
    const h = { 2: 0.6078 - 0.0006 * p2, 3: 0.292 };
    const l = { 2: 0.0847 + 0.0002 * p2, 3: 0.015 };
    const displacement = [0, 1, 2].map((axis) => {
      let sum = 0;
      for (const n of [2, 3] as const) {
        const gradient = [0, 1, 2].map((i) => {
          const e = [0, 1, 2].map((j) => (i === j ? 100 : 0)) as unknown as Vector;
          const at = (sign: number) => potential(n, c.station.map((v, j) => v + sign * e[j]!) as unknown as Vector);
          return (at(1) - at(-1)) / 200;
        });
        const radial = gradient[0]! * up[0] + gradient[1]! * up[1] + gradient[2]! * up[2];
        sum += (h[n] * potential(n, c.station) * up[axis]!) / g;
        sum += (l[n] * radius * (gradient[axis]! - radial * up[axis]!)) / g;
      }
      return sum;
    });
    const difference = displacement.map((v, i) => v - c.displacement[i]!);
    // what is left is the resonance of the liquid core, which the routine has and this model has not: 12 mm·sin 2φ in K1 alone
    expect(Math.hypot(...difference)).toBeLessThan(0.01);
    expect(Math.hypot(...displacement)).toBeGreaterThan(0.09);
  });
});
