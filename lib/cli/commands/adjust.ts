import { adjust as adjustMeasured, adjustPlanned } from '../../answers/adjust.js';
import { adjustmentReport } from '../../report/adjustment-report.js';
import { NETWORK_TEST } from '../../uncertainty/detection.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';
import { detectionOptions, detectionTestOf } from '../detection-test.js';

export const adjust: Command = {
  name: 'adjust',
  summary: 'potentials of all sites from every determination and every measurement',
  synopsis: 'FILE [--planned] [--size P] [--power P] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'Generalised least squares over all determinations and all measured links with their full covariance: adjusted potentials, offsets and tilts of datums that ask for them, and for each observation its residual, how well the others control it, and the smallest mistake in it that would show. Loops of links are closed. Nothing is left out, whatever its residual.',
    'With --planned, links without a measurement join as if they ran through the window: uncertainties only.',
    'The JSON holds the full covariance of the unknowns.',
  ],
  options: {
    ...detectionOptions(NETWORK_TEST),
    planned: { help: 'links without a measurement join as if run through the window; uncertainties only' },
  },
  examples: ['plumbtick adjust campaign.json', 'plumbtick adjust campaign.json --planned --json'],
  run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const planned = call.has('planned');
    const test = detectionTestOf('adjust', call, NETWORK_TEST);
    const adjustment = withWarnings(refuseAt(() => (planned ? adjustPlanned : adjustMeasured)(campaign, test)));
    return {
      kind: 'answer',
      status: 0,
      json: adjustment,
      report: () => adjustmentReport(adjustment, campaign, { title, provenance: call.provenance, planned }),
    };
  },
};
