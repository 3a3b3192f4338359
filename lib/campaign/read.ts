import type { Campaign } from './campaign.js';
import { type CampaignFiles, NO_FILES } from './campaign-files.js';
import { CampaignError, type Warning } from './fault.js';
import { parseJsonText } from './json-text.js';
import { type JsonNode, JsonTextError, jsonTreeOf } from './json-tree.js';
import { withPlaces } from './locate.js';
import { assumptions } from './read/assumptions.js';
import { checkCampaign } from './read/checks.js';
import { doubts } from './read/doubts.js';
import { rootContext } from './read/node.js';
import { Reading, TooManyFaults } from './read/reading.js';
import { campaignSchema } from './schema/campaign-schema.js';
import { toCampaign } from './to-campaign.js';
import { formatIsReadable } from './versions.js';
import { withFiles } from './with-files.js';

export interface ReadOptions {
  /** files that the campaign names, read beforehand: `gatherCampaignFiles` */
  readonly files?: CampaignFiles;
}

export interface ReadCampaign {
  readonly campaign: Campaign;
  readonly warnings: readonly Warning[];
}

/** Reads and validates a campaign file.
 * @param text JSON; a byte order mark at its beginning is passed over
 * @throws {CampaignError} with every fault, in the order of the file, each with line and column */
export const readCampaign = (text: string, options: ReadOptions = {}): ReadCampaign =>
  read(text, () => parseJsonText(text), options);

/** Reads and validates a campaign that is already in memory, as JSON.parse would have given it.
 * @throws {CampaignError} with every fault; line and column are null */
export const readCampaignValue = (value: unknown, options: ReadOptions = {}): ReadCampaign =>
  read(null, () => jsonTreeOf(value), options);

/** Reads and validates a campaign whose parts stand in a text of another kind, such as a table.
 * @param tree nodes that know where in the text they stood; −1 where nowhere
 * @throws {CampaignError} with every fault; line and column where the text holds the value */
export const readCampaignTree = (text: string, tree: JsonNode): ReadCampaign => read(text, () => tree, {}, false);

function read(
  text: string | null,
  tree: () => JsonNode,
  { files = NO_FILES }: ReadOptions,
  isJson = true,
): ReadCampaign {
  const reading = new Reading(text);
  try {
    const file = readTree(tree(), reading);
    if (file !== undefined && !reading.hasFaults) {
      const { campaign, warnings } = withFiles(toCampaign(file), files, (site, n) =>
        datumIsStated(file.sites[site]?.determinations?.[n]),
      );
      return { campaign, warnings: [...doubts(file, reading.uses), ...assumptions(campaign), ...warnings] };
    }
  } catch (error) {
    if (error instanceof JsonTextError) {
      const { code, start, found, expected } = error.fault;
      reading.add(code, '', { type: 'null', start }, found, expected);
    } else if (error instanceof CampaignError && text !== null && isJson)
      throw new CampaignError(withPlaces(text, error.faults));
    else if (!(error instanceof TooManyFaults)) throw error;
  }
  throw new CampaignError(reading.faults());
}

const datumIsStated = (determination: object | undefined): boolean =>
  determination !== undefined && 'datum' in determination && determination.datum !== undefined;

function readTree(root: JsonNode, reading: Reading) {
  const context = rootContext(reading);
  if (!formatIsReadable(root, context)) return undefined;
  const file = context.read(campaignSchema, root, context);
  if (file !== undefined) checkCampaign(file, reading);
  return file;
}
