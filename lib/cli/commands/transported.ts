import { transportedClocks } from '../../answers/transported-clock.js';
import { transportedReport } from '../../report/transported-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';

export const transported: Command = {
  name: 'transported',
  summary: 'a clock that travels: side by side before and after, and what cancels',
  synopsis: 'FILE [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'For every link with "transported": the two clocks compared in one place before and after, with gravity taken off; the difference before − after over its u, before anything is averaged; and the potential difference ΔW = c²·(R_remote/R_local − 1) + ΔW_local of every measurement of the link beside its prediction. Without a measurement the uncertainty over the window is planned.',
    'Systematics of the travelling clock cancel piece by piece where both places name the same source; a piece without a source, and the reproducibility, are new each time the clock is set up. The clock that stays and the frequency ratio cancel whole.',
  ],
  options: {},
  examples: ['plumbtick transported campaign.json', 'plumbtick transported campaign.json --csv --table components'],
  run(call) {
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const answer = withWarnings(refuseAt(() => transportedClocks(campaign)));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: () => transportedReport(answer, campaign, { title, provenance: call.provenance }),
    };
  },
};
