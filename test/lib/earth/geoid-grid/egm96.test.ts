import { beforeAll, describe, expect, it } from 'vitest';
import { type GeoidGrid, gridExcerpt, interpolate, surveyGrid } from '../../../../lib/earth/geoid-grid/index.js';
import { egm96Centimetres, egm96Gtx } from '../../../data/egm96-15/egm96-grid.mjs';
import { dataFile, open, valueAt } from './grid-fixtures.js';

interface ReferencePoint {
  readonly lat: number;
  readonly lon: number;
  readonly proj: number;
  readonly geographiclib: number;
  readonly gdalCubic: number | null;
}
const { points } = JSON.parse(new TextDecoder().decode(dataFile('egm96-15/reference.json'))) as {
  points: ReferencePoint[];
};

describe.each([
  ['longitudes from −180°', -180 as const],
  ['longitudes 0 … 360°', 0 as const],
])('EGM96 at 15′, %s', (_, west) => {
  let grid: GeoidGrid;
  beforeAll(async () => {
    grid = await open(egm96Gtx(egm96Centimetres(), west));
  });

  it('is closed round the Earth', () => {
    expect(grid).toMatchObject({
      rows: 721,
      columns: 1440,
      period: 1440,
      registration: 'nodes',
      surface: 'unknown',
      tide: 'unknown',
    });
  });

  it("equals PROJ's and GeographicLib's bilinear interpolation, poles and antimeridian included", async () => {
    for (const p of points) {
      const value = await valueAt(grid, p.lat, p.lon);
      // PROJ works in single precision here and there; GeoidEval prints four decimals
      expect(Math.abs(value - p.proj)).toBeLessThan(2e-5);
      expect(Math.abs(value - p.geographiclib)).toBeLessThan(5.1e-5);
      expect(await valueAt(grid, p.lat, p.lon + 360)).toBeCloseTo(value, 9);
      expect(await valueAt(grid, p.lat, p.lon - 720)).toBeCloseTo(value, 9);
    }
  });

  it("equals GDAL's cubic convolution, single precision", async () => {
    let compared = 0;
    for (const p of points) {
      if (p.gdalCubic === null) continue;
      expect(Math.abs((await valueAt(grid, p.lat, p.lon, 'bicubic')) - p.gdalCubic)).toBeLessThan(3e-5);
      compared++;
    }
    expect(compared).toBeGreaterThan(40);
  });

  it('shows the four nodes round a point across the antimeridian', async () => {
    const lat = -33.9;
    const { nodes } = interpolate(await gridExcerpt(grid, lat, 179.9), lat, 179.9);
    expect(nodes.map((n) => [n.latitudeDeg, Math.abs(n.longitudeDeg)])).toEqual([
      [-34, 179.75],
      [-34, 180],
      [-33.75, 179.75],
      [-33.75, 180],
    ]);
    const across = interpolate(await gridExcerpt(grid, lat, -179.9), lat, -179.9).nodes;
    expect(across[0]!.valueM).toBe(nodes[1]!.valueM);
    expect(across[1]!.longitudeDeg).toBe(-179.75);
  });
});

it('EGM96 as a whole looks like a geoid', async () => {
  const survey = await surveyGrid(await open(egm96Gtx(egm96Centimetres(), -180)));
  // the extremes of the EGM96 15′ grid: −106.99 m south of India, 85.39 m at New Guinea (README of the WW15MGH.GRD file, NIMA, from memory)
  expect(survey.leastM).toBeCloseTo(-106.99, 2);
  expect(survey.mostM).toBeCloseTo(85.39, 2);
  expect(survey).toMatchObject({ missing: 0, count: 721 * 1440, warnings: [] });
});

it("the window that GDAL cut and wrote as GTX gives PROJ's values in the whole grid of Debian", async () => {
  const grid = await open(dataFile('geotiff/egm96-window.gtx'));
  expect(grid).toMatchObject({
    format: 'gtx',
    firstLatitudeDeg: 50,
    firstLongitudeDeg: 8,
    rows: 17,
    columns: 25,
    period: null,
  });
  const { points: at } = JSON.parse(new TextDecoder().decode(dataFile('geotiff/reference.json'))) as {
    points: ReferencePoint[];
  };
  for (const p of at) expect(Math.abs((await valueAt(grid, p.lat, p.lon)) - p.proj)).toBeLessThan(2e-5);
});
