import type { Campaign } from '../campaign/campaign.js';
import { CampaignError, type Warning } from '../campaign/fault.js';
import { withPlaces } from '../campaign/locate.js';
import { readCampaign } from '../campaign/read.js';
import type { Call } from './command.js';

export interface CallCampaign {
  readonly campaign: Campaign;
  /** of the reading alone */
  readonly warnings: readonly Warning[];
  /** An answer with the warnings of the reading before its own. */
  withWarnings<T extends { readonly warnings: readonly Warning[] }>(answer: T): T;
  /** what stands as heading where the campaign has no title */
  readonly title: string;
  /** Runs an answer; what it refuses gets the line and column of its path in the file. */
  refuseAt<T>(answer: () => T): T;
}

/** The campaign in the file of a call.
 * @throws {CampaignError} */
export function readCallCampaign({ file }: Call): CallCampaign {
  if (file === null) throw new TypeError('a command that reads a campaign takes a file');
  const { campaign, warnings } = readCampaign(file.text, { files: file.files });
  return {
    campaign,
    warnings,
    withWarnings: (answer) => ({ ...answer, warnings: distinct([...warnings, ...answer.warnings]) }),
    title: campaign.title ?? (file.name === '-' ? 'Campaign' : (file.name.split(/[/\\]/).pop() ?? file.name)),
    refuseAt(answer) {
      try {
        return answer();
      } catch (error) {
        throw error instanceof CampaignError ? new CampaignError(withPlaces(file.text, error.faults)) : error;
      }
    },
  };
}

const distinct = (warnings: readonly Warning[]): Warning[] => [
  ...new Map(
    warnings.map((warning) => [JSON.stringify([warning.code, warning.path, warning.message]), warning]),
  ).values(),
];
