import type { FibreNoise } from '../clocks/fibre-noise.js';
import type { StartingValue } from '../constants/starting-value.js';
import { formatLength } from '../quantity/index.js';
import { wrap } from './as-text.js';
import { sizeText } from './numbers.js';
import { type Report, textCell, textColumn } from './table.js';

/** Phase noise of a stabilised fibre, and what it was computed from. */
export interface FibrePhase extends FibreNoise {
  /** a of S = a·(2πfτ)²·S_fibre */
  readonly part: number;
  /** Allan deviation at 1 s, falling as 1/τ */
  readonly phase: number;
}

/** Starting values with their sources. */
export function startingValuesReport(
  values: readonly StartingValue[],
  fibre: FibrePhase | null,
  provenance: string,
): Report {
  return {
    title: 'Starting values: published figures, none of them used by itself',
    sentences: fibre
      ? [
          `A stabilised fibre of ${formatLength(fibre.lengthM)} keeps phase noise of ${sizeText(fibre.phase)} at 1 s because of its delay: write "stability": { "phase": "${sizeText(fibre.phase)}" }.`,
        ]
      : [],
    tables: [
      {
        id: 'starting-values',
        title: 'What was published',
        columns: ['name', 'of', 'what', 'write', 'source', 'read'].map(textColumn),
        rows: values.map((v) =>
          [v.id, v.of, v.what, v.write, v.source, v.evidence === 'seen' ? 'seen' : 'from memory'].map(textCell),
        ),
        notes: ['from memory: look the figure up before relying on it.'],
      },
    ],
    conventions: [
      'phase: Allan deviation at 1 s of noise that falls as 1/τ. systematic: what averaging does not reduce.',
      ...(fibre
        ? [
            `Fibre: group index ${fibre.groupIndex}, carrier ${fibre.carrierHz / 1e12} THz, a = 1/3 for noise uniform along the fibre (Williams, Swann & Newbury 2008; from memory).`,
          ]
        : []),
    ],
    cautions: [],
    provenance,
  };
}

/** The same for a terminal: a list, for the columns would be too many. */
export function startingValuesText(values: readonly StartingValue[], report: Report): string {
  const width = Math.max(...values.map(({ id }) => id.length)) + 2;
  const entry = ({ id, what, write, source, evidence }: StartingValue): string =>
    [what, write, evidence === 'seen' ? source : `${source}; from memory, to be looked up`]
      .map((line, i) => (i === 0 ? id : '').padEnd(width) + wrap(line, 96 - width, ' '.repeat(width)))
      .join('\n');
  const bySubject = [...new Set(values.map(({ of }) => of))].map(
    (of) =>
      `${of}\n${values
        .filter((v) => v.of === of)
        .map(entry)
        .join('\n')}`,
  );
  return `${[report.title, ...report.sentences.map((s) => wrap(s)), ...bySubject, report.conventions.map((s) => wrap(s)).join('\n')].join('\n\n')}\n`;
}
