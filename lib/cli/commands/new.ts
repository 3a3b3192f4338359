import { writeFileSync } from 'node:fs';
import { type Command, UsageError } from '../command.js';
import { starterCampaign } from '../starter-campaign.js';

export const newCampaign: Command = {
  name: 'new',
  summary: 'a commented campaign file to begin with',
  synopsis: '[--out FILE [--overwrite]]',
  takesFile: false,
  description: [
    'Writes a small campaign of two invented places, with a note on every part that explains it. It can be predicted as it stands: change one number after another into your own.',
    'Without --out the file goes to standard output. A file that exists is left alone unless --overwrite is given.',
  ],
  options: {
    out: { value: 'FILE', help: 'where to write it' },
    overwrite: { help: 'replace the file if it exists' },
  },
  examples: ['plumbtick new --out first.json', 'plumbtick new | plumbtick predict -'],
  run(call) {
    const name = call.option('out');
    if (name === null) {
      if (call.has('overwrite')) throw new UsageError('new: --overwrite goes with --out FILE');
      return { kind: 'plain', text: starterCampaign };
    }
    const replaced = write(name, call.has('overwrite'));
    const words = `${replaced ? 'Replaced' : 'Wrote'} ${name}. Next: plumbtick predict ${/\s/.test(name) ? JSON.stringify(name) : name}\n`;
    return { kind: 'plain', text: words };
  },
};

/** @returns whether a file of that name was there before */
function write(name: string, overwrite: boolean): boolean {
  try {
    writeFileSync(name, starterCampaign, { flag: 'wx' });
    return false;
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code !== 'EEXIST') throw cannotWrite(name, code);
    if (!overwrite) throw new UsageError(`new: ${name} exists and was left alone. Another name, or --overwrite`);
  }
  try {
    writeFileSync(name, starterCampaign);
    return true;
  } catch (error) {
    throw cannotWrite(name, (error as NodeJS.ErrnoException).code);
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

const cannotWrite = (name: string, code = 'unknown reason'): UsageError =>
  new UsageError(`new: ${name} can't be written: ${reasons[code] ?? code}`);
