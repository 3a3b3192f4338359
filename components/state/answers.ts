import { predictionOf } from '../../lib/answers/predict.js';
import type { Prediction } from '../../lib/answers/prediction.js';
import { type SolvedCampaign, solveCampaign } from '../../lib/answers/solve-campaign.js';
import type { Campaign } from '../../lib/campaign/campaign.js';

/** An answer that is worked out once per campaign, however many elements on the page ask for it. */
export function oncePerCampaign<Answer>(answer: (campaign: Campaign) => Answer): (campaign: Campaign) => Answer {
  const known = new WeakMap<Campaign, { readonly answer: Answer }>();
  return (campaign) => {
    let entry = known.get(campaign);
    if (!entry) {
      entry = { answer: answer(campaign) };
      known.set(campaign, entry);
    }
    return entry.answer;
  };
}

/** @throws {CampaignError} the campaign contradicts itself */
export const solvedOf: (campaign: Campaign) => SolvedCampaign = oncePerCampaign(solveCampaign);

/** @throws {CampaignError} the campaign contradicts itself */
export const predictionFor: (campaign: Campaign) => Prediction = oncePerCampaign((campaign) =>
  predictionOf(solvedOf(campaign)),
);
