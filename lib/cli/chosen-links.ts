import type { Campaign } from '../campaign/campaign.js';
import { type Call, UsageError } from './command.js';

/** Ids given with --link.
 * @throws {UsageError} one is not in the file */
export function chosenLinks(command: string, call: Call, { links }: Campaign): readonly string[] {
  const ids = call.values('link');
  for (const id of ids)
    if (!links.some((link) => link.id === id))
      throw new UsageError(
        `${command}: there is no link ${JSON.stringify(id)} in the file. Links: ${links.map((link) => link.id).join(', ') || 'none'}`,
      );
  return ids;
}
