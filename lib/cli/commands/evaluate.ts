import { evaluate as evaluateCampaign } from '../../answers/evaluate.js';
import { evaluationReport } from '../../report/evaluation-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';

export const evaluate: Command = {
  name: 'evaluate',
  summary: 'does the measured offset agree with the predicted one, and what height does it say',
  synopsis: 'FILE [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'Every measurement of the file beside its prediction, in mean tide: difference, verdict (agree, differ, inconclusive), and the potential and height differences that the clocks alone imply.',
    'Where they differ, the single mistakes that would explain size and sign are listed: each is taken out of this campaign and the model run again.',
  ],
  options: {},
  examples: ['plumbtick evaluate campaign.json', 'plumbtick evaluate campaign.json --csv --table suspects'],
  run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const evaluation = withWarnings(refuseAt(() => evaluateCampaign(campaign)));
    return {
      kind: 'answer',
      status: 0,
      json: evaluation,
      report: () => evaluationReport(evaluation, campaign, { title, provenance: call.provenance }),
    };
  },
};
