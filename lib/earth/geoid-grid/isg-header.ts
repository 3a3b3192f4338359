import { CampaignError, type Fault, type Warning } from '../../campaign/fault.js';
import type { TideSystem } from '../tide-system.js';
import type { GeoidSurface, GridFormat } from './geoid-grid.js';
import type { PrintedAxis, PrintedNumber } from './registration.js';

/** Order of the values: 1 along rising latitude or longitude, −1 along falling. */
export interface IsgOrdering {
  readonly rows: 1 | -1;
  readonly columns: 1 | -1;
}

export interface IsgHeader {
  readonly format: GridFormat & `isg-${string}`;
  readonly name: string;
  readonly surface: GeoidSurface;
  readonly tide: TideSystem | 'unknown';
  readonly heightDatum: string | null;
  readonly ellipsoid: string | null;
  readonly frame: string | null;
  /** metres per unit of the values */
  readonly unitM: number;
  readonly ordering: IsgOrdering;
  readonly latitude: PrintedAxis;
  readonly longitude: PrintedAxis;
  /** null: no value stands for "none" */
  readonly nodata: number | null;
  readonly entries: readonly { readonly key: string; readonly value: string }[];
  readonly warnings: readonly Warning[];
}

const UNITS_M: Readonly<Record<string, number>> = {
  meters: 1,
  metres: 1,
  meter: 1,
  metre: 1,
  m: 1,
  centimeters: 0.01,
  centimetres: 0.01,
  cm: 0.01,
  millimeters: 0.001,
  millimetres: 0.001,
  mm: 0.001,
  feet: 0.3048,
};

const SURFACES: Readonly<Record<string, GeoidSurface>> = {
  geoid: 'geoid',
  'quasi-geoid': 'quasigeoid',
  quasigeoid: 'quasigeoid',
};

const TIDES: Readonly<Record<string, TideSystem>> = {
  'tide-free': 'free',
  'non-tidal': 'free',
  'zero-tide': 'zero',
  'mean-tide': 'mean',
};

const ORDERINGS: Readonly<Record<string, IsgOrdering>> = {
  'n-to-s,w-to-e': { rows: -1, columns: 1 },
  's-to-n,w-to-e': { rows: 1, columns: 1 },
  'n-to-s,e-to-w': { rows: -1, columns: -1 },
  's-to-n,e-to-w': { rows: 1, columns: -1 },
};

interface Entry {
  readonly value: string;
  readonly line: number;
}

/** Lines between `begin_of_head` and `end_of_head` of a file of the International Service for the Geoid: ISG format specifications
 *  1.0 (2015), 1.01 and 2.0 (2020), isgeoid.polimi.it. `---` stands for unknown.
 * @param firstLine number of the first of these lines in the file
 * @throws {CampaignError} with every fault of the head */
export function readIsgHeader(lines: readonly string[], firstLine: number): IsgHeader {
  const entries = new Map<string, Entry>();
  const faults: Fault[] = [];
  for (const [i, line] of lines.entries()) {
    const match = /^\s*([^:=]+?)\s*[:=]\s*(.*?)\s*$/.exec(line);
    if (!match) {
      if (line.trim() !== '' && !line.trim().startsWith('#'))
        faults.push(
          fault('header-line', '', firstLine + i, line.trim().slice(0, 60), 'a line `key : text` or `key = number`'),
        );
      continue;
    }
    const key = match[1]!.toLowerCase().replace(/\s+/g, ' ');
    if (entries.has(key)) faults.push(fault('header-key-twice', key, firstLine + i, match[2]!, `${key} once`));
    entries.set(key, { value: match[2]!, line: firstLine + i });
  }
  return new HeaderReader(entries, faults).read();
}

const fault = (code: string, path: string, line: number | null, found: string, expected: string): Fault => ({
  code,
  path,
  line,
  column: null,
  found,
  expected,
});

class HeaderReader {
  readonly #entries: ReadonlyMap<string, Entry>;
  readonly #faults: Fault[];
  readonly #warnings: Warning[] = [];
  constructor(entries: ReadonlyMap<string, Entry>, faults: Fault[]) {
    this.#entries = entries;
    this.#faults = faults;
  }

  read(): IsgHeader {
    const version = this.#version();
    const second = version === '2.0';
    if (second) {
      this.#oneOf('data format', { grid: true }, 'grid: scattered points are not interpolated');
      this.#oneOf('coord type', { geodetic: true }, 'geodetic: latitude and longitude');
    }
    const dms = second && this.#oneOf('coord units', { deg: false, dms: true }, 'deg or dms') === true;
    const unit = this.#oneOf(second ? 'data units' : 'units', UNITS_M, 'meters, millimeters, centimeters or feet');
    const orderingEntry = this.#text('data ordering');
    const ordering = orderingEntry === null ? undefined : ORDERINGS[orderingEntry.toLowerCase().replace(/\s/g, '')];
    if (orderingEntry !== null && !ordering) this.#refuse('data ordering', 'N-to-S or S-to-N, then W-to-E or E-to-W');
    const latitude = this.#axis('lat', 'nrows', dms);
    const longitude = this.#axis('lon', 'ncols', dms);
    if (
      latitude &&
      (latitude.min.value < -90 - latitude.min.halfDigit || latitude.max.value > 90 + latitude.max.halfDigit)
    )
      this.#refuse(latitude.min.value < -90 ? 'lat min' : 'lat max', 'a latitude between −90° and 90°');
    const nodata = this.#text('nodata') === null ? null : this.#number('nodata', false);
    const surface = this.#optional('data type', SURFACES, 'unknown' as const);
    const tide = this.#optional('tide system', TIDES, 'unknown' as const);
    if (this.#faults.length > 0 || !latitude || !longitude || unit === undefined) throw new CampaignError(this.#faults);
    if (unit === 0.3048)
      this.#warnings.push({
        code: 'feet',
        path: 'data units',
        message: 'feet are read as international feet, 0.3048 m; the US survey foot is 2e-6 longer, 0.2 mm at 100 m.',
      });
    return {
      format: `isg-${version}`,
      name: this.#text('model name') ?? '',
      surface,
      tide,
      heightDatum: this.#text('height datum'),
      ellipsoid: this.#text(second ? 'ref ellipsoid' : 'reference'),
      frame: this.#text('ref frame'),
      unitM: unit,
      ordering: ordering ?? { rows: -1, columns: 1 },
      latitude,
      longitude,
      nodata: nodata?.value ?? null,
      entries: [...this.#entries].map(([key, { value }]) => ({ key, value })),
      warnings: this.#warnings,
    };
  }

  #version(): '1.0' | '1.01' | '2.0' {
    const entry = this.#entries.get('isg format');
    const version = entry ? Number(entry.value) : 1;
    if (!entry)
      this.#warnings.push({
        code: 'format-version-missing',
        path: 'ISG format',
        message: 'the head does not say which ISG format it has; read as 1.0.',
      });
    if (version === 1) return '1.0';
    if (version === 1.01) return '1.01';
    if (version === 2) return '2.0';
    this.#refuse('isg format', '1.0, 1.01 or 2.0');
    return '2.0';
  }

  /** Text of a key; null where it is missing or unknown (`---`). */
  #text(key: string): string | null {
    const value = this.#entries.get(key)?.value ?? '';
    return /^-*$/.test(value) ? null : value;
  }

  #oneOf<T>(key: string, words: Readonly<Record<string, T>>, expected: string): T | undefined {
    const word = this.#text(key)?.toLowerCase();
    if (word !== undefined && Object.hasOwn(words, word)) return words[word];
    this.#refuse(key, expected);
    return undefined;
  }

  #optional<T, U>(key: string, words: Readonly<Record<string, T>>, otherwise: U): T | U {
    const word = this.#text(key)?.toLowerCase().replace(/[ _]/g, '-');
    if (word === undefined) return otherwise;
    if (Object.hasOwn(words, word)) return words[word]!;
    this.#refuse(key, `${Object.keys(words).join(', ')} or ---`);
    return otherwise;
  }

  #axis(name: 'lat' | 'lon', countKey: string, dms: boolean): PrintedAxis | null {
    const min = this.#number(`${name} min`, dms);
    const max = this.#number(`${name} max`, dms);
    const delta = this.#number(`delta ${name}`, dms);
    const count = this.#number(countKey, false);
    if (!min || !max || !delta || !count) return null;
    if (!(Number.isInteger(count.value) && count.value >= 2 && count.value < 2 ** 31)) {
      this.#refuse(countKey, 'a whole number from 2');
      return null;
    }
    if (!(delta.value > 0)) {
      this.#refuse(`delta ${name}`, 'a step above 0');
      return null;
    }
    // a grid across the antimeridian may be written 170 … −170
    const east = name === 'lon' && max.value <= min.value ? { ...max, value: max.value + 360 } : max;
    if (!(east.value > min.value) || (name === 'lon' && (Math.abs(min.value) > 360 || east.value - min.value > 361))) {
      this.#refuse(
        `${name} max`,
        `more than ${name} min = ${this.#entries.get(`${name} min`)!.value}${name === 'lon' ? ', and at most a turn' : ''}`,
      );
      return null;
    }
    return { name, min, max: east, delta, count: count.value };
  }

  #number(key: string, dms: boolean): PrintedNumber | null {
    const entry = this.#entries.get(key);
    const parsed = entry ? (dms ? parseDms(entry.value) : parseDecimal(entry.value)) : null;
    if (!parsed) this.#refuse(key, dms ? 'degrees, minutes and seconds such as −0°30\'00"' : 'a decimal number');
    return parsed;
  }

  #refuse(key: string, expected: string): void {
    const entry = this.#entries.get(key);
    this.#faults.push(
      fault(
        entry ? 'header-value' : 'header-key-missing',
        key,
        entry?.line ?? null,
        entry?.value ?? 'nothing',
        expected,
      ),
    );
  }
}

function parseDecimal(text: string): PrintedNumber | null {
  const match = /^([+-]?)(\d+)(?:\.(\d*))?(?:[eEdD]([+-]?\d{1,3}))?$/.exec(text.replace('\u2212', '-'));
  if (!match) return null;
  const [, sign, whole, fraction = '', power = '0'] = match;
  return {
    value: Number(`${sign}${whole}.${fraction || '0'}e${power}`),
    // a bare whole number (40) is meant exactly
    halfDigit: fraction === '' ? 0 : 0.5 * 10 ** (Number(power) - fraction.length),
  };
}

/** Degrees, minutes and seconds; leading parts that are 0 may be left out, and the sign stands before the first part: −0°30′00″
 *  and −30′00″ are both half a degree south or west. */
function parseDms(text: string): PrintedNumber | null {
  const clean = text
    .replace(/\u2212/g, '-')
    .replace(/[\u2032\u2019´`]/g, "'")
    .replace(/[\u2033\u201d]|''/g, '"')
    .replace(/\s/g, '');
  const match = /^([+-]?)(?:(\d+)(?:\u00c2?\u00b0|d))?(?:(\d+)')?(?:(\d+)(?:\.(\d*))?")?$/.exec(clean);
  if (!match || clean.length === 0) return null;
  const [, sign, degrees, minutes, seconds, fraction = ''] = match;
  if (degrees === undefined && minutes === undefined && seconds === undefined) return null;
  if (Number(minutes ?? 0) >= 60 || Number(seconds ?? 0) >= 60) return null;
  const arcSeconds =
    Number(degrees ?? 0) * 3600 + Number(minutes ?? 0) * 60 + Number(`${seconds ?? 0}.${fraction || '0'}`);
  return {
    value: (sign === '-' ? -arcSeconds : arcSeconds) / 3600,
    halfDigit: (0.5 * 10 ** -fraction.length) / 3600,
  };
}
