import type { Campaign } from '../campaign/campaign.js';
import { recommendedFrequency } from './recommended-frequencies.js';

/** Recommended frequency of a transition, Hz, as a double: the CIPM's, or the campaign's own where the CIPM has none. */
export function frequencyOfTransitionHz(campaign: Campaign, transition: string): number {
  const { frequencyHz } = transitionFrequency(campaign, transition);
  return frequencyHz;
}

/** Frequency and the relative standard uncertainty that stands for its ratio to others when no measured ratio does. */
export function transitionFrequency(
  campaign: Campaign,
  transition: string,
): { readonly frequencyHz: number; readonly relativeStandardUncertainty: number } {
  const recommended = recommendedFrequency(transition);
  if (recommended) return recommended;
  const own = campaign.transitions.find((t) => t.id === transition)?.frequency;
  if (!own) throw new Error(`internal: transition ${transition} has no frequency`);
  return { frequencyHz: own.value, relativeStandardUncertainty: own.u / own.value };
}
