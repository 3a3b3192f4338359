import { deflateSync } from 'node:zlib';
import { beforeAll, describe, expect, it } from 'vitest';
import type { GeoidGrid } from '../../../../lib/earth/geoid-grid/index.js';
import { dataFile, faultOf, open, valueAt } from './grid-fixtures.js';
import { floats, gridTags, packLzw, type Tag, tiff } from './tiff-fixtures.js';

const VALUES = [0, 1, 2, 3, 10, 11, 12, 13, 20, 21, 22, 23];
const grid = (changes: Readonly<Record<number, Tag | null>> = {}, values = floats(VALUES)) =>
  tiff(gridTags(changes), [values]);
const metadata = (items: string): Tag => [42112, 2, `<GDALMetadata>\n${items}\n</GDALMetadata>`];

describe('GeoTIFF grids as GDAL writes them', () => {
  let window: GeoidGrid;
  beforeAll(async () => {
    window = await open(dataFile('geotiff/egm96-window.gtx'));
  });

  it.each([
    ['deflate-predictor3-tiles.tif', 'nodes', 0],
    ['lzw-predictor3-strips.tif', 'edges', 0],
    ['lzw-big-endian.tif', 'edges', 0],
    ['float64-deflate-bigtiff.tif', 'nodes', 0],
    ['uncompressed-area.tif', 'edges', 0],
    // half a step of the integers
    ['int16-scaled-lzw-predictor2.tif', 'edges', 0.0025 + 1e-9],
    ['int32-scaled-deflate-predictor2-big-endian.tif', 'nodes', 0.00005 + 1e-9],
  ] as const)('%s', async (name, registration, tolerance) => {
    const tif = await open(dataFile(`geotiff/${name}`));
    expect(tif).toMatchObject({
      format: 'geotiff',
      registration,
      surface: 'geoid',
      tide: 'unknown',
      rows: 17,
      columns: 25,
      frame: 'EPSG:4326',
      heightDatum: 'EPSG:5773',
    });
    let differ = 0;
    for (let lat = 50; lat <= 54; lat += 0.25)
      for (let lon = 8; lon <= 14; lon += 0.25) {
        const [a, b] = [await valueAt(tif, lat, lon), await valueAt(window, lat, lon)];
        expect(Math.abs(a - b)).toBeLessThanOrEqual(tolerance);
        if (a !== b) differ++;
      }
    expect(differ === 0).toBe(tolerance === 0);
  });

  it('honours the value for "none"', async () => {
    const tif = await open(dataFile('geotiff/deflate-strips.tif'));
    expect(await faultOf(() => valueAt(tif, 50.9, 13.4))).toMatchObject({
      code: 'nodata',
      found: 'no value at the node 51, 13.5',
    });
    expect(await valueAt(tif, 52, 10)).toBe(await valueAt(window, 52, 10));
  });
});

describe('GeoTIFF grids', () => {
  it('has its first row in the north; the corner is a node or half a cell off it', async () => {
    const point = await open(grid());
    expect(point).toMatchObject({ registration: 'nodes', surface: 'unknown', warnings: [] });
    expect(await valueAt(point, 51, 10)).toBe(0);
    expect(await valueAt(point, 50, 11.5)).toBe(23);
    const area = await open(grid({ 34735: [34735, 3, [1, 1, 0, 2, 1024, 0, 1, 2, 1025, 0, 1, 1]] }));
    expect(area.registration).toBe('edges');
    expect(await valueAt(area, 50.75, 10.25)).toBe(0);
    expect((await faultOf(() => valueAt(area, 51, 10))).code).toBe('outside-grid');
    const tie = await open(grid({ 33922: [33922, 12, [1, 2, 0, 10.5, 50, 0]] }));
    expect(await valueAt(tie, 51, 10)).toBe(0);
  });

  it('takes a matrix, and rows from the south', async () => {
    const matrix = await open(
      grid({ 33550: null, 33922: null, 34264: [34264, 12, [0.5, 0, 0, 10, 0, 0.5, 0, 50, 0, 0, 0, 0, 0, 0, 0, 1]] }),
    );
    expect(await valueAt(matrix, 50, 10)).toBe(0);
    expect(await valueAt(matrix, 51, 10)).toBe(20);
    const negative = await open(grid({ 33550: [33550, 12, [0.5, -0.5, 0]], 33922: [33922, 12, [0, 0, 0, 10, 50, 0]] }));
    expect(await valueAt(negative, 51, 10)).toBe(20);
  });

  it('works out the registration where the file is silent', async () => {
    const silent: Tag = [34735, 3, [1, 1, 0, 1, 1024, 0, 1, 2]];
    const doubtful = await open(grid({ 34735: silent }));
    expect(doubtful.registration).toBe('edges');
    expect(doubtful.warnings.map((w) => w.code)).toEqual(['registration-doubtful']);
    // three rows from pole to pole can only be nodes; from the middle of the first cell only edges
    const scale: Tag = [33550, 12, [90, 90, 0]];
    const nodes = await open(grid({ 34735: silent, 33550: scale, 33922: [33922, 12, [0, 0, 0, -180, 90, 0]] }));
    expect(nodes).toMatchObject({ registration: 'nodes', warnings: [], period: 4 });
    const edges = await open(
      grid({ 34735: silent, 33550: [33550, 12, [60, 60, 0]], 33922: [33922, 12, [0, 0, 0, -180, 91, 0]] }),
    );
    expect(edges.registration).toBe('edges');
    const fault = await faultOf(() =>
      open(grid({ 33550: [33550, 12, [90, 90, 0]], 33922: [33922, 12, [0, 0, 0, -180, 90.9, 0]] })),
    );
    expect(fault).toMatchObject({ code: 'registration' });
    const half = await faultOf(() =>
      open(
        grid({
          34735: [34735, 3, [1, 1, 0, 2, 1024, 0, 1, 2, 1025, 0, 1, 1]],
          33550: scale,
          33922: [33922, 12, [0, 0, 0, -180, 90, 0]],
        }),
      ),
    );
    expect(half.found).toContain(
      'fit between the poles as nodes, do not fit as cell edges; the file says pixel is area',
    );
  });

  it('applies scale, offset and unit after the value for "none"', async () => {
    const tif = await open(
      grid({
        42112: metadata(
          '<Item name="TYPE">VERTICAL_OFFSET_GEOGRAPHIC_TO_VERTICAL</Item><Item name="SCALE" sample="0" role="scale">2</Item><Item name="OFFSET" sample="0" role="offset">100</Item><Item name="UNITTYPE" sample="0" role="unittype">millimetre</Item>',
        ),
        42113: [42113, 2, '13'],
      }),
    );
    expect(await valueAt(tif, 51, 10)).toBeCloseTo(0.1, 12);
    expect(await valueAt(tif, 50, 11.5)).toBeCloseTo(0.146, 12);
    expect((await faultOf(() => valueAt(tif, 50.5, 11.5))).code).toBe('nodata');
  });

  it('takes the sample that is described as geoid height', async () => {
    const two = floats(VALUES.flatMap((v) => [1000 + v, v]));
    const described = metadata(
      '<Item name="DESCRIPTION" sample="0" role="description">geoid_undulation_accuracy</Item><Item name="DESCRIPTION" sample="1" role="description">geoid_undulation</Item>',
    );
    const tags = { 258: [258, 3, [32, 32]], 277: [277, 3, [2]], 339: [339, 3, [3, 3]], 42112: described } as const;
    expect(await valueAt(await open(grid(tags, two)), 50, 11.5)).toBe(23);
    const planes = tiff(gridTags({ ...tags, 284: [284, 3, [2]] }), [
      floats(VALUES.map((v) => 1000 + v)),
      floats(VALUES),
    ]);
    expect(await valueAt(await open(planes), 50, 11.5)).toBe(23);
  });

  it('reads quasigeoids by their description', async () => {
    const tif = await open(
      grid({ 42112: metadata('<Item name="DESCRIPTION" sample="0" role="description">height_anomaly</Item>') }),
    );
    expect(tif.surface).toBe('quasigeoid');
  });

  it('passes over reduced images and warns of further grids', async () => {
    const one = grid();
    // a second directory behind the first: the same tags once more
    const directory = new DataView(one.buffer).getUint32(4, true);
    const count = new DataView(one.buffer).getUint16(directory, true);
    const both = new Uint8Array(one.length + 2 + 12 * count + 4);
    both.set(one);
    both.set(one.subarray(directory, directory + 2 + 12 * count), one.length);
    new DataView(both.buffer).setUint32(directory + 2 + 12 * count, one.length, true);
    expect((await open(both)).warnings.map((w) => w.code)).toEqual(['subgrids-not-used']);
  });

  describe('refuses', () => {
    const refusals: readonly (readonly [string, () => Uint8Array, string, RegExp])[] = [
      [
        'a projected grid',
        () => grid({ 34735: [34735, 3, [1, 1, 0, 1, 1024, 0, 1, 1]] }),
        'not-geographic',
        /projected/,
      ],
      ['no geographic keys', () => grid({ 34735: null }), 'not-geographic', /missing/],
      [
        'radians',
        () => grid({ 34735: [34735, 3, [1, 1, 0, 2, 1024, 0, 1, 2, 2054, 0, 1, 9101]] }),
        'not-geographic',
        /9101/,
      ],
      [
        'a horizontal grid',
        () => grid({ 42112: metadata('<Item name="TYPE">HORIZONTAL_OFFSET</Item>') }),
        'wrong-grid',
        /HORIZONTAL/,
      ],
      [
        'another sample',
        () => grid({ 42112: metadata('<Item name="D" sample="0" role="description">latitude_offset</Item>') }),
        'wrong-grid',
        /latitude_offset/,
      ],
      [
        'an unknown unit',
        () => grid({ 42112: metadata('<Item name="U" sample="0" role="unittype">degree</Item>') }),
        'unit',
        /degree/,
      ],
      [
        'a scale that is none',
        () => grid({ 42112: metadata('<Item name="S" sample="0" role="scale">x</Item>') }),
        'scale',
        /NaN/,
      ],
      ['a nodata that is none', () => grid({ 42113: [42113, 2, 'none'] }), 'nodata', /none/],
      ['no place', () => grid({ 33922: null }), 'georeference', /no usable/],
      ['a scale of zero', () => grid({ 33550: [33550, 12, [0.5, 0, 0]] }), 'georeference', /no usable/],
      [
        'a place in metres',
        () => grid({ 33922: [33922, 12, [0, 0, 0, 500000, 5700000, 0]] }),
        'georeference',
        /5700000/,
      ],
      [
        'a rotated grid',
        () =>
          grid({
            33550: null,
            33922: null,
            34264: [34264, 12, [0.5, 0.1, 0, 10, 0.1, -0.5, 0, 51, 0, 0, 0, 0, 0, 0, 0, 1]],
          }),
        'georeference',
        /rotated/,
      ],
      ['a compression that is not read', () => grid({ 259: [259, 3, [50000]] }), 'compression', /50000/],
      ['samples of 16-bit floats', () => grid({ 258: [258, 3, [16]] }), 'sample-type', /16 bits, format 3/],
      ['one row', () => grid({ 257: [257, 3, [1]] }), 'wrong-size', /1 rows/],
      ['strips missing from the table', () => grid({ 257: [257, 3, [30]] }), 'wrong-size', /1 strips for 30 rows/],
      [
        'a strip of 4 GB',
        () =>
          grid({
            256: [256, 4, [40000]],
            257: [257, 4, [30000]],
            278: [278, 4, [30000]],
            33550: [33550, 12, [0.001, 0.001, 0]],
          }),
        'block-too-large',
        /4800000000 bytes/,
      ],
      ['a file that is cut in its tags', () => grid().slice(0, -40), 'file-truncated', /bytes/],
      ['a file that is cut after its magic', () => grid().slice(0, 6), 'file-truncated', /6 bytes/],
      ['a TIFF without an image', () => Uint8Array.of(0x49, 0x49, 42, 0, 0, 0, 0, 0), 'tiff-directory', /no image/],
    ];
    it.each(refusals)('%s', async (_, make, code, found) => {
      const fault = await faultOf(() => open(make()));
      expect(fault.code).toBe(code);
      expect(fault.found).toMatch(found);
    });

    const blockFault = async (bytes: Uint8Array) => faultOf(async () => valueAt(await open(bytes), 50.2, 10.2));

    it('a tile that expands without end, in bounded memory', async () => {
      const bomb = new Uint8Array(deflateSync(new Uint8Array(1 << 25)));
      const before = process.memoryUsage().arrayBuffers;
      const deflate = tiff(gridTags({ 259: [259, 3, [8]] }), [bomb]);
      expect(await blockFault(deflate)).toMatchObject({
        code: 'block-damaged',
        found: 'strip 0: more than the 48 bytes that it must hold',
      });
      const lzw = tiff(gridTags({ 259: [259, 3, [5]] }), [packLzw(new Uint8Array(200_000))]);
      expect(await blockFault(lzw)).toMatchObject({ code: 'block-damaged' });
      const tiled = tiff(
        gridTags({ 259: [259, 3, [8]], 278: null, 322: [322, 3, [16]], 323: [323, 3, [16]] }),
        [bomb],
        { tiled: true },
      );
      expect(await blockFault(tiled)).toMatchObject({
        code: 'block-damaged',
        found: 'tile 0: more than the 1024 bytes that it must hold',
      });
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1 << 22);
    });

    it('a strip that is short, damaged, outside the file or empty', async () => {
      expect((await blockFault(grid({}, floats(VALUES.slice(0, 11))))).found).toBe('strip 0: 44 bytes');
      const packed = new Uint8Array(deflateSync(floats(VALUES)));
      packed[packed.length - 1]! ^= 1;
      expect((await blockFault(tiff(gridTags({ 259: [259, 3, [8]] }), [packed]))).found).toContain('checksum');
      expect((await blockFault(grid({}, new Uint8Array(0)))).code).toBe('block-missing');
      const cut = grid();
      // the size of the only strip, inline in tag 279
      const view = new DataView(cut.buffer);
      const directory = view.getUint32(4, true);
      for (let i = 0; i < view.getUint16(directory, true); i++)
        if (view.getUint16(directory + 2 + 12 * i, true) === 279)
          view.setUint32(directory + 10 + 12 * i, 0xffffffff, true);
      expect((await blockFault(cut)).code).toBe('file-truncated');
      expect((await blockFault(grid({ 317: [317, 3, [7]] }))).code).toBe('predictor');
    });

    it('a table of tags that claims gigabytes, or goes in a circle', async () => {
      const claims = grid();
      const view = new DataView(claims.buffer);
      const directory = view.getUint32(4, true);
      view.setUint32(directory + 2 + 4, 0xffffffff, true);
      const before = process.memoryUsage().arrayBuffers;
      expect((await faultOf(() => open(claims))).code).toBe('tiff-directory');
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1 << 20);
      const circle = grid();
      const v = new DataView(circle.buffer);
      v.setUint32(directory + 2 + 12 * v.getUint16(directory, true), directory, true);
      expect((await faultOf(() => open(circle))).found).toContain('circle');
    });
  });
});
