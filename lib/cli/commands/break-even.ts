import { type BreakEvenOptions, breakEven as breakEvenCampaign } from '../../answers/break-even.js';
import { startingValue } from '../../answers/starting-values.js';
import { METHOD_STARTING_VALUES } from '../../model/levelling-classes.js';
import { closest } from '../../quantity/index.js';
import { breakEvenReport } from '../../report/break-even-report.js';
import { readCallCampaign } from '../campaign-of-call.js';
import { type Call, type Command, UsageError } from '../command.js';
import { exactOption } from '../exact-option.js';

const NAME = 'break-even';
const CLASSES = METHOD_STARTING_VALUES.filter(({ of }) => of === 'levelling').map(({ id }) => id);

export const breakEven: Command = {
  name: NAME,
  summary: 'clocks against levelling and against GNSS with a geoid, over distance',
  synopsis: 'FILE [--time DURATION] [--b … --k … | --levelling CLASS] [--gnss-h … --geoid …]',
  takesFile: true,
  description: [
    'For every link: the uncertainty of its height difference by the clocks after the window (or --time), by levelling (b·√d ⊕ k·d) and by GNSS heights with a (quasi)geoid and its correlation, and the distance beyond which such clocks are better.',
    'The models are yours: from the options, else from "methods" in the campaign, else from the levelled lines and GNSS determinations the campaign holds. A published class is taken only if you name it with --levelling; plumbtick starting-values --of levelling lists them.',
  ],
  options: {
    time: { value: 'DURATION', help: 'time of the comparison on the wall: 20d; the window if not given' },
    b: { value: 'NUMBER', help: 'random error of levelling: "1.5 mm/√km"' },
    k: { value: 'NUMBER', help: 'systematic error of levelling: "0.1 mm/km"' },
    detour: { value: 'NUMBER', help: 'length of the levelling line over the geodesic; 1 if not given' },
    levelling: { value: 'CLASS', help: `a published class instead of --b and --k: ${CLASSES.join(', ')}` },
    'gnss-h': { value: 'LENGTH', help: 'u of an ellipsoidal height: "7 mm"' },
    geoid: { value: 'LENGTH', help: 'u of a (quasi)geoid height: "17 mm"' },
    'correlation-length': { value: 'LENGTH', help: 'of the (quasi)geoid, ρ = exp(−d/L): "60 km"' },
    correlation: { value: 'NUMBER', help: 'or its correlation at any distance; 0 if not given' },
  },
  examples: [
    'plumbtick break-even campaign.json --b "1.5 mm/√km" --k "0.1 mm/km"',
    'plumbtick break-even campaign.json --levelling first-order-II --time 30d',
  ],
  run(call) {
    const timeS = exactOption(NAME, call, 'time', { kind: 'duration', above: 0 });
    const levelling = levellingOf(call);
    const gnss = gnssOf(call);
    const options: BreakEvenOptions = {
      ...(timeS === null ? {} : { timeS }),
      ...(levelling ? { levelling } : {}),
      ...(gnss ? { gnss } : {}),
    };
    const { campaign, title, refuseAt, withWarnings } = readCallCampaign(call);
    const answer = withWarnings(refuseAt(() => breakEvenCampaign(campaign, options)));
    return {
      kind: 'answer',
      status: 0,
      json: answer,
      report: () => breakEvenReport(answer, campaign, { title, provenance: call.provenance }),
    };
  },
};

function levellingOf(call: Call): BreakEvenOptions['levelling'] | null {
  const bRootM = exactOption(NAME, call, 'b', { kind: 'root-length', min: 0 });
  const k = exactOption(NAME, call, 'k', { kind: 'length-ratio', min: 0 });
  const detour = exactOption(NAME, call, 'detour', { kind: 'fraction', min: 1 });
  const name = call.option('levelling');
  if (name === null) {
    if (bRootM === null && k === null) {
      if (detour !== null) throw new UsageError(`${NAME}: --detour goes with --b and --k, or with --levelling`);
      return null;
    }
    return { bRootM: bRootM ?? 0, k: k ?? 0, detour: detour ?? 1, origin: 'option' };
  }
  if (bRootM !== null || k !== null) throw new UsageError(`${NAME}: either --levelling, or --b and --k`);
  const found = CLASSES.includes(name) ? startingValue(name) : null;
  if (found === null) {
    const near = closest(name, CLASSES);
    throw new UsageError(
      `${NAME}: there is no class ${JSON.stringify(name)}${near === null ? '' : `; did you mean ${near}?`} Classes: ${CLASSES.join(', ')}`,
    );
  }
  const reference = found.evidence === 'seen' ? found.source : `${found.source}; from memory`;
  return {
    bRootM: found.values['bRootM']!,
    k: found.values['k']!,
    detour: detour ?? 1,
    origin: found.id,
    reference,
  };
}

function gnssOf(call: Call): BreakEvenOptions['gnss'] | null {
  const length = (name: string, spec: { min?: number; above?: number }) =>
    exactOption(NAME, call, name, { kind: 'length', ...spec });
  const hM = length('gnss-h', { min: 0 });
  const geoidM = length('geoid', { min: 0 });
  const correlationLengthM = length('correlation-length', { above: 0 });
  const correlation = exactOption(NAME, call, 'correlation', { kind: 'fraction', min: -1 });
  if (correlation !== null && correlation > 1) throw new UsageError(`${NAME}: --correlation is at most 1`);
  if (correlation !== null && correlationLengthM !== null)
    throw new UsageError(`${NAME}: either --correlation or --correlation-length`);
  if (hM === null && geoidM === null) {
    if (correlation !== null || correlationLengthM !== null)
      throw new UsageError(`${NAME}: a correlation goes with --gnss-h and --geoid`);
    return null;
  }
  if (hM === null || geoidM === null) throw new UsageError(`${NAME}: --gnss-h and --geoid go together`);
  return { hM, geoidM, correlationLengthM, correlation: correlation ?? 0, origin: 'option' };
}
