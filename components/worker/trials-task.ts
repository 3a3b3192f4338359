import { linkMonteCarloSteps, type MonteCarloRequest } from '../../lib/answers/monte-carlo.js';
import { solveCampaign } from '../../lib/answers/solve-campaign.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { MonteCarloProgress, MonteCarloResult } from '../../lib/uncertainty/monte-carlo/index.js';

/** Trials of one link, as they are handed to a worker: plain data. */
export interface TrialsTask extends MonteCarloRequest {
  readonly campaign: Campaign;
  /** index into campaign.links */
  readonly link: number;
}

/** What a worker says back. */
export type TrialsMessage =
  | { readonly kind: 'progress'; readonly progress: MonteCarloProgress }
  | { readonly kind: 'result'; readonly result: MonteCarloResult }
  | { readonly kind: 'failed'; readonly message: string };

/** The same steps for a worker and for the page itself. */
export const trialsSteps = ({
  campaign,
  link,
  trials,
  seed,
}: TrialsTask): Generator<MonteCarloProgress, MonteCarloResult, void> =>
  linkMonteCarloSteps(solveCampaign(campaign), { trials, seed }, [link]);
