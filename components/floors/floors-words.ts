import type { FloorsAnswer, FloorsMeasured } from '../../lib/answers/floors.js';
import { formatConcise, formatEstimate, formatScaled } from '../../lib/quantity/index.js';
import { num, type RichText, sentenceCase, sym } from '../shared/rich-text.js';

/** Names of the two floors in the order of the height difference: counted from, counted to. */
export interface FloorNames {
  readonly from: string;
  readonly to: string;
}

/** The clock that the offset is of: the one that the height difference leads to. */
export const clockWord = ({ dH }: FloorsAnswer): string => (dH.value < 0 ? 'lower' : 'upper');
const otherWord = ({ dH }: FloorsAnswer): string => (dH.value < 0 ? 'upper' : 'lower');

const offset = (value: number, u: number, sign: 'negative' | 'always' = 'negative') =>
  num(formatConcise(value, u, { sign }));

const verdictWords = ({ verdict, difference }: FloorsMeasured): RichText => {
  if (verdict === 'agree') return ['; the measurement agrees'];
  if (verdict === 'differ') return ['; the measurement differs by ', offset(difference.value, difference.u, 'always')];
  return ['; the measurement could not have told'];
};

/** The finding. */
export function sentence(answer: FloorsAnswer): RichText {
  const { y, measured } = answer;
  const verdict = measured ? verdictWords(measured) : [];
  if (y.value === 0) return ['Both clocks stand on one level: gravity sets no offset between them', ...verdict, '.'];
  const runs = y.value > 0 ? 'fast' : 'slow';
  return [`The ${clockWord(answer)} clock runs ${runs} by `, offset(Math.abs(y.value), y.u), ...verdict, '.'];
}

export const shift = (answer: FloorsAnswer): RichText => [
  `${clockWord(answer)} clock `,
  offset(answer.y.value, answer.y.u, 'always'),
  `, seen from the ${otherWord(answer)}`,
];

export const correction = (answer: FloorsAnswer): RichText => [
  offset(answer.correction.value, answer.correction.u, 'always'),
  ` to the ${clockWord(answer)} clock’s fractional frequency`,
];

const HINTS = {
  'sign-turned': 'It fits with the sign turned: is a correction given where the shift is asked for?',
  'gravity-already-removed': 'It fits zero: has gravity’s part been removed already?',
} as const;

/** Why the verdict is what it is; null where the numbers say enough. */
export function reason({ measured, y }: FloorsAnswer): RichText | null {
  if (!measured) return null;
  if (measured.hint) return [HINTS[measured.hint]];
  if (measured.verdict !== 'inconclusive') return null;
  const least = formatConcise(measured.smallestDetectable, null, { significant: 2 });
  return [
    'Only ',
    num(least),
    ' or more would have shown; the whole offset is ',
    num(formatConcise(Math.abs(y.value), null, { significant: 2 })),
    '.',
  ];
}

/** Where g and the gradient come from, for the line to cite. */
function conditions(answer: FloorsAnswer, asGiven: Readonly<Record<string, string>>): RichText {
  const g: RichText =
    answer.g.from === 'stated'
      ? [sym('g'), ' = ', num(asGiven['g'] ?? formatEstimate(answer.g, 'acceleration', 'm/s²'))]
      : ['normal gravity ', sym('g'), ' = ', num(formatEstimate(answer.g, 'acceleration', 'm/s²'))];
  const gradient: RichText = asGiven['gradient'] ? ['gradient ', num(asGiven['gradient'])] : ['default gradient'];
  return [...g, ', ', ...gradient];
}

/** The line to cite. */
export function citation(answer: FloorsAnswer, names: FloorNames, asGiven: Readonly<Record<string, string>>): RichText {
  const height = asGiven['dh'] ?? formatEstimate(answer.dH, 'length', 'm');
  return [
    `${sentenceCase(names.to)} minus ${names.from}: `,
    sym('y'),
    ' = ',
    offset(answer.y.value, answer.y.u),
    ' for ',
    num(height),
    ', ',
    ...conditions(answer, asGiven),
  ];
}

export interface TermTexts {
  readonly linear: string;
  readonly quadratic: string;
  readonly dW: string;
  readonly y: string;
}

/** The sum in print: both terms to one more digit than the sum, so that the small one is seen. */
export function termTexts({ terms, dW, y }: FloorsAnswer): TermTexts {
  const decimalsOfSum = dW.u > 0 ? Math.max(0, 1 - Math.floor(Math.log10(dW.u))) : 4;
  const first = terms.quadratic === 0 ? 0 : -Math.floor(Math.log10(Math.abs(terms.quadratic)));
  const decimals = Math.min(Math.max(decimalsOfSum, first), 6);
  const fixed = (value: number) => value.toFixed(decimals).replace('-', '\u2212');
  return {
    linear: fixed(terms.linear),
    quadratic: first > decimals ? formatConcise(terms.quadratic, null, { significant: 1 }) : fixed(terms.quadratic),
    dW: formatConcise(dW.value, dW.u),
    y: formatScaled(y.value, y.u, -18),
  };
}
