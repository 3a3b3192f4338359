import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { geocentricToGeodetic, geodeticToGeocentric, localAxes } from '../../../lib/earth/geocentric.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { degToRad, type Radians } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number) =>
  expect(Math.abs(actual - expected), `${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const wgs84 = { a: 6378137, e2: (1 / 298.257223563) * (2 - 1 / 298.257223563) };

describe('geodetic and geocentric coordinates', () => {
  it('reproduces the test pairs of the SOFA/ERFA library (t_gd2gc, t_gc2gd)', () => {
    const place = { latitudeRad: -0.5 as Radians, longitudeRad: 3.1 as Radians, heightM: 2500 };
    const grs = geodeticToGeocentric(GRS80, place);
    // ERFA's GRS80 has 1/f = 298.257222101, ours comes from J2: they differ by less than 1e-9 of f
    within(grs.xM, -5599000.5577260984, 1e-6);
    within(grs.yM, 233011.6722356702949, 1e-6);
    within(grs.zM, -3040909.4706095476, 1e-6);
    const wgs = geodeticToGeocentric(wgs84, place);
    within(wgs.xM, -5599000.5577049947, 2e-9);
    within(wgs.yM, 233011.67223479203, 2e-9);
    within(wgs.zM, -3040909.4706983363, 2e-9);
    const back = geocentricToGeodetic(wgs84, { xM: 2e6, yM: 3e6, zM: 5.244e6 });
    within(back.longitudeRad, 0.982793723247329, 1e-15);
    within(back.latitudeRad, 0.97160184819075459, 1e-15);
    within(back.heightM, 331.4172461426, 2e-9);
    const backGrs = geocentricToGeodetic(GRS80, { xM: 2e6, yM: 3e6, zM: 5.244e6 });
    within(backGrs.latitudeRad, 0.97160184820607853, 1e-14);
    within(backGrs.heightM, 331.41731754844348, 1e-7);
  });

  it('there and back to 3 nm, from the deepest mine to a geostationary satellite, poles and date line included', () => {
    const check = (latDeg: number, lonDeg: number, heightM: number) => {
      const place = { latitudeRad: degToRad(latDeg), longitudeRad: degToRad(lonDeg), heightM };
      const again = geocentricToGeodetic(GRS80, geodeticToGeocentric(GRS80, place));
      within(again.heightM, heightM, heightM > 1e6 ? 2e-8 : 3e-9);
      within((again.latitudeRad - place.latitudeRad) * 6.4e6, 0, 5e-9);
      const turn = again.longitudeRad - place.longitudeRad;
      within(Math.sin(turn) * Math.cos(place.latitudeRad) * 6.4e6, 0, 5e-9);
    };
    for (const lat of [-90, -89.9999999, -45, -1e-9, 0, 1e-9, 30, 52.3, 89.9999999, 90])
      for (const lon of [-180, -90, 0, 10, 179.9999999, 180])
        for (const h of [-12000, -100, 0, 143.2, 8848, 400e3, 35786e3]) check(lat, lon, h);
    fc.assert(
      fc.property(
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: -180, max: 180, noNaN: true }),
        fc.double({ min: -12000, max: 4e7, noNaN: true }),
        (lat, lon, h) => check(lat, lon, h),
      ),
      { seed: 3, numRuns: 300 },
    );
  });

  it('refuses what is no place on or above the Earth', () => {
    expect(() => geocentricToGeodetic(GRS80, { xM: 0, yM: 0, zM: 0 })).toThrow(/distance from the centre/);
    expect(() => geocentricToGeodetic(GRS80, { xM: 3771.8, yM: 140.3, zM: 5124.3 })).toThrow(/6 200 km/);
    expect(() => geocentricToGeodetic(GRS80, { xM: Number.NaN, yM: 6.4e6, zM: 0 })).toThrow(/distance/);
    expect(() =>
      geodeticToGeocentric(GRS80, { latitudeRad: 52 as Radians, longitudeRad: 0 as Radians, heightM: 0 }),
    ).toThrow(/degrees/);
    expect(() =>
      geodeticToGeocentric(GRS80, { latitudeRad: degToRad(5), longitudeRad: degToRad(5), heightM: Number.NaN }),
    ).toThrow(/heightM/);
  });

  it('has local axes that are the derivatives of the position', () => {
    const at = (lat: number, lon: number, h: number) => {
      const p = geodeticToGeocentric(GRS80, {
        latitudeRad: lat as Radians,
        longitudeRad: lon as Radians,
        heightM: h,
      });
      return [p.xM, p.yM, p.zM];
    };
    const axes = localAxes(0.8 as Radians, -2.1 as Radians);
    const up = at(0.8, -2.1, 10).map((v, i) => (v - at(0.8, -2.1, 0)[i]!) / 10);
    const north = at(0.8 + 1e-5, -2.1, 0).map((v, i) => v - at(0.8 - 1e-5, -2.1, 0)[i]!);
    const length = Math.hypot(...north);
    for (const i of [0, 1, 2]) {
      within(axes.up[i]!, up[i]!, 1e-9);
      within(axes.north[i]!, north[i]! / length, 1e-9);
    }
    within(axes.east[0] * axes.north[0] + axes.east[1] * axes.north[1] + axes.east[2] * axes.north[2], 0, 1e-16);
    // right-handed: east × north = up
    within(axes.east[1] * axes.north[2] - axes.east[2] * axes.north[1], axes.up[0], 1e-15);
  });
});
