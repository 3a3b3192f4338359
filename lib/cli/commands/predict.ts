import { predictMonteCarlo } from '../../answers/monte-carlo.js';
import { predict as predictCampaign } from '../../answers/predict.js';
import { tideCautions } from '../../answers/tide-cautions.js';
import type { Campaign } from '../../campaign/campaign.js';
import type { Warning } from '../../campaign/fault.js';
import { withMonteCarloTable } from '../../report/monte-carlo-table.js';
import { predictionReport } from '../../report/prediction-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Call, type Command, UsageError } from '../command.js';

export const predict: Command = {
  name: 'predict',
  summary: 'the offset gravity makes on every link, its uncertainty, what limits it',
  synopsis: 'FILE [--link ID] [--monte-carlo N|auto [--seed S]] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'From a campaign file: the potential of every site, combined by generalised least squares over all determinations with their correlations; then, for every link, the offset of its second clock (to) seen from its first (from) as a length equivalent, a potential difference and a frequency offset, each with its standard uncertainty, and the budget of that uncertainty.',
    'With --monte-carlo every offset is also computed by trials (JCGM 101): inputs drawn from their distributions with their correlations, each determination evaluated as it is; whether the linear result agrees stands beside it.',
    'Measured offsets in the file are not used: this is what gravity alone makes.',
  ],
  options: {
    link: { value: 'ID', help: 'the whole budget of that link', repeatable: true },
    'monte-carlo': {
      value: 'N|auto',
      help: 'so many trials (1000000 takes about a second), or until results are stable',
    },
    seed: { value: 'S', help: 'whole number that fixes the trials; 1 if not given' },
  },
  examples: ['plumbtick predict campaign.json', 'plumbtick predict campaign.json --csv --table links'],
  run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const links = call.values('link');
    for (const id of links)
      if (!campaign.links.some((link) => link.id === id))
        throw new UsageError(
          `predict: there is no link ${JSON.stringify(id)} in the file. Links: ${campaign.links.map((link) => link.id).join(', ') || 'none'}`,
        );
    const request = monteCarloRequest(call);
    const reportOptions = { title, provenance: call.provenance, links };
    if (request !== null) {
      const prediction = withWarnings(refuseAt(() => withTide(campaign, predictMonteCarlo(campaign, request))));
      return {
        kind: 'answer',
        status: 0,
        json: prediction,
        report: (detail) =>
          withMonteCarloTable(
            predictionReport(prediction, campaign, { ...reportOptions, full: detail === 'full' }),
            prediction,
          ),
      };
    }
    const prediction = withWarnings(refuseAt(() => withTide(campaign, predictCampaign(campaign))));
    return {
      kind: 'answer',
      status: 0,
      json: prediction,
      report: (detail) => predictionReport(prediction, campaign, { ...reportOptions, full: detail === 'full' }),
    };
  },
};

/** More would take minutes. */
const MOST_TRIALS = 100_000_000;

/** @throws {UsageError} a number of trials or a seed that can't be used */
function monteCarloRequest(call: Call): { trials: number | 'auto'; seed: number } | null {
  const trials = call.option('monte-carlo');
  const seed = call.option('seed');
  if (trials === null) {
    if (seed !== null) throw new UsageError('predict: --seed goes with --monte-carlo');
    return null;
  }
  const count = trials === 'auto' ? trials : wholeNumber(trials);
  if (count === null || (count !== 'auto' && (count < 100 || count > MOST_TRIALS)))
    throw new UsageError(
      `predict: --monte-carlo ${JSON.stringify(trials)}: expected a whole number from 100 to ${MOST_TRIALS}, or auto`,
    );
  const start = seed === null ? 1 : wholeNumber(seed);
  if (start === null)
    throw new UsageError(
      `predict: --seed ${JSON.stringify(seed)}: expected a whole number from 0 to ${Number.MAX_SAFE_INTEGER}`,
    );
  return { trials: count, seed: start };
}

/** 1000000, 1e6 or 1_000_000; null for anything else. */
function wholeNumber(text: string): number | null {
  if (!/^\d[\d_]*(e\d+)?$/i.test(text)) return null;
  const value = Number(text.replaceAll('_', ''));
  return Number.isSafeInteger(value) ? value : null;
}

/** y is that of the mean tide; where the Earth tide of the window matters beside it, a caution says so. */
const withTide = <T extends { readonly warnings: readonly Warning[] }>(campaign: Campaign, answer: T): T => ({
  ...answer,
  warnings: [...answer.warnings, ...tideCautions(campaign)],
});
