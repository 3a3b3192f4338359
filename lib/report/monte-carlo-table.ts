import type { LinkMonteCarlo, MonteCarloPrediction } from '../answers/monte-carlo.js';
import { grouped } from './digit-groups.js';
import { decimalCell, OFFSET, sizeCell } from './numbers.js';
import { type Cell, none, notComputed, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

const SCALE = 10 ** -OFFSET.power;

/** Digits after the point, in 1e-18, of the second digit of u. */
const decimalsOf = ({ tolerance }: LinkMonteCarlo): number =>
  tolerance > 0 ? Math.max(0, -Math.floor(Math.log10(tolerance * SCALE))) : OFFSET.decimals;

/** A report of `predict` with the trials of every link as a table behind the links. */
export function withMonteCarloTable(report: Report, prediction: MonteCarloPrediction): Report {
  const table = monteCarloTable(prediction);
  const [links, ...others] = report.tables;
  return { ...report, tables: links ? [links, table, ...others] : [table] };
}

function monteCarloTable({ links }: MonteCarloPrediction): Table {
  const first = links.find(({ monteCarlo }) => monteCarlo)?.monteCarlo;
  return {
    id: 'monte-carlo',
    title: 'Monte Carlo: y by trials, and whether the linear result holds',
    columns: [
      textColumn('link'),
      numberColumn('mean', OFFSET.unit),
      numberColumn('u', OFFSET.unit),
      numberColumn('from', OFFSET.unit),
      numberColumn('to', OFFSET.unit),
      numberColumn('linear from', OFFSET.unit),
      numberColumn('linear to', OFFSET.unit),
      textColumn('linear result'),
    ],
    rows: links.map(({ id, monteCarlo }) => [
      textCell(id),
      ...(monteCarlo ? cellsOf(monteCarlo) : [...Array<Cell>(6).fill(notComputed), notComputed]),
    ]),
    notes: [
      ...(first ? [`${grouped(String(first.trials))} trials, seed ${first.seed}.`] : []),
      'from … to: 95 % interval, as many trials below as above it; linear: y ± k·u, k from the effective degrees of freedom (GUM G.4.1).',
      'The linear result holds where both ends agree to half a unit in the second digit of u, apart from the noise of the trials (JCGM 101, clause 8).',
    ],
  };
}

function cellsOf(y: LinkMonteCarlo): Cell[] {
  const end = (value: number) => decimalCell(value * SCALE, decimalsOf(y), 'signed');
  return [
    y.mean === null ? none : end(y.mean),
    y.u === null ? none : sizeCell(y.u * SCALE),
    end(y.interval95[0]),
    end(y.interval95[1]),
    end(y.linear95[0]),
    end(y.linear95[1]),
    textCell(y.validated ? (y.resolved ? 'holds' : 'holds, as far as so many trials can tell') : 'does not hold'),
  ];
}
