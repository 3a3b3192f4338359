import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { transformBackward, transformForward } from '../../../lib/earth/frames/fourteen-parameters.js';
import { FRAME_NAMES, type FrameName, readFrameName } from '../../../lib/earth/frames/frame-name.js';
import { frameRoute, transformPosition } from '../../../lib/earth/frames/frame-transformation.js';
import { frameChangeOfHeight, heightInFrame } from '../../../lib/earth/frames/height-in-frame.js';
import { PUBLISHED_TRANSFORMATIONS } from '../../../lib/earth/frames/published-transformations.js';
import { geocentricToGeodetic, geodeticToGeocentric } from '../../../lib/earth/geocentric.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

type Row = [FrameName, FrameName, number, number, number, number, number, number, number];
const proj = JSON.parse(readFileSync(new URL('../../data/frames/proj.json', import.meta.url), 'utf8')) as {
  cases: Row[];
};

describe('transformations between terrestrial frames', () => {
  it('agrees with PROJ 9.1.1 to 1 µm in every pair of frames (test/data/frames)', () => {
    expect(new Set(proj.cases.map((c) => `${c[0]} ${c[1]}`)).size).toBe(FRAME_NAMES.length * (FRAME_NAMES.length - 1));
    for (const [from, to, lon, lat, h, epoch, lon2, lat2, h2] of proj.cases) {
      const here = geodeticToGeocentric(GRS80, {
        latitudeRad: degToRad(lat),
        longitudeRad: degToRad(lon),
        heightM: h,
      });
      const there = transformPosition(here, from, to, epoch);
      const expected = geodeticToGeocentric(GRS80, {
        latitudeRad: degToRad(lat2),
        longitudeRad: degToRad(lon2),
        heightM: h2,
      });
      const what = `${from} → ${to} at ${epoch}`;
      within(there.xM, expected.xM, 1e-6, what);
      within(there.yM, expected.yM, 1e-6, what);
      within(there.zM, expected.zM, 1e-6, what);
      within(frameChangeOfHeight(degToRad(lat), degToRad(lon), h, from, to, epoch), h2 - h, 1e-6, what);
    }
  });

  it('cancels exactly forwards and backwards, for every published set', () => {
    const p = { xM: 3771793.9, yM: 140253.3, zM: 5124304.3 };
    for (const { parameters } of PUBLISHED_TRANSFORMATIONS) {
      const again = transformBackward(parameters, transformForward(parameters, p, 2031.2), 2031.2);
      within(Math.hypot(again.xM - p.xM, again.yM - p.yM, again.zM - p.zM), 0, 2e-9);
    }
  });

  it('closes every loop over three frames: the published tables agree with each other, a wrong digit would open one', () => {
    const p = { xM: 3771793.9, yM: 140253.3, zM: 5124304.3 };
    for (const a of FRAME_NAMES)
      for (const b of FRAME_NAMES)
        for (const c of FRAME_NAMES) {
          if (a === b || b === c || c === a) continue;
          const q = transformPosition(transformPosition(transformPosition(p, a, b, 2027), b, c, 2027), c, a, 2027);
          within(Math.hypot(q.xM - p.xM, q.yM - p.yM, q.zM - p.zM), 0, 2e-8, `${a} ${b} ${c}`);
        }
  });

  it('shows the size that matters: ITRF2020 against ETRF2000 in central Europe is centimetres in height', () => {
    // PROJ through ITRF2014, 52.2961° N 10.4598° E, 143.216 m, 2027.36: 10th row of that pair in test/data/frames/proj.json
    const row = proj.cases.find((c) => c[0] === 'ITRF2020' && c[1] === 'ETRF2000' && c[5] === 2027.36)!;
    const dh = frameChangeOfHeight(degToRad(row[3]), degToRad(row[2]), row[4], 'ITRF2020', 'ETRF2000', 2027.36);
    within(dh, row[8] - row[4], 1e-6);
    expect(Math.abs(dh)).toBeGreaterThan(0.02);
  });

  it('routes ITRF2020 to ETRF2000 through ITRF2014 and every published pair directly', () => {
    expect(frameRoute('ITRF2020', 'ETRF2000').map((s) => s.to)).toEqual(['ITRF2014', 'ETRF2000']);
    expect(frameRoute('ITRF2000', 'ITRF2020')).toHaveLength(1);
    expect(frameRoute('ITRF2008', 'ITRF2008')).toHaveLength(0);
  });
});

describe('a height in another frame and epoch', () => {
  const lat = degToRad(52.2961);
  const lon = degToRad(10.4598);

  it('moves with the rate first, then changes frame at the wanted epoch', () => {
    const r = heightInFrame(
      lat,
      lon,
      143.216,
      0.0032,
      { frame: 'ITRF2020', epochYear: 2015 },
      { frame: 'ETRF2000', epochYear: 2027.36 },
    );
    within(r.byMotionM, 0.0032 * 12.36, 1e-12);
    const row = proj.cases.find(
      (c) => c[0] === 'ITRF2020' && c[1] === 'ETRF2000' && c[3] === 52.2961 && c[5] === 2027.36,
    )!;
    // the frame's shift changes by 1e-8 over the 4 cm
    within(r.byFrameM, row[8] - row[4], 1e-6);
    within(r.heightM, 143.216 + r.byMotionM + r.byFrameM, 1e-12);
    within(r.perRateYears, 12.36, 1e-12);
    expect(r.sources).toHaveLength(2);
  });

  it('agrees with a rigorous station: full velocity, moved in either frame', () => {
    // a plate that moves 2.5 cm a year and rises 4 mm a year in ITRF2014, ten years
    const start = geodeticToGeocentric(GRS80, { latitudeRad: lat, longitudeRad: lon, heightM: 143.216 });
    const axes = [
      [Math.cos(lat) * Math.cos(lon), -Math.sin(lon), -Math.sin(lat) * Math.cos(lon)],
      [Math.cos(lat) * Math.sin(lon), Math.cos(lon), -Math.sin(lat) * Math.sin(lon)],
      [Math.sin(lat), 0, Math.cos(lat)],
    ];
    const enu = [0.004, 0.019, 0.016]; // up, east, north
    const v = axes.map((row) => row[0]! * enu[0]! + row[1]! * enu[1]! + row[2]! * enu[2]!);
    const end = { xM: start.xM + 10 * v[0]!, yM: start.yM + 10 * v[1]!, zM: start.zM + 10 * v[2]! };
    const rigorous = geocentricToGeodetic(GRS80, transformPosition(end, 'ITRF2014', 'ETRF2000', 2020)).heightM;
    const ours = heightInFrame(
      lat,
      lon,
      143.216,
      0.004,
      { frame: 'ITRF2014', epochYear: 2010 },
      { frame: 'ETRF2000', epochYear: 2020 },
    );
    within(ours.heightM, rigorous, 2e-7);
  });

  it('gives the same whichever way round: transform first and move with the rate of the other frame', () => {
    for (const from of FRAME_NAMES)
      for (const to of FRAME_NAMES) {
        const once = heightInFrame(
          lat,
          lon,
          50,
          0.008,
          { frame: from, epochYear: 2003.5 },
          { frame: to, epochYear: 2027 },
        );
        const first = heightInFrame(
          lat,
          lon,
          50,
          0.008,
          { frame: from, epochYear: 2003.5 },
          { frame: to, epochYear: 2003.5 },
        );
        within(first.heightM + first.rateMPerYear * 23.5, once.heightM, 2e-7, `${from} ${to}`);
        const back = heightInFrame(
          lat,
          lon,
          once.heightM,
          once.rateMPerYear,
          { frame: to, epochYear: 2027 },
          { frame: from, epochYear: 2003.5 },
        );
        within(back.heightM, 50, 2e-7, `${from} ${to} and back`);
        within(back.rateMPerYear, 0.008, 1e-9);
      }
  });

  it('refuses an epoch that is no year', () => {
    expect(() =>
      heightInFrame(lat, lon, 0, 0, { frame: 'ITRF2014', epochYear: 61000 }, { frame: 'ITRF2014', epochYear: 2020 }),
    ).toThrow(/1980/);
    expect(() => frameChangeOfHeight(lat, lon, 0, 'ITRF2014', 'ETRF2000', Number.NaN)).toThrow(/decimal year/);
  });
});

describe('names of frames', () => {
  it.each([
    ['ITRF2020', 'ITRF2020'],
    ['itrf 2014', 'ITRF2014'],
    ['IGb14', 'ITRF2014'],
    ['IGS20', 'ITRF2020'],
    ['ETRF2000', 'ETRF2000'],
  ])('reads %s', (text, frame) => {
    expect(readFrameName(text)).toEqual({ ok: true, frame });
  });

  it.each([
    ['ETRS89', /name the one of your heights/],
    ['WGS84 (G2139)', /follow the ITRF/],
    ['ITRF', /with its year/],
    ['NAD83', /one of ITRF2020/],
    ['', /one of ITRF2020/],
  ])('refuses %s with what would be right', (text, pattern) => {
    const r = readFrameName(text);
    expect(r.ok).toBe(false);
    if (!r.ok) expect(r.expected).toMatch(pattern);
  });
});
