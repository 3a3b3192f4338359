/** The zlib (RFC 1950) and deflate (RFC 1951) decoder for the blocks of a TIFF file. It is ours because the size of a block is known
 *  beforehand and nothing beyond it may be unpacked, however far the stream would go on expanding. */

/** What is wrong with a compressed block, for the caller to place. */
export class DecompressionError extends Error {
  override readonly name = 'DecompressionError';
}

const LENGTH_BASE = [
  3, 4, 5, 6, 7, 8, 9, 10, 11, 13, 15, 17, 19, 23, 27, 31, 35, 43, 51, 59, 67, 83, 99, 115, 131, 163, 195, 227, 258,
];
const LENGTH_EXTRA = [0, 0, 0, 0, 0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2, 3, 3, 3, 3, 4, 4, 4, 4, 5, 5, 5, 5, 0];
const DISTANCE_BASE = [
  1, 2, 3, 4, 5, 7, 9, 13, 17, 25, 33, 49, 65, 97, 129, 193, 257, 385, 513, 769, 1025, 1537, 2049, 3073, 4097, 6145,
  8193, 12289, 16385, 24577,
];
const DISTANCE_EXTRA = [
  0, 0, 0, 0, 1, 1, 2, 2, 3, 3, 4, 4, 5, 5, 6, 6, 7, 7, 8, 8, 9, 9, 10, 10, 11, 11, 12, 12, 13, 13,
];
const CODE_LENGTH_ORDER = [16, 17, 18, 0, 8, 7, 9, 6, 10, 5, 11, 4, 12, 3, 13, 2, 14, 1, 15];
const MAX_CODE_BITS = 15;

/** A canonical Huffman code: how many codes of each length, and the symbols in order of their codes (RFC 1951, 3.2.2). */
interface HuffmanCode {
  readonly counts: Uint16Array;
  readonly symbols: Uint16Array;
  /** for the next {@link FAST_BITS} bits: 16·symbol + length of its code; 0 where the code is longer */
  readonly fast: Uint16Array;
}

const FAST_BITS = 9;

function huffmanCode(lengths: ArrayLike<number>): HuffmanCode {
  const counts = new Uint16Array(MAX_CODE_BITS + 1);
  for (let i = 0; i < lengths.length; i++) counts[lengths[i]!]!++;
  counts[0] = 0;
  let left = 1;
  for (let bits = 1; bits <= MAX_CODE_BITS; bits++) {
    left = 2 * left - counts[bits]!;
    if (left < 0) throw new DecompressionError('a Huffman code with more symbols than it has room for');
  }
  const offsets = new Uint16Array(MAX_CODE_BITS + 2);
  for (let bits = 1; bits <= MAX_CODE_BITS; bits++) offsets[bits + 1] = offsets[bits]! + counts[bits]!;
  const symbols = new Uint16Array(lengths.length);
  for (let i = 0; i < lengths.length; i++) if (lengths[i]! > 0) symbols[offsets[lengths[i]!]!++] = i;
  return { counts, symbols, fast: fastTable(counts, symbols) };
}

function fastTable(counts: Uint16Array, symbols: Uint16Array): Uint16Array {
  const fast = new Uint16Array(1 << FAST_BITS);
  let code = 0;
  let index = 0;
  for (let bits = 1; bits <= FAST_BITS; bits++) {
    for (let i = 0; i < counts[bits]!; i++, code++, index++) {
      // codes stand with their first bit lowest in the stream
      let reversed = 0;
      for (let b = 0; b < bits; b++) reversed |= ((code >> b) & 1) << (bits - 1 - b);
      for (let j = reversed; j < fast.length; j += 1 << bits) fast[j] = (symbols[index]! << 4) | bits;
    }
    code <<= 1;
  }
  return fast;
}

const fixedLengths = Uint8Array.from({ length: 288 }, (_, i) => (i < 144 ? 8 : i < 256 ? 9 : i < 280 ? 7 : 8));
const FIXED_LITERALS = huffmanCode(fixedLengths);
const FIXED_DISTANCES = huffmanCode(new Uint8Array(30).fill(5));

class BitReader {
  readonly #bytes: Uint8Array;
  #at: number;
  #held = 0;
  #heldBits = 0;
  constructor(bytes: Uint8Array, at: number) {
    this.#bytes = bytes;
    this.#at = at;
  }

  bits(count: number): number {
    while (this.#heldBits < count) {
      if (this.#at >= this.#bytes.length) throw new DecompressionError('the compressed data end too early');
      this.#held |= this.#bytes[this.#at++]! << this.#heldBits;
      this.#heldBits += 8;
    }
    const value = this.#held & ((1 << count) - 1);
    this.#held >>>= count;
    this.#heldBits -= count;
    return value;
  }

  symbol({ counts, symbols, fast }: HuffmanCode): number {
    while (this.#heldBits < MAX_CODE_BITS && this.#at < this.#bytes.length) {
      this.#held |= this.#bytes[this.#at++]! << this.#heldBits;
      this.#heldBits += 8;
    }
    const entry = fast[this.#held & ((1 << FAST_BITS) - 1)]!;
    if (entry !== 0 && (entry & 15) <= this.#heldBits) {
      this.#held >>>= entry & 15;
      this.#heldBits -= entry & 15;
      return entry >> 4;
    }
    let code = 0;
    let first = 0;
    let index = 0;
    for (let bits = 1; bits <= MAX_CODE_BITS; bits++) {
      code |= this.bits(1);
      const count = counts[bits]!;
      if (code - count < first) return symbols[index + (code - first)]!;
      index += count;
      first = (first + count) << 1;
      code <<= 1;
    }
    throw new DecompressionError('a code that stands for nothing');
  }

  /** Drops the rest of the byte in hand and returns the place of the next one. */
  alignToByte(): number {
    this.#at -= this.#heldBits >> 3;
    this.#held = 0;
    this.#heldBits = 0;
    return this.#at;
  }

  skipTo(at: number): void {
    this.#at = at;
  }
}

/** Unpacks a zlib stream.
 * @param mostBytes size the block may have; the work space is no larger
 * @returns the bytes, `mostBytes` of them or fewer
 * @throws {DecompressionError} damaged, cut off, its checksum wrong, or longer than `mostBytes` */
export function inflateZlib(packed: Uint8Array, mostBytes: number): Uint8Array {
  const method = packed[0] ?? 0;
  const flags = packed[1] ?? 0;
  if ((method & 0x0f) !== 8 || (method * 256 + flags) % 31 !== 0 || (flags & 0x20) !== 0)
    throw new DecompressionError('no zlib head at its beginning');
  const reader = new BitReader(packed, 2);
  const out = new Uint8Array(mostBytes);
  let length = 0;
  for (let last = false; !last; ) {
    last = reader.bits(1) === 1;
    const type = reader.bits(2);
    if (type === 0) length = copyStored(packed, reader, out, length);
    else if (type === 1) length = unpackCodes(reader, FIXED_LITERALS, FIXED_DISTANCES, out, length);
    else if (type === 2) {
      const [literals, distances] = readCodes(reader);
      length = unpackCodes(reader, literals, distances, out, length);
    } else throw new DecompressionError('a block of a type that does not exist');
  }
  const at = reader.alignToByte();
  const stated = ((packed[at]! << 24) | (packed[at + 1]! << 16) | (packed[at + 2]! << 8) | packed[at + 3]!) >>> 0;
  if (at + 4 > packed.length || stated !== adler32(out, length))
    throw new DecompressionError('the checksum does not agree');
  return out.subarray(0, length);
}

const tooLong = (most: number) => new DecompressionError(`more than the ${most} bytes that it must hold`);

function copyStored(packed: Uint8Array, reader: BitReader, out: Uint8Array, length: number): number {
  const at = reader.alignToByte();
  const count = (packed[at] ?? 0) | ((packed[at + 1] ?? 0) << 8);
  const complement = (packed[at + 2] ?? 0) | ((packed[at + 3] ?? 0) << 8);
  if (at + 4 + count > packed.length) throw new DecompressionError('the compressed data end too early');
  if ((count ^ complement) !== 0xffff) throw new DecompressionError('a stored block whose length is damaged');
  if (length + count > out.length) throw tooLong(out.length);
  out.set(packed.subarray(at + 4, at + 4 + count), length);
  reader.skipTo(at + 4 + count);
  return length + count;
}

function readCodes(reader: BitReader): [HuffmanCode, HuffmanCode] {
  const literalCount = reader.bits(5) + 257;
  const distanceCount = reader.bits(5) + 1;
  const lengthCount = reader.bits(4) + 4;
  if (literalCount > 286 || distanceCount > 30) throw new DecompressionError('a Huffman table that is too large');
  const lengths = new Uint8Array(19);
  for (let i = 0; i < lengthCount; i++) lengths[CODE_LENGTH_ORDER[i]!] = reader.bits(3);
  const code = huffmanCode(lengths);
  const all = new Uint8Array(literalCount + distanceCount);
  for (let i = 0; i < all.length; ) {
    const symbol = reader.symbol(code);
    if (symbol < 16) {
      all[i++] = symbol;
      continue;
    }
    if (symbol === 16 && i === 0) throw new DecompressionError('a repeated code length with nothing before it');
    const repeated = symbol === 16 ? all[i - 1]! : 0;
    const times = symbol === 16 ? 3 + reader.bits(2) : symbol === 17 ? 3 + reader.bits(3) : 11 + reader.bits(7);
    if (i + times > all.length) throw new DecompressionError('more code lengths than announced');
    all.fill(repeated, i, i + times);
    i += times;
  }
  return [huffmanCode(all.subarray(0, literalCount)), huffmanCode(all.subarray(literalCount))];
}

function unpackCodes(
  reader: BitReader,
  literals: HuffmanCode,
  distances: HuffmanCode,
  out: Uint8Array,
  from: number,
): number {
  let length = from;
  for (;;) {
    const symbol = reader.symbol(literals);
    if (symbol === 256) return length;
    if (symbol < 256) {
      if (length >= out.length) throw tooLong(out.length);
      out[length++] = symbol;
      continue;
    }
    const l = symbol - 257;
    if (l >= LENGTH_BASE.length) throw new DecompressionError('a length that does not exist');
    const count = LENGTH_BASE[l]! + reader.bits(LENGTH_EXTRA[l]!);
    const d = reader.symbol(distances);
    if (d >= DISTANCE_BASE.length) throw new DecompressionError('a distance that does not exist');
    const distance = DISTANCE_BASE[d]! + reader.bits(DISTANCE_EXTRA[d]!);
    if (distance > length) throw new DecompressionError('a reference to before the beginning');
    if (length + count > out.length) throw tooLong(out.length);
    // byte by byte: a run may overlap itself
    for (let i = 0; i < count; i++, length++) out[length] = out[length - distance]!;
  }
}

/** RFC 1950, section 9. Sums stay below 2³² for 5552 bytes between reductions. */
function adler32(bytes: Uint8Array, length: number): number {
  let a = 1;
  let b = 0;
  for (let i = 0; i < length; ) {
    for (const stop = Math.min(i + 5552, length); i < stop; i++) {
      a += bytes[i]!;
      b += a;
    }
    a %= 65521;
    b %= 65521;
  }
  return (b * 65536 + a) >>> 0;
}
