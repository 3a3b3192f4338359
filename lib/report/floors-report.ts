import type { Estimate, FloorsAnswer, FloorsHint } from '../answers/floors.js';
import { formatConcise, formatLength } from '../quantity/index.js';
import { BUDGET_TITLE, budgetCells, budgetColumns } from './budget-table.js';
import { decimalCell, estimateCell, HERTZ, METRES, OFFSET, POTENTIAL, sizeText } from './numbers.js';
import { estimateColumn, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

const HINTS: Readonly<Record<FloorsHint, string>> = {
  'sign-turned': 'With its sign turned it would agree: it may be the lower clock seen from the upper, or a correction.',
  'gravity-already-removed': "It is compatible with zero: gravity's part may have been removed already.",
};

/** The inter-floor check as tables. */
export function floorsReport(answer: FloorsAnswer, provenance: string): Report {
  return {
    title: 'Two floors',
    sentences: sentences(answer),
    tables: [offsetTable(answer), termsTable(answer), frequencyTable(answer), budgetTable(answer)].filter(
      (table) => table.rows.length > 0,
    ),
    conventions: [
      'Sign: dH > 0 when the second floor is the upper one; y > 0 when its clock runs fast. ΔW = W(first) − W(second).',
      'correction: what to add to the frequency of the second clock to compare it with the first.',
    ],
    cautions: answer.warnings,
    provenance,
  };
}

const exact = (value: number) => formatConcise(Number(value.toPrecision(7)), null);

function sentences({ y, dH, measured }: FloorsAnswer): string[] {
  const size = y.u > 0 ? formatConcise(Math.abs(y.value), y.u) : exact(Math.abs(y.value));
  const found =
    y.value === 0
      ? ['The clocks on both floors run alike.']
      : [
          `The clock ${dH.value > 0 ? 'above runs fast' : 'below runs slow'} by ${size}. Its uncertainty is that of ${formatLength(dH.u, 2)} in the height difference.`,
        ];
  if (dH.u === 0 && y.value !== 0)
    found[0] = `The clock ${dH.value > 0 ? 'above runs fast' : 'below runs slow'} by ${size}.`;
  if (measured !== null) {
    const { difference, verdict, smallestDetectable, hint } = measured;
    const reason =
      verdict === 'inconclusive'
        ? `Only ${sizeText(smallestDetectable)} or more would have shown.`
        : `Measured minus predicted is ${difference.u > 0 ? formatConcise(difference.value, difference.u, { sign: 'always' }) : exact(difference.value)}; a discrepancy of ${sizeText(smallestDetectable)} would have shown.`;
    found.push(`The measured offset: ${verdict}. ${reason}${hint === null ? '' : ` ${HINTS[hint]}`}`);
  }
  return found;
}

function offsetTable({ dH, dW, y, correction, measured }: FloorsAnswer): Table {
  const offsetRow = (name: string, estimate: Estimate) => [
    textCell(name),
    textCell(''),
    textCell(''),
    estimateCell(estimate, OFFSET, 'signed'),
  ];
  return {
    id: 'offset',
    title: "Offset of the second floor's clock seen from the first",
    columns: [
      textColumn(''),
      estimateColumn('length', METRES.unit),
      estimateColumn('ΔW', POTENTIAL.unit),
      estimateColumn('y', OFFSET.unit),
    ],
    rows: [
      [
        textCell('shift'),
        estimateCell(dH, METRES, 'signed'),
        estimateCell(dW, POTENTIAL, 'signed'),
        estimateCell(y, OFFSET, 'signed'),
      ],
      offsetRow('correction', correction),
      ...(measured === null
        ? []
        : [offsetRow('measured', measured.y), offsetRow('measured minus predicted', measured.difference)]),
    ],
    notes: [],
  };
}

function termsTable({ terms, g, gradient, dW, dH: { value: delta } }: FloorsAnswer): Table {
  const term = (name: string, value: number) => [textCell(name), decimalCell(value, 5, 'signed')];
  const from = (what: string, estimate: { value: number; u: number }, unit: string) =>
    `${what} = ${formatConcise(estimate.value, estimate.u)} ${unit}`;
  return {
    id: 'terms',
    title: 'Terms of ΔW = g·Δ − ½·Γ·Δ²',
    columns: [textColumn('term'), numberColumn('ΔW', POTENTIAL.unit)],
    rows: [term('g·Δ', terms.linear), term('−½·Γ·Δ²', terms.quadratic), term('sum', dW.value)],
    notes: [
      `${from('g', g, 'm/s²')} at the ${delta < 0 ? 'first' : 'lower'} floor, ${g.from === 'stated' ? 'as stated' : 'normal gravity of latitude and height'}; ${from('Γ', gradient, 's⁻²')}, ${gradient.from === 'stated' ? 'as stated' : 'the free-air value'}.`,
    ],
  };
}

const frequencyTable = ({ offsetHz }: FloorsAnswer): Table => ({
  id: 'frequency',
  title: 'Offset in hertz at the recommended frequency',
  columns: [textColumn('transition'), estimateColumn('offset', HERTZ.unit)],
  rows: Object.entries(offsetHz).map(([id, offset]) => [textCell(id), estimateCell(offset, HERTZ, 'signed')]),
  notes: [],
});

const budgetTable = ({ budget }: FloorsAnswer): Table => ({
  id: 'budget',
  title: BUDGET_TITLE,
  columns: budgetColumns,
  rows: budget.map(budgetCells),
  notes: [],
});
