import { describe, expect, it } from 'vitest';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight, normalGravity } from '../../../lib/earth/normal-field.js';
import { NORMAL_HEIGHT_FIELDS, readNormalHeightField } from '../../../lib/earth/normal-height-field.js';
import { normalOrthometricShortfallM2s2 } from '../../../lib/earth/normal-orthometric-height.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);
const field = (id: string) => readNormalHeightField(id)!;
const gamma0 = (id: string, lat: number) => field(id).geopotential(degToRad(lat), 0).perHeightMs2;
const LATITUDES = [0, 15, 30, 45, 52.3, 60, 75, 90];

describe('normal heights made with another normal field', () => {
  it('differ by the published differences of the gravity formulas (Moritz 1980, Bull. Géod. 54:395; from memory)', () => {
    for (const lat of LATITUDES) {
      const s2 = Math.sin(degToRad(lat)) ** 2;
      const grs80 = normalGravity(GRS80, degToRad(lat), 0);
      // the formula of 1967 is printed to 0.004 mGal; γ(1980) − γ(1967) = 0.8316 + 0.0782·sin²φ − 0.0007·sin⁴φ mGal
      within((grs80 - gamma0('GRS67', lat)) * 1e5, 0.8316 + 0.0782 * s2 - 0.0007 * s2 * s2, 1e-2, `GRS67 ${lat}`);
      // γ(1980) − γ(1930) = −16.3 + 13.7·sin²φ mGal
      within((grs80 - gamma0('International1930', lat)) * 1e5, -16.3 + 13.7 * s2, 0.15, `1930 ${lat}`);
    }
  });

  it('have the normal gravity of Helmert 1901: 9.78030 at the equator, 9.83215 at the pole, 14 mGal less where Potsdam', () => {
    within(gamma0('Helmert1901', 0), 9.7803, 1e-12);
    within(gamma0('Helmert1901', 90), 9.7803 * 1.005302, 1e-12);
    within(gamma0('Helmert1901', 45), 9.7803 * (1 + 0.002651 - 0.000007), 1e-12);
    within(gamma0('Helmert1901-potsdam', 45), gamma0('Helmert1901', 45) - 14e-5, 1e-12);
  });

  it('follow the closed form of GRS80 in height: mean gravity to second order, 1e-3 m²/s² at 2 km', () => {
    for (const lat of LATITUDES)
      for (const H of [-300, 500, 1000, 2000]) {
        const exact = geopotentialOfNormalHeight(GRS80, degToRad(lat), H).geopotentialM2s2;
        expect(field('GRS80').geopotential(degToRad(lat), H).geopotentialM2s2).toBe(exact);
        const by67 = field('GRS67').geopotential(degToRad(lat), H).geopotentialM2s2;
        const difference = normalGravity(GRS80, degToRad(lat), 0) - gamma0('GRS67', lat);
        within(by67 + difference * H, exact, 3e-3, `${lat} ${H}`);
      }
  });

  it('have their derivative to height', () => {
    for (const { id, geopotential } of NORMAL_HEIGHT_FIELDS) {
      const at = (H: number) => geopotential(degToRad(47), H).geopotentialM2s2;
      within(geopotential(degToRad(47), 1500).perHeightMs2, (at(1501) - at(1499)) / 2, 1e-8, id);
    }
  });

  it('are named in any spelling, and by no other name', () => {
    expect(field('grs 80').id).toBe('GRS80');
    expect(field('International 1930').id).toBe('International1930');
    expect(field('helmert-1901-Potsdam').id).toBe('Helmert1901-potsdam');
    expect(readNormalHeightField('Bessel')).toBeNull();
    expect(readNormalHeightField('')).toBeNull();
  });
});

describe('a normal-orthometric height', () => {
  it('lacks (g − γ)·H: 1 m²/s² for 100 mGal at 1000 m', () => {
    const lat = degToRad(47);
    const gamma = normalGravity(GRS80, lat, 1000);
    within(normalOrthometricShortfallM2s2(lat, 1000, gamma + 100e-5), 1, 1e-9);
    within(normalOrthometricShortfallM2s2(lat, 1000, gamma - 100e-5), 1, 1e-9);
    within(normalOrthometricShortfallM2s2(lat, 1000, null), 1000 * (5e-4 + 5e-4), 1e-12);
    within(normalOrthometricShortfallM2s2(lat, -200, null), 200 * (5e-4 + 1e-4), 1e-12);
    expect(normalOrthometricShortfallM2s2(lat, 0, null)).toBe(0);
  });
});
