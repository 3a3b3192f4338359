import { constants } from 'node:fs';
import { type FileHandle, open } from 'node:fs/promises';
import { CampaignError, faultAt } from '../campaign/fault.js';
import type { ByteSource } from '../earth/file-bytes/byte-source.js';

/** Runs `use` with a file from which stretches are read; nothing is gathered whole.
 * @throws {CampaignError} no such file, a folder, or not readable */
export async function withFileSource<T>(name: string, use: (source: ByteSource) => Promise<T>): Promise<T> {
  let handle: FileHandle;
  try {
    // a pipe without a writer would hold the program up for ever
    handle = await open(name, constants.O_RDONLY | (constants.O_NONBLOCK ?? 0));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    const missing = code === 'ENOENT' || code === 'ENOTDIR';
    throw new CampaignError([
      missing
        ? faultAt('no-such-file', '', name, 'the name of a file that exists')
        : faultAt('not-readable', '', `${name} (${code ?? 'unknown reason'})`, 'a file that can be read'),
    ]);
  }
  try {
    const status = await handle.stat();
    if (!status.isFile())
      throw new CampaignError([
        faultAt(
          'not-a-file',
          '',
          `${name}, ${status.isDirectory() ? 'a folder' : 'no plain file'}`,
          'a plain file: stretches of it are read',
        ),
      ]);
    return await use({
      name: name.split(/[/\\]/).pop() ?? name,
      size: status.size,
      read: async (offset, length) => {
        const buffer = new Uint8Array(Math.max(0, Math.min(length, status.size - offset)));
        let filled = 0;
        while (filled < buffer.length) {
          const { bytesRead } = await handle.read(buffer, filled, buffer.length - filled, offset + filled);
          if (bytesRead === 0) break;
          filled += bytesRead;
        }
        return buffer.subarray(0, filled);
      },
    });
  } finally {
    await handle.close();
  }
}
