import { predict as predictCampaign } from '../../answers/predict.js';
import { predictionReport } from '../../report/prediction-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Command, UsageError } from '../command.js';

export const predict: Command = {
  name: 'predict',
  summary: 'the offset gravity makes on every link, its uncertainty, what limits it',
  synopsis: 'FILE [--link ID] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'From a campaign file: the potential of every site, combined by generalised least squares over all determinations with their correlations; then, for every link, the offset of its second clock (to) seen from its first (from) as a length equivalent, a potential difference and a frequency offset, each with its standard uncertainty, and the budget of that uncertainty.',
    'Measured offsets in the file are not used: this is what gravity alone makes.',
  ],
  options: {
    link: { value: 'ID', help: 'the whole budget of that link', repeatable: true },
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
    const prediction = withWarnings(refuseAt(() => predictCampaign(campaign)));
    return {
      kind: 'answer',
      status: 0,
      json: prediction,
      report: (detail) =>
        predictionReport(prediction, campaign, { title, provenance: call.provenance, full: detail === 'full', links }),
    };
  },
};
