import { Body, GeoMoon, HelioVector, KM_PER_AU, MakeTime, Rotation_EQJ_EQD, SiderealTime } from 'astronomy-engine';
import { QuantityRangeError } from '../range-error.js';

/** Geocentric positions of the Moon and the Sun in Earth-fixed axes (z to the pole, x to Greenwich), m. */
export interface SunAndMoon {
  readonly moon: readonly [number, number, number];
  readonly sun: readonly [number, number, number];
}

const M_PER_AU = KM_PER_AU * 1000;
const DAY_MS = 86_400_000;
/** 2000-01-01T12:00:00Z */
export const J2000_MS = 946_728_000_000;

export const TIDE_FIRST_MS = Date.UTC(1950, 0, 1);
export const TIDE_LAST_MS = Date.UTC(2100, 0, 1);

/** Positions in the true equator and equinox of date, m, and Greenwich apparent sidereal time, rad. */
export interface SunAndMoonOfDate {
  readonly moon: readonly [number, number, number];
  readonly sun: readonly [number, number, number];
  readonly siderealTimeRad: number;
}

/** Geometric positions of the Moon and the Sun (no light time, no aberration: it is their pull that is wanted).
 *  Moon: Montenbruck & Pfleger's form of Brown's theory; Sun: VSOP87, both as in the package astronomy-engine. Against ERFA's
 *  moon98 and epv00 the Moon agrees within 10″ and 19 km, the Sun within 2″ and 1200 km: below 1e-3 m²/s² in the tide.
 *  UTC is taken for UT1 and polar motion is left out: within 0.9 s and 0.5″, 3e-4 m²/s².
 * @param timeMs UTC, milliseconds since 1970, about 1950…2100: callers check it with {@link checkTideTime} */
export function sunAndMoonOfDate(timeMs: number): SunAndMoonOfDate {
  const time = MakeTime((timeMs - J2000_MS) / DAY_MS);
  const { rot } = Rotation_EQJ_EQD(time);
  const turn = (x: number, y: number, z: number): [number, number, number] => [
    (rot[0]![0]! * x + rot[1]![0]! * y + rot[2]![0]! * z) * M_PER_AU,
    (rot[0]![1]! * x + rot[1]![1]! * y + rot[2]![1]! * z) * M_PER_AU,
    (rot[0]![2]! * x + rot[1]![2]! * y + rot[2]![2]! * z) * M_PER_AU,
  ];
  const moon = GeoMoon(time);
  const earth = HelioVector(Body.Earth, time);
  return {
    moon: turn(moon.x, moon.y, moon.z),
    sun: turn(-earth.x, -earth.y, -earth.z),
    siderealTimeRad: (SiderealTime(time) * Math.PI) / 12,
  };
}

/** The same in Earth-fixed axes.
 * @throws {QuantityRangeError} outside 1950…2100 */
export function sunAndMoon(timeMs: number): SunAndMoon {
  checkTideTime(timeMs);
  const { moon, sun, siderealTimeRad } = sunAndMoonOfDate(timeMs);
  const s = Math.sin(siderealTimeRad);
  const c = Math.cos(siderealTimeRad);
  return {
    moon: [c * moon[0] + s * moon[1], c * moon[1] - s * moon[0], moon[2]],
    sun: [c * sun[0] + s * sun[1], c * sun[1] - s * sun[0], sun[2]],
  };
}

export function checkTideTime(timeMs: number): void {
  if (!(timeMs >= TIDE_FIRST_MS && timeMs <= TIDE_LAST_MS))
    throw new QuantityRangeError('timeMs', timeMs, 'milliseconds since 1970, from 1950-01-01 to 2100-01-01 UTC');
}
