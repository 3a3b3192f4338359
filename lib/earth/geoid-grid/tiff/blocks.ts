import { CampaignError } from '../../../campaign/fault.js';
import { type ByteSource, viewOf } from '../../file-bytes/byte-source.js';
import type { TiffDirectory } from './directory.js';
import { DecompressionError, inflateZlib } from './inflate.js';
import { unpackLzw } from './lzw.js';
import { undoPredictor } from './predictor.js';

const BITS_PER_SAMPLE = 258;
const COMPRESSION = 259;
const STRIP_OFFSETS = 273;
const SAMPLES_PER_PIXEL = 277;
const ROWS_PER_STRIP = 278;
const STRIP_BYTE_COUNTS = 279;
const PLANAR_CONFIGURATION = 284;
const PREDICTOR = 317;
const TILE_WIDTH = 322;
const TILE_LENGTH = 323;
const TILE_OFFSETS = 324;
const TILE_BYTE_COUNTS = 325;
const SAMPLE_FORMAT = 339;

/** A strip or tile of more than this is not unpacked; tiles are 256 × 256 by custom. */
const MAX_BLOCK_BYTES = 2 ** 28;
const CACHE_BYTES = 2 ** 26;

const UNSIGNED = 1;
const SIGNED = 2;
const FLOAT = 3;

const refuse = (code: string, found: string, expected: string): never => {
  throw new CampaignError([{ code, path: 'tiff', line: null, column: null, found, expected }]);
};

/** Reads samples of one TIFF image as numbers, unpacking the strips or tiles that hold them. */
export class BlockReader {
  /** rows that are cheapest read together */
  readonly rowsPerBlock: number;
  /** type of the samples and how they are packed, in words */
  readonly description: string;
  readonly #source: ByteSource;
  readonly #little: boolean;
  readonly #rows: number;
  readonly #blockWidth: number;
  readonly #blockHeight: number;
  readonly #tiled: boolean;
  readonly #across: number;
  readonly #down: number;
  readonly #offsets: readonly number[];
  readonly #byteCounts: readonly number[];
  readonly #compression: number;
  readonly #predictor: number;
  readonly #samples: number;
  readonly #planar: boolean;
  readonly #bytesPerSample: number;
  readonly #format: number;
  readonly #cache = new Map<number, Uint8Array>();
  #cachedBytes = 0;

  /** @throws {CampaignError} the image is packed in a way that is not read, or its tables disagree with its size */
  constructor(source: ByteSource, image: TiffDirectory, rows: number, columns: number) {
    this.#source = source;
    this.#little = image.littleEndian;
    this.#rows = rows;
    this.#samples = image.number(SAMPLES_PER_PIXEL, 1);
    this.#planar = image.number(PLANAR_CONFIGURATION, 1) === 2;
    this.#compression = image.number(COMPRESSION, 1);
    this.#predictor = image.number(PREDICTOR, 1);
    const bits = image.numbers(BITS_PER_SAMPLE) ?? [1];
    this.#format = image.number(SAMPLE_FORMAT, UNSIGNED);
    this.#bytesPerSample = bits[0]! / 8;
    if (bits.some((b) => b !== bits[0]) || !SAMPLE_TYPES.has(`${this.#format}:${bits[0]}`))
      refuse(
        'sample-type',
        `samples of ${bits.join(', ')} bits, format ${this.#format}`,
        `one of ${[...SAMPLE_TYPES.values()].join(', ')}`,
      );
    const packing = COMPRESSIONS.get(this.#compression);
    if (packing === undefined)
      refuse(
        'compression',
        `compression ${this.#compression}`,
        `${[...new Set(COMPRESSIONS.values())].join(', ')}: rewrite the file with one of these`,
      );
    this.#tiled = image.numbers(TILE_OFFSETS) !== null;
    this.#blockWidth = this.#tiled ? image.number(TILE_WIDTH, 0) : columns;
    this.#blockHeight = this.#tiled ? image.number(TILE_LENGTH, 0) : Math.min(rows, image.number(ROWS_PER_STRIP, rows));
    if (!(this.#blockWidth > 0 && this.#blockHeight > 0))
      refuse('tiff-directory', 'strips or tiles of no size', 'their width and length');
    this.#offsets = image.numbers(this.#tiled ? TILE_OFFSETS : STRIP_OFFSETS) ?? [];
    this.#byteCounts = image.numbers(this.#tiled ? TILE_BYTE_COUNTS : STRIP_BYTE_COUNTS) ?? [];
    this.#across = Math.ceil(columns / this.#blockWidth);
    this.#down = Math.ceil(rows / this.#blockHeight);
    const blocks = this.#across * this.#down * (this.#planar ? this.#samples : 1);
    if (this.#offsets.length !== blocks || this.#byteCounts.length !== blocks)
      refuse(
        'wrong-size',
        `${this.#offsets.length} ${this.#tiled ? 'tiles' : 'strips'} for ${rows} rows of ${columns} values`,
        `${blocks} of ${this.#blockHeight} × ${this.#blockWidth}`,
      );
    if (this.#fullBlockBytes() > MAX_BLOCK_BYTES)
      refuse(
        'block-too-large',
        `a ${this.#tiled ? 'tile' : 'strip'} of ${this.#fullBlockBytes()} bytes`,
        `at most ${MAX_BLOCK_BYTES}: write the file in tiles`,
      );
    this.rowsPerBlock = this.#tiled ? this.#blockHeight : Math.max(this.#blockHeight, Math.min(rows, 16));
    this.description = `${SAMPLE_TYPES.get(`${this.#format}:${bits[0]}`)}, ${packing}${this.#predictor > 1 ? `, predictor ${this.#predictor}` : ''}, ${this.#tiled ? 'tiles' : 'strips'} of ${this.#blockHeight} × ${this.#blockWidth}, ${this.#little ? 'little' : 'big'}-endian`;
  }

  /** Samples of one channel as stored, row by row; the window lies inside the image. */
  async read(
    sample: number,
    firstRow: number,
    firstColumn: number,
    rows: number,
    columns: number,
  ): Promise<Float64Array> {
    const out = new Float64Array(rows * columns);
    const [h, w] = [this.#blockHeight, this.#blockWidth];
    const interleaved = this.#planar ? 1 : this.#samples;
    const channel = this.#planar ? 0 : sample;
    for (let y = Math.floor(firstRow / h); y * h < firstRow + rows; y++)
      for (let x = Math.floor(firstColumn / w); x * w < firstColumn + columns; x++) {
        const index = (this.#planar ? sample * this.#across * this.#down : 0) + y * this.#across + x;
        const view = viewOf(await this.#block(index, y));
        for (let row = Math.max(firstRow, y * h); row < Math.min(firstRow + rows, (y + 1) * h); row++)
          for (
            let column = Math.max(firstColumn, x * w);
            column < Math.min(firstColumn + columns, (x + 1) * w);
            column++
          ) {
            const at = ((row - y * h) * w + (column - x * w)) * interleaved + channel;
            out[(row - firstRow) * columns + column - firstColumn] = this.#sampleAt(view, at * this.#bytesPerSample);
          }
      }
    return out;
  }

  /** A number as it comes back from storage in this sample type (−9999.9 in single precision). */
  asStored(value: number): number {
    return this.#format === FLOAT && this.#bytesPerSample === 4 ? Math.fround(value) : value;
  }

  #fullBlockBytes(): number {
    return this.#blockHeight * this.#blockWidth * (this.#planar ? 1 : this.#samples) * this.#bytesPerSample;
  }

  async #block(index: number, y: number): Promise<Uint8Array> {
    const cached = this.#cache.get(index);
    if (cached) return cached;
    const offset = this.#offsets[index]!;
    const count = this.#byteCounts[index]!;
    const name = `${this.#tiled ? 'tile' : 'strip'} ${index}`;
    if (count === 0) return refuse('block-missing', `${name} without data`, 'data in every strip or tile');
    if (offset + count > this.#source.size)
      refuse('file-truncated', `${this.#source.size} bytes`, `${name}, ${count} bytes at ${offset}`);
    const full = this.#fullBlockBytes();
    // the last strip holds the rows that are left; a tile is always whole
    const rowsHere = this.#tiled ? this.#blockHeight : Math.min(this.#blockHeight, this.#rows - y * this.#blockHeight);
    const needed = (full / this.#blockHeight) * rowsHere;
    const packed = await this.#source.read(offset, count);
    let bytes: Uint8Array;
    try {
      bytes = this.#unpack(packed, full);
    } catch (error) {
      if (error instanceof DecompressionError)
        return refuse('block-damaged', `${name}: ${error.message}`, 'a block that unpacks to its size');
      throw error;
    }
    if (bytes.length < needed) refuse('block-damaged', `${name}: ${bytes.length} bytes`, `${needed} bytes`);
    const stride = this.#planar ? 1 : this.#samples;
    if (!undoPredictor(bytes, this.#predictor, this.#blockWidth * stride, stride, this.#bytesPerSample, this.#little))
      refuse(
        'predictor',
        `predictor ${this.#predictor} with samples of ${this.#bytesPerSample} bytes`,
        'predictor 1, 2 or 3',
      );
    this.#keep(index, bytes);
    return bytes;
  }

  #unpack(packed: Uint8Array, most: number): Uint8Array {
    if (this.#compression === 5) return unpackLzw(packed, most);
    if (this.#compression === 1) return packed.slice(0, most);
    return inflateZlib(packed, most);
  }

  #keep(index: number, bytes: Uint8Array): void {
    this.#cache.set(index, bytes);
    this.#cachedBytes += bytes.length;
    for (const [oldest, block] of this.#cache) {
      if (this.#cachedBytes <= CACHE_BYTES || oldest === index) break;
      this.#cache.delete(oldest);
      this.#cachedBytes -= block.length;
    }
  }

  #sampleAt(view: DataView, at: number): number {
    const little = this.#little;
    if (this.#format === FLOAT)
      return this.#bytesPerSample === 4 ? view.getFloat32(at, little) : view.getFloat64(at, little);
    const signed = this.#format === SIGNED;
    if (this.#bytesPerSample === 1) return signed ? view.getInt8(at) : view.getUint8(at);
    if (this.#bytesPerSample === 2) return signed ? view.getInt16(at, little) : view.getUint16(at, little);
    return signed ? view.getInt32(at, little) : view.getUint32(at, little);
  }
}

const SAMPLE_TYPES: ReadonlyMap<string, string> = new Map([
  [`${UNSIGNED}:8`, 'unsigned 8 bit'],
  [`${SIGNED}:8`, 'signed 8 bit'],
  [`${UNSIGNED}:16`, 'unsigned 16 bit'],
  [`${SIGNED}:16`, 'signed 16 bit'],
  [`${UNSIGNED}:32`, 'unsigned 32 bit'],
  [`${SIGNED}:32`, 'signed 32 bit'],
  [`${FLOAT}:32`, 'float 32 bit'],
  [`${FLOAT}:64`, 'float 64 bit'],
]);

const COMPRESSIONS: ReadonlyMap<number, string> = new Map([
  [1, 'uncompressed'],
  [5, 'LZW'],
  [8, 'deflate'],
  [32946, 'deflate'],
]);
