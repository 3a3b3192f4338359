import type { SeriesAnswer, SeriesDeviation } from '../answers/series.js';
import { DEVIATION_KINDS, type DeviationKind } from '../clocks/deviations/index.js';
import { formatConcise, formatDuration } from '../quantity/index.js';
import { sizeCell, sizeText } from './numbers.js';
import { type Cell, type Column, none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

const NAMES: Readonly<Record<DeviationKind, string>> = {
  adev: 'ADEV',
  oadev: 'OADEV',
  mdev: 'MDEV',
  tdev: 'TDEV',
  hdev: 'HDEV',
  ohdev: 'OHDEV',
  totdev: 'TOTDEV',
};

/** Gaps that a reader is shown; `--json` and `--csv` have all. */
const MOST_GAPS = 12;

export interface SeriesReportOptions {
  readonly provenance: string;
  /** every row of every table, for a program */
  readonly full: boolean;
}

/** A frequency series as tables: the mean, the stability by τ, the gaps. */
export function seriesReport(answer: SeriesAnswer, { provenance, full }: SeriesReportOptions): Report {
  const tables = full
    ? [deviationsTable(answer), gapsTable(answer, true)]
    : [stabilityTable(answer), intervalsTable(answer), gapsTable(answer, false)];
  return {
    title: 'Frequency series',
    sentences: sentences(answer),
    tables: tables.filter((table) => table.rows.length > 0),
    conventions: [
      'Overlapping and modified deviations: NIST SP 1065 (2008); intervals 68.3 %, by the degrees of freedom for the noise found at each τ (Greenhall & Riley 2003).',
      ...(answer.gaps.length > 0
        ? ['Gaps: a term counts only if all its samples follow each other; nothing is interpolated.']
        : []),
    ],
    cautions: answer.warnings,
    provenance,
  };
}

function sentences({ samples, interval, dropped, mean, basis, noise }: SeriesAnswer): string[] {
  const value = mean.u === null || !(mean.u > 0) ? sizeText(mean.value, 10) : formatConcise(mean.value, mean.u);
  const rows = dropped === 0 ? '' : `; ${dropped} ${dropped === 1 ? 'row' : 'rows'} left out`;
  return [
    `${samples} samples ${formatDuration(interval)} apart${rows}. Mean y = ${value}${mean.u === null ? ', without uncertainty' : ''}.`,
    `Noise: ${noise !== null && basis.words.startsWith(noise) ? '' : `${noise ?? 'not identified'}; `}${basis.words}.`,
  ];
}

/** A number with the digits it has and no more. */
const plainCell = (value: number): Cell => ({ kind: 'number', text: formatConcise(value, null), value, u: null });

const tauColumn = numberColumn('τ', 's');

const kindsIn = ({ deviations }: SeriesAnswer): DeviationKind[] =>
  DEVIATION_KINDS.filter((kind) => deviations.some((d) => d.kind === kind));

const tausIn = ({ deviations }: SeriesAnswer): number[] =>
  [...new Set(deviations.map((d) => d.tau))].sort((a, b) => a - b);

/** All kinds side by side, one row to a τ. */
function stabilityTable(answer: SeriesAnswer): Table {
  const kinds = kindsIn(answer);
  const at = new Map(answer.deviations.map((d) => [`${d.kind} ${d.tau}`, d]));
  return {
    id: 'stability',
    title: 'Deviations',
    columns: [tauColumn, ...kinds.map((kind): Column => numberColumn(NAMES[kind], kind === 'tdev' ? 's' : null))],
    rows: tausIn(answer).map((tau) => [
      plainCell(tau),
      ...kinds.map((kind) => {
        const d = at.get(`${kind} ${tau}`);
        return d === undefined ? none : sizeCell(d.value, 3);
      }),
    ]),
    notes: [],
  };
}

const intervalCells = (d: SeriesDeviation) => [
  sizeCell(d.value, 4),
  sizeCell(d.lo, 4),
  sizeCell(d.hi, 4),
  plainCell(d.n),
  textCell(d.noise),
];

const intervalColumns = [
  numberColumn('value'),
  numberColumn('from'),
  numberColumn('to'),
  numberColumn('terms'),
  textColumn('noise'),
];

/** The overlapping Allan deviation with its interval; the other kinds' intervals are in the full table. */
const intervalsTable = (answer: SeriesAnswer): Table => ({
  id: 'intervals',
  title: 'Overlapping Allan deviation with its 68.3 % interval',
  columns: [tauColumn, ...intervalColumns],
  rows: answer.deviations.filter((d) => d.kind === 'oadev').map((d) => [plainCell(d.tau), ...intervalCells(d)]),
  notes: [],
});

/** Everything, one row to a kind and τ. */
const deviationsTable = (answer: SeriesAnswer): Table => ({
  id: 'deviations',
  title: 'Deviations with 68.3 % intervals (TDEV in s)',
  columns: [textColumn('kind'), tauColumn, ...intervalColumns],
  rows: answer.deviations.map((d) => [textCell(d.kind), plainCell(d.tau), ...intervalCells(d)]),
  notes: [],
});

function gapsTable({ gaps }: SeriesAnswer, full: boolean): Table {
  const shown = full ? gaps : gaps.slice(0, MOST_GAPS);
  const rest = gaps.length - shown.length;
  const instant = (t: string | number): string => (typeof t === 'string' ? t : `${t} s`);
  return {
    id: 'gaps',
    title: 'Gaps',
    columns: [textColumn('from'), textColumn('to')],
    rows: shown.map(({ start, end }) => [textCell(instant(start)), textCell(instant(end))]),
    notes: rest > 0 ? [`and ${rest} more; --json lists all of them`] : [],
  };
}
