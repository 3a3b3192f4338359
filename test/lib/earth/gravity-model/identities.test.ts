import { describe, expect, it } from 'vitest';
import { geodeticToGeocentric } from '../../../../lib/earth/geocentric.js';
import { type GravityModel, GravitySynthesis } from '../../../../lib/earth/gravity-model/index.js';
import { GRS80 } from '../../../../lib/earth/level-ellipsoid.js';
import { normalField } from '../../../../lib/earth/normal-field.js';
import { degToRad } from '../../../../lib/quantity/radians.js';
import { syntheticModel } from '../../../data/gravity-model/synthetic-model.mjs';

const model = (
  parts: Partial<GravityModel> & { maxDegree: number; cosine: Float64Array; sine: Float64Array },
): GravityModel => ({
  name: 'test',
  format: 'icgem1.0',
  maxDegreeOfFile: parts.maxDegree,
  tide: 'zero',
  errors: 'no',
  cosineSigma: null,
  sineSigma: null,
  warnings: [],
  gmM3s2: 3.986004415e14,
  radiusM: 6378136.3,
  ...parts,
});

describe('spherical-harmonic synthesis', () => {
  it('gives the closed normal potential of GRS80 from J2 … J12', () => {
    // Moritz (2000), Geodetic Reference System 1980, J. Geodesy 74:128:
    // J_2n = (−1)^{n+1}·3e^{2n}/((2n+1)(2n+3))·(1 − n + 5n·J2/e²); the term of J14 is below 1e-9 m²/s²
    const cosine = new Float64Array((13 * 14) / 2);
    cosine[0] = 1;
    for (let n = 1; n <= 6; n++) {
      const j =
        ((n % 2 === 1 ? 3 : -3) * GRS80.e2 ** n * (1 - n + (5 * n * 108263e-8) / GRS80.e2)) /
        ((2 * n + 1) * (2 * n + 3));
      cosine[(2 * n * (2 * n + 1)) / 2] = -j / Math.sqrt(4 * n + 1);
    }
    const synthesis = new GravitySynthesis(
      model({ maxDegree: 12, cosine, sine: new Float64Array(cosine.length), gmM3s2: GRS80.GM, radiusM: GRS80.a }),
    );
    for (const lat of [-90, -60.3, -1e-7, 0, 30, 45, 52.3, 89.999, 90])
      for (const heightM of [-500, 0, 1000, 8848]) {
        const at = geodeticToGeocentric(GRS80, { latitudeRad: degToRad(lat), longitudeRad: degToRad(17), heightM });
        const centrifugal = 0.5 * GRS80.omega ** 2 * (at.xM ** 2 + at.yM ** 2);
        const u = normalField(GRS80, degToRad(lat), heightM).potentialM2s2;
        expect(Math.abs(synthesis.potentialM2s2(at) + centrifugal - u)).toBeLessThan(1e-6);
      }
  });

  it.each([
    [12, 52.3, 10.4],
    [36, -77, 166],
    [36, 89.5, 0],
    [120, 5, -179.9],
  ])('is harmonic outside the Earth: degree %i at %f, %f', (degree, lat, lon) => {
    const { cosine, sine } = syntheticModel(degree);
    // without the central term and the flattening the second derivatives are those of the higher terms alone
    cosine[0] = 0;
    cosine[3] = 0;
    const synthesis = new GravitySynthesis(model({ maxDegree: degree, cosine, sine }));
    const { xM, yM, zM } = geodeticToGeocentric(GRS80, {
      latitudeRad: degToRad(lat),
      longitudeRad: degToRad(lon),
      heightM: 2000,
    });
    const v = (dx: number, dy: number, dz: number) =>
      synthesis.potentialM2s2({ xM: xM + dx, yM: yM + dy, zM: zM + dz });
    // fourth-order second differences over a step that is small against the shortest wave
    const step = 2e4 / degree;
    const second = [
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
    ].map(([a, b, c]) => {
      const at = (k: number) => v(k * step * a!, k * step * b!, k * step * c!);
      return (-at(-2) + 16 * at(-1) - 30 * at(0) + 16 * at(1) - at(2)) / (12 * step * step);
    });
    const size = second.reduce((s, x) => s + Math.abs(x), 0);
    expect(size).toBeGreaterThan(1e-11);
    expect(Math.abs(second[0]! + second[1]! + second[2]!)).toBeLessThan(2e-5 * size);
  });

  it.each([2190, 2700])('equals the sum of the zonal terms at the poles, degree %i', (degree) => {
    const { cosine, sine } = syntheticModel(degree);
    const synthesis = new GravitySynthesis(model({ maxDegree: degree, cosine, sine }));
    for (const [zM, sign] of [
      [6356752.3, 1],
      [-6360000, -1],
    ] as const) {
      // P̄_n0(±1) = (±1)ⁿ·√(2n + 1); smallest terms first
      let sum = 0;
      for (let n = degree; n >= 0; n--)
        sum += (6378136.3 / Math.abs(zM)) ** n * Math.sqrt(2 * n + 1) * sign ** n * cosine[(n * (n + 1)) / 2]!;
      const v = synthesis.potentialM2s2({ xM: 0, yM: 0, zM });
      expect(Math.abs(v - (3.986004415e14 / Math.abs(zM)) * sum)).toBeLessThan(1e-6);
      // and the pole is where the meridians around it lead
      for (const longitude of [0, 1, 2, 3, 4, 5, 6]) {
        const near = synthesis.potentialM2s2({ xM: 1e-3 * Math.cos(longitude), yM: 1e-3 * Math.sin(longitude), zM });
        expect(Math.abs(near - v)).toBeLessThan(1e-4);
      }
    }
  });

  it('gives the derivative outwards that differences give', () => {
    const { cosine, sine } = syntheticModel(180);
    const synthesis = new GravitySynthesis(model({ maxDegree: 180, cosine, sine }));
    for (const [x, y, z] of [
      [0.6, 0.3, 0.74162],
      [0, 0, -1],
      [-1, 1e-4, 0],
    ] as const) {
      const at = (radius: number) => synthesis.potentialM2s2({ xM: radius * x, yM: radius * y, zM: radius * z });
      const r = 6372000;
      const { potentialM2s2, radialMs2 } = synthesis.potentialAndRadialDerivative({ xM: r * x, yM: r * y, zM: r * z });
      const norm = Math.hypot(x, y, z);
      expect(potentialM2s2).toBe(at(r));
      expect(Math.abs(radialMs2 - (at(r + 50) - at(r - 50)) / (100 * norm))).toBeLessThan(2e-8);
    }
  });

  it('sums to a lower degree as if the rest were zero', () => {
    const { cosine, sine } = syntheticModel(40);
    const cut = model({ maxDegree: 40, cosine: cosine.slice(), sine: sine.slice() });
    cut.cosine.fill(0, (21 * 22) / 2);
    cut.sine.fill(0, (21 * 22) / 2);
    const at = { xM: 4e6, yM: -3e6, zM: 3.9e6 };
    const full = new GravitySynthesis(model({ maxDegree: 40, cosine, sine }), 20).potentialM2s2(at);
    expect(Math.abs(full - new GravitySynthesis(cut).potentialM2s2(at))).toBeLessThan(1e-7);
    expect(
      Math.abs(full - new GravitySynthesis(model({ maxDegree: 40, cosine, sine })).potentialM2s2(at)),
    ).toBeGreaterThan(0.1);
  });

  it('refuses degrees and places for which it does not hold', () => {
    const { cosine, sine } = syntheticModel(4);
    const m = model({ maxDegree: 4, cosine, sine });
    for (const degree of [5, -1, 2.5, Number.NaN])
      expect(() => new GravitySynthesis(m, degree)).toThrow(/maxDegree = .*0 to 4/);
    const synthesis = new GravitySynthesis(m);
    expect(() => synthesis.potentialM2s2({ xM: 1000, yM: 0, zM: 0 })).toThrow(/distance from the centre/);
    expect(() => synthesis.potentialM2s2({ xM: Number.NaN, yM: 0, zM: 0 })).toThrow(/distance from the centre/);
    expect(() => synthesis.alongParallel(6.4e6, 0).potentialM2s2(Number.NaN)).toThrow(/longitudeRad/);
  });
});
