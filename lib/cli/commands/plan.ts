import { plan as planCampaign } from '../../answers/plan.js';
import { planReport } from '../../report/plan-report.js';
import { COMPARISON_TEST } from '../../uncertainty/detection.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { chosenLinks } from '../chosen-links.js';
import { type Command, UsageError } from '../command.js';
import { exactOption } from '../exact-option.js';

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
    size: { value: 'P', help: 'chance of a false alarm of the test; 0.05 if not given' },
    power: { value: 'P', help: 'chance that a discrepancy of the size given shows; 0.8 if not given' },
  },
  examples: ['plumbtick plan campaign.json', 'plumbtick plan campaign.json --link ab --power 0.95'],
  run(call) {
    const probability = (name: string) => exactOption('plan', call, name, { kind: 'fraction', above: 0, below: 1 });
    const test = {
      size: probability('size') ?? COMPARISON_TEST.size,
      power: probability('power') ?? COMPARISON_TEST.power,
    };
    if (test.power <= test.size)
      throw new UsageError(`plan: --power ${test.power} has to be more than --size ${test.size}`);
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
