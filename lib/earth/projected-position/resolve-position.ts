import proj4 from 'proj4';
import { degToRad, type Radians, radToDeg } from '../../quantity/radians.js';
import { geocentricToGeodetic } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { QuantityRangeError } from '../range-error.js';
import { type CoordinateSystem, readCoordinateSystem } from './coordinate-system.js';
import { type LatitudeLongitude, shiftDatum } from './datum-shift.js';
import type { AreaOfUse } from './known-system.js';
import { ellipsoidWords, type ProjectionDefinition } from './projection-definition.js';

/** A position as typed: x is the easting and y the northing (or geocentric X, Y, Z), m; lat and lon in degrees. */
export interface StatedPosition {
  readonly crs: string;
  readonly x?: number;
  readonly y?: number;
  readonly z?: number;
  readonly latDeg?: number;
  readonly lonDeg?: number;
}

export interface ResolvedPosition {
  /** geodetic on GRS80 */
  readonly latitudeRad: Radians;
  readonly longitudeRad: Radians;
  /** ellipsoidal height; only of geocentric coordinates */
  readonly heightM: number | null;
  /** what was done, in words */
  readonly steps: string;
  /** computed, but doubtful */
  readonly cautions: readonly { readonly code: string; readonly message: string }[];
}

export type PositionReading =
  | { readonly ok: true; readonly position: ResolvedPosition }
  | {
      readonly ok: false;
      /** key at fault, '' for the whole */
      readonly at: 'crs' | 'x' | 'y' | 'z' | 'lat' | 'lon' | '';
      readonly code: string;
      readonly expected: string;
    };

type Refusal = Extract<PositionReading, { ok: false }>;
const refuse = (at: Refusal['at'], code: string, expected: string): Refusal => ({ ok: false, at, code, expected });

/** Latitude and longitude on GRS80 of a position in a national grid, in latitude and longitude, or in geocentric coordinates.
 *  ETRS89, WGS 84 and the other frames of today are taken as one here: they differ by up to 2 m horizontally, which changes a
 *  potential by 1e-5 m²/s² at 1000 m. What the frame does to a height is no part of it, and no height goes through a projection.
 *  Never swaps axes by itself: where only the swap makes sense, it says so. */
export function resolvePosition(stated: StatedPosition): PositionReading {
  const read = readCoordinateSystem(stated.crs);
  if (!read.ok) return refuse('crs', read.code, read.expected);
  const { system } = read;
  const unwanted = unwantedKey(stated, system.form);
  if (unwanted) return unwanted;
  switch (system.form) {
    case 'geocentric':
      return fromGeocentric(stated, system.name);
    case 'geographic':
      return fromGeographic(stated, system);
    case 'projected':
      return fromProjected(stated, system);
  }
}

const KEYS = { x: 'x', y: 'y', z: 'z', latDeg: 'lat', lonDeg: 'lon' } as const;
const WANTED = { geocentric: ['x', 'y', 'z'], geographic: ['latDeg', 'lonDeg'], projected: ['x', 'y'] } as const;
const WANTED_WORDS = {
  geocentric: 'x, y and z in m: geocentric coordinates',
  geographic: 'lat and lon in degrees, for this system has no easting and northing',
  projected: 'x (easting) and y (northing) in m; a height stands in h of the site',
} as const;

function unwantedKey(stated: StatedPosition, form: CoordinateSystem['form']): Refusal | null {
  const wanted: readonly (keyof typeof KEYS)[] = WANTED[form];
  for (const key of Object.keys(KEYS) as (keyof typeof KEYS)[]) {
    if (stated[key] === undefined && wanted.includes(key))
      return refuse(KEYS[key], 'missing-coordinate', WANTED_WORDS[form]);
    if (stated[key] !== undefined && !wanted.includes(key))
      return refuse(KEYS[key], 'unexpected-coordinate', WANTED_WORDS[form]);
  }
  return null;
}

function fromGeocentric({ x, y, z }: StatedPosition, name: string): PositionReading {
  try {
    const { latitudeRad, longitudeRad, heightM } = geocentricToGeodetic(GRS80, { xM: x!, yM: y!, zM: z! });
    if (Math.abs(heightM) > 100_000)
      return refuse(
        '',
        'not-on-earth',
        `X, Y, Z of a place on the Earth in m; this one is ${(heightM / 1000).toFixed(0)} km above the ellipsoid`,
      );
    return {
      ok: true,
      position: {
        latitudeRad,
        longitudeRad,
        heightM,
        steps: `${name}: to latitude, longitude and height on GRS80`,
        cautions: [],
      },
    };
  } catch (error) {
    if (!(error instanceof QuantityRangeError)) throw error;
    return refuse('', 'not-on-earth', 'X, Y, Z of a place on the Earth in m: some 6 370 000 m from its centre');
  }
}

function fromGeographic(
  { latDeg, lonDeg }: StatedPosition,
  system: Extract<CoordinateSystem, { form: 'geographic' }>,
): PositionReading {
  if (!(Math.abs(latDeg!) <= 90))
    return refuse(
      'lat',
      'out-of-range',
      Math.abs(lonDeg!) <= 90
        ? 'a latitude from −90 to 90; lat and lon look swapped'
        : 'a latitude from −90 to 90, degrees',
    );
  const here: LatitudeLongitude = { latitudeRad: degToRad(latDeg!), longitudeRad: degToRad(lonDeg!) };
  return {
    ok: true,
    position: { ...onGrs80(here, system), heightM: null, steps: `${system.name}${shiftWords(system)}`, cautions: [] },
  };
}

const onGrs80 = (
  p: LatitudeLongitude,
  {
    definition,
    shift,
  }: { readonly definition: ProjectionDefinition; readonly shift: { readonly parameters: readonly number[] } | null },
): LatitudeLongitude => (shift ? shiftDatum(p, definition.ellipsoid, shift.parameters) : p);

function shiftWords({
  shift,
}: {
  readonly shift: { readonly source: string; readonly accuracyM: number | null } | null;
}): string {
  if (!shift) return '';
  return `, seven-parameter shift to ETRS89/WGS 84 (${shift.source}${shift.accuracyM === null ? '' : `, ${shift.accuracyM} m horizontally`})`;
}

/** Forth and back must agree to this, m: proj4's inverse of the Lambert azimuthal projection is off by up to 0.8 mm. */
const ROUND_TRIP_M = 0.005;

/** Inverse projection on the system's own ellipsoid; null where it has none (outside what the projection can do). */
function unproject(definition: ProjectionDefinition, x: number, y: number): LatitudeLongitude | null {
  const converter = proj4(definition.text, `+proj=longlat ${ellipsoidWords(definition.ellipsoid)} +no_defs`);
  try {
    const [lon, lat] = converter.forward([x, y]);
    if (!(Number.isFinite(lon) && Math.abs(lat!) <= 90)) return null;
    const again = converter.inverse([lon!, lat!]);
    if (!(Math.hypot(again[0]! - x, again[1]! - y) < ROUND_TRIP_M)) return null;
    return { latitudeRad: degToRad(lat!), longitudeRad: degToRad(lon!) };
  } catch {
    // proj4 throws for coordinates it cannot take
    return null;
  }
}

/** How far outside its area of use a place lies, degrees; 0 inside. */
function outsideDeg(area: AreaOfUse, { latitudeRad, longitudeRad }: LatitudeLongitude): number {
  const lat = radToDeg(latitudeRad);
  const width = (((area.east - area.west) % 360) + 360) % 360;
  const fromWest = (((radToDeg(longitudeRad) - area.west) % 360) + 360) % 360;
  const beside = fromWest <= width ? 0 : Math.min(fromWest - width, 360 - fromWest);
  return Math.max(0, area.south - lat, lat - area.north, beside);
}

/** A degree outside its area a system is still in use: beside borders, at sea. */
const TOLERATED_DEG = 1;

function fromProjected(
  { x, y }: StatedPosition,
  system: Extract<CoordinateSystem, { form: 'projected' }>,
): PositionReading {
  const { definition, area, name } = system;
  const here = unproject(definition, x!, y!);
  const swapped = unproject(definition, y!, x!);
  const distance = (p: LatitudeLongitude | null) =>
    p === null ? Number.POSITIVE_INFINITY : area ? outsideDeg(area, p) : 0;
  if (distance(here) > TOLERATED_DEG && distance(swapped) <= TOLERATED_DEG)
    return refuse(
      '',
      'swapped-axes',
      `x the easting and y the northing: as they stand they name ${here ? `a place at ${placeWords(here)}` : 'no place'}, swapped one at ${placeWords(swapped!)}${area ? `, where ${name} is used` : ''}`,
    );
  if (here === null)
    return refuse('', 'outside-projection', `coordinates that ${name} can hold: easting x and northing y in m`);
  const cautions =
    distance(here) > TOLERATED_DEG
      ? [
          {
            code: 'outside-area-of-use',
            message: `${placeWords(here)} is ${distance(here).toFixed(1)}° outside the area in which ${name} is used. Is it the right zone?`,
          },
        ]
      : [];
  return {
    ok: true,
    position: {
      ...onGrs80(here, system),
      heightM: null,
      steps: `${name}: easting and northing to latitude and longitude${shiftWords(system)}`,
      cautions,
    },
  };
}

const placeWords = ({ latitudeRad, longitudeRad }: LatitudeLongitude): string => {
  const lat = radToDeg(latitudeRad);
  const lon = radToDeg(longitudeRad);
  return `${Math.abs(lat).toFixed(2)}° ${lat < 0 ? 'S' : 'N'}, ${Math.abs(lon).toFixed(2)}° ${lon < 0 ? 'W' : 'E'}`;
};
