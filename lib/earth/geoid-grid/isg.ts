import { CampaignError, type Warning } from '../../campaign/fault.js';
import type { ByteSource } from '../file-bytes/byte-source.js';
import { piecesOf } from '../file-bytes/byte-source.js';
import { DecimalScanner, latin1 } from '../file-bytes/decimal-scanner.js';
import { type GeoidGrid, periodOf } from './geoid-grid.js';
import { type IsgHeader, readIsgHeader } from './isg-header.js';
import { findRegistration } from './registration.js';

/** Comments and head come first; a file without a head in its first megabyte is of another kind. */
const MAX_HEADER_BYTES = 2 ** 20;
/** A row of 21 601 values of 19 characters is 0.4 MB. */
const MAX_LINE_BYTES = 2 ** 22;

const refuse = (code: string, line: number | null, found: string, expected: string): never => {
  throw new CampaignError([{ code, path: '', line, column: null, found, expected }]);
};

/** Reads a grid in the text format of the International Service for the Geoid. Every value is kept, 8 bytes each; no more than
 *  four times the size of the file, whatever its head claims.
 * @throws {CampaignError} with what is wrong and the line */
export async function readIsg(source: ByteSource): Promise<GeoidGrid> {
  const reader = new IsgReader(source);
  for await (const piece of piecesOf(source)) reader.push(piece);
  return reader.end();
}

class IsgReader {
  readonly #source: ByteSource;
  readonly #scanner = new DecimalScanner();
  #line = 0;
  #phase: 'comment' | 'head' | 'data' = 'comment';
  #headerBytes = 0;
  #headLines: string[] = [];
  #headFirstLine = 0;
  #header: IsgHeader | null = null;
  #registration: ReturnType<typeof findRegistration> | null = null;
  #values = new Float64Array(0);
  #count = 0;
  #inRow = 0;
  #pending = new Uint8Array(0);
  #afterCarriageReturn = false;
  #endings = new Set<string>();

  constructor(source: ByteSource) {
    this.#source = source;
  }

  push(piece: Uint8Array): void {
    let bytes = piece;
    if (this.#pending.length > 0) {
      bytes = new Uint8Array(this.#pending.length + piece.length);
      bytes.set(this.#pending);
      bytes.set(piece, this.#pending.length);
    }
    let start = 0;
    for (let i = this.#pending.length; i < bytes.length; i++) {
      const byte = bytes[i]!;
      if (byte !== 0x0a && byte !== 0x0d) continue;
      this.#endLine(bytes, start, i, byte);
      start = i + 1;
    }
    this.#pending = bytes.slice(start);
    const limit = this.#phase === 'data' ? MAX_LINE_BYTES : MAX_HEADER_BYTES;
    if (this.#pending.length > limit)
      refuse(
        this.#phase === 'data' ? 'row' : 'not-isg',
        this.#line + 1,
        `a line of more than ${limit} bytes`,
        'an ISG file, which is text in rows',
      );
  }

  end(): GeoidGrid {
    if (this.#pending.length > 0) this.#takeLine(this.#pending, 0, this.#pending.length);
    const header = this.#header;
    if (!header)
      return refuse(
        'not-isg',
        null,
        this.#phase === 'comment' ? 'no line `begin_of_head`' : 'no line `end_of_head`',
        'an ISG file: a head between begin_of_head and end_of_head, then the values',
      );
    const expected = header.latitude.count * header.longitude.count;
    if (this.#count < expected)
      refuse(
        'file-truncated',
        this.#line,
        `${this.#count} values, ending in row ${Math.floor(this.#count / header.longitude.count) + 1} of ${header.latitude.count}`,
        `${header.latitude.count} rows of ${header.longitude.count} values`,
      );
    return this.#grid(header);
  }

  #endLine(bytes: Uint8Array, start: number, stop: number, ending: number): void {
    if (this.#afterCarriageReturn && ending === 0x0a && start === stop) {
      this.#endings.delete('\r');
      this.#endings.add('\r\n');
      this.#afterCarriageReturn = false;
      return;
    }
    this.#afterCarriageReturn = ending === 0x0d;
    this.#endings.add(ending === 0x0a ? '\n' : '\r');
    this.#takeLine(bytes, start, stop);
  }

  #takeLine(bytes: Uint8Array, start: number, stop: number): void {
    this.#line++;
    if (this.#phase === 'data') {
      this.#takeValues(bytes, start, stop);
      return;
    }
    this.#headerBytes += stop - start + 1;
    if (this.#headerBytes > MAX_HEADER_BYTES)
      refuse(
        'not-isg',
        this.#line,
        `no end of the head in ${MAX_HEADER_BYTES} bytes`,
        'an ISG file: a head between begin_of_head and end_of_head',
      );
    const text = utf8(bytes, start, stop);
    if (this.#phase === 'comment') {
      if (!/^\ufeff?\s*begin_of_head/.test(text)) return;
      this.#phase = 'head';
      this.#headFirstLine = this.#line + 1;
    } else if (/^\s*end_of_head/.test(text)) {
      // gravity models begin alike
      if (this.#headLines.some((line) => /^\s*(product_type|earth_gravity_constant)\s/.test(line)))
        refuse(
          'not-isg',
          this.#line,
          'the head of a gravity model in ICGEM format (.gfc)',
          'a grid; a model is named by a determination of kind "gravity-model"',
        );
      this.#begin(readIsgHeader(this.#headLines, this.#headFirstLine));
    } else this.#headLines.push(text);
  }

  #begin(header: IsgHeader): void {
    this.#header = header;
    // before any value is read: most wrong heads disagree with themselves
    this.#registration = findRegistration(
      header.latitude,
      header.longitude,
      header.format === 'isg-2.0' ? 'nodes' : 'edges',
    );
    this.#phase = 'data';
    const claimed = header.latitude.count * header.longitude.count;
    // a value and its separator take two bytes at least
    if (claimed > this.#source.size / 2)
      refuse(
        'file-too-short',
        null,
        `${header.latitude.count} rows of ${header.longitude.count} values in a file of ${this.#source.size} bytes`,
        `at least ${2 * claimed} bytes for so many values: the head is wrong, or the file is cut`,
      );
    this.#values = new Float64Array(claimed);
  }

  #takeValues(bytes: Uint8Array, start: number, stop: number): void {
    const { nodata, unitM, longitude, latitude } = this.#header!;
    const scanner = this.#scanner;
    scanner.reset(bytes, start, stop);
    while (scanner.skipBlanks()) {
      const value = scanner.number();
      if (Number.isNaN(value)) refuse('value', this.#line, scanner.word().slice(0, 40), 'a number');
      if (this.#count === this.#values.length)
        refuse(
          'too-many-values',
          this.#line,
          `more than ${latitude.count} rows of ${longitude.count} values`,
          'as many values as the head says',
        );
      if (this.#inRow === longitude.count)
        refuse(
          'row-length',
          this.#line,
          `more than ${longitude.count} values up to the end of this line`,
          `rows of ${longitude.count} values, each ending with a line`,
        );
      const none = value === nodata;
      this.#values[this.#count++] = none ? Number.NaN : value * unitM;
      this.#inRow++;
    }
    // a row may go over several lines, but must end where a line does: else a value too few and one too many would shift all between
    if (this.#inRow === longitude.count) this.#inRow = 0;
  }

  #grid(header: IsgHeader): GeoidGrid {
    const found = this.#registration!;
    const { latitude, longitude, ordering } = header;
    const half = found.registration === 'edges' ? 0.5 : 0;
    const first = (axis: typeof latitude, step: number, direction: 1 | -1) =>
      direction === 1 ? axis.min.value + half * step : axis.max.value - half * step;
    const values = this.#values;
    const columns = longitude.count;
    const warnings: Warning[] = [...header.warnings, ...found.warnings];
    if (this.#endings.size > 1)
      warnings.push({
        code: 'mixed-line-ends',
        path: '',
        message:
          'the lines end in different ways; the file may have been pieced together. Every row has its number of values.',
      });
    return {
      format: header.format,
      name: header.name || this.#source.name,
      registration: found.registration,
      registrationReason: found.reason,
      surface: header.surface,
      tide: header.tide,
      heightDatum: header.heightDatum,
      ellipsoid: header.ellipsoid,
      frame: header.frame,
      rows: latitude.count,
      columns,
      firstLatitudeDeg: first(latitude, found.latitudeStepDeg, ordering.rows),
      latitudeStepDeg: ordering.rows * found.latitudeStepDeg,
      firstLongitudeDeg: first(longitude, found.longitudeStepDeg, ordering.columns),
      longitudeStepDeg: ordering.columns * found.longitudeStepDeg,
      period: periodOf(columns, found.longitudeStepDeg),
      header: header.entries,
      warnings,
      rowsPerBlock: 64,
      readBlock: (firstRow, firstColumn, rows, wide) => {
        const block = new Float64Array(rows * wide);
        for (let i = 0; i < rows; i++) {
          const from = (firstRow + i) * columns + firstColumn;
          block.set(values.subarray(from, from + wide), i * wide);
        }
        return Promise.resolve(block);
      },
    };
  }
}

/** Text of a head: UTF-8, or Latin-1 where it is not (the degree sign of older files). */
function utf8(bytes: Uint8Array, start: number, stop: number): string {
  const text = latin1(bytes, start, stop);
  if (!/[\u0080-\u00ff]/.test(text)) return text;
  try {
    return decodeURIComponent(
      text.replace(/[%\u0080-\u00ff]/g, (c) => `%${c.charCodeAt(0).toString(16).padStart(2, '0')}`),
    );
  } catch {
    return text;
  }
}
