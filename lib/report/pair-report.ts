import type { PairAnswer } from '../answers/pair.js';
import { formatLength } from '../quantity/index.js';
import { BUDGET_TITLE, budgetCells, budgetColumns, SHARE_NOTE } from './budget-table.js';
import { LENGTH_NOTE, tideNote } from './conventions.js';
import { grouped } from './digit-groups.js';
import { limitSentence } from './limit.js';
import { estimateCell, HERTZ, METRES, OFFSET, POTENTIAL, sizeText } from './numbers.js';
import { estimateColumn, type Report, type Table, textCell, textColumn } from './table.js';

/** Two sites, marker to marker, as tables. */
export function pairReport(answer: PairAnswer, provenance: string): Report {
  const { sites, y, dH, distanceM, budget } = answer;
  const names = sites.map(({ name }) => name).join(' to ');
  const uncertainty =
    y.u > 0
      ? ` is predicted to ${formatLength(dH.u, 2)}, ${sizeText(y.u)}. ${limitSentence(budget)}`
      : ' is exact, as its inputs are.';
  return {
    title: names,
    sentences: [`The offset over ${grouped(formatLength(distanceM))}${uncertainty}`],
    tables: [offsetTable(answer), sitesTable(answer), frequencyTable(answer), budgetTable(answer)].filter(
      (table) => table.rows.length > 0,
    ),
    conventions: [
      tideNote(answer.tide),
      'Sign: y > 0 when a clock at B runs fast seen from A: B is the higher one. ΔW = W(A) − W(B). From marker to marker; the tie to the atoms comes on top.',
    ],
    cautions: answer.warnings,
    provenance,
  };
}

const offsetTable = ({ dH, dW, y, dHNormal }: PairAnswer): Table => ({
  id: 'offset',
  title: 'B seen from A: the offset that gravity alone makes',
  columns: [
    estimateColumn('length', METRES.unit),
    estimateColumn('ΔW', POTENTIAL.unit),
    estimateColumn('y', OFFSET.unit),
    estimateColumn('normal height', METRES.unit),
  ],
  rows: [
    [
      estimateCell(dH, METRES, 'signed'),
      estimateCell(dW, POTENTIAL, 'signed'),
      estimateCell(y, OFFSET, 'signed'),
      estimateCell(dHNormal, METRES, 'signed'),
    ],
  ],
  notes: [LENGTH_NOTE],
});

const sitesTable = ({ sites }: PairAnswer): Table => ({
  id: 'sites',
  title: 'Sites: potential at the marker',
  columns: [
    textColumn('site'),
    textColumn('name'),
    estimateColumn('W', POTENTIAL.unit),
    estimateColumn('C', POTENTIAL.unit),
  ],
  rows: sites.map(({ id, name, W, C }) => [
    textCell(id.toUpperCase()),
    textCell(name),
    estimateCell(W, POTENTIAL),
    estimateCell(C, POTENTIAL),
  ]),
  notes: ['C = W₀ − W with the W₀ of the IHRS.'],
});

const frequencyTable = ({ offsetHz }: PairAnswer): Table => ({
  id: 'frequency',
  title: 'Offset in hertz at the recommended frequency',
  columns: [textColumn('transition'), estimateColumn('offset', HERTZ.unit)],
  rows: Object.entries(offsetHz).map(([id, offset]) => [textCell(id), estimateCell(offset, HERTZ, 'signed')]),
  notes: [],
});

const budgetTable = ({ budget, groups }: PairAnswer): Table => {
  const shared = groups.find(({ source }) => source !== null);
  return {
    id: 'budget',
    title: BUDGET_TITLE,
    columns: budgetColumns,
    rows: budget.map(budgetCells),
    notes: [
      SHARE_NOTE,
      ...(shared
        ? [
            `${shared.rows.map(({ input }) => input).join(' and ')} are correlated with ρ = ${shared.correlation}: together ${(100 * shared.share).toFixed(1)} %.`.replace(
              '-0',
              '\u22120',
            ),
          ]
        : []),
    ],
  };
};
