import type { GridAnswer } from '../answers/grid.js';
import { decimalCell, decimalText } from './numbers.js';
import { none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

const SURFACE = {
  geoid: 'Geoid height N',
  quasigeoid: 'Height anomaly ζ',
  unknown: 'Geoid height N or height anomaly ζ (the file does not say which)',
} as const;

const TIDE = { free: 'tide-free', zero: 'zero-tide', mean: 'mean-tide', unknown: 'not stated' } as const;

const place = ({ lat, lon }: { readonly lat: number; readonly lon: number }): string =>
  `${decimalText(lat, 8)}, ${decimalText(lon, 8)}`;

/** A value read off a grid, with the grid as it was understood. */
export function gridReport(answer: GridAnswer, provenance: string): Report {
  const { value, method, otherMethod, at } = answer;
  const other =
    otherMethod === null
      ? ''
      : ` ${otherMethod.method === 'bicubic' ? 'Bicubic' : 'Bilinear'} interpolation gives ${decimalText(otherMethod.value, 4)} m.`;
  return {
    title: answer.name,
    sentences: [
      `${SURFACE[answer.surface]} at ${place(at)}: ${decimalText(value, 4)} m, by ${method} interpolation.${other}`,
    ],
    tables: [nodesTable(answer), headerTable(answer)],
    conventions: [
      'Bicubic: cubic convolution with a = −1/2 over 4 × 4 nodes (Keys 1981). Nothing is extrapolated, and no missing value is filled in.',
    ],
    cautions: answer.warnings,
    provenance,
  };
}

const nodesTable = ({ nodes }: GridAnswer): Table => ({
  id: 'nodes',
  title: 'The four nodes round the place',
  columns: [textColumn(''), numberColumn('latitude', '°'), numberColumn('longitude', '°'), numberColumn('value', 'm')],
  rows: nodes.map(({ lat, lon, value }, i) => [
    textCell(['south-west', 'south-east', 'north-west', 'north-east'][i] ?? ''),
    decimalCell(lat, 6),
    decimalCell(lon, 6),
    value === null ? none : decimalCell(value, 4),
  ]),
  notes: [],
});

const headerTable = (answer: GridAnswer): Table => ({
  id: 'header',
  title: 'The file as it was understood',
  columns: [textColumn('what'), textColumn('as read')],
  rows: [
    ['format', answer.format],
    [
      'nodes',
      `${answer.rows} × ${answer.columns}, from ${place(answer.nodesFrom)} to ${place(answer.nodesTo)}, every ${place(answer.step)}°`,
    ],
    [
      'bounds mean',
      answer.registration === 'nodes' ? 'the outermost nodes' : 'edges of cells; the nodes are their middles',
    ],
    ['because', answer.registrationReason],
    ['surface', answer.surface],
    ['permanent tide', TIDE[answer.tide]],
    ['zero level', answer.heightDatum ?? 'not stated'],
    ['ellipsoid', answer.ellipsoid ?? 'not stated'],
    ['frame', answer.frame ?? 'not stated'],
    [
      'values',
      `${decimalText(answer.range.least, 4)} … ${decimalText(answer.range.most, 4)} m, ${answer.range.missing} missing`,
    ],
  ].map(([key, value]) => [textCell(key!), textCell(value!)]),
  notes: [],
});
