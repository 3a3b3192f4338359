import { STARTING_SUBJECTS, STARTING_VALUES } from '../../answers/starting-values.js';
import {
  DELAY_LIMITED_PART,
  delayLimitedPhaseNoise,
  FIBRE_CARRIER_HZ,
  FIBRE_GROUP_INDEX,
} from '../../clocks/fibre-noise.js';
import { closest } from '../../quantity/index.js';
import { type FibrePhase, startingValuesReport, startingValuesText } from '../../report/starting-values-report.js';
import { type Call, type Command, UsageError } from '../command.js';
import { exactOption } from '../exact-option.js';

export const startingValues: Command = {
  name: 'starting-values',
  summary: 'published figures of links, levelling and flywheels to begin a plan with',
  synopsis: '[--of SUBJECT] [--length LENGTH --noise NUMBER --bandwidth FREQUENCY]',
  takesFile: false,
  description: [
    'Lists typical published figures with their sources. No command puts one of them into a computation by itself: copy what fits into the campaign, where it is yours to answer for. Figures cited from memory are marked and want looking up.',
    'With --length, --noise and --bandwidth it also says the phase noise that a stabilised fibre keeps because of its delay: S = a·(2πfτ)²·S_fibre with S_fibre = noise·length/f² and a = 1/3 (Williams, Swann & Newbury 2008; the number from memory).',
  ],
  options: {
    of: { value: 'SUBJECT', help: `one of ${STARTING_SUBJECTS.join(', ')}` },
    length: { value: 'LENGTH', help: 'length of a fibre: "420 km"' },
    noise: { value: 'NUMBER', help: 'noise of the fibre, rad²·Hz/km' },
    bandwidth: { value: 'FREQUENCY', help: 'bandwidth in which the phase is read: "10 Hz"' },
  },
  examples: [
    'plumbtick starting-values --of fibre',
    'plumbtick starting-values --length "420 km" --noise 10 --bandwidth "10 Hz"',
  ],
  run(call) {
    const subject = call.option('of');
    if (subject !== null && !STARTING_SUBJECTS.includes(subject)) {
      const near = closest(subject, STARTING_SUBJECTS);
      throw new UsageError(
        `starting-values: no figures of ${JSON.stringify(subject)}${near === null ? '' : `; did you mean ${near}?`} There are: ${STARTING_SUBJECTS.join(', ')}`,
      );
    }
    const values = STARTING_VALUES.filter(({ of }) => subject === null || of === subject);
    const fibre = fibreOf(call);
    const report = () => startingValuesReport(values, fibre, call.provenance);
    return {
      kind: 'answer',
      status: 0,
      json: { values, ...(fibre ? { fibre } : {}) },
      report,
      text: () => startingValuesText(values, report()),
    };
  },
};

function fibreOf(call: Call): FibrePhase | null {
  const given = ['length', 'noise', 'bandwidth'].filter((name) => call.has(name));
  if (given.length === 0) return null;
  if (given.length < 3)
    throw new UsageError(
      'starting-values: the phase noise of a fibre needs --length, --noise and --bandwidth together',
    );
  const number = (name: string, kind: 'length' | 'frequency' | 'fraction') =>
    exactOption('starting-values', call, name, { kind, above: 0 })!;
  const fibre = {
    lengthM: number('length', 'length'),
    noiseRad2HzPerM: number('noise', 'fraction') / 1000,
    bandwidthHz: number('bandwidth', 'frequency'),
    carrierHz: FIBRE_CARRIER_HZ,
    groupIndex: FIBRE_GROUP_INDEX,
  };
  return { ...fibre, part: DELAY_LIMITED_PART, phase: delayLimitedPhaseNoise(fibre) };
}
