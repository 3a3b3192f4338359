import { type Command, UsageError } from '../command.js';
import { starterCampaign } from '../starter-campaign.js';
import { writeNewFile } from '../write-new-file.js';

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
    const replaced = writeNewFile('new', name, starterCampaign, call.has('overwrite'));
    const words = `${replaced ? 'Replaced' : 'Wrote'} ${name}. Next: plumbtick predict ${/\s/.test(name) ? JSON.stringify(name) : name}\n`;
    return { kind: 'plain', text: words };
  },
};
