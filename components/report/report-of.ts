import { evaluationOf } from '../../lib/answers/evaluate.js';
import { planOf } from '../../lib/answers/plan.js';
import { tide } from '../../lib/answers/tide.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { CampaignError } from '../../lib/campaign/fault.js';
import { type CampaignReport, campaignReport } from '../../lib/report/campaign-report.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';

/** Samples of the tide for its statistics: one an hour. */
const TIDE_STEP_S = 3600;

export const answersFor = oncePerCampaign((campaign: Campaign) => {
  const solved = solvedOf(campaign);
  const measured = campaign.measurements.some(({ check }) => !check);
  return {
    evaluation: measured ? evaluationOf(solved) : null,
    plan: planOf(solved),
    tide: campaign.window ? tideOf(campaign) : null,
  };
});

/** A window that the tide cannot be computed for is said by the tide's own element; the report stands without it. */
function tideOf(campaign: Campaign) {
  try {
    return tide(campaign, TIDE_STEP_S);
  } catch (error) {
    if (error instanceof CampaignError) return null;
    throw error;
  }
}

/** The whole campaign as a report. @param provenance version and date */
export const reportOf = ({ campaign, prediction }: AnsweredCampaign, provenance: string): CampaignReport =>
  campaignReport(
    { solved: solvedOf(campaign), prediction, ...answersFor(campaign) },
    { title: 'Campaign', provenance },
  );
