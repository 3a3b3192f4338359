import { writeFileSync } from 'node:fs';
import { UsageError } from './command.js';

/** Writes a text to a file that must not be there yet, unless it may be replaced.
 * @returns whether a file of that name was there before
 * @throws {UsageError} it exists, or can't be written */
export function writeNewFile(command: string, name: string, text: string, overwrite: boolean): boolean {
  try {
    writeFileSync(name, text, { flag: 'wx' });
    return false;
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code !== 'EEXIST') throw cannotWrite(command, name, code);
    if (!overwrite) throw new UsageError(`${command}: ${name} exists and was left alone. Another name, or --overwrite`);
  }
  try {
    writeFileSync(name, text);
    return true;
  } catch (error) {
    throw cannotWrite(command, name, (error as NodeJS.ErrnoException).code);
  }
}

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such folder',
  ENOTDIR: 'there is no such folder',
  EACCES: 'it may not be written',
  EPERM: 'it may not be written',
  EROFS: 'it may not be written',
  EISDIR: 'it is a folder',
  ENOSPC: 'the disk is full',
};

const cannotWrite = (command: string, name: string, code = 'unknown reason'): UsageError =>
  new UsageError(`${command}: ${name} can't be written: ${reasons[code] ?? code}`);
