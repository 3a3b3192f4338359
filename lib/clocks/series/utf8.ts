/** Text as UTF-8 bytes. lib/ has neither DOM nor node types, hence no TextEncoder. */
export function encodeUtf8(text: string): Uint8Array {
  const bytes = new Uint8Array(3 * text.length);
  let n = 0;
  for (let i = 0; i < text.length; i++) {
    let c = text.charCodeAt(i);
    if (c < 0x80) bytes[n++] = c;
    else if (c < 0x800) {
      bytes[n++] = 0xc0 | (c >> 6);
      bytes[n++] = 0x80 | (c & 63);
    } else if (c >= 0xd800 && c < 0xdc00 && i + 1 < text.length) {
      c = 0x10000 + ((c & 0x3ff) << 10) + (text.charCodeAt(++i) & 0x3ff);
      bytes[n++] = 0xf0 | (c >> 18);
      bytes[n++] = 0x80 | ((c >> 12) & 63);
      bytes[n++] = 0x80 | ((c >> 6) & 63);
      bytes[n++] = 0x80 | (c & 63);
    } else {
      bytes[n++] = 0xe0 | (c >> 12);
      bytes[n++] = 0x80 | ((c >> 6) & 63);
      bytes[n++] = 0x80 | (c & 63);
    }
  }
  return bytes.subarray(0, n);
}

/** UTF-8 bytes as text; a byte that is no UTF-8 becomes U+FFFD, so that a message can still show the place. */
export function decodeUtf8(bytes: Uint8Array, from = 0, to = bytes.length): string {
  const parts: string[] = [];
  for (let i = from; i < to; ) {
    const b = bytes[i]!;
    const extra = b < 0x80 ? 0 : b >= 0xf0 && b < 0xf8 ? 3 : b >= 0xe0 ? 2 : b >= 0xc2 ? 1 : -1;
    let code = extra <= 0 ? b : b & (0x3f >> extra);
    let good = extra >= 0 && i + extra < to;
    for (let k = 1; good && k <= extra; k++) {
      const next = bytes[i + k]!;
      good = (next & 0xc0) === 0x80;
      code = (code << 6) | (next & 63);
    }
    parts.push(good && code <= 0x10ffff ? String.fromCodePoint(code) : '\uFFFD');
    i += good ? extra + 1 : 1;
  }
  return parts.join('');
}
