import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { readCoordinateSystem, systemOfCode } from '../../../lib/earth/projected-position/coordinate-system.js';
import { NATIONAL_SYSTEMS } from '../../../lib/earth/projected-position/national-systems.js';
import { readDefinition } from '../../../lib/earth/projected-position/projection-definition.js';
import { resolvePosition, type StatedPosition } from '../../../lib/earth/projected-position/resolve-position.js';
import { radToDeg } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const proj = JSON.parse(readFileSync(new URL('../../data/positions/proj.json', import.meta.url), 'utf8')) as {
  cases: [number, number, number, number, number][];
};

const resolved = (stated: StatedPosition) => {
  const read = resolvePosition(stated);
  if (!read.ok) throw new Error(`${read.at} ${read.code}: ${read.expected}`);
  return { ...read.position, lat: radToDeg(read.position.latitudeRad), lon: radToDeg(read.position.longitudeRad) };
};
const refused = (stated: StatedPosition) => {
  const read = resolvePosition(stated);
  if (read.ok)
    throw new Error(`read as ${radToDeg(read.position.latitudeRad)}, ${radToDeg(read.position.longitudeRad)}`);
  return read;
};

describe('positions in projected systems', () => {
  it('agree with PROJ 9.1.1 to 1 mm in every built-in system (test/data/positions)', () => {
    for (const { code } of NATIONAL_SYSTEMS) expect(proj.cases.filter((c) => c[0] === code)).toHaveLength(3);
    for (const [code, x, y, lat, lon] of proj.cases) {
      const p = resolved({ crs: `EPSG:${code}`, x, y });
      const what = `EPSG:${code} ${x} ${y}`;
      within((p.lat - lat) * 111_200, 0, 1e-3, what);
      within((p.lon - lon) * 111_200 * Math.cos((lat * Math.PI) / 180), 0, 1e-3, what);
      expect(p.cautions, what).toEqual([]);
    }
  });

  it('agree with published worked examples (from memory)', () => {
    // Ordnance Survey, A guide to coordinate systems in Great Britain, annex C: 651409.903 E 313177.270 N, Airy ellipsoid
    const airy = resolved({
      crs: '+proj=tmerc +lat_0=49 +lon_0=-2 +k=0.9996012717 +x_0=400000 +y_0=-100000 +ellps=airy +units=m',
      x: 651409.903,
      y: 313177.27,
    });
    within(airy.lat, 52 + 39 / 60 + 27.2531 / 3600, 2e-8);
    within(airy.lon, 1 + 43 / 60 + 4.5177 / 3600, 2e-8);
    // swisstopo: the origin of LV95 in Bern is 46.951083° N, 7.438632° E in WGS 84
    const bern = resolved({ crs: 'EPSG:2056', x: 2_600_000, y: 1_200_000 });
    within(bern.lat, 46.951083, 1e-6);
    within(bern.lon, 7.438632, 1e-6);
  });

  it('are the same by code, by number, by URN and by definition', () => {
    const a = resolved({ crs: 'EPSG:31467', x: 3_600_000, y: 5_795_000 });
    for (const crs of [
      '31467',
      'epsg: 31467',
      'urn:ogc:def:crs:EPSG::31467',
      '+proj=tmerc +lat_0=0 +lon_0=9 +k=1 +x_0=3500000 +y_0=0 +ellps=bessel +towgs84=598.1,73.7,418.2,0.202,0.045,-2.455,6.7 +units=m +no_defs +type=crs',
      '+proj=tmerc +lon_0=9 +x_0=3500000 +a=6377397.155 +rf=299.1528128 +towgs84=598.1,73.7,418.2,0.202,0.045,-2.455,6.7 +axis=neu',
    ]) {
      const b = resolved({ crs, x: 3_600_000, y: 5_795_000 });
      within(b.lat, a.lat, 1e-12, crs);
      within(b.lon, a.lon, 1e-12, crs);
    }
    // without the datum shift the place would be 150 m off
    const bare = resolved({ crs: '+proj=tmerc +lon_0=9 +x_0=3500000 +ellps=bessel', x: 3_600_000, y: 5_795_000 });
    expect(Math.hypot(bare.lat - a.lat, bare.lon - a.lon) * 111_200).toBeGreaterThan(100);
    expect(a.steps).toMatch(/seven-parameter shift.*3 m horizontally/);
  });

  it('take three numbers of a translation too', () => {
    const bessel =
      '+proj=somerc +lat_0=46.9524055555556 +lon_0=7.43958333333333 +k_0=1 +x_0=600000 +y_0=200000 +ellps=bessel';
    const a = resolved({ crs: `${bessel} +towgs84=674.374,15.056,405.346`, x: 707_000, y: 231_000 });
    const b = resolved({ crs: 'EPSG:21781', x: 707_000, y: 231_000 });
    within(a.lat, b.lat, 1e-13);
    within(a.lon, b.lon, 1e-13);
  });

  it('say when only the swap of easting and northing makes sense, and never swap by themselves', () => {
    expect(refused({ crs: 'EPSG:25832', x: 5_795_000, y: 604_000 })).toMatchObject({ code: 'swapped-axes', at: '' });
    expect(refused({ crs: 'EPSG:25832', x: 5_795_000, y: 604_000 }).expected).toMatch(
      /swapped one at 52\.\d\d° N, 10\.\d\d° E/,
    );
    expect(refused({ crs: 'EPSG:31467', x: 5_795_000, y: 3_600_000 }).code).toBe('swapped-axes');
    expect(refused({ crs: 'EPSG:2056', x: 1_200_000, y: 2_600_000 }).code).toBe('swapped-axes');
    // the south of Japan has negative northings and small eastings: both ways make sense, so the words are taken as they stand
    expect(resolved({ crs: 'EPSG:6677', x: -5000, y: -30_000 }).lat).toBeLessThan(36);
  });

  it('warn about a place far from where the system is used', () => {
    const p = resolved({ crs: 'EPSG:25832', x: 1_400_000, y: 5_800_000 });
    expect(p.cautions).toEqual([expect.objectContaining({ code: 'outside-area-of-use' })]);
    expect(p.cautions[0]!.message).toMatch(/right zone/);
  });

  it('refuse coordinates that the projection cannot hold', () => {
    for (const [x, y] of [
      [1e9, 5e6],
      [Number.NaN, 5e6],
      [5e5, 9e8],
    ] as const)
      expect(refused({ crs: 'EPSG:25832', x, y }).code).toBe('outside-projection');
    expect(refused({ crs: '+proj=lcc +lat_1=35 +lat_2=65 +lat_0=52 +ellps=GRS80', x: 1e12, y: 0 }).ok).toBe(false);
  });

  it('know the UTM zones by rule and nothing beside them', () => {
    expect(systemOfCode(25832)).toMatchObject({
      name: 'EPSG:25832 ETRS89 / UTM zone 32N',
      area: { west: 6, east: 12 },
    });
    expect(systemOfCode(32760)).toMatchObject({
      name: 'EPSG:32760 WGS 84 / UTM zone 60S',
      area: { west: 174, east: 180 },
    });
    for (const code of [25827, 25839, 32600, 32661, 32761, 31465, 9999]) expect(systemOfCode(code)).toBeNull();
  });
});

describe('latitude and longitude, and geocentric coordinates', () => {
  it('are taken as they stand', () => {
    const p = resolved({ crs: 'EPSG:4258', latDeg: 52.2961, lonDeg: 10.4598 });
    within(p.lat, 52.2961, 1e-13);
    within(p.lon, 10.4598, 1e-13);
    expect(p.heightM).toBeNull();
  });

  it('bring latitude, longitude and height out of X, Y, Z', () => {
    // the pair of ERFA's t_gc2gd: GRS80 0.97160184820607853 rad, 0.982793723247329 rad, 331.41731754844348 m
    for (const crs of ['geocentric', 'EPSG:4936', 'EPSG:9988', '4978']) {
      const p = resolved({ crs, x: 2e6, y: 3e6, z: 5.244e6 });
      within(p.latitudeRad, 0.97160184820607853, 1e-14);
      within(p.longitudeRad, 0.982793723247329, 1e-15);
      within(p.heightM!, 331.41731754844348, 1e-7);
    }
  });

  it('are refused in words where they are none', () => {
    expect(refused({ crs: 'geocentric', x: 3771.8, y: 140.3, z: 5124.3 })).toMatchObject({ code: 'not-on-earth' });
    expect(refused({ crs: 'geocentric', x: 2e7, y: 3e6, z: 5e6 }).expected).toMatch(/km above/);
    expect(refused({ crs: 'geocentric', x: 2e6, y: 3e6 })).toMatchObject({ at: 'z', code: 'missing-coordinate' });
    expect(refused({ crs: 'EPSG:4326', x: 10, y: 52 })).toMatchObject({ at: 'x', code: 'unexpected-coordinate' });
    expect(refused({ crs: 'EPSG:25832', latDeg: 52, lonDeg: 10 }).code).toMatch(/coordinate/);
    expect(refused({ crs: 'EPSG:25832', x: 604_000, y: 5_795_000, z: 100 })).toMatchObject({ at: 'z' });
    expect(refused({ crs: 'EPSG:4258', latDeg: 139.76, lonDeg: 35.71 }).expected).toMatch(/swapped/);
    expect(refused({ crs: 'EPSG:4258', latDeg: 139.76, lonDeg: 135.71 }).expected).not.toMatch(/swapped/);
  });
});

describe('definitions', () => {
  const expected = (text: string) => {
    const read = readCoordinateSystem(text);
    if (read.ok) throw new Error(`${text} was read`);
    return `${read.code}: ${read.expected}`;
  };

  it.each([
    ['EPSG:9999', /unknown-crs: .*projinfo EPSG:9999 -o PROJ/],
    ['EPSG:25842', /the PROJ definition of EPSG:25842/],
    ['UTM32', /unknown-crs: an EPSG code such as/],
    ['', /unknown-crs/],
    ['+proj=utm +zone=32 +ellps=GRS8O', /GRS80/],
    ['+proj=utm +zone=32', /an ellipsoid of the Earth/],
    ['+proj=utm +ellps=GRS80', /\+zone=1/],
    ['+proj=utm +zone=61 +ellps=GRS80', /\+zone=1/],
    ['+proj=tmrec +ellps=GRS80', /did you mean tmerc/],
    ['+proj=tmerc +lon_O=9 +ellps=GRS80', /did you mean \+lon_0/],
    ['+proj=tmerc +lon_0=9E +ellps=GRS80', /a number behind \+lon_0/],
    ['+proj=tmerc +lon_0=9 +lon_0=12 +ellps=GRS80', /stands twice/],
    ['+proj=tmerc +lon_0=9 +datum=potsdam', /\+datum=WGS84 or NAD83/],
    ['+proj=tmerc +lon_0=9 +ellps=bessel +nadgrids=BETA2007.gsb', /unsupported-definition: .*\+nadgrids/],
    ['+proj=utm +zone=32 +ellps=GRS80 +geoidgrids=egm96.gtx', /heights never go through/],
    ['+proj=utm +zone=32 +ellps=GRS80 +vunits=us-ft', /heights never go through/],
    ['+proj=lcc +lat_1=40 +lat_2=42 +ellps=GRS80 +units=us-ft', /1200\/3937/],
    ['+proj=tmerc +lon_0=9 +ellps=bessel +towgs84=1,2', /three or seven/],
    ['+proj=tmerc +lon_0=9 +ellps=bessel +towgs84=1,2,x', /three or seven/],
    ['+proj=tmerc +ellps=GRS80 +axis=wsu', /easting/],
    ['+proj=lcc +pm=paris +ellps=clrk80ign', /prime meridian/],
    ['+proj=geocent +ellps=GRS80', /"geocentric"/],
    ['+init=epsg:25832', /EPSG:25832/],
    ['+proj=tmerc +ellps=GRS80 +a=6378137', /not both/],
    ['+proj=tmerc +a=6378 +rf=298', /an ellipsoid of the Earth/],
    ['proj=utm +zone=32', /unknown-crs/],
    ['+proj=utm zone=32 +ellps=GRS80', /"zone=32" is none/],
    ['+proj=tmerc +ellps=__proto__', /\+ellps= one of/],
  ])('%s is refused', (text, pattern) => {
    expect(expected(text)).toMatch(pattern);
  });

  it('keep south, and leave the datum to us', () => {
    const read = readDefinition('+proj=utm +zone=56 +south +ellps=GRS80 +towgs84=0,0,0 +no_defs');
    expect(read.ok && read.definition.text).toMatch(/\+south/);
    expect(read.ok && read.definition.text).not.toMatch(/towgs84/);
    expect(read.ok && read.definition.toWgs84).toEqual([0, 0, 0, 0, 0, 0, 0]);
  });
});
