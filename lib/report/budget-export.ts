import type { BudgetGroup, BudgetPart } from '../answers/budget-groups.js';
import type { Amount, LinkUncertainty, WhatIfChange } from '../answers/what-if.js';
import type { Campaign } from '../campaign/campaign.js';
import { formatConcise, formatDays, formatLength } from '../quantity/index.js';
import { tableAsCsv } from './as-csv.js';
import { SHARE_NOTE } from './budget-table.js';
import { LENGTH_NOTE, referencePotentialNote, SIGN_NOTE, tideNote } from './conventions.js';
import { inputUnit } from './input-unit.js';
import { inputText, sourceText } from './input-words.js';
import { decimalCell, estimateCell, METRES, OFFSET, POTENTIAL, sizeCell, sizeText } from './numbers.js';
import { type Cell, none, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

/** What stands in an exported budget of one link. */
export interface BudgetExport {
  readonly campaign: Campaign;
  /** as stated */
  readonly uncertainty: LinkUncertainty;
  /** as it would be, with what was changed; null: nothing was */
  readonly whatIf: { readonly changes: readonly WhatIfChange[]; readonly uncertainty: LinkUncertainty } | null;
  /** the trials, if they were run: ends of their 95 % interval of y and whether the linear result holds, in words */
  readonly trials: {
    readonly trials: number;
    readonly seed: number;
    readonly low: number;
    readonly high: number;
    readonly sentence: string;
  } | null;
  /** version and date */
  readonly provenance: string;
}

const PER_OFFSET = 1e18;

/** The budget of one link as tables: three scales with u and U, then every input under its source.
 * @param detail `full`: with paths, for a program to read */
export function budgetReport(of: BudgetExport, detail: 'readable' | 'full' = 'readable'): Report {
  const { campaign, uncertainty, whatIf } = of;
  const link = campaign.links.find(({ id }) => id === uncertainty.id)!;
  const changed = whatIf
    ? [
        `What if, not as stated: ${whatIf.changes.map((change) => changeText(of, change)).join('; ')}. u(y) = ${scaled(whatIf.uncertainty.y.u)}e-18 instead of ${scaled(uncertainty.y.u)}e-18.`,
      ]
    : [];
  return {
    title: `Uncertainty of link ${link.id}, ${link.from} to ${link.to}${campaign.title === undefined ? '' : ` (${campaign.title})`}`,
    sentences: [
      `Link ${link.id} is predicted to ${formatLength(uncertainty.dH.u, 2)} of height, ${scaled(uncertainty.y.u)}e-18.`,
      ...changed,
      ...(of.trials ? [of.trials.sentence] : []),
    ],
    tables: [
      scalesTable(of),
      partsTable(of, 'budget', 'Budget: what each input contributes to u(y), by source', detail),
      ...comparisonTables(of, detail),
    ],
    conventions: [tideNote(campaign.tide), SIGN_NOTE, referencePotentialNote(campaign)],
    cautions: [],
    provenance: of.provenance,
  };
}

/** The same as comma-separated values, with conventions, version and date as a last table: a file of numbers alone is soon
 *  without them. */
export function budgetCsv(of: BudgetExport): string {
  const report = budgetReport(of, 'full');
  const about: Table = {
    id: 'about',
    title: 'About',
    columns: [textColumn('about'), textColumn('text')],
    rows: [
      ['link', report.title],
      ...report.sentences.map((sentence) => ['result', sentence]),
      ...report.conventions.map((sentence) => ['convention', sentence]),
      ...report.tables.flatMap(({ notes }) => notes.map((note) => ['note', note])),
      ['computed', report.provenance],
    ].map((row) => row.map((text) => textCell(text!))),
    notes: [],
  };
  return [...report.tables, about].map(tableAsCsv).join('\r\n');
}

/** u in 1e-18. */
const scaled = (u: number): string => sizeText(u * PER_OFFSET);

/** One change in words: `regional quasigeoid: u = 10 mm`, `Ridge, ζ: u times 0.5`. */
export function changeText(
  { campaign, uncertainty }: Pick<BudgetExport, 'campaign' | 'uncertainty'>,
  change: WhatIfChange,
): string {
  if (change.kind === 'part')
    return `${inputText(campaign, change.input)}${change.source === null ? '' : ` (${sourceText(campaign, change.source)})`}: ${amountText(change.amount, inputUnit(change.input))}`;
  const source = sourceText(campaign, change.source);
  if (change.kind === 'correlation') return `${source}: correlation ${formatConcise(change.correlation, null)}`;
  if (change.kind === 'correlation-length') return `${source}: correlation length ${formatLength(change.lengthM)}`;
  const groups = [...uncertainty.budget.groups, ...uncertainty.outlook.systematic.groups];
  const member = groups.find((group) => group.source === change.source)?.parts[0];
  return `${source}: ${amountText(change.amount, member ? inputUnit(member.input) : 'SI')}`;
}

const amountText = (amount: Amount, unit: string): string =>
  'factor' in amount ? `u times ${formatConcise(amount.factor, null)}` : `u = ${uText(amount.u, unit)}`;

/** A standard uncertainty for a row or a sentence, two digits: lengths in mm and the like. */
export const uText = (u: number, unit: string): string =>
  unit === 'm' ? formatLength(u, 2) : `${sizeText(u)}${unit === '1' ? '' : `\u00a0${unit}`}`;

function scalesTable({ uncertainty, whatIf, trials, campaign }: BudgetExport): Table {
  const rows = (of: LinkUncertainty, name: string): Cell[][] => {
    const { dH, dW, y, expanded } = of;
    return [
      [
        textCell(`${name}predicted`),
        estimateCell(dH, METRES, 'signed'),
        estimateCell(dW, POTENTIAL, 'signed'),
        estimateCell(y, OFFSET, 'signed'),
      ],
      [textCell(`${name}u`), sizeCell(dH.u), sizeCell(dW.u), sizeCell(y.u * PER_OFFSET)],
      [textCell(`${name}U`), sizeCell(expanded.dH), sizeCell(expanded.dW), sizeCell(expanded.y * PER_OFFSET)],
    ];
  };
  const { outlook } = uncertainty;
  return {
    id: 'scales',
    title: 'Uncertainty on three scales',
    columns: [
      textColumn('quantity'),
      { ...numberColumn('length', METRES.unit), withU: true },
      { ...numberColumn('ΔW', POTENTIAL.unit), withU: true },
      { ...numberColumn('y', OFFSET.unit), withU: true },
    ],
    rows: [...rows(uncertainty, ''), ...(whatIf ? rows(whatIf.uncertainty, 'what if: ') : [])],
    notes: [
      `${coverageText(uncertainty)}${whatIf ? `; what if: ${coverageText(whatIf.uncertainty)}` : ''}.`,
      LENGTH_NOTE,
      ...(outlook.smallestDetectableM === null
        ? []
        : [
            `Smallest discrepancy that the window shows: ${formatLength(outlook.smallestDetectableM, 2)}${whatIf?.uncertainty.outlook.smallestDetectableM ? `; what if: ${formatLength(whatIf.uncertainty.outlook.smallestDetectableM, 2)}` : ''} (test size 0.05, power 0.8).`,
          ]),
      ...(campaign.targetM === null
        ? []
        : [
            `Time to the target of ${formatLength(campaign.targetM)}: ${timeText(outlook.timeToTargetS)}${whatIf ? `; what if: ${timeText(whatIf.uncertainty.outlook.timeToTargetS)}` : ''}.`,
          ]),
      ...(trials
        ? [`By ${trials.trials} trials, seed ${trials.seed}: 95 % interval of y ${range(trials)} (1e-18).`]
        : []),
    ],
  };
}

const range = ({ low, high }: { readonly low: number; readonly high: number }): string =>
  `${sizeText(low * PER_OFFSET, 6)} … ${sizeText(high * PER_OFFSET, 6)}`.replaceAll('-', '\u2212');

const timeText = (seconds: number | null): string => (seconds === null ? 'never' : formatDays(seconds, 2));

/** `U = k·u with k = 1.96, 95 %, degrees of freedom 16`. */
export function coverageText({ expanded }: LinkUncertainty): string {
  const { coverageFactor, coverageProbability, degreesOfFreedom } = expanded;
  const dof = degreesOfFreedom === null ? 'normal' : `effective degrees of freedom ${sizeText(degreesOfFreedom, 3)}`;
  return `U with k = ${coverageFactor.toFixed(2)}, ${100 * coverageProbability}\u00a0%, ${dof}`;
}

/** What only the comparison with a measurement contains. */
function comparisonTables(of: BudgetExport, detail: 'readable' | 'full'): Table[] {
  const table = partsTable(of, 'comparison', 'Only in the comparison: clocks, link and frequency ratio', detail);
  return table.rows.length > 0 ? [table] : [];
}

interface Shown {
  readonly row: 'source' | 'in source' | 'alone';
  readonly name: string;
  readonly path: string | null;
  readonly part: BudgetPart | null;
  readonly uy: number;
  readonly share: number;
  readonly key: string;
}

function partsTable(
  { campaign, uncertainty, whatIf }: BudgetExport,
  id: 'budget' | 'comparison',
  title: string,
  detail: 'readable' | 'full',
): Table {
  const groupsOf = (u: LinkUncertainty) => (id === 'budget' ? u.budget : u.outlook.systematic).groups;
  const now = new Map(
    whatIf
      ? groupsOf(whatIf.uncertainty)
          .flatMap((group) => shownRows(campaign, group))
          .map((row) => [row.key, row])
      : [],
  );
  const full = detail === 'full';
  // beside a what-if there is no room for it
  const wide = full || !whatIf;
  const number = (value: number | undefined, make: (value: number) => Cell): Cell =>
    value === undefined ? none : make(value);
  return {
    id,
    title,
    columns: [
      textColumn('row'),
      textColumn('input'),
      ...(full ? [textColumn('path'), textColumn('source')] : []),
      numberColumn('u', null),
      textColumn('unit'),
      ...(wide ? [numberColumn('c', '1e-18 per unit')] : []),
      numberColumn('c·u', OFFSET.unit),
      numberColumn('share', '%'),
      ...(whatIf ? [numberColumn('c·u, what if', OFFSET.unit), numberColumn('share, what if', '%')] : []),
    ],
    rows: groupsOf(uncertainty)
      .flatMap((group) => shownRows(campaign, group))
      .map((row) => {
        const { part } = row;
        const later = now.get(row.key);
        return [
          textCell(row.row),
          textCell(row.name),
          ...(full ? [textCell(row.path ?? ''), textCell(row.key.split(' ')[0]!)] : []),
          part ? sizeCell(part.u) : textCell(''),
          textCell(part ? inputUnit(part.input) : ''),
          ...(wide ? [part ? sizeCell(part.sensitivity * PER_OFFSET, 4) : textCell('')] : []),
          sizeCell((part ? part.effect : row.uy) * PER_OFFSET, 3),
          decimalCell(100 * row.share, 1),
          ...(whatIf
            ? [
                number(later && (later.part?.effect ?? later.uy), (v) => sizeCell(v * PER_OFFSET, 3)),
                number(later?.share, (v) => decimalCell(100 * v, 1)),
              ]
            : []),
        ];
      }),
    notes:
      id === 'budget'
        ? [
            SHARE_NOTE,
            'Rows "in source" make up the row "source" above them; their c·u is signed, the source’s is what is left of them.',
          ]
        : [
            'These enter the comparison with a measured offset and not the prediction; shares are of their own variance.',
          ],
  };
}

function shownRows(campaign: Campaign, group: BudgetGroup): Shown[] {
  const member = (part: BudgetPart, row: Shown['row']): Shown => ({
    row,
    name: `${inputText(campaign, part.input)}${part.isWhole ? '' : part.source === null ? ', own part' : ', shared part'}`,
    path: part.input,
    part,
    uy: Math.abs(part.effect),
    share: part.share,
    key: `${part.source ?? ''} ${part.input}`,
  });
  const [first] = group.parts;
  if (group.source === null || group.parts.length === 1) return first ? [member(first, 'alone')] : [];
  return [
    {
      row: 'source',
      name: `${sourceText(campaign, group.source)}, ${group.parts.length} inputs`,
      path: null,
      part: null,
      uy: group.uy,
      share: group.share,
      key: `${group.source} `,
    },
    ...group.parts.map((part) => member(part, 'in source')),
  ];
}
