import {
  type LabelToPlace,
  type LineSpot,
  lineObstacles,
  type Obstacle,
  placeLabels,
  spotsAlong,
} from './place-labels.js';
import type { PlacedClock, PlacedLink, PlacedSite, SectionLink, SectionPlanInput } from './section-plan.js';
import type { SectionScale } from './section-scale.js';
import { textWidth } from './text-width.js';

/** What is drawn, before it is written on. */
export interface Unlabelled {
  readonly scale: SectionScale;
  readonly height: number;
  readonly zeroFits: boolean;
  readonly left: number;
  readonly plotWidth: number;
  /** px from site to site */
  readonly apart: number;
  readonly sites: readonly Omit<PlacedSite, 'label' | 'lines'>[];
  readonly clocks: readonly Omit<PlacedClock, 'label'>[];
  readonly links: readonly Omit<PlacedLink, 'label' | 'lines'>[];
}

export interface SectionLabels {
  readonly placed: ReadonlyMap<string, LineSpot | null>;
  readonly breaks: readonly (LineSpot & { readonly text: string })[];
  /** per site, in order: the lines that there is room for */
  readonly siteLines: readonly (readonly string[])[];
  readonly linkLines: (link: SectionLink) => readonly string[];
}

/** With more links than this a label is the id alone; with more than the second only that of the link in hand is written. */
const MANY_LINKS = 12;
const VERY_MANY_LINKS = 40;
const LINE_PX = 15;

/** What labels keep off. */
function obstaclesOf(
  { scale, left, plotWidth, zeroFits, sites, clocks, links }: Unlabelled,
  underLoupe: string | null,
): Obstacle[] {
  const obstacles: Obstacle[] = [
    ...sites.map(({ x, y, half, groundFrom, groundTo }) => ({
      box: {
        x: Math.min(groundFrom, x),
        y: y - Math.max(half, 4),
        width: groundTo - groundFrom,
        height: 2 * Math.max(half, 6),
      },
      weight: 10,
    })),
    ...clocks.map(({ x, y, markerY, rungs }) => {
      const top = Math.min(y, markerY, ...rungs) - 7;
      return { box: { x: x - 8, y: top, width: 16, height: Math.max(y, markerY, ...rungs) + 7 - top }, weight: 25 };
    }),
    ...links.flatMap(({ a, b, half }) => [
      ...lineObstacles(a, b, 3, 4),
      ...(half > 3 ? lineObstacles(a, b, half, links.length > MANY_LINKS ? 0.2 : 2) : []),
    ]),
    ...scale.breaks.map(({ top, bottom }) => ({
      box: { x: left, y: top, width: plotWidth, height: bottom - top },
      weight: 1.5,
    })),
  ];
  // the level that is carried over to the loupe
  for (const { clock, x, markerY } of clocks)
    if (clock.id === underLoupe)
      obstacles.push({ box: { x, y: markerY - 2, width: left + plotWidth - x, height: 4 }, weight: 6 });
  if (zeroFits) obstacles.push({ box: { x: left, y: scale.toPx(0) - 2, width: plotWidth, height: 4 }, weight: 2.5 });
  return obstacles;
}

/** Over the reference level at its right or left end; in a narrow plate under it. */
function zeroSpots({ zeroLabel, narrow }: SectionPlanInput, zeroY: number, left: number, right: number): LineSpot[] {
  const width = textWidth(zeroLabel, 11);
  const y = narrow ? zeroY + 4 : zeroY - 18;
  return [right - width - 2, left + 6, (left + right - width) / 2].map((x) => ({
    x,
    y,
    width,
    height: 14,
    anchor: 'start',
  }));
}

type Label = LabelToPlace<LineSpot>;

function siteLabelsOf(
  input: SectionPlanInput,
  { sites, clocks, apart }: Unlabelled,
): readonly (Label & { readonly lines: readonly string[] })[] {
  const mean = sites.reduce((sum, one) => sum + one.y, 0) / sites.length;
  return sites.map(({ site, x, y, half, groundFrom, groundTo }) => {
    const all = input.siteLines(site);
    const nameWidth = textWidth(all[0]!, 15);
    const widest = Math.max(nameWidth, ...all.slice(1).map((line) => textWidth(line, 12)));
    const lines = widest > apart * 0.98 ? all.slice(0, 1) : all;
    const boxWidth = lines.length === 1 ? nameWidth : widest;
    const boxHeight = 18 + LINE_PX * (lines.length - 1);
    const lift = Math.max(half, 5) + 5;
    const centre = (groundFrom + groundTo) / 2;
    const centres = [x, centre, (x + centre) / 2, x - boxWidth * 0.45, x + boxWidth * 0.45];
    const here = clocks.filter(({ clock }) => clock.site === site.id).flatMap((c) => [c.y, ...c.rungs]);
    const over = Math.min(y - lift, ...here.map((level) => level - 14)) - boxHeight;
    const under = Math.max(y + lift, ...here.map((level) => level + 14));
    const beside = [
      { x: Math.min(groundFrom, x) - boxWidth - 8, y: y - boxHeight / 2 },
      { x: Math.max(groundTo, x) + 12, y: y - boxHeight / 2 },
    ];
    const row = (top: number) => centres.map((c) => ({ x: c - boxWidth / 2, y: top }));
    // above what is high and below what is low, close to the ground first, then clear of the ladder
    const upward = [...row(y - lift - boxHeight), ...row(over)];
    const downward = [...row(y + lift), ...row(under)];
    const spots = y <= mean ? [...upward, ...beside, ...downward] : [...downward, ...beside, ...upward];
    return {
      id: `site ${site.id}`,
      lines,
      essential: true,
      spots: spots.map((spot) => ({ ...spot, width: boxWidth, height: boxHeight, anchor: 'middle' as const })),
    };
  });
}

function clockLabelsOf({ clocks, links }: Unlabelled): readonly Label[] {
  return clocks.map(({ clock, x, y }) => {
    const width = textWidth(clock.id, 12, true);
    return {
      id: `clock ${clock.id}`,
      essential: links.length <= VERY_MANY_LINKS,
      spots: [
        { x: x + 9, y: y - 16 },
        { x: x - 9 - width, y: y - 16 },
        { x: x + 9, y: y + 3 },
        { x: x - 9 - width, y: y + 3 },
        { x: x + 11, y: y - 7 },
        { x: x - 11 - width, y: y - 7 },
        { x: x - width / 2, y: y + 8 },
        { x: x - width / 2, y: y - 22 },
      ].map((spot) => ({ ...spot, width, height: 13, anchor: 'start' as const })),
    };
  });
}

function breakLabelsOf(
  input: SectionPlanInput,
  { scale, left, plotWidth }: Unlabelled,
): readonly (Label & { readonly text: string })[] {
  return scale.breaks.map(({ top, bottom, leftOut }, i) => {
    const text = input.leftOut(leftOut);
    const width = textWidth(text, 12);
    const y = (top + bottom) / 2 - 8;
    const xs = [left + 12, left + plotWidth - width - 12, left + plotWidth / 2 - width / 2];
    return {
      id: `break ${i}`,
      text,
      essential: true,
      spots: xs.map((x) => ({ x, y, width, height: 15, anchor: 'start' as const })),
    };
  });
}

/** Everything that is written on a section, the most needed first. */
export function sectionLabels(input: SectionPlanInput, drawn: Unlabelled): SectionLabels {
  const { scale, height, zeroFits, left, plotWidth, links } = drawn;
  const linesOf = (link: SectionLink) =>
    input.narrow || links.length > MANY_LINKS ? [link.lines[0]!.split(' ')[0]!] : link.lines;
  const linkLabels = links
    .filter(({ link }) => links.length <= VERY_MANY_LINKS || link.id === input.inHand)
    .sort((p, q) => Number(q.link.id === input.inHand) - Number(p.link.id === input.inHand))
    .map(({ link, a, b, half }) => {
      const lines = linesOf(link);
      const width = Math.max(...lines.map((line, i) => textWidth(line, 12, i === 1)));
      return {
        id: `link ${link.id}`,
        essential: false,
        spots: spotsAlong(a, b, half, width, LINE_PX * lines.length),
      };
    });
  const breakLabels = breakLabelsOf(input, drawn);
  const siteLabels = siteLabelsOf(input, drawn);
  const zeroLabel = { id: 'zero', essential: true, spots: zeroSpots(input, scale.toPx(0), left, left + plotWidth) };
  const placed = placeLabels<LineSpot>(
    [...breakLabels, ...clockLabelsOf(drawn), ...siteLabels, ...(zeroFits ? [zeroLabel] : []), ...linkLabels],
    obstaclesOf(drawn, input.underLoupe(scale)),
    { x: left + 2, y: 0, width: plotWidth - 4, height: height + 4 },
  );
  return {
    placed,
    breaks: breakLabels.map(({ id, text }) => ({ ...placed.get(id)!, text })),
    siteLines: siteLabels.map(({ lines }) => lines),
    linkLines: linesOf,
  };
}
