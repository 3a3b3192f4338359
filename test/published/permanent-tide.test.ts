import { describe, expect, test } from 'vitest';
import { GRS80 } from '../../lib/earth/level-ellipsoid.js';
import { normalGravity } from '../../lib/earth/normal-field.js';
import {
  LOVE_NUMBERS,
  permanentCrustDisplacementM,
  permanentTidePotentialM2s2,
  type TideQuantity,
  tideConversion,
} from '../../lib/earth/permanent-tide.js';
import { degToRad } from '../../lib/quantity/radians.js';
import { expectWithin } from '../expect-within.js';

describe('permanent tide potential', () => {
  test('A·(r/r₀)²·(sin²ψ − 1/3), A = −2.9166 m²/s² (Mäkinen 2021, J. Geodesy 95:106, eq. 18), on the ellipsoid', () => {
    for (const phi of [0, 15, 30, 45, -52.3, 60, 75, 90]) {
      const s = Math.sin(degToRad(phi));
      const c = Math.cos(degToRad(phi));
      const n = GRS80.a / Math.sqrt(1 - GRS80.e2 * s * s);
      const [x, z] = [n * c, n * (1 - GRS80.e2) * s];
      const r2 = x * x + z * z;
      const exact = -2.9166 * (r2 / 6378137 ** 2) * ((z * z) / r2 - 1 / 3);
      // the polynomial's printed digits: 5e-5 each
      expectWithin(permanentTidePotentialM2s2(degToRad(phi)), exact, 1e-4, `φ ${phi}`);
    }
  });
  test('lowers gravity by 30.49 µGal at the equator (Mäkinen 2021, eq. 20): 2·W_T/r', () => {
    expectWithin(((2 * permanentTidePotentialM2s2(degToRad(0))) / 6378137) * 1e8, 30.49, 0.01);
  });
});

describe('crust displacement, IERS Conventions 2010 eq. (7.14a)', () => {
  test('values at geodetic latitudes, P₂ of the geocentric one; printed to 1e-5 m', () => {
    // (−0.1206 + 0.0001 P₂)·P₂ worked by hand with ψ = atan((1 − e²)·tan φ)
    for (const [phi, m] of [
      [0, 0.06032],
      [30, 0.01553],
      [45, -0.02954],
      [52.3, -0.05236],
      [60, -0.07488],
      [90, -0.1205],
    ] as const)
      expectWithin(permanentCrustDisplacementM(degToRad(phi)), m, 6e-6, `φ ${phi}`);
  });
  test('the latitude inside is geocentric: at 45° geodetic would be 0.3 mm off', () => {
    const wrong = (-0.1206 + 0.0001 * 0.25) * 0.25;
    expect(Math.abs(permanentCrustDisplacementM(degToRad(45)) - wrong)).toBeGreaterThan(3e-4);
  });
  test('0.06029 − 0.180873·sin²φ (satellite altimetry product, ICESat-2), a fit of its own: 0.6 mm', () => {
    for (const phi of [0, 30, 60, 90])
      expectWithin(permanentCrustDisplacementM(degToRad(phi)), 0.06029 - 0.180873 * Math.sin(degToRad(phi)) ** 2, 6e-4);
  });
});

describe('conversions', () => {
  const phi = degToRad(52.3);
  const x = permanentTidePotentialM2s2(phi) / normalGravity(GRS80, phi, 0);
  const rounded = { h2: 0.6, k2: 0.3 };
  // Ekman (1989), Bull. Géod. 63:281, eqs. 9–11 with γ = 1 + k − h; x ≈ −0.198·(3/2 sin²φ − 1/2) m
  test('N and H by Ekman (1989)', () => {
    expectWithin(tideConversion('geoid-height', 'zero', 'mean', phi, rounded), x, 1e-12, 'N zero→mean');
    expectWithin(tideConversion('geoid-height', 'free', 'zero', phi, rounded), 0.3 * x, 1e-12, 'N free→zero');
    expectWithin(tideConversion('physical-height', 'zero', 'mean', phi, rounded), -x, 1e-12, 'H zero→mean');
    expectWithin(tideConversion('physical-height', 'mean', 'free', phi, rounded), (1 + 0.3 - 0.6) * x, 1e-12);
    expectWithin(tideConversion('physical-height', 'zero', 'free', phi, rounded), (0.3 - 0.6) * x, 1e-12);
    expectWithin(x, -0.198 * (1.5 * Math.sin(phi) ** 2 - 0.5), 2e-3, 'the usual form, rounded and on a sphere');
  });
  test('C is as H, times γ₀, and W is opposite to C, in every direction (Ekman 1989; Mäkinen 2021)', () => {
    const systems = ['mean', 'zero', 'free'] as const;
    const gamma0 = normalGravity(GRS80, phi, 0);
    for (const from of systems)
      for (const to of systems) {
        const C = tideConversion('geopotential-number', from, to, phi);
        expectWithin(C, gamma0 * tideConversion('physical-height', from, to, phi), 1e-12, `C ${from}→${to}`);
        expectWithin(tideConversion('potential', from, to, phi), -C, 1e-15, `W ${from}→${to}`);
      }
    // at a point fixed in space the crust does not matter: only k₂
    expectWithin(tideConversion('fixed-point-potential', 'free', 'zero', phi), 0.3019 * x * gamma0, 1e-12);
    expectWithin(tideConversion('fixed-point-potential', 'zero', 'mean', phi), x * gamma0, 1e-12);
  });
  test('zero against mean tide between 45° and 52.3°: 4e-18', () => {
    const d =
      tideConversion('potential', 'zero', 'mean', degToRad(45)) - tideConversion('potential', 'zero', 'mean', phi);
    expectWithin(d / 8.987551787e16, 4.07e-18, 1e-20);
  });
  test('there and back is nothing, and the three systems close', () => {
    const quantities: TideQuantity[] = [
      'ellipsoidal-height',
      'geoid-height',
      'geopotential-number',
      'physical-height',
      'potential',
      'fixed-point-potential',
    ];
    for (const q of quantities) {
      expectWithin(tideConversion(q, 'mean', 'zero', phi) + tideConversion(q, 'zero', 'mean', phi), 0, 1e-15, q);
      const round =
        tideConversion(q, 'mean', 'zero', phi) +
        tideConversion(q, 'zero', 'free', phi) +
        tideConversion(q, 'free', 'mean', phi);
      expectWithin(round, 0, 1e-15, q);
    }
  });
  test('h = H + ζ in each system, to the 1.1 mm by which eq. (7.14a) and h₂·W_T/γ₀ differ at the poles', () => {
    for (const [from, to] of [
      ['free', 'zero'],
      ['zero', 'mean'],
      ['free', 'mean'],
    ] as const)
      for (const deg of [-80, 0, 45, 52.3]) {
        const lat = degToRad(deg);
        const h = tideConversion('ellipsoidal-height', from, to, lat);
        const sum = tideConversion('physical-height', from, to, lat) + tideConversion('geoid-height', from, to, lat);
        expectWithin(h, sum, 1.1e-3, `${from}→${to} at ${deg}`);
      }
  });
  test('another h₂ scales the crust', () => {
    const doubled = { ...LOVE_NUMBERS, h2: 2 * 0.6078 };
    expectWithin(permanentCrustDisplacementM(phi, doubled), 2 * permanentCrustDisplacementM(phi), 1e-15);
  });
});
