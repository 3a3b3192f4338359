import { describe, expect, it } from 'vitest';
import { geodeticToGeocentric } from '../../../../lib/earth/geocentric.js';
import {
  coefficientIndex,
  commissionCovariance,
  type GravityModel,
  GravitySynthesis,
  gravityPotential,
  heightAnomaly,
  kaulaOmission,
} from '../../../../lib/earth/gravity-model/index.js';
import { GRS80 } from '../../../../lib/earth/level-ellipsoid.js';
import { normalField, normalGravity } from '../../../../lib/earth/normal-field.js';
import { degToRad } from '../../../../lib/quantity/radians.js';
import { syntheticModel } from '../../../data/gravity-model/synthetic-model.mjs';

const synthetic = (maxDegree: number, tide: GravityModel['tide'] = 'free'): GravityModel => {
  const m = syntheticModel(maxDegree);
  return {
    name: 'synthetic',
    format: 'icgem1.0',
    maxDegreeOfFile: maxDegree,
    tide,
    errors: 'formal',
    warnings: [],
    ...m,
    cosineSigma: m.sigma,
    sineSigma: m.sigma,
  };
};
const place = (lat: number, lon: number, heightM = 0) => ({
  latitudeRad: degToRad(lat),
  longitudeRad: degToRad(lon),
  heightM,
});

describe('W of a gravity model', () => {
  it('is V and the centrifugal potential, and falls with height as differences say', () => {
    const synthesis = new GravitySynthesis(synthetic(12));
    for (const p of [place(52.3, 10.46, 143), place(-90, 0, 2835), place(0, 180, 0)]) {
      const point = geodeticToGeocentric(GRS80, p);
      const w = gravityPotential(synthesis, p, 'free');
      expect(w.potentialM2s2).toBeCloseTo(
        synthesis.potentialM2s2(point) + 0.5 * 7292115e-11 ** 2 * (point.xM ** 2 + point.yM ** 2),
        6,
      );
      const at = (heightM: number) => gravityPotential(synthesis, { ...p, heightM }, 'free').potentialM2s2;
      const difference = (at(p.heightM + 50) - at(p.heightM - 50)) / 100;
      expect(Math.abs(w.perHeightMs2 - difference)).toBeLessThan(2e-6);
      expect(w.perHeightMs2).toBeLessThan(-9.7);
    }
  });

  it('is turned between tide systems as at a fixed point: zero = free + k2·W_T, mean = zero + W_T', () => {
    const p = place(90, 0);
    const w = (model: GravityModel['tide'], to: 'free' | 'zero' | 'mean') =>
      gravityPotential(new GravitySynthesis(synthetic(2, model)), p, to).potentialM2s2;
    // W_T at a pole: 0.9722 − 2.8841 − 0.0195 = −1.9314 m²/s² (Mäkinen 2021 polynomial); k2 = 0.30190
    expect(Math.abs(w('free', 'zero') - w('free', 'free') - 0.3019 * -1.9314)).toBeLessThan(1e-7);
    expect(Math.abs(w('free', 'mean') - w('free', 'zero') - -1.9314)).toBeLessThan(1e-7);
    expect(Math.abs(w('mean', 'free') - w('free', 'free') - 1.3019 * 1.9314)).toBeLessThan(1e-7);
    expect(w('zero', 'zero')).toBe(w('free', 'free'));
  });

  it('asks for the tide system where the file is silent, and refuses one that contradicts the file', () => {
    const p = place(45, 7);
    const silent = new GravitySynthesis(synthetic(2, 'unknown'));
    expect(() => gravityPotential(silent, p, 'zero')).toThrow(/tide-system-unknown/);
    expect(gravityPotential(silent, p, 'zero', { modelTide: 'zero' }).tideShiftM2s2).toBe(0);
    expect(() => gravityPotential(new GravitySynthesis(synthetic(2)), p, 'zero', { modelTide: 'zero' })).toThrow(
      /tide-system-differs/,
    );
  });
});

describe('height anomaly of a potential', () => {
  it.each([
    [52.3, 143, 31.2],
    [-90, 2800, -29.9],
    [0, 0, 5],
    [28, 8848, -28],
  ])('at %f, h = %f m', (lat, h, zeta) => {
    const latitudeRad = degToRad(lat);
    // W of a point whose normal height is h − ζ, by definition; and Molodensky's ζ = (T − (W₀ − U₀))/γ at the telluroid, which
    // agrees to second order
    for (const W0 of [62636853.4, GRS80.U0]) {
      const W = W0 - (GRS80.U0 - normalField(GRS80, latitudeRad, h - zeta).potentialM2s2);
      const found = heightAnomaly(latitudeRad, h, W, W0);
      expect(Math.abs(found.heightAnomalyM - zeta)).toBeLessThan(1e-8);
      const T = W - normalField(GRS80, latitudeRad, h).potentialM2s2;
      const gamma = normalGravity(GRS80, latitudeRad, h - zeta / 2);
      expect(Math.abs((T - (W0 - GRS80.U0)) / gamma - zeta)).toBeLessThan(2e-5);
      expect(
        Math.abs(found.perPotentialS2PerM - (heightAnomaly(latitudeRad, h, W + 1, W0).heightAnomalyM - zeta)),
      ).toBeLessThan(2e-8);
    }
  });
});

describe('commission', () => {
  it('is, for one sigma per degree, the sum over Legendre polynomials of the distance: degree 2190', () => {
    const N = 2190;
    const model = synthetic(N);
    const byDegree = Float32Array.from({ length: N + 1 }, (_, n) => (n < 2 ? 0 : 1e-11 / n + (n % 7) * 1e-12));
    for (let n = 0; n <= N; n++) {
      model.cosineSigma!.fill(byDegree[n]!, coefficientIndex(n, 0), coefficientIndex(n, n) + 1);
    }
    const equal = { ...model, sineSigma: model.cosineSigma };
    const places = [place(52.2961, 10.4598, 143), place(52.291, 10.462, 80), place(-33, 151, 12), place(90, 0, 0)];
    const found = commissionCovariance(equal, places);
    const points = places.map((p) => geodeticToGeocentric(GRS80, p));
    // addition theorem: Σ_m P̄_nm(i)·P̄_nm(j)·cos m(λ_i − λ_j) = (2n + 1)·P_n(cos ψ_ij) (Heiskanen & Moritz 1967, section 1-15)
    for (const [i, a] of points.entries())
      for (const [j, b] of points.entries()) {
        const ra = Math.hypot(a.xM, a.yM, a.zM);
        const rb = Math.hypot(b.xM, b.yM, b.zM);
        // rounding of cos ψ, 1e-16, counts n²/2 times for near points: 2e-10
        const t = Math.min(1, (a.xM * b.xM + a.yM * b.yM + a.zM * b.zM) / (ra * rb));
        const q = model.radiusM ** 2 / (ra * rb);
        let [before, p, sum] = [0, 1, 0];
        for (let n = 0; n <= N; n++) {
          sum += q ** n * byDegree[n]! ** 2 * (2 * n + 1) * p;
          [before, p] = [p, ((2 * n + 1) * t * p - n * before) / (n + 1)];
        }
        const expected = (model.gmM3s2 ** 2 / (ra * rb)) * sum;
        const scale = Math.sqrt(found[i * 4 + i]! * found[j * 4 + j]!);
        expect(Math.abs(found[i * 4 + j]! - expected)).toBeLessThan(1e-8 * scale);
        expect(found[i * 4 + j]).toBe(found[j * 4 + i]);
      }
    // near sites share nearly all of it, far ones little: what makes it cancel in a difference
    expect(found[1]! / Math.sqrt(found[0]! * found[5]!)).toBeGreaterThan(0.5);
    expect(Math.abs(found[2]! / Math.sqrt(found[0]! * found[10]!))).toBeLessThan(0.2);
  });

  it('weighs cosine and sine terms apart', () => {
    const model = synthetic(2);
    model.cosineSigma!.fill(0);
    const sineSigma = new Float32Array(6);
    sineSigma[coefficientIndex(2, 2)] = 1e-9;
    // V = (GM/r)(R/r)²·P̄_22·S_22·sin 2λ, P̄_22 = √15/2·cos²ψ
    const [east, west, none] = [place(0, 45), place(0, -45), place(0, 0)];
    const cov = commissionCovariance({ ...model, sineSigma }, [east, west, none]);
    const u = (model.gmM3s2 / GRS80.a) * (model.radiusM / GRS80.a) ** 2 * (Math.sqrt(15) / 2) * Math.fround(1e-9);
    expect(cov[0]! / u ** 2).toBeCloseTo(1, 12);
    expect(cov[1]! / u ** 2).toBeCloseTo(-1, 12);
    expect(cov[8]! / u ** 2).toBeCloseTo(0, 12);
  });

  it('stops at the degree asked for and refuses a model without sigmas', () => {
    const model = synthetic(10);
    const [all] = commissionCovariance(model, [place(10, 20)]);
    const [cut] = commissionCovariance(model, [place(10, 20)], 5);
    const [own] = commissionCovariance(synthetic(5), [place(10, 20)]);
    expect(cut).toBeLessThan(all!);
    expect(cut! / own!).toBeCloseTo(1, 14);
    expect(() => commissionCovariance({ ...model, cosineSigma: null }, [place(0, 0)])).toThrow(/no-sigmas/);
    expect(() => commissionCovariance(model, [place(0, 0)], 11)).toThrow(/maxDegree/);
  });
});

describe('omission', () => {
  it("is Kaula's rule summed beyond the degree", () => {
    for (const N of [36, 360, 2190]) {
      // R·1e-5·√(Σ_{n>N}(2n + 1)/n⁴) with the Earth's mean radius
      let sum = 0;
      for (let n = 400_000; n > N; n--) sum += (2 * n + 1) / n ** 4;
      const direct = 6371000 * 1e-5 * Math.sqrt(sum);
      expect(Math.abs(kaulaOmission(N).geoidHeightM / direct - 1)).toBeLessThan(0.03);
    }
    expect(kaulaOmission(2190).geoidHeightM).toBeCloseTo(0.0292, 4);
    expect(kaulaOmission(2000).correlationLengthM).toBe(10_000);
    expect(() => kaulaOmission(1)).toThrow();
  });
});
