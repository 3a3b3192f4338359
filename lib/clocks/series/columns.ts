import { type Fault, faultAt } from '../../campaign/fault.js';

/** What a column of a frequency file holds: `mjd` or `iso` the start of a sample (a second one, or `stop`, its end), `y` fractional
 *  frequency, `ratio` a frequency ratio, `hz` a frequency, `u` the standard uncertainty of y, `valid` 1 or 0, `-` not read. */
export const COLUMN_WORDS = ['mjd', 'iso', 'stop', 'y', 'u', 'valid', 'ratio', 'hz', '-'] as const;

export type ColumnWord = (typeof COLUMN_WORDS)[number];

/** How sure a guess is: `certain` can be acted upon, `likely` is acted upon with a warning, `unsure` has to be confirmed. */
export type Certainty = 'certain' | 'likely' | 'unsure';

export interface ColumnGuess {
  readonly words: readonly ColumnWord[];
  readonly certainty: Certainty;
  /** why, in words */
  readonly reason: string;
  /** factor that the header states for y and u ("y / 1e-15"); 1 without */
  readonly scale: number;
  /** the time column's name says UTC */
  readonly utcStated: boolean;
}

const WORDS: ReadonlySet<string> = new Set(COLUMN_WORDS);

/** Reads the words of `--columns "mjd y u"`.
 * @returns the words, or the faults: an unknown word, no value column, two value columns, a stop without a start */
export function readColumnWords(text: string): { words: readonly ColumnWord[] } | { faults: readonly Fault[] } {
  const parts = text.trim().split(/[\s,]+/);
  const bad = parts.find((p) => !WORDS.has(p));
  const listed = COLUMN_WORDS.join(' ');
  if (bad !== undefined || text.trim() === '') {
    return { faults: [faultAt('column-word', 'columns', JSON.stringify(bad ?? ''), `words from: ${listed}`)] };
  }
  const words = parts as ColumnWord[];
  const fault = (found: string, expected: string) => ({
    faults: [faultAt('column-words', 'columns', found, expected)],
  });
  const count = (...of: ColumnWord[]): number => words.filter((w) => of.includes(w)).length;
  if (count('y', 'ratio', 'hz') !== 1) return fault(JSON.stringify(text), 'exactly one of y, ratio, hz');
  if (count('u') > 1 || count('valid') > 1) return fault(JSON.stringify(text), 'u and valid at most once');
  if (count('mjd', 'iso') + count('stop') > 2 || count('stop') > 1)
    return fault(JSON.stringify(text), 'one start and at most one stop');
  if (count('stop') === 1 && count('mjd', 'iso') === 0)
    return fault(JSON.stringify(text), 'a start (mjd or iso) beside stop');
  return { words };
}

/** The kinds of text that a field can be, told from its look alone. */
type Look = 'iso' | 'mjd' | 'near-one' | 'small' | 'large' | 'flag' | 'missing' | 'word';

const ISO = /^\d{4}-\d{2}-\d{2}[Tt ]\d{2}:\d{2}/;
const NUMBER = /^[+\-−]?(\d+\.?\d*|\.\d+)([eEdD][+\-−]?\d+)?$/;
const MISSING = /^(|-|nan|na|n\/a|null|none)$/i;
const FLAG = /^(true|false|t|f|yes|no|ok|valid|invalid|good|bad)$/i;

/** Modified Julian dates from 1968 to 2132: what a clock file can be about. */
const isDate = (x: number): boolean => x >= 40000 && x < 100000;

function look(field: string): Look {
  if (ISO.test(field)) return 'iso';
  if (MISSING.test(field)) return 'missing';
  if (FLAG.test(field)) return 'flag';
  if (!NUMBER.test(field)) return 'word';
  const x = Number(field.replace('−', '-').replace(/[dD]/, 'e'));
  if (isDate(x) && !/[eEdD]/.test(field)) return 'mjd';
  if (Math.abs(x - 1) <= 1e-3 && field.replace(/\D/g, '').length >= 8) return 'near-one';
  return Math.abs(x) < 1e3 ? 'small' : 'large';
}

interface Summary {
  readonly looks: ReadonlySet<Look>;
  readonly rising: boolean;
  readonly onlyZeroOne: boolean;
  readonly allPositive: boolean;
  readonly largest: number;
}

function summarise(fields: readonly string[]): Summary {
  const looks = new Set(fields.map(look));
  if (looks.size > 1) looks.delete('missing');
  const numbers = fields.filter((f) => NUMBER.test(f)).map((f) => Number(f.replace('−', '-').replace(/[dD]/, 'e')));
  let backward = 0;
  for (let i = 1; i < numbers.length; i++) if (numbers[i]! < numbers[i - 1]!) backward++;
  return {
    looks,
    rising: backward <= numbers.length / 10,
    onlyZeroOne: fields.every((f) => /^[01]$/.test(f)),
    allPositive: numbers.length > 0 && numbers.every((x) => x > 0),
    largest: Math.max(0, ...numbers.map(Math.abs)),
  };
}

type Role = 'start' | 'stop' | 'y' | 'u' | 'valid' | 'ratio' | 'hz' | 'frequency' | '-';

/** Names that columns go by in clock files: common practice, no source. The first that fits counts. */
const NAMES: readonly (readonly [RegExp, Role])[] = [
  [/stop|end|until/, 'stop'],
  [/^(u|uy|u\(y\)|u_y|unc.*|sigma.*|std.*|err.*|u[_ ].*)$/, 'u'],
  [/mjd|utc|iso|time|date|epoch|start|begin|^t$/, 'start'],
  [/valid|^ok$|good|^flag$|^status$/, 'valid'],
  [/ratio/, 'ratio'],
  [/^(y|ffo|y[_( ].*|frac.*|rel.*|delta.*|dff|df\/f|offset)$/, 'y'],
  [/hz|beat/, 'hz'],
  [/freq|^nu$|^f$/, 'frequency'],
];

const roleOf = (name: string): Role => NAMES.find(([pattern]) => pattern.test(name))?.[1] ?? '-';

const SCALE = /\s*(?:\/|\[|\(|\bin\b|×)\s*(?:10\^?|1e)\s*([-−]\d+)\s*[\])]?\s*$/;

const clean = (name: string): string =>
  name
    .trim()
    .replace(/^["']|["']$/g, '')
    .trim()
    .toLowerCase();

/** Guesses what the columns hold, from the header if there is one and from the values.
 * @param header names of the columns, or null
 * @param rows the first data lines, split into fields; at least one */
export function guessColumns(header: readonly string[] | null, rows: readonly (readonly string[])[]): ColumnGuess {
  const width = rows[0]!.length;
  const columns = Array.from({ length: width }, (_, c) => summarise(rows.map((r) => r[c] ?? '')));
  const names = header !== null && header.length === width ? header.map(clean) : null;
  return names ? fromHeader(names, columns) : fromValues(columns);
}

function fromHeader(names: readonly string[], columns: readonly Summary[]): ColumnGuess {
  let scale = 1;
  let started = false;
  let valued = false;
  const doubts: string[] = [];
  const words = names.map((name, c): ColumnWord => {
    const stated = SCALE.exec(name);
    const bare = name.replace(SCALE, '').trim();
    const role = roleOf(bare);
    const { looks, largest } = columns[c]!;
    const time: ColumnWord | null = looks.has('iso') ? 'iso' : looks.has('mjd') && looks.size === 1 ? 'mjd' : null;
    if (role === 'start' || role === 'stop') {
      if (time === null || (started && role === 'start')) {
        doubts.push(`${name}: ${time === null ? 'neither MJD nor ISO 8601' : 'a second start'}`);
        return '-';
      }
      if (role === 'start') started = true;
      return role === 'stop' ? 'stop' : time;
    }
    if (role === 'y' || role === 'ratio' || role === 'hz' || role === 'frequency') {
      if (valued) {
        doubts.push(`${name}: a second value column`);
        return '-';
      }
      valued = true;
      if (stated && role === 'y') scale = Number(`1e${stated[1]!.replace('−', '-')}`);
      if (role === 'frequency') return largest < 1 ? 'y' : looks.has('near-one') ? 'ratio' : 'hz';
      return role;
    }
    if (role === '-') doubts.push(`${name}: not a known name, skipped`);
    return role;
  });
  if (!valued)
    return { ...fromValues(columns), certainty: 'unsure', reason: 'no column of the header is named y, ratio or Hz' };
  const time = names[words.findIndex((w) => w === 'mjd' || w === 'iso')];
  return {
    words,
    certainty: doubts.length === 0 ? 'certain' : started ? 'likely' : 'unsure',
    reason: doubts.length === 0 ? 'named in the header' : `named in the header, but ${doubts.join('; ')}`,
    scale,
    utcStated: time !== undefined && /utc/.test(time),
  };
}

function fromValues(columns: readonly Summary[]): ColumnGuess {
  const words: ColumnWord[] = [];
  const doubts: string[] = [];
  let c = 0;
  const isTime = (s: Summary | undefined): boolean =>
    s !== undefined && s.looks.size === 1 && (s.looks.has('iso') || (s.looks.has('mjd') && s.rising));
  if (isTime(columns[0])) {
    words.push(columns[0]!.looks.has('iso') ? 'iso' : 'mjd');
    c = 1;
    if (isTime(columns[1])) {
      words.push('stop');
      doubts.push('a second date is taken as the end of the sample');
      c = 2;
    }
  }
  const value = columns[c];
  let certainty: Certainty = 'certain';
  if (value === undefined) {
    certainty = 'unsure';
    doubts.push('no column of values');
  } else if (c === 0 && columns.length > 1) {
    certainty = 'unsure';
    doubts.push('the first column is neither MJD nor ISO 8601');
    words.push(...columns.map((): ColumnWord => '-'));
  } else {
    if (value.looks.has('near-one') && value.looks.size === 1) {
      words.push('ratio');
      doubts.push('values next to 1 are taken as a ratio');
    } else if (value.looks.has('large') && value.largest >= 1e5) {
      words.push('hz');
      doubts.push('values of this size are taken as Hz');
    } else {
      words.push('y');
      if (value.looks.has('word')) certainty = 'unsure';
    }
    for (const more of columns.slice(c + 1)) {
      const bare = more.looks.size === 1;
      if ((more.onlyZeroOne || (bare && more.looks.has('flag'))) && !words.includes('valid')) {
        words.push('valid');
        doubts.push('a column of 0 and 1 is taken as validity, 1 good');
      } else if (
        bare &&
        more.looks.has('small') &&
        more.allPositive &&
        !words.includes('u') &&
        !words.includes('valid')
      ) {
        words.push('u');
        doubts.push('a positive column after the value is taken as its standard uncertainty');
      } else {
        words.push('-');
        certainty = 'unsure';
        doubts.push(`column ${words.length} could be anything`);
      }
    }
  }
  if (certainty === 'certain' && doubts.length > 0) certainty = 'likely';
  const plain = words.length === 1 ? 'a single column of values' : 'a date, then a fraction';
  return { words, certainty, reason: doubts.length === 0 ? plain : doubts.join('; '), scale: 1, utcStated: false };
}
