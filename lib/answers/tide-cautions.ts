import type { Campaign } from '../campaign/campaign.js';
import { CampaignError, type Warning } from '../campaign/fault.js';
import { tide } from './tide.js';

/** A word on the tide for answers that leave it out: the links on which averaging over the window, or over the stated
 *  availability, leaves more than a third of the target. None without a window or a target, nor where `tide` itself refuses. */
export function tideCautions(campaign: Campaign): Warning[] {
  const { window, targetM } = campaign;
  if (window === null || targetM === null || campaign.links.length === 0) return [];
  try {
    // the two ends alone: what is left comes from an integral of its own
    const { links } = tide(campaign, (window.endMs - window.startMs) / 1000);
    return links.flatMap(({ id, left, target, needsCorrecting }) =>
      needsCorrecting && left && target !== null
        ? [
            {
              code: 'tide-needs-correcting',
              path: `links.${id}`,
              message: `the Earth tide leaves ${(left.mean * 1e18).toFixed(2)}e-18 in y averaged over the ${left.over === 'window' ? 'window' : 'stated availability'}, more than a third of the target ${(target * 1e18).toPrecision(2)}e-18; y here is without it. \`plumbtick tide\` gives what to take off.`,
            },
          ]
        : [],
    );
  } catch (error) {
    if (error instanceof CampaignError) return [];
    throw error;
  }
}
