import type { BreakEven, LinkBreakEven } from '../answers/break-even.js';
import type { GnssOverDistance, LevellingOverDistance } from '../answers/classical-methods.js';
import type { Campaign } from '../campaign/campaign.js';
import { MM_PER_ROOT_KM } from '../model/levelling-classes.js';
import { formatDays, formatLength } from '../quantity/index.js';
import { sizeCell, sizeText } from './numbers.js';
import { partText } from './plan-words.js';
import { type Cell, none, numberColumn, type Report, textCell, textColumn } from './table.js';

/** More links than this are not told one by one. */
const MAX_SENTENCES = 4;

const METHOD_NAMES = { clocks: 'clocks', levelling: 'levelling', gnss: 'GNSS and geoid' } as const;

/** What `break-even` found. */
export function breakEvenReport(
  answer: BreakEven,
  campaign: Campaign,
  options: { readonly title: string; readonly provenance: string },
): Report {
  return {
    title: campaign.title ?? options.title,
    sentences: breakEvenSentences(answer, campaign),
    tables: [
      {
        id: 'links',
        title: 'Standard uncertainty of the height difference by each method',
        columns: [
          textColumn('link'),
          numberColumn('distance', 'km'),
          numberColumn('clocks', 'mm'),
          numberColumn('levelling', 'mm'),
          numberColumn('GNSS and geoid', 'mm'),
          textColumn('smallest'),
          textColumn('better than levelling'),
          textColumn('better than GNSS'),
          textColumn('what limits the clocks'),
          numberColumn('without it', 'mm'),
        ],
        rows: answer.links.map((l) => [
          textCell(l.id),
          sizeCell(l.distance / 1000, 3),
          millimetres(l.clocks),
          millimetres(l.levelling),
          millimetres(l.gnss),
          l.best === null ? none : textCell(METHOD_NAMES[l.best]),
          beyondCell(l, answer.levelling, 'levelling'),
          beyondCell(l, answer.gnss, 'gnss'),
          l.limit ? textCell(partText(l.limit, campaign)) : none,
          millimetres(l.withoutLimit),
        ]),
        notes: ['better than …: clocks as good as these are, over any distance beyond that.'],
      },
      {
        id: 'curve',
        title: 'The classical methods over distance',
        columns: [
          numberColumn('distance', 'km'),
          numberColumn('levelling', 'mm'),
          numberColumn('GNSS and geoid', 'mm'),
        ],
        rows:
          answer.levelling === null && answer.gnss === null
            ? []
            : answer.curve.map((p) => [sizeCell(p.distance / 1000, 3), millimetres(p.levelling), millimetres(p.gnss)]),
        notes: [],
      },
    ].filter(({ rows }) => rows.length > 0),
    conventions: [levellingNote(answer.levelling), gnssNote(answer.gnss), clocksNote(answer)],
    cautions: answer.warnings,
    provenance: options.provenance,
  };
}

const millimetres = (lengthM: number | null): Cell => (lengthM === null ? none : sizeCell(1000 * lengthM, 3));

function beyondCell(l: LinkBreakEven, model: object | null, method: 'levelling' | 'gnss'): Cell {
  if (model === null || l.clocks === null) return none;
  return textCell(beyondText(l.beyond[method]));
}

/** A break-even distance: `beyond 132 km`, `everywhere`, `never`. */
export const beyondText = (distanceM: number | null): string =>
  distanceM === null ? 'never' : distanceM === 0 ? 'everywhere' : `beyond ${formatLength(distanceM)}`;

/** Worth it or not, link by link. */
export function breakEvenSentences(answer: BreakEven, campaign: Campaign): string[] {
  if (answer.links.length === 0) return ['The campaign has no links between clocks.'];
  if (answer.levelling === null && answer.gnss === null)
    return [
      'There is nothing to compare with: state "methods" in the campaign, or give --b and --k, a class with --levelling, or --gnss-h and --geoid.',
    ];
  if (answer.links.length > MAX_SENTENCES) {
    const won = answer.links.filter(({ best }) => best === 'clocks').length;
    return [`Clocks are the best of the methods over ${won} of ${answer.links.length} links.`];
  }
  return answer.links.map((l) => linkSentence(l, answer, campaign));
}

function linkSentence(l: LinkBreakEven, answer: BreakEven, campaign: Campaign): string {
  if (l.clocks === null) return `Link ${l.id} never runs.`;
  const over = `Link ${l.id}, ${formatLength(l.distance)}: clocks ${formatLength(l.clocks, 2)}`;
  const others = (['levelling', 'gnss'] as const).flatMap((m) =>
    l[m] === null ? [] : [`${METHOD_NAMES[m]} ${formatLength(l[m], 2)}`],
  );
  const passes = (['levelling', 'gnss'] as const).flatMap((m) =>
    answer[m] === null ? [] : [[METHOD_NAMES[m], l.beyond[m]] as const],
  );
  const never = passes.filter(([, d]) => d === null).map(([name]) => name);
  const where = passes.flatMap(([name, d]) =>
    d === null ? [] : [d === 0 ? `${name} at any distance` : `${name} beyond ${formatLength(d)}`],
  );
  const cost =
    never.length > 0 && l.limit && l.withoutLimit !== null
      ? ` Without the ${partText(l.limit, campaign)} it would be ${formatLength(l.withoutLimit, 2)}.`
      : '';
  return `${[over, ...others].join(', ')}. Such clocks ${[
    where.length > 0 ? `pass ${where.join(' and ')}` : '',
    never.length > 0 ? `${where.length > 0 ? 'but ' : ''}never pass ${never.join(' nor ')}` : '',
  ]
    .filter(Boolean)
    .join(', ')}.${cost}`;
}

const ORIGINS: Readonly<Record<string, string>> = {
  option: 'as given',
  methods: 'as the campaign states under "methods"',
  'levelled-from': 'from the levelled lines of the campaign',
  gnss: 'as the determinations of the campaign state, correlated by their sources',
};

const originText = (origin: string): string => ORIGINS[origin] ?? `of the published class ${origin}`;

/** b, k and detour, and whose they are. */
export function levellingNote(model: LevellingOverDistance | null): string {
  if (model === null) return 'Levelling: no b and k stated.';
  const b = `${sizeText(model.bRootM / MM_PER_ROOT_KM)}\u00a0mm/√km`;
  const k = `${sizeText(1e6 * model.k)}\u00a0mm/km`;
  const detour =
    model.detour === 1
      ? 'length of the line taken as the geodesic'
      : `line ${sizeText(model.detour, 3)} times the geodesic`;
  const from =
    model.reference === undefined ? originText(model.origin) : `${originText(model.origin)} (${model.reference})`;
  return `Levelling: u = b·√d ⊕ k·d with b = ${b}, k = ${k}, ${from}; ${detour}.`;
}

/** Sizes at a site, and whose they are. */
export function gnssNote(model: GnssOverDistance | null): string {
  if (model === null) return 'GNSS and geoid: nothing stated.';
  const all = Math.sqrt(model.pieces.reduce((s, p) => s + p.variance, 0));
  return `GNSS and geoid: ${formatLength(all, 2)} a site, ${originText(model.origin)}; the curve is for sites of that kind.`;
}

export const clocksNote = ({ time }: BreakEven): string =>
  `Clocks: u of the comparison over ${formatDays(time)} on the wall, without the ties to the markers.`;
