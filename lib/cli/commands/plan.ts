import { plan as planCampaign } from '../../answers/plan.js';
import { planReport } from '../../report/plan-report.js';
import { COMPARISON_TEST } from '../../uncertainty/detection.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { chosenLinks } from '../chosen-links.js';
import type { Command } from '../command.js';
import { detectionOptions, detectionTestOf } from '../detection-test.js';

export const plan: Command = {
  name: 'plan',
  summary: 'how many days, what limits, what could be seen',
  synopsis: 'FILE [--link ID] [--size P] [--power P] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'For every link: the uncertainty of the comparison against time, the day the target is met, the floor that no averaging passes, what limits, and the smallest discrepancy against the prediction that the window would show.',
    'Uptimes of clocks and link multiply; measured intervals ("available") are intersected. A clock with a "flywheel" is planned a second time with its gaps bridged. No published figure is put in by itself: plumbtick starting-values lists them.',
  ],
  options: {
    link: { value: 'ID', help: 'the curve of that link', repeatable: true },
    ...detectionOptions(COMPARISON_TEST),
  },
  examples: ['plumbtick plan campaign.json', 'plumbtick plan campaign.json --link ab --power 0.95'],
  run(call) {
    const test = detectionTestOf('plan', call, COMPARISON_TEST);
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const links = chosenLinks('plan', call, campaign);
    const answer = withWarnings(refuseAt(() => planCampaign(campaign, test)));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: (detail) =>
        planReport(answer, campaign, { title, provenance: call.provenance, full: detail === 'full', links }),
    };
  },
};
