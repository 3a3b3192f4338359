import { closest } from '../../quantity/near-match.js';
import type { EllipsoidShape } from '../geocentric.js';
import { ELLIPSOIDS } from './ellipsoids.js';

/** A PROJ definition after our own check: proj4 itself ignores or misreads what it does not know, without a word. */
export interface ProjectionDefinition {
  /** for proj4: projection and its numbers, ellipsoid by a and rf, no datum */
  readonly text: string;
  readonly ellipsoid: EllipsoidShape;
  /** seven parameters to ETRS89 or WGS 84 in the order of +towgs84; null: the datum is taken as one of these */
  readonly toWgs84: readonly number[] | null;
  /** geographic: latitude and longitude, no projection */
  readonly geographic: boolean;
}

export type DefinitionReading =
  | { readonly ok: true; readonly definition: ProjectionDefinition }
  | { readonly ok: false; readonly code: string; readonly expected: string };

const PROJECTIONS = [
  'utm',
  'tmerc',
  'etmerc',
  'lcc',
  'laea',
  'aea',
  'stere',
  'sterea',
  'somerc',
  'omerc',
  'krovak',
  'merc',
  'cass',
  'poly',
  'nzmg',
  'eqdc',
];
const GEOGRAPHIC = ['longlat', 'latlong', 'lonlat', 'latlon'];
const NUMBERS = [
  'lat_0',
  'lat_1',
  'lat_2',
  'lat_ts',
  'lon_0',
  'lonc',
  'alpha',
  'gamma',
  'x_0',
  'y_0',
  'k',
  'k_0',
  'a',
  'b',
  'rf',
];
const FLAGS = ['south', 'no_defs', 'no_off', 'no_uoff'];
/** Not passed on: checked here, or of no meaning for a position with named fields. */
const HANDLED = ['proj', 'ellps', 'datum', 'towgs84', 'zone', 'units', 'to_meter', 'axis', 'pm', 'type'];

const REFUSED: Readonly<Record<string, string>> = {
  nadgrids:
    'a definition without +nadgrids: grid shift files are not read here. Convert with the grid first, or state +towgs84 (metres)',
  geoidgrids: 'no +geoidgrids: heights never go through a projection; state them as h, zeta or N of the site',
  vunits: 'no +vunits: heights never go through a projection',
  vto_meter: 'no +vto_meter: heights never go through a projection',
  init: 'the definition itself, or the code as "EPSG:25832"',
};

/** Checks a PROJ definition, `+proj=utm +zone=32 +ellps=GRS80`. Every key must be known, every number a number. */
export function readDefinition(text: string): DefinitionReading {
  const values = new Map<string, string | null>();
  const refuse = (code: string, expected: string): DefinitionReading => ({ ok: false, code, expected });
  for (const word of text.trim().split(/\s+/)) {
    const match = /^\+([A-Za-z][A-Za-z_0-9]*)(?:=(.+))?$/.exec(word);
    if (!match) return refuse('bad-definition', `words such as +proj=utm; ${JSON.stringify(word)} is none`);
    const key = match[1]!;
    if (Object.hasOwn(REFUSED, key)) return refuse('unsupported-definition', REFUSED[key]!);
    if (![...NUMBERS, ...FLAGS, ...HANDLED].includes(key)) {
      const near = closest(key, [...NUMBERS, ...FLAGS, ...HANDLED]);
      return refuse(
        'bad-definition',
        `a known parameter; +${key} is none${near === null ? '' : `, did you mean +${near}?`}`,
      );
    }
    if (values.has(key)) return refuse('bad-definition', `each parameter once; +${key} stands twice`);
    values.set(key, match[2] ?? null);
  }
  const passed: string[] = [];
  for (const [key, value] of values) {
    if (NUMBERS.includes(key)) {
      if (value === null || !isNumber(value)) return refuse('bad-definition', `a number behind +${key}`);
      if (!['a', 'b', 'rf'].includes(key)) passed.push(`+${key}=${value}`);
    } else if (FLAGS.includes(key)) {
      if (value !== null) return refuse('bad-definition', `+${key} without a value`);
      if (key !== 'no_defs') passed.push(`+${key}`);
    }
  }
  const proj = values.get('proj') ?? '';
  const geographic = GEOGRAPHIC.includes(proj);
  if (proj === 'geocent')
    return refuse('unsupported-definition', '"crs": "geocentric" with x, y, z in m, or the code, such as EPSG:4978');
  if (!geographic && !PROJECTIONS.includes(proj)) {
    const near = closest(proj, PROJECTIONS);
    return refuse(
      'bad-definition',
      `+proj= one of ${[...PROJECTIONS, 'longlat'].join(', ')}${near === null ? '' : `; did you mean ${near}?`}`,
    );
  }
  const zone = values.get('zone');
  if (proj === 'utm') {
    if (!/^([1-9]|[1-5]\d|60)$/.test(zone ?? ''))
      return refuse('bad-definition', '+zone=1 … +zone=60 beside +proj=utm');
    passed.unshift(`+zone=${zone}`);
  } else if (zone !== undefined) return refuse('bad-definition', '+zone only beside +proj=utm');

  const units = values.get('units');
  if ((units !== undefined && units !== 'm') || values.has('to_meter'))
    return refuse(
      'unsupported-definition',
      'coordinates in metres: convert them (1 US survey foot is 1200/3937 m) and leave +units and +to_meter out; false eastings in a definition are in metres anyhow',
    );
  const pm = values.get('pm');
  if (pm !== undefined && pm !== 'greenwich' && pm !== '0')
    return refuse(
      'unsupported-definition',
      'longitudes from Greenwich: add the prime meridian to +lon_0 and leave +pm out',
    );
  const axis = values.get('axis');
  if (axis !== undefined && axis !== 'enu' && axis !== 'neu')
    return refuse('unsupported-definition', '+axis=enu or none: x is the easting and y the northing, by name');
  const ellipsoid = readEllipsoid(values);
  if (typeof ellipsoid === 'string') return refuse('bad-definition', ellipsoid);
  const toWgs84 = readShift(values.get('towgs84'));
  if (typeof toWgs84 === 'string') return refuse('bad-definition', toWgs84);
  // the oblique Swiss projection of proj4 takes its flattening from rf alone
  return {
    ok: true,
    definition: {
      text: `+proj=${proj} ${[...passed, ellipsoidWords(ellipsoid)].join(' ')} +units=m +no_defs`,
      ellipsoid,
      toWgs84,
      geographic,
    },
  };
}

/** An ellipsoid as numbers, which proj4 cannot misread. */
export const ellipsoidWords = ({ a, e2 }: EllipsoidShape): string => `+a=${a} +rf=${1 / (1 - Math.sqrt(1 - e2))}`;

const isNumber = (text: string): boolean => /^[-+]?(\d+\.?\d*|\.\d+)(e[-+]?\d+)?$/i.test(text);

function readEllipsoid(values: ReadonlyMap<string, string | null>): EllipsoidShape | string {
  const names = Object.keys(ELLIPSOIDS).join(', ');
  const datum = values.get('datum');
  const ellps = values.get('ellps') ?? (datum === undefined ? undefined : DATUM_ELLIPSOIDS[datum ?? '']);
  if (datum !== undefined && DATUM_ELLIPSOIDS[datum ?? ''] === undefined)
    return `+datum=WGS84 or NAD83; for others state what they mean by +ellps and +towgs84`;
  if (ellps !== undefined) {
    if (values.has('a') || values.has('b') || values.has('rf')) return '+ellps or +a with +b or +rf, not both';
    const known = ellps === null || !Object.hasOwn(ELLIPSOIDS, ellps) ? undefined : ELLIPSOIDS[ellps];
    return known ?? `+ellps= one of ${names}, or +a with +b or +rf`;
  }
  const a = Number(values.get('a') ?? Number.NaN);
  const b = Number(values.get('b') ?? Number.NaN);
  const rf = Number(values.get('rf') ?? Number.NaN);
  const e2 = values.has('b') ? 1 - (b * b) / (a * a) : (1 / rf) * (2 - 1 / rf);
  if (!(a > 6.3e6 && a < 6.4e6 && e2 > 0.006 && e2 < 0.0075))
    return `an ellipsoid of the Earth: +ellps= one of ${names}, or +a with +b or +rf`;
  return { a, e2 };
}

const DATUM_ELLIPSOIDS: Readonly<Record<string, string>> = { WGS84: 'WGS84', NAD83: 'GRS80' };

function readShift(text: string | null | undefined): readonly number[] | null | string {
  if (text === undefined) return null;
  const words = (text ?? '').split(',');
  const numbers = words.map(Number);
  if (!words.every(isNumber) || (numbers.length !== 3 && numbers.length !== 7))
    return '+towgs84= three or seven numbers with commas: m, arc-seconds, 1e-6';
  return numbers.length === 3 ? [...numbers, 0, 0, 0, 0] : numbers;
}
