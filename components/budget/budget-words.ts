import type { BudgetGroup } from '../../lib/answers/budget-groups.js';
import type { Limits } from '../../lib/answers/limits.js';
import type { LinkQuestions } from '../../lib/answers/questions.js';
import type { LinkUncertainty } from '../../lib/answers/what-if.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatConcise, formatDays, formatLength } from '../../lib/quantity/index.js';
import { sourceText } from '../../lib/report/input-words.js';
import { joined, TIDE_QUANTITY_WORDS } from '../../lib/report/questions-report.js';
import type { MonteCarloOutput, MonteCarloResult } from '../../lib/uncertainty/monte-carlo/index.js';
import { inputName } from '../shared/input-name.js';
import { num, type RichText, sym } from '../shared/rich-text.js';

const percent = (share: number): string => `${Math.round(100 * share)}\u00a0%`;

/** A quantity in 1e-18, to so many digits. */
export const in1e18 = (value: number, significant = 2): string => formatConcise(value * 1e18, null, { significant });

/** A size of y for a sentence: `4.3e-18`, small ones in full, `6.3e-23`. */
export const offsetText = (y: number, significant = 2): string =>
  Math.abs(y) < 1e-21 && y !== 0 ? formatConcise(y, null, { significant }) : `${in1e18(y, significant)}e-18`;

/** A group in a sentence: its source, or its only input. */
function groupName(campaign: Campaign, { source, parts }: BudgetGroup): RichText {
  if (source === null || parts.length < 2) return inputName(campaign, parts[0]!.input);
  const name = sourceText(campaign, source);
  return [name === source ? `the source ${source}` : /^the /i.test(name) ? name : `the ${name}`];
}

/** What limits, what halving it would bring, what would not help: two sentences. */
export function sentence(campaign: Campaign, { id, dH, y }: LinkUncertainty, limits: Limits): RichText {
  const { largest, halvedM, idle } = limits;
  if (!largest || halvedM === null || y.u === 0)
    return [`Link ${id} is exact: none of its inputs carries an uncertainty.`];
  const help: RichText = [' Halving its ', sym('u'), ' would bring ', num(formatLength(halvedM, 2))];
  const nothing = idle.length > 0 ? `; better ${joined(idle)} would not help.` : '.';
  return [
    `Link ${id} is predicted to `,
    num(formatLength(dH.u, 2)),
    `; ${percent(largest.share)} of the variance is `,
    ...groupName(campaign, largest),
    '.',
    ...help,
    nothing,
  ];
}

/** U = k·u in full: never bare. */
export function coverageNote({ expanded }: LinkUncertainty): RichText {
  const { coverageFactor, coverageProbability, degreesOfFreedom } = expanded;
  return [
    sym('U'),
    ' with ',
    sym('k'),
    ` = ${coverageFactor.toFixed(2)}, ${100 * coverageProbability}\u00a0%, `,
    ...(degreesOfFreedom === null
      ? ['normal']
      : ['effective degrees of freedom ', num(formatConcise(degreesOfFreedom, null, { significant: 3 }))]),
  ];
}

/** How the errors of a source go together between sites. */
export function correlationWords(campaign: Campaign, id: string): string {
  const source = campaign.sources.find((one) => one.id === id);
  if (source?.correlationLengthM !== undefined) return `correlation length ${formatLength(source.correlationLengthM)}`;
  if (source?.correlation !== undefined) return `correlation ${formatConcise(source.correlation, null)} between sites`;
  return source ? 'the same at all sites' : 'correlation length 30\u00a0km';
}

/** What cancels inside a source. */
export function cancellation({ independentUy, commonUy, uy }: BudgetGroup): RichText {
  const left: RichText = uy < 1e-9 * independentUy ? ['nothing is left'] : [num(offsetText(uy)), ' is left'];
  const common: RichText =
    Math.abs(commonUy - uy) < 0.005 * independentUy ? [] : [', wholly common ', num(offsetText(commonUy))];
  const verb = uy < 0.995 * independentUy ? '' : uy > 1.005 * independentUy ? ': they add up' : ': nothing cancels';
  return ['independent they would make ', num(offsetText(independentUy)), ...common, '; ', ...left, verb];
}

/** The comparison with a measurement, in words. */
export function outlookWords(campaign: Campaign, { outlook }: LinkUncertainty): RichText {
  const { smallestDetectableM, timeToTargetS } = outlook;
  const detectable: RichText =
    smallestDetectableM === null
      ? []
      : ['Over the window a discrepancy of ', num(formatLength(smallestDetectableM, 2)), ' or more would show.'];
  const target: RichText =
    campaign.targetM === null
      ? []
      : timeToTargetS === null
        ? [' The target of ', num(formatLength(campaign.targetM)), ' is never met.']
        : [
            ' The target of ',
            num(formatLength(campaign.targetM)),
            ' is met after ',
            num(formatDays(timeToTargetS, 2)),
            '.',
          ];
  return [...detectable, ...target];
}

const decimalsOf = (tolerance: number): number =>
  tolerance > 0 ? Math.max(0, -Math.floor(Math.log10(tolerance * 1e18))) : 3;

/** Digits after the point, in 1e-18, to which the trials are compared. */
export const trialDecimals = ({ validation }: MonteCarloOutput): number => decimalsOf(validation.tolerance);

/** The verdict on the linear result, and the sentence behind it. */
export function trialsWords(
  output: MonteCarloOutput,
  { trials, seed, coverage }: MonteCarloResult,
): { readonly title: string; readonly text: RichText } {
  const { validation: v } = output;
  const decimals = decimalsOf(v.tolerance);
  const text = (value: number) => (value * 1e18).toFixed(decimals).replace('-', '\u2212');
  const size = (value: number) => num(`${text(value)}e-18`);
  const signed = (value: number, end = '') => num(`${value > 0 ? '+' : ''}${text(value)}${end}`);
  const title = !v.validated
    ? 'The linear result does not hold'
    : v.resolved
      ? 'The linear result holds'
      : 'The linear result holds as far as so many trials can tell';
  const u: RichText =
    output.u === null ? [', whose ', sym('u'), ' is infinite,'] : [': ', sym('u'), ' = ', num(offsetText(output.u, 3))];
  const differ: RichText = [' The ends differ by ', num(text(v.differenceLow)), ' and ', size(v.differenceHigh)];
  const judged: RichText = !v.validated
    ? [...differ, ', more than the tolerance of ', size(v.tolerance), ': use the interval of the trials']
    : v.resolved
      ? [...differ, '; the tolerance is ', size(v.tolerance)]
      : [
          ...differ,
          '; so many trials know them to ',
          size(Math.max(v.noiseLow, v.noiseHigh)),
          ', the tolerance is ',
          size(v.tolerance),
        ];
  return {
    title,
    text: [
      'Monte Carlo with ',
      num(String(trials)),
      ` trials, seed ${seed}`,
      ...u,
      ` and a ${100 * coverage}\u00a0% interval of `,
      signed(v.trials.low),
      ' to ',
      signed(v.trials.high, 'e-18'),
      ', against ',
      signed(v.linear.low),
      ' to ',
      signed(v.linear.high, 'e-18'),
      ' by the linear way.',
      ...judged,
      ' (JCGM 101, clause 8).',
    ],
  };
}

/** Why a share is negative, in words with the inputs' names. */
export function negativeWords(campaign: Campaign, { harmful }: LinkQuestions): RichText | null {
  const [part] = harmful;
  if (!part) return null;
  const others: RichText = harmful.length > 1 ? [` (and ${harmful.length - 1} more)`] : [];
  const source = part.source === null ? '' : ` and shares its source, ${sourceText(campaign, part.source)}`;
  return [
    ...inputName(campaign, part.input),
    ...others,
    ` enters with the sign opposite to that of others${source}: its error takes part of theirs away, `,
    num(formatConcise(100 * part.share, null, { significant: 2 })),
    '\u00a0% of the variance. A better value there alone would not help.',
  ];
}

/** Is a gravity visit needed. */
export function gravityWords(campaign: Campaign, { gravity, uM }: LinkQuestions): RichText {
  const name = (id: string) => campaign.sites.find((site) => site.id === id)?.name ?? id;
  const wanted = gravity.filter(({ isWorthIt }) => isWorthIt);
  if (wanted.length === 0) {
    const largest = Math.max(...gravity.map(({ uyG, uyGradient }) => Math.hypot(uyG, uyGradient)));
    return [
      'No. ',
      sym('g'),
      ' and its gradient at the two ends make ',
      num(offsetText(largest)),
      ' at most; exact values would change ',
      sym('u'),
      ' by less than 1\u00a0%.',
    ];
  }
  return [
    'Yes: exact ',
    sym('g'),
    ' and gradient at ',
    ...wanted.flatMap(
      ({ site, exactM, gStated }, i): RichText => [
        `${i > 0 ? '; at ' : ''}${name(site)}${gStated ? '' : ', where normal gravity stands in for them,'} would bring `,
        num(formatLength(exactM, 2)),
      ],
    ),
    ' instead of ',
    num(formatLength(uM, 2)),
    '.',
  ];
}

/** How wrong a wrong tide label would be. */
export function tideWords(campaign: Campaign, { tideLabels, commonLabels }: LinkQuestions): RichText {
  const worst = [...tideLabels].sort((a, b) => Math.abs(b.errors[0]!.y) - Math.abs(a.errors[0]!.y))[0];
  if (!worst) return ['No label moves this link by 0.01e-18.'];
  const { system, lengthM, y } = worst.errors[0]!;
  const common = [...commonLabels].sort((a, b) => Math.abs(b.errors[0]!.y) - Math.abs(a.errors[0]!.y))[0];
  return [
    'The worst single label is that of ',
    ...inputName(campaign, worst.path),
    `: ${worst.stated === null ? 'no label stands there, ' : ''}taken as ${worst.used}; were it ${system}, the link would be off by `,
    num(formatLength(Math.abs(lengthM), 2)),
    ', ',
    num(offsetText(Math.abs(y))),
    '.',
    ...(common
      ? [
          ` All ${TIDE_QUANTITY_WORDS[common.quantity]} at once: `,
          num(formatLength(Math.abs(common.errors[0]!.lengthM), 2)),
          '.',
        ]
      : []),
  ];
}

/** What single value would help most. */
export function helpWords(campaign: Campaign, { inputs, uM }: LinkQuestions): RichText {
  const [best] = inputs;
  if (!best) return ['Nothing: every input is exact.'];
  return [
    'Half the ',
    sym('u'),
    ' of ',
    ...inputName(campaign, best.input!),
    ' would bring ',
    num(formatLength(best.halvedM, 2)),
    ' instead of ',
    num(formatLength(uM, 2)),
    '; exact, ',
    num(formatLength(best.exactM, 2)),
    '.',
  ];
}
