/** A TIFF file from tags, each `[tag, type, values]`; types 2 text, 3 short, 4 long, 12 double. Block data are put first, and their
 *  offsets and sizes into tags 273/279 or 324/325. */
export type Tag = readonly [tag: number, type: 2 | 3 | 4 | 12, values: readonly number[] | string];

const SIZES: Readonly<Record<number, number>> = { 2: 1, 3: 2, 4: 4, 12: 8 };

export function tiff(
  tags: readonly Tag[],
  blocks: readonly Uint8Array[],
  options: { little?: boolean; tiled?: boolean } = {},
): Uint8Array {
  const { little = true, tiled = false } = options;
  const offsets: number[] = [];
  let at = 8;
  for (const b of blocks) {
    offsets.push(at);
    at += b.length;
  }
  const directory = at + (at % 2);
  const all: Tag[] = [
    ...tags,
    [tiled ? 324 : 273, 4, offsets] as Tag,
    [tiled ? 325 : 279, 4, blocks.map((b) => b.length)] as Tag,
  ].sort((a, b) => a[0] - b[0]);
  const sizeOf = ([, type, values]: Tag) =>
    SIZES[type]! * (typeof values === 'string' ? values.length + 1 : values.length);
  const outside = all.reduce((s, t) => s + (sizeOf(t) > 4 ? sizeOf(t) : 0), 0);
  const bytes = new Uint8Array(directory + 2 + 12 * all.length + 4 + outside);
  const view = new DataView(bytes.buffer);
  bytes.set(little ? [0x49, 0x49] : [0x4d, 0x4d]);
  view.setUint16(2, 42, little);
  view.setUint32(4, directory, little);
  for (const [i, b] of blocks.entries()) bytes.set(b, offsets[i]!);
  view.setUint16(directory, all.length, little);
  let value = directory + 2 + 12 * all.length + 4;
  for (const [i, tag] of all.entries()) {
    const [id, type, values] = tag;
    const entry = directory + 2 + 12 * i;
    view.setUint16(entry, id, little);
    view.setUint16(entry + 2, type, little);
    view.setUint32(entry + 4, typeof values === 'string' ? values.length + 1 : values.length, little);
    let to = entry + 8;
    if (sizeOf(tag) > 4) {
      view.setUint32(entry + 8, value, little);
      to = value;
      value += sizeOf(tag);
    }
    const numbers = typeof values === 'string' ? [...values].map((c) => c.charCodeAt(0)).concat(0) : values;
    for (const [k, x] of numbers.entries()) {
      if (type === 2) view.setUint8(to + k, x);
      else if (type === 3) view.setUint16(to + 2 * k, x, little);
      else if (type === 4) view.setUint32(to + 4 * k, x, little);
      else view.setFloat64(to + 8 * k, x, little);
    }
  }
  return bytes;
}

/** Tags of a float grid of 3 × 4 nodes at 50 … 51° N by 0.5°, 10 … 11.5° E, pixel is point; `changes` replace or (null) remove. */
export function gridTags(changes: Readonly<Record<number, Tag | null>> = {}): Tag[] {
  const tags: Tag[] = [
    [256, 3, [4]],
    [257, 3, [3]],
    [258, 3, [32]],
    [259, 3, [1]],
    [277, 3, [1]],
    [278, 3, [3]],
    [339, 3, [3]],
    [33550, 12, [0.5, 0.5, 0]],
    [33922, 12, [0, 0, 0, 10, 51, 0]],
    [34735, 3, [1, 1, 0, 2, 1024, 0, 1, 2, 1025, 0, 1, 2]],
  ];
  const kept = tags.filter(([id]) => !(id in changes));
  return [...kept, ...Object.values(changes).filter((t) => t !== null)];
}

/** Floats, row by row from the north. */
export function floats(values: readonly number[], little = true): Uint8Array {
  const view = new DataView(new ArrayBuffer(4 * values.length));
  for (const [i, v] of values.entries()) view.setFloat32(4 * i, v, little);
  return new Uint8Array(view.buffer);
}

/** The LZW encoder of TIFF 6.0, section 13, written from its pseudo-code. */
export function packLzw(data: Uint8Array): Uint8Array {
  const out: number[] = [];
  let held = 0;
  let bits = 0;
  let width = 9;
  const write = (code: number) => {
    held = held * 2 ** width + code;
    bits += width;
    while (bits >= 8) {
      const byte = Math.floor(held / 2 ** (bits - 8));
      out.push(byte);
      held -= byte * 2 ** (bits - 8);
      bits -= 8;
    }
  };
  let table = new Map<string, number>();
  const clear = () => {
    write(256);
    table = new Map(Array.from({ length: 256 }, (_, i) => [String.fromCharCode(i), i]));
    width = 9;
  };
  clear();
  let next = 258;
  let string = '';
  for (const byte of data) {
    const longer = string + String.fromCharCode(byte);
    if (table.has(longer)) {
      string = longer;
      continue;
    }
    write(table.get(string)!);
    table.set(longer, next++);
    if (next === 512 || next === 1024 || next === 2048) width++;
    else if (next === 4095) {
      write(table.get(String.fromCharCode(byte))!);
      clear();
      next = 258;
      string = '';
      continue;
    }
    string = String.fromCharCode(byte);
  }
  if (string !== '') {
    write(table.get(string)!);
    next++;
    if (next === 512 || next === 1024 || next === 2048) width++;
  }
  write(257);
  if (bits > 0) out.push(held * 2 ** (8 - bits));
  return Uint8Array.from(out);
}
