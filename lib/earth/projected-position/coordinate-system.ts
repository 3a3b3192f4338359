import { closest } from '../../quantity/near-match.js';
import type { AreaOfUse, DatumShift, KnownSystem } from './known-system.js';
import { NATIONAL_SYSTEMS } from './national-systems.js';
import { type ProjectionDefinition, readDefinition } from './projection-definition.js';

/** What a `crs` means: a projection, latitude and longitude, or geocentric X, Y, Z. */
export type CoordinateSystem =
  | {
      readonly form: 'projected';
      readonly name: string;
      readonly definition: ProjectionDefinition;
      readonly shift: DatumShift | null;
      readonly area: AreaOfUse | null;
    }
  | {
      readonly form: 'geographic';
      readonly name: string;
      readonly definition: ProjectionDefinition;
      readonly shift: DatumShift | null;
    }
  | { readonly form: 'geocentric'; readonly name: string };

export type SystemReading =
  | { readonly ok: true; readonly system: CoordinateSystem }
  | { readonly ok: false; readonly code: string; readonly expected: string };

const GEOGRAPHIC: Readonly<Record<number, string>> = {
  4258: 'ETRS89',
  4937: 'ETRS89 (3D)',
  4326: 'WGS 84',
  4979: 'WGS 84 (3D)',
  7912: 'ITRF2014 (3D)',
  9000: 'ITRF2014',
  9989: 'ITRF2020 (3D)',
  9990: 'ITRF2020',
  7931: 'ETRF2000 (3D)',
  9067: 'ETRF2000',
};
const GEOCENTRIC: Readonly<Record<number, string>> = {
  4936: 'ETRS89 (geocentric)',
  4978: 'WGS 84 (geocentric)',
  7789: 'ITRF2014 (geocentric)',
  9988: 'ITRF2020 (geocentric)',
  7930: 'ETRF2000 (geocentric)',
};

/** UTM zones come by rule: EPSG 258zz ETRS89 (28–38), 326zz and 327zz WGS 84 north and south (1–60). */
function utmSystem(code: number): KnownSystem | null {
  const zone = code % 100;
  const family = Math.floor(code / 100);
  const europe = family === 258 && zone >= 28 && zone <= 38;
  const world = (family === 326 || family === 327) && zone >= 1 && zone <= 60;
  if (!europe && !world) return null;
  const south = family === 327;
  const west = zone * 6 - 186;
  return {
    code,
    name: `${europe ? 'ETRS89' : 'WGS 84'} / UTM zone ${zone}${south ? 'S' : 'N'}`,
    definition: `+proj=utm +zone=${zone}${south ? ' +south' : ''} +ellps=${europe ? 'GRS80' : 'WGS84'}`,
    shift: null,
    area: { west, south: south ? -80 : 0, east: west + 6, north: south ? 0 : 84 },
  };
}

/** The system with an EPSG code, or null. */
export function systemOfCode(code: number): CoordinateSystem | null {
  const geocentric = GEOCENTRIC[code];
  if (geocentric !== undefined) return { form: 'geocentric', name: `EPSG:${code} ${geocentric}` };
  const geographic = GEOGRAPHIC[code];
  if (geographic !== undefined)
    return {
      form: 'geographic',
      name: `EPSG:${code} ${geographic}`,
      definition: checked('+proj=longlat +ellps=GRS80'),
      shift: null,
    };
  const known = utmSystem(code) ?? NATIONAL_SYSTEMS.find((s) => s.code === code);
  if (!known) return null;
  return {
    form: 'projected',
    name: `EPSG:${code} ${known.name}`,
    definition: checked(known.definition),
    shift: known.shift,
    area: known.area,
  };
}

function checked(text: string): ProjectionDefinition {
  const read = readDefinition(text);
  if (!read.ok) throw new Error(`internal: ${text}: ${read.expected}`);
  return read.definition;
}

/** Reads a `crs`: `EPSG:25832`, a PROJ definition, or `geocentric`. */
export function readCoordinateSystem(text: string): SystemReading {
  const trimmed = text.trim();
  if (/^geocentric$/i.test(trimmed)) return { ok: true, system: { form: 'geocentric', name: 'geocentric X, Y, Z' } };
  const code = /^(?:epsg\s*:\s*|urn:ogc:def:crs:epsg:[^:]*:)?(\d{4,5})$/i.exec(trimmed)?.[1];
  if (code !== undefined) {
    const system = systemOfCode(Number(code));
    return system ? { ok: true, system } : { ok: false, code: 'unknown-crs', expected: unknownCode(Number(code)) };
  }
  if (!trimmed.startsWith('+'))
    return {
      ok: false,
      code: 'unknown-crs',
      expected:
        'an EPSG code such as "EPSG:25832", a PROJ definition such as "+proj=utm +zone=32 +ellps=GRS80", or "geocentric"',
    };
  const read = readDefinition(trimmed);
  if (!read.ok) return read;
  const { definition } = read;
  const shift = definition.toWgs84 && { parameters: definition.toWgs84, source: '+towgs84 as stated', accuracyM: null };
  return {
    ok: true,
    system: definition.geographic
      ? { form: 'geographic', name: trimmed, definition, shift }
      : { form: 'projected', name: trimmed, definition, shift, area: null },
  };
}

function unknownCode(code: number): string {
  const known = [
    ...NATIONAL_SYSTEMS.map((s) => String(s.code)),
    ...Object.keys(GEOGRAPHIC),
    ...Object.keys(GEOCENTRIC),
  ];
  const near = closest(String(code), known);
  return `a code that is built in (ETRS89/UTM 25828–25838, WGS 84/UTM 32601–32660 and 32701–32760, 3035, and ${NATIONAL_SYSTEMS.length} national systems${near === null ? '' : `, such as ${near}`}), or the PROJ definition of EPSG:${code} in its place: "+proj=… +ellps=… [+towgs84=…]", as \`projinfo EPSG:${code} -o PROJ\` prints it`;
}
