import { CampaignError, faultAt } from '../../campaign/fault.js';
import { assembleSeries } from './assemble.js';
import type { ColumnGuess, ColumnWord } from './columns.js';
import type { FrequencySeries } from './frequency-series.js';
import { type Head, readHead } from './head.js';
import type { Nominal } from './nominal.js';
import { type NominalChoice, recognisedNominal } from './recognised-nominal.js';
import { MOST_FAULTS, RowReader } from './row-reader.js';
import { decodeUtf8, encodeUtf8 } from './utf8.js';

export interface SeriesOptions {
  /** what the columns hold; without it they are guessed, and an unsure guess is refused */
  readonly columns?: readonly ColumnWord[];
  /** sampling interval [s]; needed for a file without dates, checked against the dates else */
  readonly tauS?: number;
  /** what a `hz` or `ratio` column is compared with; without it the recommended frequency, or ratio of two, or 1, that the first
   *  value lies next to, which a warning names */
  readonly nominal?: Nominal;
}

/** Bytes that the guess of the columns may look at. */
const HEAD_BYTES = 1 << 16;
const NEWLINE = 10;
const RETURN = 13;

/** Reads a frequency file piece by piece: `push` each piece as it comes, `finish` at the end. Memory is the columns alone
 *  (16 bytes a row, 8 more for each of stop and u), whatever the file's size; no row makes an object.
 *  Lines end with LF, CR LF; UTF-8. Faults are gathered, the first twenty thrown together.
 * @throws {CampaignError} from `push` or `finish`: what could not be read, with line and column */
export class FrequencySeriesParser {
  readonly #options: SeriesOptions;
  #head: Uint8Array | null = new Uint8Array(0);
  #reader: RowReader | null = null;
  #guess: ColumnGuess | null = null;
  #nominal: NominalChoice | null = null;
  #skipUntil = 0;
  #line = 0;
  #bytes = 0;
  #pending = new Uint8Array(1024);
  #pendingLength = 0;

  constructor(options: SeriesOptions = {}) {
    this.#options = options;
  }

  /** How far it has come, for a progress display. */
  get progress(): { readonly bytes: number; readonly rows: number } {
    return { bytes: this.#bytes, rows: this.#reader?.rows ?? 0 };
  }

  /** Takes the next piece of the file; pieces may end anywhere, inside a line or a character too. */
  push(chunk: string | Uint8Array): void {
    const bytes = typeof chunk === 'string' ? encodeUtf8(chunk) : chunk;
    this.#bytes += bytes.length;
    if (this.#head === null) {
      this.#take(bytes);
      return;
    }
    const room = HEAD_BYTES - this.#head.length;
    const part = bytes.subarray(0, room);
    const head = new Uint8Array(this.#head.length + part.length);
    head.set(this.#head);
    head.set(part, this.#head.length);
    this.#head = head;
    if (head.length < HEAD_BYTES) return;
    this.#begin(false);
    this.#take(bytes.subarray(room));
  }

  /** Ends the file and puts the series together. */
  finish(): FrequencySeries {
    if (this.#head !== null) this.#begin(true);
    if (this.#pendingLength > 0) this.#readLine(this.#pending, 0, this.#pendingLength);
    const reader = this.#reader!;
    this.#throwFaults(reader);
    if (reader.y.length === 0) {
      const found = `${reader.rows} rows, none with a valid value`;
      throw new CampaignError([faultAt('no-data', '', found, 'at least one valid sample')]);
    }
    return assembleSeries(reader, this.#guess!, this.#options, this.#nominal?.named ?? null);
  }

  /** Settles the columns from the first lines, then reads those lines. */
  #begin(whole: boolean): void {
    const bytes = this.#head!;
    this.#head = null;
    const bom = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
    let end = bytes.length;
    if (!whole) {
      const lastLine = bytes.lastIndexOf(NEWLINE);
      if (lastLine > 0) end = lastLine;
    }
    const head = readHead(decodeUtf8(bytes, bom, end));
    if ('code' in head) {
      const { code, line, column, found, expected } = head;
      throw new CampaignError([{ code, path: '', line, column, found, expected }]);
    }
    this.#guess = this.#settleColumns(head);
    const { words, scale, utcStated } = this.#guess;
    this.#nominal = this.#nominalFor(words, head);
    this.#reader = new RowReader({
      words,
      delimiter: head.delimiter,
      scale,
      utcStated,
      nominal: this.#nominal?.nominal ?? null,
    });
    this.#skipUntil = head.firstDataLine;
    this.#take(bom > 0 ? bytes.subarray(bom) : bytes);
  }

  #settleColumns(head: Head): ColumnGuess {
    const { columns } = this.#options;
    if (columns !== undefined) {
      if (columns.length !== head.width) {
        const found = `${head.width} columns in line ${head.firstDataLine}, ${columns.length} words: ${columns.join(' ')}`;
        const fault = faultAt('column-count', '', found, 'a word for every column, - for one that is not to be read');
        throw new CampaignError([{ ...fault, line: head.firstDataLine, column: 1 }]);
      }
      return { words: columns, certainty: 'certain', reason: 'as stated', scale: 1, utcStated: false };
    }
    const guess = head.columns;
    const unitUnclear = head.scaleSeen !== null && guess.scale === 1;
    if (guess.certainty === 'unsure' || unitUnclear) {
      const words = guess.words.join(' ');
      const why = unitUnclear ? `${guess.reason}; ${head.scaleSeen} stands in the header` : guess.reason;
      const fault = faultAt(
        'columns-unsure',
        '',
        `${words} (${why})`,
        'columns named: --columns "mjd y", say, y as a plain fraction',
      );
      throw new CampaignError([{ ...fault, line: head.headerLine || head.firstDataLine, column: 1 }]);
    }
    return guess;
  }

  #nominalFor(words: readonly ColumnWord[], head: Head): NominalChoice | null {
    const c = words.findIndex((w) => w === 'hz' || w === 'ratio');
    if (c < 0) return null;
    if (this.#options.nominal !== undefined) return { nominal: this.#options.nominal, named: null };
    const kind = words[c] as 'hz' | 'ratio';
    const text = head.firstRow[c] ?? '';
    const found = recognisedNominal(kind, text);
    if (found !== null) return found;
    const what =
      kind === 'hz' ? 'the nominal frequency in Hz or the transition' : 'the nominal ratio or the two transitions';
    const fault = faultAt(
      'nominal-unknown',
      '',
      `${text}, a ${kind} near no recommended one`,
      `${what}, to make a fraction of it`,
    );
    throw new CampaignError([{ ...fault, line: head.firstDataLine, column: 1 }]);
  }

  #take(bytes: Uint8Array): void {
    let from = 0;
    if (this.#pendingLength > 0) {
      const newline = bytes.indexOf(NEWLINE);
      this.#hold(bytes, 0, newline < 0 ? bytes.length : newline);
      if (newline < 0) return;
      this.#readLine(this.#pending, 0, this.#pendingLength);
      this.#pendingLength = 0;
      from = newline + 1;
    }
    for (let newline = bytes.indexOf(NEWLINE, from); newline >= 0; newline = bytes.indexOf(NEWLINE, from)) {
      this.#readLine(bytes, from, newline);
      from = newline + 1;
    }
    this.#hold(bytes, from, bytes.length);
    if (this.#reader!.faults.length >= MOST_FAULTS) this.#throwFaults(this.#reader!);
  }

  /** Keeps the beginning of a line whose end is in the next piece. */
  #hold(bytes: Uint8Array, from: number, to: number): void {
    const length = this.#pendingLength + to - from;
    if (length > this.#pending.length) {
      const wider = new Uint8Array(2 * length);
      wider.set(this.#pending.subarray(0, this.#pendingLength));
      this.#pending = wider;
    }
    this.#pending.set(bytes.subarray(from, to), this.#pendingLength);
    this.#pendingLength = length;
  }

  #readLine(bytes: Uint8Array, from: number, to: number): void {
    this.#line++;
    if (this.#line < this.#skipUntil) return;
    const end = to > from && bytes[to - 1] === RETURN ? to - 1 : to;
    this.#reader!.readLine(bytes, from, end, this.#line);
  }

  #throwFaults(reader: RowReader): void {
    if (reader.faults.length > 0) throw new CampaignError(reader.faults);
  }
}

/** Reads a whole frequency file that is already in memory. */
export function readFrequencySeries(text: string | Uint8Array, options: SeriesOptions = {}): FrequencySeries {
  const parser = new FrequencySeriesParser(options);
  parser.push(text);
  return parser.finish();
}
