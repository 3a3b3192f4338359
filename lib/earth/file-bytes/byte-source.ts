/** A file of known size from which stretches are read: one in memory, on disk or behind a page's file handle. */
export interface ByteSource {
  /** name for messages */
  readonly name: string;
  /** bytes */
  readonly size: number;
  /** The stretch from `offset`, shorter only where the file ends. */
  read(offset: number, length: number): Promise<Uint8Array>;
}

/** A file that is in memory. */
export const bytesSource = (name: string, bytes: Uint8Array): ByteSource => ({
  name,
  size: bytes.length,
  read: (offset, length) => Promise.resolve(bytes.subarray(offset, offset + length)),
});

/** The whole file in pieces of a megabyte, in order. */
export async function* piecesOf(source: ByteSource, pieceBytes = 2 ** 20): AsyncGenerator<Uint8Array> {
  for (let at = 0; at < source.size; at += pieceBytes)
    yield await source.read(at, Math.min(pieceBytes, source.size - at));
}

/** A view for numbers of more than one byte. */
export const viewOf = (bytes: Uint8Array): DataView => new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
