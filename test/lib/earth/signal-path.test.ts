import { describe, expect, it } from 'vitest';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../lib/constants/defining-constants.js';
import { geodeticToGeocentric } from '../../../lib/earth/geocentric.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../../../lib/earth/normal-field.js';
import { gravitationalDelayS } from '../../../lib/earth/signal-path/gravitational-delay.js';
import { movedClockTime, type WayPoint } from '../../../lib/earth/signal-path/moved-clock.js';
import { orbitingClockOffset } from '../../../lib/earth/signal-path/orbiting-clock.js';
import { sagnacDelayS } from '../../../lib/earth/signal-path/sagnac.js';
import { alongGeodesic, type PathPoint } from '../../../lib/earth/signal-path/surface-path.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);
const point = (lat: number, lon: number, heightM = 0): PathPoint => ({
  latitudeRad: degToRad(lat),
  longitudeRad: degToRad(lon),
  heightM,
});
const xyz = (p: PathPoint) => geodeticToGeocentric(GRS80, p);
const sagnacAlong = (...stops: PathPoint[]) => {
  let sum = 0;
  for (let i = 1; i < stops.length; i++) sum += sagnacDelayS(alongGeodesic(stops[i - 1]!, stops[i]!).points.map(xyz));
  return sum;
};

describe('Sagnac delay', () => {
  it('is 207.4 ns around the equator eastwards (Ashby 2003, from memory), 2ωπa²/c² = 207.386 ns', () => {
    const around = sagnacAlong(point(0, 0), point(0, 90), point(0, 180), point(0, -90), point(0, 0));
    within(around * 1e9, 207.4, 0.05);
    within(around, (2 * GRS80.omega * Math.PI * GRS80.a ** 2) / C2, 207e-9 * 5e-7);
  });

  it('has the sign of the way: east later, west earlier, nothing along a meridian', () => {
    const a = point(52.3, 10.5);
    const b = point(48.8, 2.3);
    const west = sagnacAlong(a, b);
    expect(west).toBeLessThan(-1e-9);
    within(sagnacAlong(b, a), -west, 1e-22);
    within(sagnacAlong(point(10, 30), point(70, 30)), 0, 1e-22);
  });

  it('is that of the area swept on the equatorial plane, for a path along a parallel', () => {
    // 60° N, 30° of longitude in small steps along the parallel itself: ½·ρ²·Δλ
    const points = Array.from({ length: 3001 }, (_, i) => xyz(point(60, i / 100)));
    const rho = Math.hypot(points[0]!.xM, points[0]!.yM);
    within(sagnacDelayS(points), (GRS80.omega * rho * rho * degToRad(30)) / C2, 5e-17);
    expect(sagnacDelayS(points.slice(0, 1))).toBe(0);
  });

  it('goes up and down over a satellite by straight legs', () => {
    // two stations 40° apart on the equator, satellite over their middle: twice the triangle (centre, station, satellite)
    const satellite = point(0, 20, 35_786_000);
    const delay = sagnacDelayS([point(0, 0), satellite, point(0, 40)].map(xyz));
    const triangles = GRS80.a * (GRS80.a + 35_786_000) * Math.sin(degToRad(20));
    within(delay, (2 * GRS80.omega * triangles) / C2, 1e-18);
    expect(delay * 1e9).toBeGreaterThan(100);
  });
});

describe('leg along the surface', () => {
  it('is as long as the arc at its mean height, and slants where it climbs', () => {
    const arc = GRS80.a * degToRad(10);
    within(alongGeodesic(point(0, 0), point(0, 10)).lengthM, arc, 1e-3);
    within(alongGeodesic(point(0, 0, 9000), point(0, 10, 9000)).lengthM, arc + 9000 * degToRad(10), 1e-3);
    within(
      alongGeodesic(point(0, 0, 1000), point(0, 10, 9000)).lengthM,
      Math.hypot(arc + 5000 * degToRad(10), 8000),
      1e-3,
    );
    within(alongGeodesic(point(40, 3, 100), point(40, 3, 600)).lengthM, 500, 1e-9);
  });

  it('has points at most so far apart, both ends among them, heights evenly between', () => {
    const { points } = alongGeodesic(point(0, 0, 0), point(0, 1, 1000), 25_000);
    expect(points).toHaveLength(6);
    within(points[1]!.heightM, 200, 1e-9);
    expect(points.at(-1)).toEqual(point(0, 1, 1000));
  });
});

describe('gravitational delay', () => {
  it('is 2GM/c³·ln((r₁ + r₂ + ρ)/(r₁ + r₂ − ρ)): against the integral of 2GM/(c³r) along the leg', () => {
    const ground = xyz(point(50, 10));
    const satellite = xyz(point(0, 19.2, 35_786_000));
    const n = 20_000;
    const leg = [satellite.xM - ground.xM, satellite.yM - ground.yM, satellite.zM - ground.zM] as const;
    const length = Math.hypot(...leg);
    let integral = 0;
    for (let i = 0; i < n; i++) {
      const s = (i + 0.5) / n;
      const r = Math.hypot(ground.xM + s * leg[0], ground.yM + s * leg[1], ground.zM + s * leg[2]);
      integral += length / n / r;
    }
    const expected = ((2 * GRS80.GM) / 299_792_458 ** 3) * integral;
    within(gravitationalDelayS(ground, satellite), expected, 1e-17);
    // tens of picoseconds: 2GM/c³ = 29.6 ps
    within(gravitationalDelayS(ground, satellite) * 1e12, 55, 10);
    within(gravitationalDelayS(satellite, ground), gravitationalDelayS(ground, satellite), 1e-25);
  });

  it('refuses a leg through the Earth', () => {
    expect(() => gravitationalDelayS(xyz(point(0, 0)), xyz(point(0, 180)))).toThrow(/in sight/);
  });
});

describe('clock in orbit', () => {
  const microsecondsPerDay = (y: number) => y * 86_400 * 1e6;

  it('gains 45 µs a day by height at the GPS orbit and loses 7.2 µs by its velocity (common practice, no source)', () => {
    const { potential, velocity } = orbitingClockOffset(26_561_750);
    within(microsecondsPerDay(potential), 45.7, 0.1);
    within(microsecondsPerDay(velocity), -7.2, 0.05);
  });

  it('loses 7213.76 ns a day at 3874 m/s and 7269.31 ns at 3888.889 m/s (−v²/2c², printed by a public calculator)', () => {
    within(microsecondsPerDay(orbitingClockOffset(26.6e6, 6.371e6, 3874).velocity) * 1e3, -7213.76, 0.01);
    within(microsecondsPerDay(orbitingClockOffset(26.6e6, 6.371e6, 3888.889).velocity) * 1e3, -7269.3141, 1e-3);
  });

  it('refuses what is no orbit', () => {
    expect(() => orbitingClockOffset(20_000)).toThrow(/centre/);
    expect(() => orbitingClockOffset(26.6e6, 0)).toThrow(/centre/);
  });
});

describe('moved clock', () => {
  const at = (p: PathPoint, hours: number): WayPoint => ({ ...p, timeMs: Date.UTC(2027, 4, 3) + hours * 3_600_000 });

  it('gains by height alone where it rests: C·T/c²', () => {
    const up = [
      at(point(47, 8, 400), 0),
      at(point(47, 8, 1400), 1),
      at(point(47, 8, 1400), 25),
      at(point(47, 8, 400), 26),
    ];
    const t = movedClockTime(up);
    const C = (h: number) => geopotentialOfNormalHeight(GRS80, degToRad(47), h).geopotentialM2s2;
    // a day up, and half the gain in each hour of the way
    within(t.potentialS, ((C(1400) - C(400)) * 25 * 3600) / C2, 1e-15);
    within(t.potentialS * 1e9, 9.8, 0.2);
    within(t.velocityS, (-0.5 * 2 * 3600 * (1000 / 3600) ** 2) / C2, 1e-19);
    within(t.rotationS, 0, 1e-20);
    within(t.durationS, 26 * 3600, 0);
    within(t.totalS, t.potentialS + t.velocityS + t.rotationS, 1e-24);
  });

  it('loses by velocity and on its way east, gains on its way west: round the equator at 10 km, 250 m/s', () => {
    const lap = (direction: 1 | -1) => {
      const radius = GRS80.a + 10_000;
      const hours = (2 * Math.PI * radius) / 250 / 3600;
      return movedClockTime(
        [0, 1, 2, 3, 4].map((k) => at(point(0, direction * (k * 90 - (k > 2 ? 360 : 0)), 10_000), (hours * k) / 4)),
      );
    };
    const [east, west] = [lap(1), lap(-1)];
    within(east.velocityS * 1e9, -((0.5 * 250 ** 2 * east.durationS) / C2) * 1e9, 1e-4);
    within(east.potentialS, 0, 1e-18);
    within(east.rotationS * 1e9, -207.386 * (1 + 10_000 / GRS80.a) ** 2, 1e-3);
    within(west.rotationS, -east.rotationS, 1e-21);
    // the order of Hafele & Keating 1972: some −59 ns and +273 ns, with the height's gain of some 150 ns against the ground
    expect(east.totalS).toBeLessThan(-200e-9);
    expect(west.totalS).toBeGreaterThan(100e-9);
  });

  it('has no time of its own when it stays', () => {
    const t = movedClockTime([at(point(52, 10, 100), 0), at(point(52, 10, 100), 48)]);
    expect(t.durationS).toBe(172_800);
    within(t.potentialS, 0, 1e-25);
    within(t.velocityS, 0, 1e-25);
    within(t.totalS, 0, 1e-25);
  });

  it('refuses times that do not rise, one way point, and impossible speeds', () => {
    expect(() => movedClockTime([at(point(0, 0), 0)])).toThrow(/two or more/);
    expect(() => movedClockTime([at(point(0, 0), 1), at(point(0, 1), 1)])).toThrow(/rise/);
    expect(() => movedClockTime([at(point(0, 0), 0), at(point(0, 90), 0.1)])).toThrow(/12 km\/s/);
  });
});
