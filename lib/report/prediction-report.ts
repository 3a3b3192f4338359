import type { BudgetRow, LinkPrediction, Prediction } from '../answers/prediction.js';
import type { Campaign, Site } from '../campaign/campaign.js';
import { formatLength } from '../quantity/index.js';
import { BUDGET_TITLE, budgetCells, budgetColumns, restCells, SHARE_NOTE } from './budget-table.js';
import { checksTable } from './checks-table.js';
import { LENGTH_NOTE, referencePotentialNote, SIGN_NOTE, tideNote } from './conventions.js';
import { limitSentence } from './limit.js';
import { decimalCell, estimateCell, HERTZ, METRES, OFFSET, POTENTIAL, sizeText } from './numbers.js';
import { estimateColumn, notComputed, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

export interface PredictionReportOptions {
  /** heading where the campaign has no title */
  readonly title: string;
  /** version and date of the computation */
  readonly provenance: string;
  /** every row of every budget; else of few links, and only the rows that matter */
  readonly full: boolean;
  /** ids of the links whose whole budget is wanted; empty: no choice made */
  readonly links: readonly string[];
}

/** More links than this get one line each about what limits them; a budget then has to be asked for. */
const MAX_BUDGETS = 6;
/** Rows of a smaller share are summed into one line. */
const SMALL_SHARE = 0.005;
/** A matrix of more columns than this can't be read. */
const MAX_CORRELATIONS = 10;

/** What `predict` found, as tables: links on three scales, what limits them, sites, clocks, correlations. */
export function predictionReport(prediction: Prediction, campaign: Campaign, options: PredictionReportOptions): Report {
  const tables = [
    linksTable(prediction),
    budgetTable(prediction, options),
    sitesTable(prediction, campaign),
    determinationsTable(prediction),
    checksTable(prediction.checks),
    clocksTable(prediction),
    correlationsTable(prediction, options.full),
  ].filter((table): table is Table => table !== null && table.rows.length > 0);
  return {
    title: campaign.title ?? options.title,
    sentences: sentences(prediction),
    tables,
    conventions: [tideNote(prediction.tide), SIGN_NOTE, referencePotentialNote(campaign)],
    cautions: prediction.warnings,
    provenance: options.provenance,
  };
}

/** Largest first: what a reader with one minute must know. */
function sentences({ links, combination }: Prediction): string[] {
  const predicted = links.filter((link) => link.y !== null && link.dH !== null && link.y.u > 0);
  const found: string[] = [];
  if (predicted.length > 0) {
    const worst = predicted.reduce((a, b) => (b.y!.u > a.y!.u ? b : a));
    const which = predicted.length === 1 ? `Link ${worst.id}` : `The least certain link, ${worst.id},`;
    found.push(
      `${which} is predicted to ${formatLength(worst.dH!.u, 2)}, ${sizeText(worst.y!.u)}. ${limitSentence(worst.budget)}`,
    );
  }
  if (combination !== null)
    found.push(
      `Redundant determinations: χ² = ${sizeText(combination.chi2, 3)} on ${combination.dof} ${combination.dof === 1 ? 'degree' : 'degrees'} of freedom, p = ${sizeText(combination.p)}.`,
    );
  return found;
}

function linksTable({ links }: Prediction): Table {
  return {
    id: 'links',
    title: 'Links: the offset that gravity alone makes',
    columns: [
      textColumn('link'),
      textColumn('from'),
      textColumn('to'),
      estimateColumn('length', METRES.unit),
      estimateColumn('ΔW', POTENTIAL.unit),
      estimateColumn('y', OFFSET.unit),
      estimateColumn('normal height', METRES.unit),
      estimateColumn('offset', HERTZ.unit),
    ],
    rows: links.map((link) => [
      textCell(link.id),
      textCell(link.from),
      textCell(link.to),
      estimateCell(link.dH, METRES, 'signed'),
      estimateCell(link.dW, POTENTIAL, 'signed'),
      estimateCell(link.y, OFFSET, 'signed'),
      estimateCell(link.dHNormal, METRES, 'signed'),
      estimateCell(link.offsetHz, HERTZ, 'signed'),
    ]),
    notes: [LENGTH_NOTE, 'offset is y times the recommended frequency of the second clock (to).'],
  };
}

function budgetTable({ links }: Prediction, { full, links: chosen }: PredictionReportOptions): Table {
  const wanted = chosen.length > 0 ? links.filter(({ id }) => chosen.includes(id)) : links;
  const whole = full || chosen.length > 0;
  const rowsOf = ({ budget }: LinkPrediction): readonly BudgetRow[] =>
    whole
      ? budget
      : links.length > MAX_BUDGETS
        ? budget.slice(0, 1)
        : budget.filter((row, i) => i === 0 || Math.abs(row.share) >= SMALL_SHARE);
  return {
    id: 'budget',
    title: BUDGET_TITLE,
    columns: [textColumn('link'), ...budgetColumns],
    rows: wanted.flatMap((link) => {
      const shown = rowsOf(link);
      const rest = link.budget.slice(shown.length);
      const id = (i: number) => textCell(whole || i === 0 ? link.id : '');
      const rows = shown.map((row, i) => [id(i), ...budgetCells(row)]);
      return rest.length === 0 ? rows : [...rows, [textCell(''), ...restCells(rest)]];
    }),
    notes: [
      SHARE_NOTE,
      ...(!whole && links.length > MAX_BUDGETS ? ['Largest input of each link; --link ID prints a whole budget.'] : []),
    ],
  };
}

function sitesTable({ sites }: Prediction, campaign: Campaign): Table {
  return {
    id: 'sites',
    title: 'Sites: potential at the marker',
    columns: [
      textColumn('site'),
      estimateColumn('W', POTENTIAL.unit),
      estimateColumn('C', POTENTIAL.unit),
      textColumn('determined by'),
    ],
    rows: sites.map((site, i) => [
      textCell(site.id),
      estimateCell(site.W, POTENTIAL),
      estimateCell(site.C, POTENTIAL),
      textCell(determinedBy(campaign.sites[i])),
    ]),
    notes: ["C = W₀ − W with the W₀ of the site's first determination."],
  };
}

const determinedBy = (site: Site | undefined): string =>
  site?.determinations
    .filter(({ check, candidate }) => !check && !candidate)
    .map(({ kind }) => kind)
    .join(', ') || 'nothing';

/** Only where a site has several: else it says what the sites' table says. */
function determinationsTable({ sites }: Prediction): Table | null {
  const several = sites.filter(({ determinations }) => determinations.length > 1);
  if (several.length === 0) return null;
  return {
    id: 'determinations',
    title: 'Determinations: each alone, and its distance from the combined W',
    columns: [
      textColumn('site'),
      numberColumn('no.', null),
      textColumn('kind'),
      estimateColumn('W', POTENTIAL.unit),
      numberColumn('minus combined', POTENTIAL.unit),
    ],
    rows: several.flatMap((site) =>
      site.determinations.map(({ kind, W }, i) => [
        textCell(site.id),
        decimalCell(i, 0),
        textCell(kind),
        estimateCell(W, POTENTIAL),
        W === null || site.W === null ? notComputed : decimalCell(W.value - site.W.value, 3, 'signed'),
      ]),
    ),
    notes: [],
  };
}

function clocksTable({ clocks }: Prediction): Table {
  return {
    id: 'clocks',
    title: 'Clocks: against Terrestrial Time',
    columns: [
      textColumn('clock'),
      textColumn('site'),
      estimateColumn('W', POTENTIAL.unit),
      estimateColumn('redshift', OFFSET.unit),
      estimateColumn('correction', OFFSET.unit),
    ],
    rows: clocks.map(({ id, site, W, redshift }) => [
      textCell(id),
      textCell(site),
      estimateCell(W, POTENTIAL),
      estimateCell(redshift, OFFSET, 'signed'),
      estimateCell(redshift && { value: -redshift.value, u: redshift.u }, OFFSET, 'signed'),
    ]),
    notes: [
      'redshift: how much faster the clock runs than Terrestrial Time; correction: what to add to its frequency.',
    ],
  };
}

function correlationsTable({ correlations: { links, matrix } }: Prediction, full: boolean): Table | null {
  if (links.length < 2 || (!full && links.length > MAX_CORRELATIONS)) return null;
  return {
    id: 'correlations',
    title: 'Correlations of y between the links',
    columns: [textColumn('link'), ...links.map((id) => numberColumn(id, null))],
    rows: links.map((id, i) => [textCell(id), ...links.map((_, j) => decimalCell(matrix[i]![j]!, 3))]),
    notes: [],
  };
}
