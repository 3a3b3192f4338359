import { closest } from '../quantity/index.js';
import { quoted } from './json-text.js';
import type { JsonNode } from './json-tree.js';
import type { Context } from './read/context.js';
import { CAMPAIGN_FORMAT } from './schema/campaign-schema.js';

/** The version of the format that this program reads and writes. When the format moves on, the step from each old version to
 *  the next (a function from tree to tree) belongs in this file, and readCampaign takes a file through them in turn. */
export const CAMPAIGN_VERSION = 1;

/** Refuses a file that is no campaign of this version, where anything else said about it would mislead: a newer version,
 *  or another document of this program. Any other wrong or missing format is an ordinary fault, found with the rest.
 * @returns whether the file may be read on */
export function formatIsReadable(root: JsonNode, context: Context): boolean {
  const format = root.type === 'object' ? root.members.get('format')?.value : undefined;
  if (format?.type !== 'string') return true;
  const at = context.member('format');
  const version = /^plumbtick-campaign\/(\d{1,9})$/.exec(format.value)?.[1];
  if (version !== undefined && Number(version) > CAMPAIGN_VERSION) {
    at.refuse(format, 'newer-format', `${quoted(CAMPAIGN_FORMAT)}: the file needs a newer version of Plumbtick`);
    return false;
  }
  const other = /^plumbtick-([a-z]+)\/\d+$/.exec(format.value)?.[1];
  if (other !== undefined && closest(other, ['campaign']) === null) {
    at.refuse(format, 'wrong-format', `${quoted(CAMPAIGN_FORMAT)}: this is a ${other}, not a campaign`);
    return false;
  }
  return true;
}
