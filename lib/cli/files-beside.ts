import path from 'node:path';
import { type CampaignFiles, NO_FILES } from '../campaign/campaign-files.js';
import { CampaignError } from '../campaign/fault.js';
import { gatherCampaignFiles } from '../campaign/gather-files.js';
import { withFileSource } from './file-source.js';

/** What the files that a campaign names say. Names are meant from the folder of the campaign; from the working folder where it comes
 *  by standard input. */
export async function filesBeside(campaignName: string, text: string): Promise<CampaignFiles> {
  // most campaigns name none, and are then read once only
  if (!/"(grid|model|series)"/.test(text)) return NO_FILES;
  const folder = campaignName === '-' ? '.' : path.dirname(campaignName);
  const progress = progressLine();
  try {
    return await gatherCampaignFiles(
      text,
      async (name, use) => {
        try {
          return await withFileSource(path.resolve(folder, name), use);
        } catch (error) {
          // the campaign's own words for a file that is not there are better: they say what could stand in its place
          if (error instanceof CampaignError && error.faults[0]?.code === 'no-such-file') return null;
          throw error;
        }
      },
      progress.tell,
    );
  } finally {
    progress.end();
  }
}

/** On a terminal, how far a large file has been read; on a pipe nothing. */
function progressLine() {
  let shown = -1;
  return {
    tell: (file: string, share: number) => {
      const percent = Math.floor(100 * share);
      if (!process.stderr.isTTY || percent === shown) return;
      shown = percent;
      process.stderr.write(`\r${file}: ${percent} %`);
    },
    end: () => {
      if (shown >= 0) process.stderr.write('\r\u001b[K');
    },
  };
}
