import type { Estimate, LinkPrediction } from '../../lib/answers/prediction.js';
import type { Section, SectionClock, SectionSite, ThreeScales } from '../../lib/answers/section.js';
import type { Campaign, Link } from '../../lib/campaign/campaign.js';
import { formatConcise, formatLength } from '../../lib/quantity/index.js';
import { estimateText, METRES, OFFSET, POTENTIAL, type Scale, type SignStyle } from '../../lib/report/numbers.js';
import { num, type RichText, sym, word } from '../shared/rich-text.js';

/** A name without what stands behind its first comma: `Marnfeld institute, pillar 3` → `Marnfeld institute`. */
export const shortName = (name: string): string => name.split(',')[0]!.trim();

/** The three scales of a value, in their order, without units. */
export interface ScaleTexts {
  readonly length: string;
  readonly potential: string;
  readonly offset: string;
}

/** As the tables print it, with no more digits of u than the source gave. */
const inScale = (estimate: Estimate, scale: Scale, sign: SignStyle, digits: 1 | 2): string =>
  estimate.u > 0 && digits === 1
    ? formatConcise(estimate.value, estimate.u, {
        scale: scale.power,
        digits,
        sign: sign === 'signed' ? 'always' : 'negative',
      })
    : estimateText(estimate, scale, sign);

export const scaleTexts = (
  { length, potential, offset }: ThreeScales,
  sign: SignStyle,
  digits: 1 | 2 = 2,
): ScaleTexts => ({
  length: inScale(length, METRES, sign, digits),
  potential: inScale(potential, POTENTIAL, sign, digits),
  offset: inScale(offset, OFFSET, sign, digits),
});

export const linkTexts = ({ dH, dW, y }: LinkPrediction): ScaleTexts | null =>
  dH && dW && y ? scaleTexts({ length: dH, potential: dW, offset: y }, 'unsigned') : null;

export const siteW = ({ W }: SectionSite): string => estimateText(W, POTENTIAL);
export const siteC = ({ C }: SectionSite): string => estimateText(C, POTENTIAL);
export const siteHeight = ({ normalHeight }: SectionSite): string => estimateText(normalHeight, METRES);
export const clockC = ({ C }: SectionClock): string => estimateText(C, POTENTIAL);

/** `r1 to p1, fibre, 640 km` */
export function linkEnds(link: Link): string {
  const kind = link.kind === null ? '' : `, ${link.kind}`;
  const length = link.lengthM === null ? '' : `, ${formatLength(link.lengthM)}`;
  return `${link.from} to ${link.to}${kind}${length}`;
}

/** First line of a link's label: `rp fibre, 640 km`. */
export const linkHead = (link: Link): string =>
  [link.id, [link.kind, link.lengthM === null ? null : formatLength(link.lengthM)].filter((s) => s !== null).join(', ')]
    .filter((s) => s !== '')
    .join(' ');

/** A height difference for a sentence: whole metres from a hundred on, three digits below. */
const size = (metres: number): RichText => [
  num(Math.abs(metres) >= 100 ? `${Math.round(Math.abs(metres))}\u00a0m` : formatLength(Math.abs(metres), 3)),
];

/** Who lies how far above whom, in normal heights; what its uncertainty covers is one level. */
function heights({ sites, highest }: Section): RichText {
  if (!highest) return ['No site of the campaign has a level to be drawn at.'];
  const nameOf = (id: string) => shortName(sites.find((site) => site.id === id)!.name);
  const name = nameOf(highest.id);
  const { above } = highest;
  if (above.length === 0) return [`${name} alone has a level.`];
  if (above.length > 2) {
    const { id, height } = above.at(-1)!;
    return [
      `Of ${sites.length} sites, ${name} is the highest, `,
      ...size(height.value),
      ` above ${nameOf(id)}, the lowest.`,
    ];
  }
  const parts = above.map(
    ({ id, height: { value, u } }): RichText =>
      value > 2 * u
        ? [...size(value), ` above ${nameOf(id)}`]
        : [`on one level with ${nameOf(id)} to `, num(formatLength(u, 2))],
  );
  return [`${name} lies `, ...parts.flatMap((part, i): RichText => (i === 0 ? part : [' and ', ...part])), '.'];
}

function tie(clock: SectionClock | null): RichText {
  if (!clock?.sum) return [];
  const { value, u } = clock.sum.length;
  const known: RichText = u > 0 ? [', known to ', num(formatLength(u, 2))] : [', exact'];
  return [
    ' The tie of ',
    word(clock.id),
    ', from marker to atoms, is ',
    num(`${formatConcise(Math.abs(Number(value.toFixed(4))), null)} m`),
    ` ${value < 0 ? 'downward' : 'upward'}`,
    ...known,
    '.',
  ];
}

/** The finding, in two sentences. */
export const sentence = (section: Section, loupe: SectionClock | null): RichText => [
  ...heights(section),
  ...tie(loupe),
];

/** What the picture is and isn't. */
export const notes = (section: Section, multiple: number, broken: boolean, campaign: Campaign): RichText => [
  'The metre scale is ',
  sym('C'),
  ' divided by ',
  num(`${section.scaleGravity.toFixed(4)} m/s²`),
  ': a length equivalent, for reading only.',
  ...(broken ? [' The scale is the same above and below a break.'] : []),
  ' Horizontal positions are not to scale and no terrain is drawn: the file holds none.',
  ...(section.sites.length > 0 && multiple > 0 ? [' Thickness of links is read vertically.'] : []),
  ' ',
  sym('C'),
  ' = ',
  sym('W', '0'),
  `(IHRS) − `,
  sym('W'),
  `, ${campaign.tide} tide.`,
];

/** What a break of the scale leaves out: `8240 m²/s² (839 m) left out`. */
export function leftOut(potentialM2s2: number, scaleGravity: number, narrow: boolean): string {
  const metres = formatLength(potentialM2s2 / scaleGravity, 3);
  return narrow
    ? `${metres} left out`
    : `${formatConcise(Number(potentialM2s2.toPrecision(3)), null)} m²/s² (${metres}) left out`;
}
