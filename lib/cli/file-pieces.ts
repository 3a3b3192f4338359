import { constants } from 'node:fs';
import { type FileHandle, open } from 'node:fs/promises';
import { CampaignError, faultAt } from '../campaign/fault.js';

const PIECE = 1 << 18;

/** Hands a file to `take` piece by piece, `-` for standard input; nothing is gathered. The same buffer is used again and again.
 * @param take a piece, and the size of the whole file in bytes, null where it is not known beforehand
 * @throws {CampaignError} no such file, a folder, or not readable */
export async function readFileInPieces(
  name: string,
  take: (piece: Uint8Array, size: number | null) => void,
): Promise<void> {
  if (name === '-') {
    if (process.stdin.isTTY) process.stderr.write('Reading the data from standard input; Ctrl-D ends it.\n');
    for await (const chunk of process.stdin) take(chunk as Uint8Array, null);
    return;
  }
  const handle = await opened(name);
  try {
    const status = await handle.stat();
    if (status.isDirectory()) throw refusal('not-a-file', `${name}, a folder`, 'a file of frequency data inside it');
    const buffer = new Uint8Array(PIECE);
    for (;;) {
      const bytesRead = await readNext(handle, buffer);
      if (bytesRead === 0) return;
      take(buffer.subarray(0, bytesRead), status.isFile() ? status.size : null);
    }
  } finally {
    await handle.close();
  }
}

/** A pipe (`<(gunzip -c run.gz)`) opened without blocking may have nothing yet: its writer is asked again a little later. */
async function readNext(handle: FileHandle, buffer: Uint8Array): Promise<number> {
  for (;;) {
    try {
      return (await handle.read(buffer, 0, PIECE, null)).bytesRead;
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EAGAIN') throw error;
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
  }
}

const refusal = (code: string, found: string, expected: string): CampaignError =>
  new CampaignError([faultAt(code, '', found, expected)]);

async function opened(name: string): Promise<FileHandle> {
  try {
    // a pipe without a writer would hold the program up for ever
    return await open(name, constants.O_RDONLY | (constants.O_NONBLOCK ?? 0));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === 'ENOENT' || code === 'ENOTDIR') {
      throw refusal('no-such-file', name, 'the name of a file that exists, or - for standard input');
    }
    throw refusal('not-readable', `${name} (${code ?? 'unknown reason'})`, 'a file that can be read');
  }
}
