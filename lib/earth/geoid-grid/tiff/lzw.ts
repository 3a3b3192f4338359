import { DecompressionError } from './inflate.js';

const CLEAR = 256;
const END = 257;
const FIRST = 258;
const MAX_CODES = 4096;

/** Unpacks the LZW of TIFF 6.0 (section 13: codes from the high bit down, 9 to 12 bits, widened one code early).
 * @param mostBytes size the block may have; nothing beyond it is unpacked
 * @throws {DecompressionError} damaged, cut off, or longer than `mostBytes` */
export function unpackLzw(packed: Uint8Array, mostBytes: number): Uint8Array {
  if (packed.length > 1 && packed[0] === 0 && (packed[1]! & 1) === 1)
    throw new DecompressionError('the LZW of before TIFF 5.0, low bit first, which is not read');
  const out = new Uint8Array(mostBytes);
  // each code is its predecessor and one byte; start and length point at where it was last written
  const starts = new Uint32Array(MAX_CODES);
  const lengths = new Uint32Array(MAX_CODES);
  let next = FIRST;
  let width = 9;
  let previous = -1;
  let length = 0;
  let held = 0;
  let heldBits = 0;
  let at = 0;
  for (;;) {
    while (heldBits < width) {
      // writers may leave out the end code where the block is full
      if (at >= packed.length) {
        if (length === mostBytes) return out;
        throw new DecompressionError('the compressed data end too early');
      }
      held = ((held << 8) | packed[at++]!) & 0xffffff;
      heldBits += 8;
    }
    heldBits -= width;
    const code = (held >>> heldBits) & ((1 << width) - 1);
    if (code === END) return out.subarray(0, length);
    if (code === CLEAR) {
      next = FIRST;
      width = 9;
      previous = -1;
      continue;
    }
    if (code > next || (code === next && previous < 0)) throw new DecompressionError('a code that stands for nothing');
    const start = length;
    if (code < CLEAR) {
      if (length >= mostBytes) throw new DecompressionError(`more than the ${mostBytes} bytes that it must hold`);
      out[length++] = code;
    } else {
      // a code that is just being made is the previous string and its first byte: where that string stands, the byte follows
      const known = code < next;
      const from = known ? starts[code]! : start - lengthOf(previous, lengths);
      const count = known ? lengths[code]! : lengthOf(previous, lengths) + 1;
      if (length + count > mostBytes)
        throw new DecompressionError(`more than the ${mostBytes} bytes that it must hold`);
      for (let i = 0; i < count; i++, length++) out[length] = out[from + i]!;
    }
    if (previous >= 0 && next < MAX_CODES) {
      const count = lengthOf(previous, lengths) + 1;
      starts[next] = start - (count - 1);
      lengths[next] = count;
      next++;
      if (next >= (1 << width) - 1 && width < 12) width++;
    }
    previous = code;
  }
}

const lengthOf = (code: number, lengths: Uint32Array): number => (code < CLEAR ? 1 : lengths[code]!);
