import type { PairAnswer, PairBudgetGroup } from '../../lib/answers/pair.js';
import { formatConcise, formatEstimate, formatLength } from '../../lib/quantity/index.js';
import { num, type RichPart, type RichText, sentenceCase, sym } from '../shared/rich-text.js';

const SYMBOLS: Readonly<Record<string, RichPart>> = {
  h: sym('h'),
  zeta: sym('ζ'),
  n: sym('N'),
  g: sym('g'),
  meangravityfactor: 'mean gravity factor',
};

const siteName = (answer: PairAnswer, id: string): string => answer.sites.find((site) => site.id === id)?.name ?? id;

/** `b-zeta` → *Ridge, ζ*. */
export function inputName(answer: PairAnswer, input: string): RichText {
  const [id = '', quantity = ''] = input.split(/-(.*)/);
  return [`${siteName(answer, id)}, `, SYMBOLS[quantity] ?? quantity];
}

/** Name of the model whose error the two sites share. */
export const modelName = ({ rows }: PairBudgetGroup): string =>
  rows.every(({ input }) => input.endsWith('-n')) ? 'geoid' : 'quasigeoid';

/** What limits, by the largest share. */
function limit(answer: PairAnswer): RichText {
  const [largest] = answer.groups;
  if (!largest) return [];
  const percent = `${Math.round(100 * largest.share)}\u00a0%`;
  const what: RichText = largest.source
    ? [`the ${modelName(largest)} at both sites`]
    : inputName(answer, largest.rows[0]!.input);
  return [` What limits is `, ...what, `, with ${percent} of the variance.`];
}

export function sentence(answer: PairAnswer): RichText {
  const { y, dHNormal } = answer;
  const [a, b] = [siteName(answer, 'a'), siteName(answer, 'b')];
  if (y.value === 0) {
    const within: RichText = y.u > 0 ? [' within ', num(formatConcise(y.u, null, { significant: 2 }))] : [];
    return [`Clocks at ${b} and ${a} run alike`, ...within, '.', ...limit(answer)];
  }
  const runs = y.value > 0 ? 'fast' : 'slow';
  return [
    `A clock at ${b} runs ${runs} by `,
    num(formatConcise(Math.abs(y.value), y.u)),
    ` against one at ${a}, known to `,
    num(formatLength(dHNormal.u, 2)),
    ' of height.',
    ...limit(answer),
  ];
}

export function citation(answer: PairAnswer, correlation: string | null): RichText {
  const { dW, y, tide, groups } = answer;
  const model: RichText = groups.some(({ source }) => source)
    ? [', ', sym('ζ'), ' correlated with ', sym('ρ'), ` = ${correlation}`]
    : [];
  return [
    `${sentenceCase(siteName(answer, 'b'))} minus ${siteName(answer, 'a')}, marker to marker: `,
    sym('y'),
    ' = ',
    num(formatConcise(y.value, y.u)),
    ', Δ',
    sym('W'),
    ' = ',
    num(formatEstimate(dW, 'potential', 'm²/s²')),
    ` (${tide} tide)`,
    ...model,
  ];
}
