import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../../lib/constants/defining-constants.js';
import { solidEarthTideM2s2, tideSite } from '../../../../lib/earth/earth-tide/solid-earth-tide.js';
import { sunAndMoon } from '../../../../lib/earth/earth-tide/sun-and-moon.js';
import { SunAndMoonTable } from '../../../../lib/earth/earth-tide/sun-and-moon-table.js';
import { tideGeneratingPotential } from '../../../../lib/earth/earth-tide/tide-generating-potential.js';
import { degToRad } from '../../../../lib/quantity/radians.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const erfa = JSON.parse(readFileSync(new URL('../../../data/tide/erfa.json', import.meta.url), 'utf8')) as {
  'places [lat, lon, h]': [number, number, number][];
  'bodies [ms, moon xyz m, sun xyz m]': number[][];
  'felt [ms, m2/s2 at each place]': number[][];
};
const sites = erfa['places [lat, lon, h]'].map(([lat, lon, h]) => tideSite(degToRad(lat), degToRad(lon), h));

describe('solid-Earth tide at a clock', () => {
  it('agrees with ERFA to 1e-19 in the offset of any pair of 11 sites, 2000–2050 (test/data/tide)', () => {
    const table = new SunAndMoonTable();
    let worst = 0;
    for (const [ms, ...felt] of erfa['felt [ms, m2/s2 at each place]']) {
      const bodies = table.at(ms!);
      const difference = felt.map((expected, i) => solidEarthTideM2s2(sites[i]!, bodies) - expected);
      worst = Math.max(worst, (Math.max(...difference) - Math.min(...difference)) / C2);
    }
    expect(worst).toBeLessThan(1e-19);
    // what was found when this was written, so that a coarser ephemeris does not pass unseen
    expect(worst).toBeLessThan(1e-20);
  });

  it('has the Moon and the Sun where ERFA has them', () => {
    for (const [ms, mx, my, mz, sx, sy, sz] of erfa['bodies [ms, moon xyz m, sun xyz m]']) {
      const { moon, sun } = sunAndMoon(ms!);
      // 20″ and 30 km at the Moon; 10″ at the Sun: twice what moon98 and epv00 against this ephemeris, and UT1, amount to
      within(Math.hypot(moon[0] - mx!, moon[1] - my!, moon[2] - mz!), 0, 60e3, 'Moon');
      within(Math.hypot(sun[0] - sx!, sun[1] - sy!, sun[2] - sz!), 0, 1e7, 'Sun');
    }
  });

  it('interpolates the ephemeris within 1e-25 of the offset', () => {
    const table = new SunAndMoonTable();
    let worst = 0;
    for (let i = 0; i < 400; i++) {
      const ms = Date.UTC(2000, 0, 1) + ((i * 0.6180339887498949) % 1) * 50 * 365.25 * 86_400_000;
      for (const site of sites)
        worst = Math.max(
          worst,
          Math.abs(solidEarthTideM2s2(site, table.at(ms)) - solidEarthTideM2s2(site, sunAndMoon(ms))),
        );
    }
    expect(worst / C2).toBeLessThan(1e-25);
  });

  it('does not depend on which epochs were asked for before', () => {
    const a = new SunAndMoonTable();
    const ms = Date.UTC(2027, 4, 3, 7, 10);
    const fresh = a.at(ms);
    const b = new SunAndMoonTable();
    for (let i = -40; i < 40; i++) b.at(ms + i * 43_200_000);
    expect(b.at(ms)).toEqual(fresh);
  });

  it('reaches from 1950 to 2100 and says so beyond', () => {
    const table = new SunAndMoonTable();
    for (const ms of [Date.UTC(1950, 0, 1), Date.UTC(2100, 0, 1)])
      within(table.at(ms).moon[2], sunAndMoon(ms).moon[2], 100);
    for (const ms of [Date.UTC(1949, 11, 31), Date.UTC(2100, 0, 2), Number.NaN]) {
      expect(() => table.at(ms)).toThrow(/1950/);
      expect(() => sunAndMoon(ms)).toThrow(/1950/);
    }
  });
});

describe('tide-generating potential', () => {
  it('is the difference of the point-mass potentials, less the uniform pull: degrees 2 and 3', () => {
    // an independent route: GM/|d − r| − GM/d − GM·(r·d)/d³, whose rest is degree 4: 4e-5 of degree 2 squared
    const site = [3771793.9, 140253.3, 5124304.3] as const;
    const bodies = { moon: [2.1e8, -3.0e8, 1.1e8], sun: [-1.2e11, 7.0e10, 4.9e10] } as const;
    const exact = (body: readonly [number, number, number], gm: number) => {
      const d = Math.hypot(...body);
      const r2 = site[0] ** 2 + site[1] ** 2 + site[2] ** 2;
      const dot = site[0] * body[0] + site[1] * body[1] + site[2] * body[2];
      // 1/√(1 + ε) − 1 by its series to ε⁴, since the closed form loses ten digits
      const e = (r2 - 2 * dot) / (d * d);
      return (gm / d) * (-e / 2 + (3 / 8) * e ** 2 - (5 / 16) * e ** 3 + (35 / 128) * e ** 4 - dot / (d * d));
    };
    const v = tideGeneratingPotential(site, bodies);
    const total = exact(bodies.moon, 0.0123000371 * 3.986004418e14) + exact(bodies.sun, 1.32712440041e20);
    within(v.degree2M2s2 + v.degree3M2s2, total, 2e-3);
    expect(Math.abs(v.degree3M2s2)).toBeGreaterThan(5e-3);
  });

  it('is symmetric: the same at the antipode for degree 2, opposite for degree 3', () => {
    const bodies = sunAndMoon(Date.UTC(2027, 4, 3));
    const here = tideGeneratingPotential([4e6, 3e6, 3.9e6], bodies);
    const there = tideGeneratingPotential([-4e6, -3e6, -3.9e6], bodies);
    within(there.degree2M2s2, here.degree2M2s2, 1e-15);
    within(there.degree3M2s2, -here.degree3M2s2, 1e-15);
  });
});
