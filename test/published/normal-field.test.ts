import { describe, expect, test } from 'vitest';
import { GRS80, type LevelEllipsoid, WGS84 } from '../../lib/earth/level-ellipsoid.js';
import {
  geopotentialOfNormalHeight,
  normalField,
  normalGravity,
  normalHeightOfGeopotential,
} from '../../lib/earth/normal-field.js';
import { degToRad } from '../../lib/quantity/radians.js';
import { expectWithin } from '../expect-within.js';

const at = (ellipsoid: LevelEllipsoid, degrees: number, h = 0) => normalGravity(ellipsoid, degToRad(degrees), h);

describe('GRS80, derived constants (Moritz 2000, J. Geodesy 74:128; half of the last printed digit)', () => {
  test('geometry', () => {
    expectWithin(GRS80.b, 6356752.3141, 5e-5, 'b');
    expectWithin(GRS80.e2, 0.0066943800229, 5e-15, 'e²');
    expectWithin(GRS80.E, 521854.0097, 5e-5, 'linear eccentricity');
    expectWithin(1 / GRS80.f, 298.257222101, 5e-10, '1/f');
    expectWithin(GRS80.e2 / (1 - GRS80.e2), 0.00673949677548, 5e-15, 'second eccentricity squared');
    expectWithin((GRS80.a * GRS80.a) / GRS80.b, 6399593.6259, 5e-5, 'polar radius of curvature');
  });
  test('physics', () => {
    expectWithin(GRS80.U0, 62636860.85, 5e-4, 'U₀');
    expectWithin(at(GRS80, 0), 9.7803267715, 5e-11, 'γ_e');
    expectWithin(at(GRS80, 90), 9.8321863685, 5e-11, 'γ_p');
    expectWithin(at(GRS80, 45), 9.806199203, 5e-10, 'γ_45');
    const m = (GRS80.omega ** 2 * GRS80.a ** 2 * GRS80.b) / GRS80.GM;
    expectWithin(m, 0.00344978600308, 5e-15, 'm');
    const k = (GRS80.b * at(GRS80, 90)) / (GRS80.a * at(GRS80, 0)) - 1;
    expectWithin(k, 0.001931851353, 5e-13, 'k');
    expectWithin(at(GRS80, 90) / at(GRS80, 0) - 1, 0.005302440112, 5e-13, 'f*');
  });
  test('γ = 9.780327(1 + 0.0053024 sin²φ − 0.0000058 sin²2φ), 1980 formula: 0.1 mGal', () => {
    for (const phi of [10, 33, 52.3, 71]) {
      const s = Math.sin(degToRad(phi)) ** 2;
      const s2 = Math.sin(2 * degToRad(phi)) ** 2;
      expectWithin(at(GRS80, phi), 9.780327 * (1 + 0.0053024 * s - 0.0000058 * s2), 1e-6, `φ ${phi}`);
    }
  });
  test('free-air gradient −0.3086e-5 s⁻² at all latitudes to 1e-8 (Moritz 1980, Bull. Géod. 54:395)', () => {
    for (const phi of [0, 45, 90]) expectWithin((at(GRS80, phi, 1) - at(GRS80, phi, -1)) / 2, -0.3086e-5, 1e-8);
  });
});

test('WGS84 (NIMA TR8350.2, table 3.4); the closed form gives γ_p …9379, so 1e-10 there', () => {
  expectWithin(WGS84.U0, 62636851.7146, 5e-5, 'U₀');
  expectWithin(at(WGS84, 0), 9.7803253359, 5e-11, 'γ_e');
  expectWithin(at(WGS84, 90), 9.8321849378, 1.5e-10, 'γ_p');
});

// NormalGravity of GeographicLib 2.1.2 (Karney), a closed solution of its own: φ, γ(0), γ(1 km), U₀ − U at 100, 1000, 3000 m
const GEOGRAPHICLIB: readonly (readonly number[])[] = [
  [0, 9.780326772, 9.7772397, 978.017238, 9778.783115, 29327.091759],
  [15, 9.783786398, 9.78069962, 978.363202, 9782.242888, 29337.471959],
  [30, 9.793248704, 9.79016273, 979.309437, 9791.705596, 29365.862494],
  [45, 9.806199203, 9.80311433, 980.604492, 9804.656645, 29404.718942],
  [52.3, 9.812738918, 9.809654601, 981.258467, 9811.196639, 29424.340589],
  [60, 9.819178385, 9.816094615, 981.902416, 9817.636379, 29443.661451],
  [75, 9.828698058, 9.825615098, 982.854388, 9827.156457, 29472.224111],
  [90, 9.832186369, 9.829103704, 983.20322, 9830.644916, 29482.690375],
];

test.each(GEOGRAPHICLIB)(
  'GRS80 at φ = %s against GeographicLib 2.1.2, last printed digit',
  (phi, g0, g1, c100, c1000, c3000) => {
    expectWithin(at(GRS80, phi!), g0!, 6e-10);
    expectWithin(at(GRS80, phi!, 1000), g1!, 6e-10);
    for (const [h, c] of [
      [100, c100!],
      [1000, c1000!],
      [3000, c3000!],
    ] as const) {
      expectWithin(geopotentialOfNormalHeight(GRS80, degToRad(phi!), h).geopotentialM2s2, c, 6e-7);
      expectWithin(geopotentialOfNormalHeight(GRS80, degToRad(-phi!), h).geopotentialM2s2, c, 6e-7);
    }
  },
);

test('WGS84 at 1000 m against GeographicLib 2.1.2', () => {
  for (const [phi, g, c] of [
    [45, 9.803112897, 9804.655212],
    [0, 9.777238265, 9778.781679],
    [90, 9.829102274, 9830.643485],
  ] as const) {
    expectWithin(at(WGS84, phi, 1000), g, 6e-10);
    expectWithin(geopotentialOfNormalHeight(WGS84, degToRad(phi), 1000).geopotentialM2s2, c, 6e-7);
  }
});

test('8820 m at 27.99° (GeographicLib, NormalGravity example): north −0.0000595, up −9.764539062 m/s²', () => {
  const p = normalField(WGS84, degToRad(27.99), 8820);
  expectWithin(p.potentialPerHeightMs2, -9.764539062, 6e-10);
  expectWithin(Math.sqrt(p.gravityMs2 ** 2 - p.potentialPerHeightMs2 ** 2), 0.0000595, 6e-8);
});

describe('consistency', () => {
  const heights = [-500, 0, 12.5, 1000, 4810, 8848, 10_000];
  test('γ is the gradient of U', () => {
    for (const phi of [-90, -52.3, 0, 0.001, 45, 89.999])
      for (const h of heights) {
        const lat = degToRad(phi);
        const up = normalField(GRS80, lat, h + 50).potentialM2s2;
        const down = normalField(GRS80, lat, h - 50).potentialM2s2;
        // the central difference itself is good to h²·U‴/6 = 6e-10 and the rounding 1.5e-10 of U
        expectWithin((up - down) / 100, normalField(GRS80, lat, h).potentialPerHeightMs2, 2e-9);
      }
  });
  test('normal height and back to 1e-8 m, poles, below zero and at 10 km', () => {
    for (const phi of [-90, -45, 0, 52.3, 90])
      for (const h of heights) {
        const c = geopotentialOfNormalHeight(GRS80, degToRad(phi), h);
        const back = normalHeightOfGeopotential(GRS80, degToRad(phi), c.geopotentialM2s2);
        expectWithin(back.normalHeightM, h, 1e-8);
        expectWithin(back.perGeopotentialS2PerM * c.perHeightMs2, 1, 1e-12);
      }
  });
  test('outside its range it refuses instead of computing', () => {
    expect(() => normalField(GRS80, degToRad(95), 0)).toThrow(/latitudeRad/);
    expect(() => normalField(GRS80, degToRad(45), Number.NaN)).toThrow(/heightM/);
    expect(() => normalHeightOfGeopotential(GRS80, degToRad(45), Number.NaN)).toThrow(/geopotential/);
  });
});
