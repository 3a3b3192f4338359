import type { CampaignComparison } from '../answers/compare.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { formatLength } from '../quantity/index.js';
import { SIGN_NOTE } from './conventions.js';
import { decimalCell, estimateCell, OFFSET, sizeText, statedCell } from './numbers.js';
import { estimateColumn, none, notComputed, numberColumn, type Report, textCell, textColumn } from './table.js';

const lengthOf = (y: number) => formatLength((Math.abs(y) * SPEED_OF_LIGHT_SQUARED_M2_PER_S2) / 9.81, 2);

/** What `compare` found: y before and now, and what moved it. */
export function comparisonReport(
  comparison: CampaignComparison,
  options: { readonly title: string; readonly provenance: string },
): Report {
  const { links, onlyBefore, onlyAfter } = comparison;
  const changed = links.filter((l) => l.change !== null);
  const most = [...changed].sort((a, b) => Math.abs(b.change!) - Math.abs(a.change!))[0];
  const sentences: string[] = [];
  if (!most || most.change === 0) sentences.push('No offset moved.');
  else {
    const [first] = most.inputs;
    sentences.push(
      `Link ${most.id} moved most: ${sizeText(most.change! * 1e18)}e-18, ${lengthOf(most.change!)}.${
        first?.moved ? ` Of this ${first.path} makes ${sizeText(first.moved * 1e18)}e-18.` : ''
      }`,
    );
  }
  for (const [ids, what] of [
    [onlyBefore, 'gone'],
    [onlyAfter, 'new'],
  ] as const)
    if (ids.length > 0) sentences.push(`Links that are ${what}: ${ids.join(', ')}.`);
  return {
    title: options.title,
    sentences,
    tables: [
      {
        id: 'links',
        title: 'Links: before and now',
        columns: [
          textColumn('link'),
          estimateColumn('y before', OFFSET.unit),
          estimateColumn('y now', OFFSET.unit),
          numberColumn('change', OFFSET.unit),
        ],
        rows: links.map((l) => [
          textCell(l.id),
          estimateCell(l.before, OFFSET, 'signed'),
          estimateCell(l.after, OFFSET, 'signed'),
          l.change === null ? notComputed : decimalCell(l.change * 1e18, 2, 'signed'),
        ]),
        notes: [],
      },
      {
        id: 'inputs',
        title: 'What moved them',
        columns: [
          textColumn('link'),
          textColumn('input'),
          estimateColumn('before', null),
          estimateColumn('now', null),
          numberColumn('moved y by', OFFSET.unit),
        ],
        rows: links.flatMap((l) => [
          ...l.inputs.map((x) => [
            textCell(l.id),
            textCell(x.path),
            x.before ? statedCell(x.before) : none,
            x.after ? statedCell(x.after) : none,
            x.moved === null ? none : decimalCell(x.moved * 1e18, 2, 'signed'),
          ]),
          ...(l.rest !== null && Math.abs(l.rest) > 1e-21
            ? [[textCell(l.id), textCell('the rest'), none, none, decimalCell(l.rest * 1e18, 2, 'signed')]]
            : []),
        ]),
        notes: [
          'before, now: as stated, SI. the rest: determinations that came or went, tide labels, datums, sources and weights.',
        ],
      },
    ].filter((t) => t.rows.length > 0),
    conventions: [SIGN_NOTE],
    cautions: [],
    provenance: options.provenance,
  };
}
