import { describe, expect, it } from 'vitest';
import { gridExcerpt, interpolate } from '../../../../lib/earth/geoid-grid/index.js';
import { findRegistration } from '../../../../lib/earth/geoid-grid/registration.js';
import { dataFile, faultOf, isg, open, text, valueAt } from './grid-fixtures.js';

describe('ISG files', () => {
  it('reads the example of format 2.0 in degrees, minutes and seconds: bounds at cell edges', async () => {
    const grid = await open(dataFile('isg/example-1.isg'));
    expect(grid).toMatchObject({
      format: 'isg-2.0',
      name: 'EXAMPLE',
      registration: 'edges',
      surface: 'geoid',
      tide: 'mean',
      heightDatum: null,
      ellipsoid: 'GRS80',
      frame: 'ITRF2014',
      rows: 4,
      columns: 6,
      warnings: [],
    });
    expect(grid.firstLatitudeDeg).toBeCloseTo(41, 12);
    expect(grid.firstLongitudeDeg).toBeCloseTo(120, 12);
    expect(await valueAt(grid, 41, 120)).toBeCloseTo(30.1234, 12);
    expect(await valueAt(grid, 40 + 5 / 6, 120)).toBeCloseTo((30.1234 + 41.1111) / 2, 10);
    expect(await valueAt(grid, 40, 121)).toBeCloseTo(64.6666, 10);
  });

  it('reads the example of format 2.0 in degrees, bounds at nodes, as the same grid', async () => {
    const [edges, nodes] = [await open(dataFile('isg/example-1.isg')), await open(dataFile('isg/example-2.isg'))];
    expect(nodes.registration).toBe('nodes');
    // the bounds of the second are printed to 1e-6 degrees
    for (const [lat, lon] of [
      [40.99, 120.01],
      [40.5, 120.9],
      [40.7, 121.6],
    ] as const)
      expect(Math.abs((await valueAt(edges, lat, lon)) - (await valueAt(nodes, lat, lon)))).toBeLessThan(1e-4);
  });

  it('reads the example of format 1.0: bounds at cell edges, surface and tide not stated', async () => {
    const grid = await open(dataFile('isg/example-1.0.isg'));
    expect(grid).toMatchObject({
      format: 'isg-1.0',
      registration: 'edges',
      surface: 'unknown',
      tide: 'unknown',
      ellipsoid: 'GRS80',
      warnings: [],
    });
    expect(await valueAt(grid, 40.875, 120.125)).toBe(30.1234);
    expect(await valueAt(grid, 40.125, 120.125)).toBe(61.9999);
    expect(grid.registrationReason).toContain('5 rows if these are nodes, 4 if cell edges; the header says 4');
  });

  it('reads 1.01 with its twelve decimals', async () => {
    const grid = await open(
      isg({
        'ISG format': '1.01',
        'data units': null,
        units: 'meters',
        'lat min': '49.750000000000',
        'lat max': '51.250000000000',
        'lon min': '9.750000000000',
        'lon max': '11.750000000000',
        'delta lat': '0.500000000000',
        'delta lon': '0.500000000000',
      }),
    );
    expect(grid).toMatchObject({ format: 'isg-1.01', registration: 'edges' });
    expect(await valueAt(grid, 50.25, 10.25)).toBeCloseTo(15.5, 12);
  });

  it.each([
    ['N-to-S, W-to-E', 0],
    ['S-to-N, W-to-E', 20],
    ['N-to-S, E-to-W', 3],
    ['S-to-N, E-to-W', 23],
  ])('puts rows and columns where the ordering %s says', async (ordering, northWest) => {
    const grid = await open(isg({ 'data ordering': ordering }));
    expect(await valueAt(grid, 51, 10)).toBe(northWest);
    const { nodes } = interpolate(await gridExcerpt(grid, 50.6, 10.1), 50.6, 10.1);
    expect(nodes.map(({ latitudeDeg, longitudeDeg }) => [latitudeDeg, longitudeDeg])).toEqual([
      [50.5, 10],
      [50.5, 10.5],
      [51, 10],
      [51, 10.5],
    ]);
    expect(nodes[2]!.valueM).toBe(northWest);
  });

  it.each([
    ['meters', 1],
    ['millimeters', 0.001],
    ['mm', 0.001],
    ['cm', 0.01],
    ['feet', 0.3048],
  ])('takes values in %s', async (units, factor) => {
    const grid = await open(isg({ 'data units': units }));
    expect(await valueAt(grid, 50, 11.5)).toBeCloseTo(23 * factor, 12);
    expect(grid.warnings.map((w) => w.code)).toEqual(units === 'feet' ? ['feet'] : []);
  });

  it.each([
    [`-0°30'00"`, -0.5],
    [`\u22120°30'00"`, -0.5],
    [`-30'00"`, -0.5],
    [`0°30'00"`, 0.5],
    [`-1°00'00"`, -1],
    [`-1800"`, null],
  ])('reads the sign of %s', async (min, south) => {
    const dms = (degrees: number) =>
      `${degrees < 0 ? '-' : ''}${Math.floor(Math.abs(degrees))}°${Math.round((Math.abs(degrees) % 1) * 60)}'00"`;
    const changes = {
      'coord units': 'dms',
      'lat min': min,
      'lat max': dms((south ?? 0) + 1),
      'lon min': dms(-0.5),
      'lon max': dms(1),
      'delta lat': `0°30'00"`,
      'delta lon': `30'00"`,
    };
    if (south === null) return expect((await faultOf(() => open(isg(changes)))).path).toBe('lat min');
    const grid = await open(isg(changes));
    expect(await valueAt(grid, south, -0.5)).toBe(20);
    expect(await valueAt(grid, south + 1, 1)).toBe(3);
  });

  it('reads the degree sign in Latin-1 too', async () => {
    const utf8 = new TextDecoder().decode(dataFile('isg/example-1.isg'));
    const grid = await open(Uint8Array.from(utf8, (c) => c.charCodeAt(0)));
    expect(grid.registration).toBe('edges');
  });

  it('takes longitudes 0 … 360, across the antimeridian either way, and turns of them', async () => {
    const east = await open(isg({ 'lon min': '359.000000', 'lon max': '360.500000' }));
    expect(await valueAt(east, 51, -0.75)).toBeCloseTo(0.5, 12);
    expect(await valueAt(east, 51, 0.5)).toBeCloseTo(3, 12);
    for (const [min, max] of [
      ['179.000000', '-179.500000'],
      ['179.000000', '180.500000'],
      ['-181.000000', '-179.500000'],
    ] as const) {
      const grid = await open(isg({ 'lon min': min, 'lon max': max }));
      expect(await valueAt(grid, 51, 180)).toBeCloseTo(2, 12);
      expect(await valueAt(grid, 51, -179.75)).toBeCloseTo(2.5, 12);
      expect((await faultOf(() => valueAt(grid, 51, 178.9))).code).toBe('outside-grid');
    }
  });

  it('never makes a number of a missing value, but leaves out nodes that have no weight', async () => {
    const grid = await open(isg({}, ['0 1 2 3', '10 -9999.0000 12 13', '20 21 22 23']));
    const fault = await faultOf(() => valueAt(grid, 50.75, 10.25));
    expect(fault).toMatchObject({ code: 'nodata', found: 'no value at the node 50.5, 10.5' });
    expect(await valueAt(grid, 51, 10.25)).toBeCloseTo(0.5, 12);
    expect((await faultOf(() => valueAt(grid, 50.5, 10.5))).code).toBe('nodata');
    const { nodes } = interpolate(await gridExcerpt(grid, 51, 10.25), 51, 10.25);
    expect(nodes.map((n) => n.valueM)).toEqual([10, null, 0, 1]);
  });

  it('lets a row go over several lines, but not run into the next', async () => {
    const grid = await open(isg({}, ['0 1', ' 2 3', '10 11 12 13', '20', '21 22', '23']));
    expect(await valueAt(grid, 50, 11.5)).toBe(23);
    const fault = await faultOf(() => open(isg({}, ['0 1 2', '3 10 11 12 13', '20 21 22 23'])));
    expect(fault).toMatchObject({ code: 'row-length', line: 25 });
  });

  it('reads mixed line ends, and says so', async () => {
    let i = 0;
    const mixed = new TextDecoder().decode(isg()).replace(/\n/g, () => ['\r\n', '\n', '\r'][i++ % 3]!);
    const grid = await open(text(mixed));
    expect(await valueAt(grid, 50, 11.5)).toBe(23);
    expect(grid.warnings.map((w) => w.code)).toEqual(['mixed-line-ends']);
    const windows = await open(text(new TextDecoder().decode(isg()).replace(/\n/g, '\r\n')));
    expect(windows.warnings).toEqual([]);
  });

  describe('refuses', () => {
    it.each([
      [
        'truncated after a row',
        isg({}, ['0 1 2 3', '10 11 12 13']),
        'file-truncated',
        /8 values, ending in row 3 of 3/,
      ],
      ['truncated in a row', isg({}, ['0 1 2 3', '10 11 12 13', '20 21']), 'file-truncated', /10 values/],
      ['one row too many', isg({}, ['0 1 2 3', '10 11 12 13', '20 21 22 23', '4']), 'too-many-values', /3 rows of 4/],
      ['a decimal comma', isg({}, ['0 1 2 3', '10 11,5 12 13', '20 21 22 23']), 'value', /11,5/],
      ['nan', isg({}, ['0 1 2 3', '10 nan 12 13', '20 21 22 23']), 'value', /nan/],
      ['scattered points', dataFile('isg/example-3.isg'), 'header-value', /sparse/],
      ['projected coordinates', isg({ 'coord type': 'projected' }), 'header-value', /projected/],
      ['another ordering', isg({ 'data ordering': 'W-to-E, N-to-S' }), 'header-value', /W-to-E/],
      ['a missing bound', isg({ 'lat min': null }), 'header-key-missing', /nothing/],
      ['an unknown unit', isg({ 'data units': 'furlong' }), 'header-value', /furlong/],
      ['no unit', isg({ 'data units': '---' }), 'header-value', /---/],
      ['an unknown surface', isg({ 'data type': 'gravity' }), 'header-value', /gravity/],
      ['an unknown tide system', isg({ 'tide system': 'some-tide' }), 'header-value', /some-tide/],
      ['a later format', isg({ 'ISG format': '3.0' }), 'header-value', /3\.0/],
      ['a latitude beyond the pole', isg({ 'lat max': '91.000000', 'lat min': '90.000000' }), 'header-value', /91/],
      ['bounds the wrong way round', isg({ 'lat max': '49.000000' }), 'header-value', /49/],
      ['a step of zero', isg({ 'delta lat': '0.000000' }), 'header-value', /0\.0/],
      ['degrees where d-m-s is announced', isg({ 'coord units': 'dms' }), 'header-value', /50\.0/],
      ['a line that is neither', text('begin_of_head\nwhat is this\nend_of_head\n'), 'header-line', /what is this/],
      ['a key twice', text('begin_of_head\nnrows = 3\nnrows = 4\nend_of_head\n'), 'header-key-twice', /4/],
      ['no head', text('1 2 3\n4 5 6\n'), 'not-isg', /begin_of_head/],
      ['no end of the head', text('begin_of_head ==\nnrows = 3\n'), 'not-isg', /end_of_head/],
    ])('%s', async (_, bytes, code, found) => {
      const fault = await faultOf(() => open(bytes));
      expect(fault.code).toBe(code);
      expect(fault.found).toMatch(found);
    });

    it('bounds half a cell off, which fit neither as nodes nor as edges', async () => {
      for (const changes of [
        { 'lat min': '49.750000' },
        { 'lat max': '51.250000' },
        { nrows: '4' },
        { 'delta lat': '0.450000' },
        // rows as nodes, columns as edges
        { 'lon min': '9.750000', 'lon max': '11.750000' },
      ]) {
        const fault = await faultOf(() => open(isg(changes)));
        expect(fault.code).toBe('registration');
        expect(fault.found).toMatch(/rows if these are nodes/);
      }
    });

    it('a size beyond any memory, at once', async () => {
      const before = process.memoryUsage().arrayBuffers;
      const claims = (rows: number, columns: number) => ({
        nrows: String(rows),
        ncols: String(columns),
        // bounds and steps that agree
        'delta lat': String(1 / (rows - 1)),
        'delta lon': String(1.5 / (columns - 1)),
      });
      expect((await faultOf(() => open(isg(claims(2_000_000_000, 2))))).code).toBe('file-too-short');
      expect((await faultOf(() => open(isg(claims(40_001, 50_001))))).code).toBe('file-too-short');
      expect((await faultOf(() => open(isg(claims(99_999_999_999, 3))))).code).toBe('header-value');
      expect(process.memoryUsage().arrayBuffers - before).toBeLessThan(1 << 22);
    });

    it('a text without lines, without gathering it', async () => {
      const fault = await faultOf(() => open(new Uint8Array(5 << 20).fill(0x41)));
      expect(fault.code).toBe('not-isg');
    });
  });
});

describe('registration from printed numbers', () => {
  const axis = (name: 'lat' | 'lon', min: number, max: number, delta: number, count: number, digits: number) => {
    const printed = (value: number) => ({ value, halfDigit: 0.5 * 10 ** -digits });
    return { name, min: printed(min), max: printed(max), delta: printed(delta), count };
  };

  it('knows a step whose last digits are cut', () => {
    // 45 … 47° by 30″ with 241 rows: 0.008333
    const found = findRegistration(axis('lat', 45, 47, 0.008333, 241, 6), axis('lon', 13, 17, 0.0125, 321, 6), 'edges');
    expect(found).toMatchObject({ registration: 'nodes', warnings: [] });
    expect(found.latitudeStepDeg).toBeCloseTo(1 / 120, 12);
  });

  it('takes a whole number of arc-seconds before a step that only seems exact', () => {
    // 249 steps of 30″ printed as 0.0083: 250 rows as nodes; 250 · 0.0083 = 2.075 would be exact as edges
    const lat = axis('lat', 40, 42.075, 0.0083, 250, 4);
    const found = findRegistration(lat, axis('lon', 10, 12.075, 0.0083, 250, 4), 'edges');
    expect(found.registration).toBe('nodes');
    expect(found.warnings.map((w) => w.code)).toEqual(['registration-doubtful']);
  });

  it('falls back on the definition of the format where both fit alike, and warns with the size', () => {
    // a head as published for a grid of Argentina: 37.0008° by 0.0167° is 2219 or 2220 steps within the printed digits
    const lat = axis('lat', -57.0091, -20.0083, 0.0167, 2220, 4);
    const lon = axis('lon', -76.0083, -52.0079, 0.0167, 1440, 4);
    const found = findRegistration(lat, lon, 'edges');
    expect(found.registration).toBe('edges');
    expect(found.warnings[0]!.message).toMatch(/half a cell off: 0\.93 km/);
    expect(findRegistration(lat, lon, 'nodes').registration).toBe('nodes');
    // with a step that no longer fits, nothing is guessed
    expect(() => findRegistration(lat, { ...lon, delta: { value: 0.0165, halfDigit: 5e-5 } }, 'edges')).toThrow(
      /registration/,
    );
  });
});
