import { type DesignAim, type DesignOptions, design as designNetwork } from '../../answers/design.js';
import { designReport } from '../../report/design-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Call, type Command, UsageError } from '../command.js';

export const design: Command = {
  name: 'design',
  summary: 'what each candidate clock, link or determination would bring, or which is idle',
  synopsis: 'FILE --aim AIM [--add N | --remove N] [--json | --csv | --markdown]',
  takesFile: true,
  description: [
    'Ranks everything marked "candidate": true by what it would bring to an aim, alone and one after the other; with up to 12 candidates the best set of N is found by trying all. With --remove the same question is asked of what is there: which observation is idle.',
    'AIM is worst-site, mean, offset:DATUM or tilt:DATUM.',
  ],
  options: {
    aim: { value: 'AIM', help: 'worst-site, mean, offset:DATUM or tilt:DATUM' },
    add: { value: 'N', help: 'how many candidates to add one after the other; default all' },
    remove: { value: 'N', help: 'how many observations to take away one after the other' },
  },
  examples: [
    'plumbtick design campaign.json --aim worst-site --add 2',
    'plumbtick design campaign.json --aim mean --remove 1',
  ],
  run(call) {
    const aimText = call.option('aim');
    if (aimText === null)
      throw new UsageError('design: --aim is missing: worst-site, mean, offset:DATUM or tilt:DATUM');
    const aim = aimOf(aimText);
    const options = optionsOf(call);
    const { campaign, title, refuseAt } = readCallCampaign(call);
    const answer = refuseAt(() => designNetwork(campaign, aim, options));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: () =>
        designReport(answer, campaign, {
          title,
          provenance: call.provenance,
          aim: aimText,
          removal: options.remove !== undefined,
        }),
    };
  },
};

function aimOf(text: string): DesignAim {
  if (text === 'worst-site' || text === 'mean') return { kind: text };
  const [kind, ...rest] = text.split(':');
  const datum = rest.join(':');
  if ((kind === 'offset' || kind === 'tilt') && datum !== '') return { kind, datum };
  throw new UsageError(`design: --aim ${text} is none of worst-site, mean, offset:DATUM, tilt:DATUM`);
}

function optionsOf(call: Call): DesignOptions {
  const count = (name: 'add' | 'remove') => {
    const text = call.option(name);
    if (text === null) return {};
    if (!/^[1-9]\d{0,4}$/.test(text)) throw new UsageError(`design: --${name} ${text} is not a whole number from 1 on`);
    return { [name]: Number(text) };
  };
  if (call.option('add') !== null && call.option('remove') !== null)
    throw new UsageError('design: --add and --remove are two questions; ask one');
  return { ...count('add'), ...count('remove') };
}
