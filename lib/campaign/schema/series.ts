import { readColumnWords } from '../../clocks/series/columns.js';
import { object, optional, required, scalar, shorthand, text } from './descriptor.js';

/** Measured data behind an offset: the name of a file, or an object where its columns have to be told. */
export const series = shorthand(
  object('series', 'Frequency data of a link, from which y and its statistical uncertainty follow.', {
    file: required(text(), 'File', 'Frequency data (CSV or columns parted by blanks), a file beside the campaign.'),
    columns: optional(
      text(undefined, (words) => {
        const read = readColumnWords(words);
        return 'words' in read ? null : read.faults[0]!.expected;
      }),
      'Columns',
      'One word per column: mjd iso stop y u valid ratio hz, - for one not to be read. Default: guessed where that is certain.',
    ),
    tau: optional(
      scalar('duration', { above: 0 }),
      'Sampling interval τ',
      'Time between samples, s; needed where the file has no dates.',
    ),
  }),
  'file',
);
