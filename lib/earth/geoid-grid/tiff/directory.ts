import { CampaignError } from '../../../campaign/fault.js';
import { type ByteSource, viewOf } from '../../file-bytes/byte-source.js';
import { latin1 } from '../../file-bytes/decimal-scanner.js';

/** One image of a TIFF file: its tags, each an array of numbers or a text. */
export class TiffDirectory {
  readonly littleEndian: boolean;
  readonly #tags: ReadonlyMap<number, readonly number[] | string>;
  constructor(littleEndian: boolean, tags: ReadonlyMap<number, readonly number[] | string>) {
    this.littleEndian = littleEndian;
    this.#tags = tags;
  }

  numbers(tag: number): readonly number[] | null {
    const value = this.#tags.get(tag);
    return typeof value === 'object' ? value : null;
  }

  number(tag: number, otherwise: number): number {
    return this.numbers(tag)?.[0] ?? otherwise;
  }

  text(tag: number): string | null {
    const value = this.#tags.get(tag);
    return typeof value === 'string' ? value : null;
  }
}

/** Bytes of the field types of TIFF 6.0 (section 2) and BigTIFF; 0 where there is no such type. */
const TYPE_BYTES = [0, 1, 1, 2, 4, 8, 1, 1, 2, 4, 8, 4, 8, 4, 0, 0, 8, 8, 8];
const ASCII = 2;

/** A grid with its tile table is far below these; without limits a damaged file could ask for anything. */
const MAX_TAGS = 4096;
const MAX_DIRECTORIES = 1024;
const MAX_VALUES = 2 ** 24;

const refuse = (code: string, found: string, expected: string): never => {
  throw new CampaignError([{ code, path: 'tiff', line: null, column: null, found, expected }]);
};

export const looksLikeTiff = (start: Uint8Array): boolean => {
  const magic = latin1(start, 0, Math.min(4, start.length));
  return magic === 'II*\0' || magic === 'MM\0*' || magic === 'II+\0' || magic === 'MM\0+';
};

/** All images of a TIFF or BigTIFF file.
 * @throws {CampaignError} no TIFF, or a table that points outside the file, goes in a circle or claims too much */
export async function readTiffDirectories(source: ByteSource): Promise<TiffDirectory[]> {
  const head = await source.read(0, 16);
  if (!looksLikeTiff(head))
    refuse(
      'not-tiff',
      `a file that begins ${JSON.stringify(latin1(head, 0, Math.min(4, head.length)))}`,
      'a TIFF file',
    );
  const little = head[0] === 0x49;
  const big = (little ? head[2] : head[3]) === 0x2b;
  const view = viewOf(head);
  if (head.length < (big ? 16 : 8)) refuse('file-truncated', `${head.length} bytes`, 'the head of a TIFF file');
  if (big && (view.getUint16(4, little) !== 8 || view.getUint16(6, little) !== 0))
    refuse('not-tiff', 'a BigTIFF head with other than 8-byte offsets', 'a TIFF file');
  const reader = new DirectoryReader(source, little, big);
  const directories: TiffDirectory[] = [];
  const seen = new Set<number>();
  for (let at = big ? Number(view.getBigUint64(8, little)) : view.getUint32(4, little); at !== 0; ) {
    if (seen.has(at) || seen.size >= MAX_DIRECTORIES)
      refuse('tiff-directory', 'images linked in a circle or without end', 'a chain of images that ends');
    seen.add(at);
    const { directory, next } = await reader.read(at);
    directories.push(directory);
    at = next;
  }
  if (directories.length === 0) refuse('tiff-directory', 'no image', 'a TIFF file with an image');
  return directories;
}

class DirectoryReader {
  readonly #source: ByteSource;
  readonly #little: boolean;
  readonly #big: boolean;
  constructor(source: ByteSource, little: boolean, big: boolean) {
    this.#source = source;
    this.#little = little;
    this.#big = big;
  }

  async read(at: number): Promise<{ directory: TiffDirectory; next: number }> {
    const little = this.#little;
    const [countBytes, entryBytes, offsetBytes] = this.#big ? [8, 20, 8] : [2, 12, 4];
    const countView = await this.#view(at, countBytes, 'the table of tags');
    const count = this.#big ? Number(countView.getBigUint64(0, little)) : countView.getUint16(0, little);
    if (count > MAX_TAGS) refuse('tiff-directory', `${count} tags`, `at most ${MAX_TAGS}`);
    const view = await this.#view(at + countBytes, count * entryBytes + offsetBytes, 'the table of tags');
    const tags = new Map<number, readonly number[] | string>();
    for (let i = 0; i < count; i++) {
      const entry = i * entryBytes;
      const tag = view.getUint16(entry, little);
      const type = view.getUint16(entry + 2, little);
      const values = this.#big ? Number(view.getBigUint64(entry + 4, little)) : view.getUint32(entry + 4, little);
      const size = TYPE_BYTES[type] ?? 0;
      if (size === 0) continue; // a reader must skip types it does not know (TIFF 6.0, section 2)
      if (values > MAX_VALUES) refuse('tiff-directory', `${values} values of tag ${tag}`, `at most ${MAX_VALUES}`);
      const inline = entry + (this.#big ? 12 : 8);
      const bytes = values * size;
      const data =
        bytes <= offsetBytes
          ? new DataView(view.buffer, view.byteOffset + inline, bytes)
          : await this.#view(this.#offset(view, inline), bytes, `the values of tag ${tag}`);
      tags.set(tag, type === ASCII ? textOf(data) : this.#values(data, type, values, size));
    }
    return { directory: new TiffDirectory(little, tags), next: this.#offset(view, count * entryBytes) };
  }

  #offset(view: DataView, at: number): number {
    return this.#big ? Number(view.getBigUint64(at, this.#little)) : view.getUint32(at, this.#little);
  }

  async #view(offset: number, length: number, what: string): Promise<DataView> {
    if (!(offset + length <= this.#source.size))
      refuse('file-truncated', `${this.#source.size} bytes`, `${what}, ${length} bytes at ${offset}`);
    const bytes = await this.#source.read(offset, length);
    if (bytes.length < length)
      refuse('file-truncated', `${this.#source.size} bytes`, `${what}, ${length} bytes at ${offset}`);
    return viewOf(bytes);
  }

  #values(view: DataView, type: number, count: number, size: number): number[] {
    const little = this.#little;
    const read: Readonly<Record<number, (at: number) => number>> = {
      1: (at) => view.getUint8(at),
      3: (at) => view.getUint16(at, little),
      4: (at) => view.getUint32(at, little),
      5: (at) => view.getUint32(at, little) / view.getUint32(at + 4, little),
      6: (at) => view.getInt8(at),
      7: (at) => view.getUint8(at),
      8: (at) => view.getInt16(at, little),
      9: (at) => view.getInt32(at, little),
      10: (at) => view.getInt32(at, little) / view.getInt32(at + 4, little),
      11: (at) => view.getFloat32(at, little),
      12: (at) => view.getFloat64(at, little),
      13: (at) => view.getUint32(at, little),
      16: (at) => Number(view.getBigUint64(at, little)),
      17: (at) => Number(view.getBigInt64(at, little)),
      18: (at) => Number(view.getBigUint64(at, little)),
    };
    return Array.from({ length: count }, (_, i) => read[type]!(i * size));
  }
}

function textOf(view: DataView): string {
  const bytes = new Uint8Array(view.buffer, view.byteOffset, view.byteLength);
  const text = latin1(bytes, 0, bytes.length);
  return text.replace(/\0[\s\S]*$/, '');
}
