import type { Improvement, LabelError, LinkQuestions } from '../answers/questions.js';
import type { Campaign } from '../campaign/campaign.js';
import type { TideQuantity } from '../earth/permanent-tide.js';
import { formatLength } from '../quantity/index.js';
import { inputText, sourceText } from './input-words.js';
import { decimalCell, fixedText, OFFSET, sizeCell, sizeText } from './numbers.js';
import { numberColumn, type Table, textCell, textColumn } from './table.js';

const MM = 1000;
const PER_OFFSET = 1e18;

/** A quantity that has a permanent-tide label, in words. */
export const TIDE_QUANTITY_WORDS: Readonly<Record<TideQuantity, string>> = {
  'ellipsoidal-height': 'ellipsoidal heights',
  'geoid-height': 'geoid heights and height anomalies',
  'geopotential-number': 'geopotential numbers',
  'physical-height': 'levelled heights',
  potential: 'potentials',
  'fixed-point-potential': 'potentials of a model',
};

/** What would help, whether a gravity visit is needed, how wrong a wrong tide label would be: one table each. */
export function questionsTables(questions: LinkQuestions, campaign: Campaign): Table[] {
  return [helpTable(questions, campaign), gravityTable(questions), tideTable(questions, campaign)].filter(
    ({ rows }) => rows.length > 0,
  );
}

/** Answers in sentences. */
export function questionsSentences(questions: LinkQuestions, campaign: Campaign): string[] {
  return [helpSentence(questions, campaign), gravitySentence(questions)].filter((sentence) => sentence !== '');
}

/** An improvement by name. */
export const improvementText = (campaign: Campaign, { input, source }: Improvement): string =>
  input === null ? sourceText(campaign, source!) : inputText(campaign, input);

function helpSentence({ inputs, idle, uM }: LinkQuestions, campaign: Campaign): string {
  const [best] = inputs;
  if (!best) return '';
  const nothing = idle.length === 0 ? '' : ` Better ${joined(idle)} would change it by less than 1\u00a0%.`;
  return `The single value that would help most is ${improvementText(campaign, best)}: with half its u the link is known to ${formatLength(best.halvedM, 2)} instead of ${formatLength(uM, 2)}.${nothing}`;
}

function gravitySentence({ gravity, uM }: LinkQuestions): string {
  const wanted = gravity.filter(({ isWorthIt }) => isWorthIt);
  if (wanted.length > 0)
    return `A gravity visit to ${wanted.map(({ site, exactM }) => `${site} would bring ${formatLength(exactM, 2)} instead of ${formatLength(uM, 2)}`).join(', to ')}.`;
  return 'No gravity visit is needed: exact g and gradients at both ends would change u by less than 1\u00a0%.';
}

/** `a`, `a or b`, `a, b or c`. */
export const joined = (words: readonly string[]): string =>
  words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words.at(-1)}`;

function helpTable({ inputs, sources, harmful }: LinkQuestions, campaign: Campaign): Table {
  const row = (one: Improvement, what: string) => [
    textCell(improvementText(campaign, one)),
    textCell(what),
    decimalCell(100 * one.share, 1),
    sizeCell(one.halvedM * MM),
    sizeCell(one.exactM * MM),
  ];
  return {
    id: 'help',
    title: 'What would help: u of the length equivalent with one thing known better',
    columns: [
      textColumn('what'),
      textColumn('kind'),
      numberColumn('share', '%'),
      numberColumn('half its u', 'mm'),
      numberColumn('exact', 'mm'),
    ],
    rows: [...sources.map((one) => row(one, 'source')), ...inputs.map((one) => row(one, 'single value'))],
    notes: [
      'Each alone; weights of redundant determinations follow.',
      ...(harmful.length > 0
        ? [
            `A better ${joined(harmful.map(({ input }) => inputText(campaign, input)))} alone would not help: its error takes part of the others’ away.`,
          ]
        : []),
    ],
  };
}

function gravityTable({ gravity }: LinkQuestions): Table {
  return {
    id: 'gravity',
    title: 'Is a gravity visit needed',
    columns: [
      textColumn('site'),
      textColumn('g'),
      textColumn('gradient'),
      numberColumn('tie', 'm'),
      numberColumn('u(y) through g', OFFSET.unit),
      numberColumn('through the gradient', OFFSET.unit),
      numberColumn('both exact: u', 'mm'),
      textColumn('worth it'),
    ],
    rows: gravity.map((visit) => [
      textCell(visit.site),
      textCell(visit.gStated ? 'stated' : 'default'),
      textCell(visit.gradientStated ? 'stated' : 'default'),
      decimalCell(visit.tieM, 3, 'signed'),
      sizeCell(visit.uyG * PER_OFFSET),
      sizeCell(visit.uyGradient * PER_OFFSET),
      sizeCell(visit.exactM * MM),
      textCell(visit.isWorthIt ? 'yes' : 'no'),
    ]),
    notes: ['worth it: u of the link would change by 1 % or more. tie: the atoms over the marker.'],
  };
}

function tideTable({ tideLabels, commonLabels }: LinkQuestions, campaign: Campaign): Table {
  const cells = (errors: readonly LabelError[]) => {
    const [worst] = errors;
    return [
      textCell(worst!.system),
      decimalCell(worst!.lengthM * MM, 1, 'signed'),
      decimalCell(worst!.y * PER_OFFSET, 2, 'signed'),
    ];
  };
  return {
    id: 'tide-labels',
    title: 'How wrong would a wrong permanent-tide label be',
    columns: [
      textColumn('value'),
      textColumn('taken as'),
      textColumn('if it were'),
      numberColumn('length', 'mm'),
      numberColumn('y', OFFSET.unit),
    ],
    rows: [
      ...tideLabels.map(({ path, stated, used, errors }) => [
        textCell(inputText(campaign, path)),
        textCell(stated === null ? `${used} (no label)` : used),
        ...cells(errors),
      ]),
      ...commonLabels.map(({ quantity, used, errors }) => [
        textCell(`all ${TIDE_QUANTITY_WORDS[quantity]} at once`),
        textCell(used),
        ...cells(errors),
      ]),
    ],
    notes: [
      'The larger of the two other systems: y with that label minus y as it is. Labels that move y by less than 0.01e-18 are left out.',
    ],
  };
}

/** A change of length with its sign, mm, for a sentence. */
export const signedLength = (lengthM: number): string => `${fixedText(lengthM * MM, 1, 'signed')}\u00a0mm`;
/** A change of y with its sign, for a sentence. */
export const signedOffset = (y: number): string => `${sizeText(y * PER_OFFSET)}e-18`.replace('-', '\u2212');
