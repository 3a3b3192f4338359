import type { Fault } from '../../campaign/fault.js';
import type { ColumnWord } from './columns.js';
import { FloatColumn } from './float-column.js';
import type { Delimiter } from './head.js';
import { LineMap } from './line-map.js';
import { fractionFromPieces, fractionFromText, type Nominal } from './nominal.js';
import { readDecimalPieces, readNumber } from './number-field.js';
import { readIsoInstant, readModifiedJulianDate, TIME_LOCAL, TIME_OUT_OF_RANGE } from './time-field.js';
import { decodeUtf8 } from './utf8.js';

/** What to do with each field of a row. */
export interface RowPlan {
  readonly words: readonly ColumnWord[];
  readonly delimiter: Delimiter;
  readonly scale: number;
  readonly utcStated: boolean;
  /** for `hz` and `ratio` */
  readonly nominal: Nominal | null;
}

/** Faults after which reading stops: the rest would be more of the same. */
export const MOST_FAULTS = 20;

/** What the columns ask of the reader; plain numbers, for the loop over fields. */
const Kind = { Skip: 0, Mjd: 1, Iso: 2, StopMjd: 3, StopIso: 4, Y: 5, U: 6, Valid: 7, Exact: 8 } as const;

/** Slots of the scratch array: doubles live there, because a double that is returned or kept in a field may become an object. */
const DAY = 0;
const SECOND = 1;
const STOP_DAY = 2;
const STOP_SECOND = 3;
const Y = 4;
const U = 5;
const PIECES = 6;
const BASE_DAY = 9;

const BLANK = 32;
const TAB = 9;
const QUOTE = 34;
const HASH = 35;

/** Code of the fault and what would be right. */
function whatIsWrong(found: string, kind: number, reason: number): readonly [code: string, expected: string] {
  if (kind === Kind.Iso || kind === Kind.StopIso) {
    if (reason === TIME_LOCAL) return ['local-time', 'UTC, marked by Z: local time is ambiguous when clocks go back'];
    if (reason === TIME_OUT_OF_RANGE) return ['no-such-time', 'a date and time that exist'];
    return ['bad-time', 'an ISO 8601 instant in UTC, such as 2027-05-03T00:00:00Z'];
  }
  if (kind === Kind.Mjd || kind === Kind.StopMjd) return ['bad-time', 'a modified Julian date, such as 61163.25'];
  if (kind === Kind.Valid) return ['bad-validity', '1 or 0'];
  if (/^[+\-−]?\d+,\d+/.test(found)) return ['decimal-comma', 'a decimal point'];
  if (kind === Kind.U) return ['bad-number', 'a standard uncertainty, not negative'];
  return ['bad-number', 'a number, or nothing where a value is missing'];
}

/** Reads rows out of bytes into columns, without an object per row. */
export class RowReader {
  readonly y = new FloatColumn();
  /** seconds after 0 h of the first row's day; the row's number without a time column */
  readonly startS = new FloatColumn();
  readonly stopS: FloatColumn | null;
  readonly u: FloatColumn | null;
  readonly lines = new LineMap();
  readonly faults: Fault[] = [];
  /** rows marked not valid, and rows without a value */
  invalid = 0;
  missing = 0;
  firstMissingLine = 0;
  /** most decimals seen in a MJD: how coarse its grid is */
  mjdDecimals = 0;
  rows = 0;

  readonly #kinds: Int32Array;
  readonly #delimiter: number;
  readonly #plan: RowPlan;
  readonly #scratch = new Float64Array(10);
  readonly #timed: boolean;
  #based = false;

  constructor(plan: RowPlan) {
    this.#plan = plan;
    const start = plan.words.find((w) => w === 'mjd' || w === 'iso') ?? null;
    let started = false;
    this.#kinds = Int32Array.from(plan.words, (word): number => {
      switch (word) {
        case 'mjd':
        case 'iso': {
          const kind = word === 'mjd' ? (started ? Kind.StopMjd : Kind.Mjd) : started ? Kind.StopIso : Kind.Iso;
          started = true;
          return kind;
        }
        case 'stop':
          return start === 'mjd' ? Kind.StopMjd : Kind.StopIso;
        case 'y':
          return Kind.Y;
        case 'u':
          return Kind.U;
        case 'valid':
          return Kind.Valid;
        case 'ratio':
        case 'hz':
          return Kind.Exact;
        default:
          return Kind.Skip;
      }
    });
    this.#timed = start !== null;
    this.#delimiter = plan.delimiter === 'blank' ? 0 : plan.delimiter.charCodeAt(0);
    const has = (...kinds: number[]): boolean => this.#kinds.some((k) => kinds.includes(k));
    this.stopS = has(Kind.StopMjd, Kind.StopIso) ? new FloatColumn() : null;
    this.u = has(Kind.U) ? new FloatColumn() : null;
  }

  /** MJD from which the seconds count; null until a row has been read, or without a time column. */
  get baseDay(): number | null {
    return this.#based ? this.#scratch[BASE_DAY]! : null;
  }

  /** Reads one line, without its line end. Empty lines and comments are passed over. */
  readLine(b: Uint8Array, from: number, end: number, line: number): void {
    let i = from;
    while (i < end && (b[i] === BLANK || b[i] === TAB)) i++;
    if (i === end) return;
    const c = b[i]!;
    // # % ! ; //
    if (c === HASH || c === 37 || c === 33 || c === 59 || (c === 47 && b[i + 1] === 47)) return;
    if (this.#delimiter !== 0) i = from;
    this.#readFields(b, i, from, end, line);
  }

  #readFields(b: Uint8Array, start: number, lineStart: number, end: number, line: number): void {
    const kinds = this.#kinds;
    const delimiter = this.#delimiter;
    const scratch = this.#scratch;
    let i = start;
    let valid = true;
    let missing = false;
    for (let c = 0; c < kinds.length; c++) {
      while (i < end && (b[i] === BLANK || b[i] === QUOTE || (b[i] === TAB && delimiter !== TAB))) i++;
      if (i >= end && (c > 0 || delimiter === 0) && !(c > 0 && delimiter !== 0 && b[i - 1] === delimiter)) {
        this.#fault(
          'missing-column',
          line,
          end - lineStart + 1,
          `${c} columns`,
          `${kinds.length} columns: ${this.#plan.words.join(' ')}`,
        );
        return;
      }
      let next = i;
      switch (kinds[c]) {
        case Kind.Skip:
          next = this.#fieldEnd(b, i, end);
          break;
        case Kind.Mjd:
        case Kind.StopMjd:
          next = readModifiedJulianDate(b, i, end, scratch, kinds[c] === Kind.Mjd ? DAY : STOP_DAY);
          if (next >= 0) {
            let k = i;
            while (k < next && b[k] !== 46) k++;
            if (next - k - 1 > this.mjdDecimals) this.mjdDecimals = next - k - 1;
          }
          break;
        case Kind.Iso:
        case Kind.StopIso:
          next = readIsoInstant(b, i, end, scratch, kinds[c] === Kind.Iso ? DAY : STOP_DAY, this.#plan.utcStated);
          break;
        case Kind.Y:
          next = readNumber(b, i, end, scratch, Y);
          break;
        case Kind.U:
          next = readNumber(b, i, end, scratch, U);
          if (next >= 0 && scratch[U]! < 0) next = -1;
          break;
        case Kind.Exact:
          next = readDecimalPieces(b, i, end, scratch, PIECES);
          if (next >= 0) {
            scratch[Y] = fractionFromPieces(
              scratch[PIECES]!,
              scratch[PIECES + 1]!,
              scratch[PIECES + 2]!,
              this.#plan.nominal!,
            );
          }
          break;
        case Kind.Valid: {
          next = this.#fieldEnd(b, i, end);
          const flag = next === i + 1 ? b[i]! : 0;
          if (flag === 48) valid = false;
          else if (flag !== 49) {
            const word = this.#validity(b, i, next);
            if (word === null) next = -1;
            else valid &&= word;
          }
          break;
        }
      }
      // A field that the quick readers did not take whole: missing, written in a rarer way, or wrong.
      if (next < 0 || (next < end && !this.#endsField(b[next]!))) {
        const fieldEnd = this.#fieldEnd(b, i, end);
        const kind = kinds[c]!;
        if (this.#isMissing(b, i, fieldEnd) && (kind === Kind.Y || kind === Kind.Exact || kind === Kind.U)) {
          if (kind === Kind.U) scratch[U] = Number.NaN;
          else missing = true;
        } else if (
          !((kind === Kind.Y || kind === Kind.Exact || kind === Kind.U) && this.#readSlowly(b, i, fieldEnd, kind))
        ) {
          this.#badField(b, i, fieldEnd, lineStart, line, kind, next);
          return;
        }
        next = fieldEnd;
      }
      i = next;
      while (i < end && (b[i] === BLANK || b[i] === QUOTE || (b[i] === TAB && delimiter !== TAB))) i++;
      if (i < end && delimiter !== 0 && b[i] === delimiter && c < kinds.length - 1) i++;
    }
    if (i < end && b[i] !== HASH && !(b[i] === delimiter && this.#isMissing(b, i + 1, end))) {
      this.#fault(
        'extra-column',
        line,
        i - lineStart + 1,
        decodeUtf8(b, i, Math.min(end, i + 40)),
        `${kinds.length} columns: ${this.#plan.words.join(' ')} (a decimal comma also reads as one column more)`,
      );
      return;
    }
    this.#store(valid, missing, line);
  }

  #store(valid: boolean, missing: boolean, line: number): void {
    const scratch = this.#scratch;
    const row = this.rows++;
    if (!this.#based && this.#timed) {
      scratch[BASE_DAY] = scratch[DAY]!;
      this.#based = true;
    }
    if (!valid) {
      this.invalid++;
      return;
    }
    if (missing) {
      if (this.missing++ === 0) this.firstMissingLine = line;
      return;
    }
    if (this.stopS !== null) {
      const stop = (scratch[STOP_DAY]! - scratch[BASE_DAY]!) * 86400 + scratch[STOP_SECOND]!;
      const start = (scratch[DAY]! - scratch[BASE_DAY]!) * 86400 + scratch[SECOND]!;
      if (!(stop > start)) {
        this.#fault('stop-before-start', line, 1, `a sample of ${stop - start} s`, 'a stop later than the start');
        return;
      }
      this.stopS.push(stop);
    }
    this.lines.note(this.y.length, line);
    this.y.push(scratch[Y]! * this.#plan.scale);
    if (this.u !== null) this.u.push(scratch[U]! * this.#plan.scale);
    this.startS.push(this.#timed ? (scratch[DAY]! - scratch[BASE_DAY]!) * 86400 + scratch[SECOND]! : row);
  }

  #endsField(c: number): boolean {
    return c === BLANK || c === TAB || c === QUOTE || c === HASH || (this.#delimiter !== 0 && c === this.#delimiter);
  }

  #fieldEnd(b: Uint8Array, from: number, end: number): number {
    let i = from;
    if (this.#delimiter === 0) while (i < end && b[i] !== BLANK && b[i] !== TAB) i++;
    else while (i < end && b[i] !== this.#delimiter) i++;
    while (i > from && (b[i - 1] === BLANK || b[i - 1] === QUOTE)) i--;
    return i;
  }

  #isMissing(b: Uint8Array, from: number, end: number): boolean {
    return end - from <= 4 && /^\s*(|-|nan|na|n\/a|null|none)\s*$/i.test(decodeUtf8(b, from, end));
  }

  #validity(b: Uint8Array, from: number, end: number): boolean | null {
    const word = decodeUtf8(b, from, Math.min(end, from + 10)).toLowerCase();
    if (/^(1(\.0*)?|true|t|yes|ok|valid|good)$/.test(word)) return true;
    return /^(0(\.0*)?|false|f|no|invalid|bad)$/.test(word) ? false : null;
  }

  /** Numbers outside the quick readers' range: a sign or exponent in a ratio, a power of ten beyond ±80. */
  #readSlowly(b: Uint8Array, from: number, end: number, kind: number): boolean {
    const text = decodeUtf8(b, from, end);
    if (kind === Kind.Exact) {
      const y = fractionFromText(text, this.#plan.nominal!);
      if (y === null) return false;
      this.#scratch[Y] = y;
      return true;
    }
    if (!/^[+\-−]?(\d+\.?\d*|\.\d+)([eEdD][+\-−]?\d+)?$/.test(text)) return false;
    const value = Number(text.replaceAll('−', '-').replace(/[dD]/, 'e'));
    if (!Number.isFinite(value) || (kind === Kind.U && value < 0)) return false;
    this.#scratch[kind === Kind.U ? U : Y] = value;
    return true;
  }

  #badField(
    b: Uint8Array,
    from: number,
    end: number,
    lineStart: number,
    line: number,
    kind: number,
    reason: number,
  ): void {
    const found = decodeUtf8(b, from, Math.min(end, from + 40));
    const [code, expected] = whatIsWrong(found, kind, reason);
    this.#fault(code, line, from - lineStart + 1, found === '' ? 'nothing' : found, expected);
  }

  #fault(code: string, line: number, column: number, found: string, expected: string): void {
    if (this.faults.length < MOST_FAULTS) this.faults.push({ code, path: '', line, column, found, expected });
  }
}
