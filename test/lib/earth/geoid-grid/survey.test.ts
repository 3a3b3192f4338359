import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gridExcerpt, interpolate, nodesToKeep, surveyGrid } from '../../../../lib/earth/geoid-grid/index.js';
import { faultOf, gtx, isg, open, valueAt } from './grid-fixtures.js';

const rolling = (r: number, c: number) => 40 + 3 * Math.sin(0.3 * r) + 2 * Math.cos(0.2 * c + 0.1 * r);
const codes = async (value: (r: number, c: number) => number, rows = 40, columns = 50) =>
  (await surveyGrid(await open(gtx([50, 10, 0.1, 0.1], rows, columns, value)))).warnings;

describe('survey of a grid', () => {
  it('is content with a smooth surface', async () => {
    expect(await codes(rolling)).toEqual([]);
    expect(await codes((r, c) => -100 + 0.5 * r + 0.2 * c)).toEqual([]);
  });
  it('finds heights that no geoid has', async () => {
    const [warning] = await codes((r, c) => 20 * rolling(r, c));
    expect(warning).toMatchObject({ code: 'implausible-height' });
    expect((await codes((r, c) => (r === 3 && c === 4 ? 120.5 : rolling(r, c))))[0]).toMatchObject({
      code: 'implausible-height',
      path: '50.3, 10.4',
    });
    expect((await codes(() => 119.9)).map((w) => w.code)).toEqual(['constant-block']);
  });
  it('finds a single value far off its neighbours', async () => {
    const warnings = await codes((r, c) => rolling(r, c) + (r === 17 && c === 23 ? 5 : 0));
    expect(warnings).toHaveLength(1);
    expect(warnings[0]).toMatchObject({ code: 'outlier', path: '51.7, 12.3' });
    expect(warnings[0]!.message).toMatch(/is 5\.\d+ m off|is 4\.9\d* m off/);
  });
  it('finds a filled-in square, but not a row of equal values', async () => {
    const warnings = await codes((r, c) => (r >= 10 && r < 15 && c >= 20 && c < 26 ? 41 : rolling(r, c)));
    expect(warnings.map((w) => w.code)).toContain('constant-block');
    expect(warnings.find((w) => w.code === 'constant-block')!.message).toContain(
      '5 × 5 neighbouring values are all 41 m',
    );
    expect(await codes((r, c) => (r === 0 ? 40 : 40 + r * 0.1 * Math.sin(0.3 * c)))).toEqual([]);
    expect((await codes((r, c) => (r < 4 && c < 4 ? 44 : rolling(r, c)))).map((w) => w.code)).not.toContain(
      'constant-block',
    );
  });
  it('finds a seam that does not close, and a grid without values', async () => {
    const grid = await open(gtx([-30, 0, 10, 10], 7, 37, (r, c) => r + (c === 36 ? 0.5 : 0)));
    expect(grid.period).toBe(36);
    expect((await surveyGrid(grid)).warnings.map((w) => w.code)).toContain('seam');
    const survey = await surveyGrid(await open(gtx([50, 10, 0.1, 0.1], 4, 4, () => -88.8888)));
    expect(survey).toMatchObject({ missing: 16 });
    expect(survey.warnings.map((w) => w.code)).toEqual(['no-values']);
  });
  it('tells how far it is', async () => {
    const shares: number[] = [];
    await surveyGrid(await open(isg()), (share) => shares.push(share));
    expect(shares.at(-1)).toBe(1);
  });
});

describe('interpolation', () => {
  const flat = (a: number, b: number, c: number, d: number, e: number, f: number) => (r: number, k: number) =>
    a + b * r + c * k + d * r * k + e * r * r + f * k * k;
  const exact = fc.tuple(...[0, 1, 2, 3, 4, 5].map(() => fc.integer({ min: -4, max: 4 })));
  const inside = fc.tuple(fc.double({ min: 1, max: 4, noNaN: true }), fc.double({ min: 1, max: 5, noNaN: true }));

  it('bilinear is exact for a + b·x + c·y + d·x·y, bicubic for the second degree', async () => {
    await fc.assert(
      fc.asyncProperty(exact, inside, async ([a, b, c, d, e, f], [r, k]) => {
        const [lat, lon] = [50 + 0.5 * r, 10 + 0.25 * k];
        const linear = await open(gtx([50, 10, 0.5, 0.25], 6, 7, flat(a!, b!, c!, d!, 0, 0)));
        expect(await valueAt(linear, lat, lon)).toBeCloseTo(flat(a!, b!, c!, d!, 0, 0)(r, k), 9);
        const square = await open(gtx([50, 10, 0.5, 0.25], 6, 7, flat(a!, b!, c!, d!, e!, f!)));
        expect(await valueAt(square, lat, lon, 'bicubic')).toBeCloseTo(flat(a!, b!, c!, d!, e!, f!)(r, k), 8);
      }),
      { numRuns: 60, seed: 5 },
    );
  });

  it('both give the value of a node at the node, also at the border', async () => {
    const grid = await open(isg());
    for (const method of ['bilinear', 'bicubic'] as const)
      for (const [r, lat] of [51, 50.5, 50].entries())
        for (const [c, lon] of [10, 10.5, 11, 11.5].entries())
          expect(await valueAt(grid, lat, lon, method)).toBe(10 * r + c);
    expect((await faultOf(() => valueAt(grid, 50.6, 10.6, 'bicubic'))).code).toBe('stencil');
    expect(await valueAt(grid, 50.5, 10.6, 'bicubic')).toBeCloseTo(11.2, 12);
  });

  it('is continuous from cell to cell', async () => {
    const grid = await open(gtx([50, 10, 0.5, 0.25], 8, 9, (r, c) => Math.sin(r * 7 + c * 3)));
    for (const method of ['bilinear', 'bicubic'] as const)
      for (const [lat, lon] of [
        [51, 10.8],
        [51.3, 10.75],
      ] as const) {
        const d = 1e-7;
        const across = [-d, d].map((s) =>
          valueAt(grid, lat + (lat === 51 ? s : 0), lon + (lat === 51 ? 0 : s), method),
        );
        const [before, after] = await Promise.all(across);
        expect(Math.abs(before! - after!)).toBeLessThan(1e-5);
      }
  });

  it('needs no more than the excerpt that is kept', async () => {
    const grid = await open(gtx([50, 10, 0.5, 0.25], 8, 9, (r, c) => Math.sin(r * 7 + c * 3)));
    const excerpt = await gridExcerpt(grid, 51.3, 10.8);
    expect(excerpt.latitudesDeg).toEqual([50.5, 51, 51.5, 52]);
    expect(excerpt.longitudesDeg).toEqual([10.5, 10.75, 11, 11.25]);
    const kept = JSON.parse(JSON.stringify(excerpt)) as typeof excerpt;
    expect(interpolate(kept, 51.3, 10.8, 'bicubic').valueM).toBe(await valueAt(grid, 51.3, 10.8, 'bicubic'));
    expect(interpolate(kept, 51.3, 370.8).valueM).toBeCloseTo(await valueAt(grid, 51.3, 10.8), 12);
    expect((await faultOf(() => interpolate(kept, 53, 10.8))).code).toBe('outside-grid');
    // one of sixteen without a value: bicubic cannot, bilinear can
    const holed = {
      ...kept,
      valuesM: kept.valuesM.map((row, i) => row.map((v, j) => (i === 0 && j === 0 ? null : v))),
    };
    expect((await faultOf(() => interpolate(holed, 51.3, 10.8, 'bicubic'))).expected).toContain('bilinear needs four');
    expect(interpolate(holed, 51.3, 10.8).valueM).toBe(interpolate(kept, 51.3, 10.8).valueM);
    // what a campaign keeps then is the four nodes; nothing where one of these is missing
    expect(nodesToKeep(kept, 51.3, 10.8)).toBe(kept);
    const four = nodesToKeep(holed, 51.3, 370.8)!;
    expect([four.latitudesDeg, four.longitudesDeg]).toEqual([
      [51, 51.5],
      [10.75, 11],
    ]);
    expect(interpolate(four, 51.3, 10.8).valueM).toBeCloseTo(interpolate(kept, 51.3, 10.8).valueM, 12);
    const inner = {
      ...kept,
      valuesM: kept.valuesM.map((row, i) => row.map((v, j) => (i === 1 && j === 1 ? null : v))),
    };
    expect(nodesToKeep(inner, 51.3, 10.8)).toBeNull();
  });
});
