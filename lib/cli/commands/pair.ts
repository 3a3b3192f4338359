import { pair as pairAnswer } from '../../answers/pair.js';
import { PAIR_OPTIONS, readPairOptions } from '../../answers/pair-options.js';
import { CampaignError } from '../../campaign/fault.js';
import { pairReport } from '../../report/index.js';
import type { Command, OptionSpec } from '../command.js';
import { refuseOptions } from '../refuse-options.js';

const siteOptions = (id: 'a' | 'b', name: 'A' | 'B'): Record<string, OptionSpec> => ({
  [`${id}-lat`]: { value: 'DEGREES', help: `latitude of ${name}, north positive: 52.2961 or 52°17'46"N` },
  [`${id}-lon`]: { value: 'DEGREES', help: `longitude of ${name}, east positive` },
  [`${id}-h`]: { value: 'LENGTH', help: `ellipsoidal height of ${name}: "143.216(8) m"` },
  [`${id}-zeta`]: { value: 'LENGTH', help: `height anomaly of ${name} (quasigeoid): "43.812(19) m"` },
  [`${id}-n`]: { value: 'LENGTH', help: `or its geoid height` },
  [`${id}-g`]: { value: 'ACCELERATION', help: `gravity at ${name}; normal gravity if not given` },
  [`${id}-name`]: { value: 'TEXT', help: `what ${name} is called in the answer` },
});

export const pair: Command = {
  name: 'pair',
  summary: 'two sites by GNSS height and (quasi)geoid; no file needed',
  synopsis: '--a-lat DEGREES --a-lon DEGREES --a-h LENGTH --a-zeta LENGTH --b-… [more options]',
  takesFile: false,
  description: [
    'Potential difference, frequency offset and uncertainty budget between two markers whose heights come from GNSS and a (quasi)geoid model. The same as a campaign file of two sites, without the file.',
  ],
  options: {
    ...siteOptions('a', 'A'),
    ...siteOptions('b', 'B'),
    correlation: { value: 'NUMBER', help: 'between the errors of the two ζ or N, −1 to 1: near sites share them' },
    tide: { value: 'SYSTEM', help: 'permanent tide of the printed potentials: mean (default), zero or free' },
    'h-tide': { value: 'SYSTEM', help: 'permanent tide of both h; free if not given, with a caution' },
    'geoid-tide': { value: 'SYSTEM', help: 'permanent tide of both ζ or N; zero if not given, with a caution' },
    transition: { value: 'NAME', help: 'offset in hertz for this transition, 87Sr for example' },
  },
  examples: [
    'plumbtick pair --a-lat 52.2961 --a-lon 10.4598 --a-h "143.216(8) m" --a-zeta "43.812(19) m" \\\n                 --b-lat 50.91 --b-lon 11.72 --b-h "384.907(9) m" --b-zeta "45.733(20) m" --correlation 0.2',
  ],
  run(call) {
    const read = readPairOptions(Object.fromEntries(PAIR_OPTIONS.map((name) => [name, call.option(name)])));
    if (!read.ok) return refuseOptions('pair', read.faults);
    try {
      const answer = pairAnswer(read.input);
      return { kind: 'answer', status: 0, json: answer, report: () => pairReport(answer, call.provenance) };
    } catch (error) {
      if (error instanceof CampaignError) return refuseOptions('pair', error.faults);
      throw error;
    }
  },
};
