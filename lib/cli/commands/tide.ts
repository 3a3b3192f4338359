import { TIDE_STEP_S, tide as tideAnswer } from '../../answers/tide.js';
import { readExact } from '../../quantity/index.js';
import { tideReport } from '../../report/tide-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Command, UsageError } from '../command.js';

export const tide: Command = {
  name: 'tide',
  summary: 'what the Earth tide adds to every link through the window, and what averaging leaves of it',
  synopsis: 'FILE [--step 10min] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'For every link a series of what to add to y to get what the clocks feel at each instant by the tides of Sun and Moon, with minimum, maximum, mean and rms; what is left of it after averaging over the window, or over the stretches in which both clocks and the link are stated to run; and whether that matters for the target. Clocks that run by day only keep a part of the solar tides however long they run.',
    'Sites may carry "oceanLoading" (amplitudes and phases by constituent) and the campaign "pole" (pole coordinates): they are added where stated. The model is good to about 1e-18; "omitted" bounds what it leaves out.',
  ],
  options: {
    step: { value: 'DURATION', help: 'time between samples, 10min if not given; both ends of the window are sampled' },
  },
  examples: ['plumbtick tide campaign.json', 'plumbtick tide campaign.json --step 1h --csv --table series'],
  run(call) {
    const stepS = stepOf(call.option('step'));
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const answer = withWarnings(refuseAt(() => tideAnswer(campaign, stepS)));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: (detail) => tideReport(answer, { title, provenance: call.provenance, full: detail === 'full' }),
    };
  },
};

function stepOf(text: string | null): number {
  if (text === null) return TIDE_STEP_S;
  const read = readExact(text, 'duration');
  if (!read.ok) throw new UsageError(`tide: --step ${text}: expected ${read.problems[0]?.expected ?? 'a duration'}`);
  if (!(read.value > 0)) throw new UsageError(`tide: --step ${text}: expected more than 0, such as 10min`);
  return read.value;
}
