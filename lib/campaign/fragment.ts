import { decodeUtf8, encodeUtf8 } from '../clocks/series/utf8.js';
import { DecompressionError, inflateZlib } from '../earth/geoid-grid/tiff/inflate.js';
import { CampaignError, faultAt } from './fault.js';

/** What an address carries behind its #: never sent to a server, so that places stay with the reader. */
export interface FragmentState {
  /** text of the campaign file */
  readonly campaign: string;
  /** id of the link in hand; null: none */
  readonly link: string | null;
  /** names of the elements to show, without `plumb-`; empty: as the page likes */
  readonly show: readonly string[];
}

/** A longer address is cut off by some mail programs, wikis and old servers. */
export const LONG_ADDRESS = 2000;
/** A campaign that unpacks to more than this is refused before it is unpacked: sixteen times the largest we know of. */
export const MOST_BYTES = 4_000_000;

const KEY = 'plumb1';
const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';

/** Makes bytes smaller, as a zlib stream (RFC 1950). */
export type Packer = (bytes: Uint8Array) => Promise<Uint8Array>;

/** A state as the part of an address behind its #. Written in this order, so that an address that is cut off shows it:
 *  `link=rp&show=section,links&plumb1=<bytes unpacked>.<characters of the data>.<data>`. White space of the file is left out.
 * @param pack null: nothing can be packed here, the bytes go as they are
 * @throws {SyntaxError} the campaign is no JSON */
export async function writeFragment(state: FragmentState, pack: Packer | null): Promise<string> {
  const bytes = encodeUtf8(JSON.stringify(JSON.parse(state.campaign)));
  const packed = pack ? await pack(bytes) : stored(bytes);
  const data = toBase64Url(packed);
  return [
    ...(state.link === null ? [] : [`link=${encodeURIComponent(state.link)}`]),
    ...(state.show.length === 0 ? [] : [`show=${state.show.map(encodeURIComponent).join(',')}`]),
    `${KEY}=${bytes.length}.${data.length}.${data}`,
  ].join('&');
}

/** Whether an address carries a state, of whatever version. */
export const hasFragment = (hash: string): boolean => /(^#?|&)plumb\d+=/.test(hash);

/** The state behind the # of an address; null where it carries none.
 * @throws {CampaignError} `cut-off`, `damaged`, `newer-version`, `too-large`; at path `address` */
export function readFragment(hash: string): FragmentState | null {
  if (!hasFragment(hash)) return null;
  const parts = new Map(
    hash
      .replace(/^#/, '')
      .split('&')
      .map((part) => [part.slice(0, part.indexOf('=')), part.slice(part.indexOf('=') + 1)] as const),
  );
  const data = parts.get(KEY);
  if (data === undefined)
    throw refused(
      'newer-version',
      [...parts.keys()].find((key) => /^plumb\d+$/.test(key)) ?? 'nothing',
      `${KEY}, which this version of the page can read; take a newer page`,
    );
  return {
    campaign: unpacked(data),
    link: decoded(parts.get('link')),
    show: (decoded(parts.get('show')) ?? '').split(',').filter((name) => name !== ''),
  };
}

const refused = (code: string, found: string, expected: string) =>
  new CampaignError([faultAt(code, 'address', found, expected)]);

function decoded(text: string | undefined): string | null {
  if (text === undefined) return null;
  try {
    return decodeURIComponent(text);
  } catch {
    throw refused('damaged', text, 'an address as it was copied; a % in it stands alone');
  }
}

function unpacked(text: string): string {
  const match = /^(\d+)\.(\d+)\.([\w-]*)$/.exec(text);
  if (!match)
    throw refused(
      /^\d*\.?\d*\.?$/.test(text) ? 'cut-off' : 'damaged',
      text === '' ? 'nothing' : text.slice(0, 40),
      'two numbers and the data; copy the whole address once more',
    );
  const [bytes, characters] = [Number(match[1]), Number(match[2])];
  const data = match[3]!;
  if (data.length < characters)
    throw refused(
      'cut-off',
      `${data.length} of ${characters} characters`,
      'the whole address; it was cut off on its way, copy it once more or send it as a file',
    );
  if (data.length > characters)
    throw refused(
      'damaged',
      `${data.length} characters`,
      `${characters} characters; something was added behind the address`,
    );
  if (bytes > MOST_BYTES) throw refused('too-large', `${bytes} bytes`, `a campaign of at most ${MOST_BYTES} bytes`);
  try {
    const unpackedBytes = inflateZlib(fromBase64Url(data), bytes);
    if (unpackedBytes.length !== bytes)
      throw new DecompressionError(`${unpackedBytes.length} bytes in place of ${bytes}`);
    return decodeUtf8(unpackedBytes);
  } catch (error) {
    if (!(error instanceof DecompressionError)) throw error;
    throw refused('damaged', error.message, 'an address as it was copied; a character of it has changed');
  }
}

function toBase64Url(bytes: Uint8Array): string {
  let text = '';
  for (let i = 0; i < bytes.length; i += 3) {
    const three = (bytes[i]! << 16) | ((bytes[i + 1] ?? 0) << 8) | (bytes[i + 2] ?? 0);
    const digits = Math.min(4, bytes.length - i + 1);
    for (let d = 0; d < digits; d++) text += DIGITS[(three >> (18 - 6 * d)) & 63];
  }
  return text;
}

function fromBase64Url(text: string): Uint8Array {
  const bytes = new Uint8Array(Math.floor((text.length * 3) / 4));
  let [held, bits, at] = [0, 0, 0];
  for (const digit of text) {
    held = (held << 6) | DIGITS.indexOf(digit);
    bits += 6;
    if (bits < 8) continue;
    bits -= 8;
    bytes[at++] = (held >> bits) & 255;
    held &= (1 << bits) - 1;
  }
  return bytes;
}

/** A zlib stream of stored blocks, for a page that cannot pack (RFC 1951, 3.2.4). */
function stored(bytes: Uint8Array): Uint8Array {
  const most = 65_535;
  const blocks = Math.max(1, Math.ceil(bytes.length / most));
  const out = new Uint8Array(2 + 5 * blocks + bytes.length + 4);
  out.set([0x78, 0x01]);
  let at = 2;
  for (let block = 0; block < blocks; block++) {
    const piece = bytes.subarray(block * most, (block + 1) * most);
    const n = piece.length;
    out.set([block === blocks - 1 ? 1 : 0, n & 255, n >> 8, ~n & 255, (~n >> 8) & 255], at);
    out.set(piece, at + 5);
    at += 5 + n;
  }
  let [a, b] = [1, 0];
  for (const byte of bytes) {
    a = (a + byte) % 65_521;
    b = (b + a) % 65_521;
  }
  out.set([b >> 8, b & 255, a >> 8, a & 255], at);
  return out;
}
