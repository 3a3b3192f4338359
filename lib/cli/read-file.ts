import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { CampaignError, faultAt } from '../campaign/fault.js';

/** A campaign of ten thousand sites is a few megabytes; more than this is another kind of file. */
const MAX_BYTES = 64 * 2 ** 20;

const refuse = (code: string, found: string, expected: string): never => {
  throw new CampaignError([faultAt(code, '', found, expected)]);
};

/** Chunks in one piece, as long as they are no more than a campaign can be. */
class Gathered {
  private readonly chunks: Uint8Array[] = [];
  private total = 0;

  constructor(private readonly name: string) {}

  add(chunk: Uint8Array): void {
    this.total += chunk.length;
    if (this.total > MAX_BYTES)
      refuse('file-too-large', `more than ${MAX_BYTES / 2 ** 20} MiB in ${this.name}`, 'a campaign file');
    this.chunks.push(chunk);
  }

  bytes(): Uint8Array {
    const all = new Uint8Array(this.total);
    let at = 0;
    for (const chunk of this.chunks) {
      all.set(chunk, at);
      at += chunk.length;
    }
    return all;
  }
}

async function readStandardInput(): Promise<Uint8Array> {
  if (process.stdin.isTTY) process.stderr.write('Reading the campaign from standard input; Ctrl-D ends it.\n');
  const gathered = new Gathered('standard input');
  for await (const chunk of process.stdin) gathered.add(chunk as Uint8Array);
  return gathered.bytes();
}

function readDescriptor(descriptor: number, name: string): Uint8Array {
  const gathered = new Gathered(name);
  for (;;) {
    const chunk = new Uint8Array(2 ** 16);
    const read = readSync(descriptor, chunk);
    if (read === 0) return gathered.bytes();
    gathered.add(chunk.subarray(0, read));
  }
}

function decode(bytes: Uint8Array): string {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff))
    refuse('not-utf8', 'a file in UTF-16', 'the same text saved as UTF-8');
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes); // drops a byte order mark
  } catch {
    return refuse('not-utf8', 'bytes that are no UTF-8', 'the same text saved as UTF-8');
  }
}

/** Text of a file, `-` for standard input.
 * @throws {CampaignError} with what stands in the way: no such file, a folder, not readable, not UTF-8, too large */
export async function readFileText(name: string): Promise<string> {
  if (name === '-') return decode(await readStandardInput());
  let descriptor: number;
  try {
    descriptor = openSync(name, 'r');
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code === 'ENOENT' || code === 'ENOTDIR')
      return refuse('no-such-file', name, 'the name of a file that exists, or - for standard input');
    if (code === 'EACCES' || code === 'EPERM') return refuse('not-readable', name, 'a file that may be read');
    return refuse('not-readable', `${name} (${code ?? 'unknown reason'})`, 'a file that can be read');
  }
  try {
    if (fstatSync(descriptor).isDirectory()) refuse('not-a-file', `${name}, a folder`, 'a campaign file inside it');
    return decode(readDescriptor(descriptor, name));
  } finally {
    closeSync(descriptor);
  }
}
