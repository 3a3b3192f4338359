import { readFileSync } from 'node:fs';
import { beforeAll, describe, expect, it } from 'vitest';
import { geodeticToGeocentric } from '../../../../lib/earth/geocentric.js';
import { type GravityModel, GravitySynthesis, gravityPotential } from '../../../../lib/earth/gravity-model/index.js';
import { GRS80 } from '../../../../lib/earth/level-ellipsoid.js';
import { degToRad } from '../../../../lib/quantity/radians.js';
import { type SyntheticModel, syntheticModel } from '../../../data/gravity-model/synthetic-model.mjs';

/** Values by GeographicLib 2.1.2 GravityModel from the same coefficients: test/data/gravity-model/README.md. */
interface Reference {
  readonly cases: readonly {
    readonly modelDegree: number;
    readonly degree: number;
    readonly points: readonly {
      lat: number;
      lon: number;
      h: number;
      W: number;
      V: number;
      east: number;
      north: number;
      up: number;
    }[];
  }[];
}
const reference = JSON.parse(
  readFileSync(new URL('../../../data/gravity-model/reference.json', import.meta.url), 'utf8'),
) as Reference;

const asModel = (m: SyntheticModel): GravityModel => ({
  name: 'synthetic',
  format: 'icgem1.0',
  maxDegreeOfFile: m.maxDegree,
  tide: 'zero',
  errors: 'no',
  cosineSigma: null,
  sineSigma: null,
  warnings: [],
  ...m,
});

for (const { modelDegree, degree, points } of reference.cases)
  describe(`degree ${degree} of a model of degree ${modelDegree}`, () => {
    let synthesis: GravitySynthesis;
    beforeAll(() => {
      synthesis = new GravitySynthesis(asModel(syntheticModel(modelDegree)), degree);
    });
    for (const p of points) {
      const position = { latitudeRad: degToRad(p.lat), longitudeRad: degToRad(p.lon), heightM: p.h };
      it(`W, V and gravity at ${p.lat}, ${p.lon}, ${p.h} m`, () => {
        const point = geodeticToGeocentric(GRS80, position);
        // both programs round a number of 6e7 at 7e-9; 1e-6 leaves room for a few thousand such steps
        expect(Math.abs(synthesis.potentialM2s2(point) - p.V)).toBeLessThan(1e-6);
        const w = gravityPotential(synthesis, position, 'zero');
        expect(Math.abs(w.potentialM2s2 - p.W)).toBeLessThan(1e-6);
        expect(w.tideShiftM2s2).toBe(0);
        // the deflection of the vertical in these rough synthetic fields reaches 1e-3 at degree 2190, times the lean of 3.4e-3
        expect(Math.abs(w.perHeightMs2 - p.up)).toBeLessThan(modelDegree < 1000 ? 2e-6 : 8e-5);
      });
      it(`the same along its parallel at ${p.lat}, ${p.lon}`, () => {
        const point = geodeticToGeocentric(GRS80, position);
        const parallel = synthesis.alongParallel(Math.hypot(point.xM, point.yM), point.zM);
        expect(Math.abs(parallel.potentialM2s2(position.longitudeRad) - p.V)).toBeLessThan(1e-6);
        expect(Math.abs(parallel.potentialM2s2(position.longitudeRad + 2 * Math.PI) - p.V)).toBeLessThan(1e-6);
      });
    }
  });
