import type { Design, DesignStep } from '../answers/design.js';
import type { Campaign } from '../campaign/campaign.js';
import { formatLength } from '../quantity/index.js';
import { sizeCell, sizeText } from './numbers.js';
import { type Cell, none, notComputed, numberColumn, type Report, type Table, textCell, textColumn } from './table.js';

const ROUND_GRAVITY = 9.81;

/** What `design` found: each item alone, the greedy order, the best set. */
export function designReport(
  design: Design,
  campaign: Campaign,
  options: { readonly title: string; readonly provenance: string; readonly aim: string; readonly removal: boolean },
): Report {
  return {
    title: campaign.title ?? options.title,
    sentences: sentences(design, options),
    tables: [
      stepsTable(
        design,
        'ranking',
        options.removal ? 'Each observation left out alone' : 'Each candidate alone',
        design.ranking,
        options.removal,
      ),
      stepsTable(
        design,
        'steps',
        options.removal ? 'One after the other, the most idle first' : 'One after the other, the best first',
        design.steps,
        options.removal,
      ),
    ].filter((t) => t.rows.length > 0),
    conventions: [
      'Every link is taken as run through the window, measured ones with their stated uncertainty.',
      `Aim ${options.aim}: ${AIM_WORDS[options.aim.split(':')[0]!] ?? options.aim}. Smaller is better.`,
    ],
    cautions: [],
    provenance: options.provenance,
  };
}

const AIM_WORDS: Readonly<Record<string, string>> = {
  'worst-site': 'the standard uncertainty of W at the least certain site, m²/s²',
  mean: 'the mean standard uncertainty of W over the sites, m²/s²',
  offset: 'the standard uncertainty of the datum’s offset, m²/s²',
  tilt: 'the larger standard uncertainty of the datum’s tilt to the north and to the east, m²/s² per m',
};

function sentences(design: Design, { removal }: { readonly removal: boolean }): string[] {
  const words = (aim: number | null) =>
    aim === null
      ? 'undetermined'
      : design.unit === 'm²/s²'
        ? `${sizeText(aim)} m²/s², ${formatLength(aim / ROUND_GRAVITY, 2)}`
        : `${sizeText(aim * 1e5)} m²/s² per 100 km`;
  const [first] = design.ranking;
  const out = [`The aim stands at ${words(design.aim)}.`];
  if (!first) out.push(removal ? 'There is nothing to take away.' : 'Nothing is marked "candidate": true.');
  else if (removal) out.push(`Most idle is ${first.id}: without it ${words(first.aim)}.`);
  else out.push(`Best is ${first.id}: with it ${words(first.aim)}.`);
  if (design.best && design.best.ids.length > 1 && design.best.ids.length < design.ranking.length)
    out.push(
      `The best ${design.best.ids.length} together are ${design.best.ids.join(', ')}: ${words(design.best.aim)}.`,
    );
  return out;
}

function stepsTable(design: Design, id: string, title: string, steps: readonly DesignStep[], removal: boolean): Table {
  const number = (x: number | null): Cell => (x === null ? notComputed : sizeCell(x, 3));
  const costed = steps.some((s) => s.cost !== null);
  return {
    id,
    title,
    columns: [
      textColumn(removal ? 'observation' : 'candidate'),
      numberColumn(removal ? 'aim without it' : 'aim with it', design.unit),
      numberColumn('gain', design.unit),
      ...(costed ? [numberColumn('cost'), numberColumn('gain per cost', design.unit)] : []),
    ],
    rows: steps.map((s) => [
      textCell(s.id),
      number(s.aim),
      number(s.gain),
      ...(costed
        ? [
            s.cost === null ? none : sizeCell(s.cost, 6),
            s.cost === null || s.gain === null || s.cost === 0 ? none : sizeCell(s.gain / s.cost, 3),
          ]
        : []),
    ]),
    notes: ['not computed: something would be left undetermined.'],
  };
}
