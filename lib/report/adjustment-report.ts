import type { Adjustment, LoopClosure, UnknownEstimate } from '../answers/adjustment.js';
import type { Campaign } from '../campaign/campaign.js';
import { formatLength } from '../quantity/index.js';
import { referencePotentialNote, SIGN_NOTE, tideNote } from './conventions.js';
import { decimalCell, estimateCell, OFFSET, POTENTIAL, sizeCell, sizeText } from './numbers.js';
import {
  type Cell,
  estimateColumn,
  none,
  numberColumn,
  type Report,
  type Table,
  textCell,
  textColumn,
} from './table.js';

/** Gravity for a length in a sentence, m/s²; 0.3 % over the Earth. */
const ROUND_GRAVITY = 9.81;

/** What `adjust` found: potentials before and after, datums, observations with their control, loops. */
export function adjustmentReport(
  adjustment: Adjustment,
  campaign: Campaign,
  options: { readonly title: string; readonly provenance: string; readonly planned: boolean },
): Report {
  const tables = [
    sitesTable(adjustment, options.planned),
    datumsTable(adjustment, options.planned),
    observationsTable(adjustment, options.planned),
    loopsTable(adjustment),
  ].filter((t) => t.rows.length > 0);
  return {
    title: campaign.title ?? options.title,
    sentences: sentences(adjustment, options.planned),
    tables,
    conventions: [tideNote(campaign.tide), SIGN_NOTE, referencePotentialNote(campaign)],
    cautions: adjustment.warnings,
    provenance: options.provenance,
  };
}

function sentences({ sites, observations, chi2, dof, p }: Adjustment, planned: boolean): string[] {
  const out: string[] = [];
  const worst = [...sites].sort((a, b) => b.uAfter - a.uAfter)[0];
  if (worst)
    out.push(
      `${planned ? 'With every link run through the window, the' : 'The'} least certain site is ${worst.id}: ${formatLength(worst.uAfter / ROUND_GRAVITY, 2)}${
        worst.uBefore === null
          ? ', unknown before'
          : `, from ${formatLength(worst.uBefore / ROUND_GRAVITY, 2)} by geodesy alone`
      }.`,
    );
  const weakest = observations
    .filter((o) => o.control !== null)
    .sort((a, b) => a.control! - b.control!)
    .at(0);
  if (weakest && dof > 0)
    out.push(
      weakest.smallestDetectable === null
        ? `Nothing controls ${weakest.id}: a mistake in it would not show.`
        : `Weakest is ${weakest.id}: a mistake in it shows from ${formatLength(weakest.smallestDetectable / ROUND_GRAVITY, 2)} on.`,
    );
  if (!planned && chi2 !== undefined && dof > 0)
    out.push(
      `χ² = ${sizeText(chi2, 3)} on ${dof} ${dof === 1 ? 'degree' : 'degrees'} of freedom, p = ${sizeText(p ?? 1)}.`,
    );
  return out;
}

const sizeOrNone = (x: number | null): Cell => (x === null ? none : sizeCell(x));
const fixedOrNone = (x: number | null, digits: number, signed = false): Cell =>
  x === null ? none : decimalCell(x, digits, signed ? 'signed' : 'unsigned');

function sitesTable({ sites }: Adjustment, planned: boolean): Table {
  return {
    id: 'sites',
    title: 'Sites: potential at the marker, before and after',
    columns: [
      textColumn('site'),
      ...(planned ? [] : [estimateColumn('W', POTENTIAL.unit)]),
      numberColumn('u before', POTENTIAL.unit),
      numberColumn('u after', POTENTIAL.unit),
    ],
    rows: sites.map((s) => [
      textCell(s.id),
      ...(s.W === undefined ? [] : [estimateCell({ value: s.W, u: s.uAfter }, POTENTIAL)]),
      sizeOrNone(s.uBefore),
      sizeCell(s.uAfter),
    ]),
    notes: ['before: from the determinations alone; none where they leave the site without a level.'],
  };
}

function datumsTable({ datums }: Adjustment, planned: boolean): Table {
  const row = (id: string, what: string, unit: string, x: UnknownEstimate, scale: number) => [
    textCell(id),
    textCell(what),
    planned ? none : estimateCell({ value: (x.value ?? 0) * scale, u: x.u * scale }, POTENTIAL, 'signed'),
    sizeCell(x.u * scale),
    sizeCell(x.smallestDetectable * scale),
    textCell(unit),
  ];
  // a tilt per metre is a number nobody can read
  const PER_100_KM = 1e5;
  return {
    id: 'datums',
    title: 'Datums: what the network says of their reference potential',
    columns: [
      textColumn('datum'),
      textColumn('unknown'),
      estimateColumn('adjusted minus stated', null),
      numberColumn('u', null),
      numberColumn('smallest detectable', null),
      textColumn('unit'),
    ],
    rows: datums.flatMap((d) => [
      ...(d.offset ? [row(d.id, 'offset of W₀', 'm²/s²', d.offset, 1)] : []),
      ...(d.tilt
        ? [
            row(d.id, 'tilt to the north', 'm²/s² per 100 km', d.tilt.north, PER_100_KM),
            row(d.id, 'tilt to the east', 'm²/s² per 100 km', d.tilt.east, PER_100_KM),
          ]
        : []),
    ]),
    notes: ['1 m²/s² is about 0.10 m of height.'],
  };
}

function observationsTable({ observations, test }: Adjustment, planned: boolean): Table {
  return {
    id: 'observations',
    title: 'Observations: residual, and how well the others control it',
    columns: [
      textColumn('observation'),
      ...(planned ? [] : [numberColumn('residual', POTENTIAL.unit), numberColumn('standardised', null)]),
      numberColumn('redundancy', null),
      numberColumn('control', null),
      numberColumn('smallest detectable', POTENTIAL.unit),
    ],
    rows: observations.map((o) => [
      textCell(o.id),
      ...(planned ? [] : [fixedOrNone(o.residual, 3, true), fixedOrNone(o.standardised, 2, true)]),
      fixedOrNone(o.redundancy, 3),
      fixedOrNone(o.control, 3),
      sizeOrNone(o.smallestDetectable),
    ]),
    notes: [
      'residual = observed − adjusted. control: 0, a mistake would not show, to 1, it would show in full.',
      `smallest detectable: at test size ${test.size} and power ${test.power}. none: exact, or not controlled.`,
    ],
  };
}

function loopsTable({ loops }: Adjustment): Table {
  const walk = ({ links }: LoopClosure) => links.map(({ id, sign }) => `${sign > 0 ? '+' : '−'}${id}`).join(' ');
  return {
    id: 'loops',
    title: 'Loops of links: gravity and clocks cancel, the sum must be zero',
    columns: [
      textColumn('loop'),
      estimateColumn('closure', OFFSET.unit),
      numberColumn('u', OFFSET.unit),
      numberColumn('z', null),
      textColumn('noise'),
    ],
    rows: loops.map((l) => [
      textCell(walk(l)),
      l.closure.value === undefined ? none : estimateCell({ value: l.closure.value, u: l.closure.u }, OFFSET, 'signed'),
      sizeCell(l.closure.u * 1e18),
      fixedOrNone(l.z, 2, true),
      textCell(l.simultaneous ? 'links alone' : 'clocks and links'),
    ]),
    notes: ['links alone: measured at the same time, so that the noise of the clocks cancels too.'],
  };
}
