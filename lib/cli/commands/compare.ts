import { compare as compareCampaigns } from '../../answers/compare.js';
import type { Campaign } from '../../campaign/campaign.js';
import { CampaignError } from '../../campaign/fault.js';
import { readCampaign } from '../../campaign/read.js';
import { comparisonReport } from '../../report/comparison-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import type { Command } from '../command.js';

export const compare: Command = {
  name: 'compare',
  summary: 'what moved y between two states of a campaign, input by input',
  synopsis: 'OLD NEW [--json | --csv | --markdown]',
  takesFile: true,
  secondFile: 'NEW',
  description: [
    'Two campaign files, the state before and the state now. Links are matched by id, inputs by path; for each link every input that changed, and by how much it moved y: a new geoid model, a re-levelled tie.',
  ],
  options: {},
  examples: ['plumbtick compare campaign-2026.json campaign-2027.json'],
  run(call) {
    const { campaign: before, refuseAt } = readCallCampaign(call);
    const { name, text } = call.second!;
    const after = readSecond(name, text);
    const comparison = refuseAt(() => compareCampaigns(before, after));
    return {
      kind: 'answer',
      status: 0,
      json: comparison,
      report: () =>
        comparisonReport(comparison, { title: `${call.file?.name} → ${name}`, provenance: call.provenance }),
    };
  },
};

/** Faults of the second file name it, since the first is what the call is known by. */
function readSecond(name: string, text: string): Campaign {
  try {
    return readCampaign(text).campaign;
  } catch (e) {
    if (e instanceof CampaignError)
      throw new CampaignError(e.faults.map((f) => ({ ...f, path: `${name}: ${f.path || 'file'}` })));
    throw e;
  }
}
