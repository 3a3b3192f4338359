import { nothing, type SVGTemplateResult, svg } from 'lit';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../lib/constants/defining-constants.js';
import { multiples, roundStep, stepLabel } from '../charts/round-step.js';
import type { PlacedClock, PlacedLink, PlacedSite, SectionPlan } from '../charts/section-plan.js';
import type { SectionScale } from '../charts/section-scale.js';
import { svgNumber } from '../charts/svg-number.js';

/** What the reader points at or holds. */
export interface Mark {
  readonly kind: 'site' | 'clock' | 'link';
  readonly id: string;
}
export const markKey = ({ kind, id }: Mark): string => `${kind} ${id}`;

/** What the figure is told by the element. */
export interface FigureOptions {
  readonly inHand: string | null;
  readonly pointed: Mark | null;
  /** class of the line of a link */
  readonly lineClass: (id: string) => string;
  /** spoken name of a mark, its numbers included */
  readonly label: (mark: Mark) => string;
  /** the one mark that Tab reaches */
  readonly tabStop: string;
  readonly narrow: boolean;
}

const TICK_PX = 6;
const MINOR_PX = 3;
const LABEL_APART_PX = 30;

interface AxisOptions {
  readonly x: number;
  /** −1: ticks and labels to the left of the line, 1: to the right */
  readonly side: -1 | 1;
  readonly head: SVGTemplateResult;
  readonly unit: string;
  /** m²/s² per unit of the axis */
  readonly perUnit: number;
}

/** One of the scales: the same levels in another unit. */
function axis(scale: SectionScale, { x, side, head, unit, perUnit }: AxisOptions): SVGTemplateResult {
  const step = roundStep(LABEL_APART_PX / (scale.pxPerUnit * perUnit));
  // fifths or halves, whichever are round
  const minor = String(step)
    .replace(/[0.]|e.*/g, '')
    .startsWith('2')
    ? step / 4
    : step / 5;
  const anchor = side < 0 ? 'end' : 'start';
  const lines = scale.pieces.map((piece, i) => {
    const broken = { below: i > 0, above: i < scale.pieces.length - 1 };
    const labelled = multiples(step, piece.from / perUnit, piece.to / perUnit).filter((value) => {
      const y = scale.toPx(value * perUnit);
      return y > piece.top + (broken.above ? 10 : 2) && y < piece.bottom - (broken.below ? 10 : 0);
    });
    const minors = multiples(minor, piece.from / perUnit, piece.to / perUnit);
    const y = (value: number) => (piece.bottom - (value * perUnit - piece.from) * scale.pxPerUnit).toFixed(1);
    const zig = (at: number, up: 1 | -1) => `M${x - 5} ${at}l3 0l2 ${-5 * up}l4 ${8 * up}l2 ${-3 * up}`;
    return svg`<line x1=${x} x2=${x} y1=${piece.top} y2=${piece.bottom} class="s-axis"/>
      <path d=${minors.map((value) => `M${x} ${y(value)}h${side * MINOR_PX}`).join('')} class="s-tick"/>
      ${labelled.map(
        (value) => svg`<line x1=${x} x2=${x + side * TICK_PX} y1=${y(value)} y2=${y(value)} class="s-axis"/>
          <text x=${x + side * (TICK_PX + 4)} y=${Number(y(value)) + 4} class="l2" text-anchor=${anchor}>${svgNumber(stepLabel(value, step))}</text>`,
      )}
      ${broken.below ? svg`<path d=${zig(piece.bottom, 1)} class="s-axis"/>` : nothing}
      ${broken.above ? svg`<path d=${zig(piece.top, -1)} class="s-axis"/>` : nothing}`;
  });
  const headX = x + side * -2;
  return svg`<g>
    <text x=${headX} y="8" text-anchor=${anchor}>${head}</text>
    <text x=${headX} y="22" class="l2" text-anchor=${anchor}>${unit}</text>
    ${lines}
  </g>`;
}

const sy = (text: string) => svg`<tspan class="sy">${text}</tspan>`;
const potentialHead = sy('C');
const lengthHead = svg`${sy('C')}/${sy('g')}`;
const offsetHead = svg`${sy('C')}/${sy('c')}²`;

/** m²/s² to 1e-18 of frequency. */
const PER_OFFSET = SPEED_OF_LIGHT_SQUARED_M2_PER_S2 * 1e-18;

/** Where the scales stand, px; null: not shown, or at the right edge. */
export interface ScalePositions {
  readonly length: number;
  readonly potential: number | null;
  readonly offset: number | null;
}

/** The three scales at the left, always in this order. */
export function sectionScales(
  { scale }: SectionPlan,
  scaleGravity: number,
  { length, potential, offset }: ScalePositions,
): SVGTemplateResult {
  return svg`${axis(scale, { x: length, side: -1, head: lengthHead, unit: 'm', perUnit: scaleGravity })}
    ${potential === null ? nothing : axis(scale, { x: potential, side: -1, head: potentialHead, unit: 'm²/s²', perUnit: 1 })}
    ${offset === null ? nothing : axis(scale, { x: offset, side: -1, head: offsetHead, unit: '1e-18', perUnit: PER_OFFSET })}`;
}

/** The scale of frequency at the right edge of a narrow plate. */
export const rightScale = ({ scale, right }: SectionPlan): SVGTemplateResult =>
  axis(scale, { x: right + 5, side: 1, head: offsetHead, unit: '1e-18', perUnit: PER_OFFSET });

function zigzag(from: number, to: number, y: number): string {
  const apart = 164;
  let path = `M${from} ${y}`;
  for (let x = from + 84; x < to - 30; x += apart) path += `H${x - 6}l3 -5l5 9l3 -4`;
  return `${path}H${to}`;
}

/** Equipotential lines, the reference level, the breaks with what they leave out. */
export function sectionLevels({ scale, left, right, zeroY }: SectionPlan): SVGTemplateResult {
  const lines = scale.pieces.flatMap((piece) =>
    multiples(scale.levelStep, piece.from, piece.to)
      .filter((C) => zeroY === null || Math.abs(C) > scale.levelStep / 2)
      .map((C) => piece.bottom - (C - piece.from) * scale.pxPerUnit)
      .filter((y) => y > piece.top + 3 && y < piece.bottom - 3),
  );
  return svg`<path d=${lines.map((y) => `M${left} ${y.toFixed(1)}H${right}`).join('')} class="s-level"/>
    ${zeroY === null ? nothing : svg`<line x1=${left} x2=${right} y1=${zeroY} y2=${zeroY} class="s-zero"/>`}
    ${scale.breaks.map(
      ({ top, bottom }) => svg`<rect x=${left} y=${top} width=${right - left} height=${bottom - top} class="s-paper"/>
        <path d=${zigzag(left, right, top)} class="s-tick"/><path d=${zigzag(left, right, bottom)} class="s-tick"/>`,
    )}`;
}

/** What each break leaves out, in words. */
export const breakWords = ({ breakLabels }: SectionPlan): SVGTemplateResult[] =>
  breakLabels.map(({ x, y, text }) => svg`<text x=${x} y=${y + 12} class="l2i halo">${svgNumber(text)}</text>`);

/** What the reference level is called: `W₀ 62 636 853.4 m²/s² (IHRS)`, in a narrow plate the symbol alone. */
export function zeroName({ zeroLabel }: SectionPlan, words: string): SVGTemplateResult | typeof nothing {
  if (!zeroLabel) return nothing;
  const [number = '', ...rest] = words.split(' ');
  return svg`<text x=${zeroLabel.x} y=${zeroLabel.y + 12} class="l2 halo">${sy('W')}<tspan class="su" dy="3">0</tspan>${
    words === '' ? nothing : svg`<tspan dy="-3"> ${svgNumber(number)} ${rest.join(' ')}</tspan>`
  }</text>`;
}

/** The levels end at a label: it never stands across a line. */
export const knockOuts = ({ sites, clocks, links }: SectionPlan): SVGTemplateResult[] =>
  [...sites, ...clocks, ...links].flatMap(({ label }) =>
    label
      ? [
          svg`<rect x=${label.x - 5} y=${label.y} width=${label.width + 10} height=${label.height + 1} class="s-paper"/>`,
        ]
      : [],
  );

const classes = (mark: Mark, { inHand, pointed }: FigureOptions): string =>
  `mark ${mark.kind === 'link' && mark.id === inHand ? 'held' : ''} ${pointed && markKey(pointed) === markKey(mark) ? 'pointed' : ''}`;

const role = (mark: Mark, options: FigureOptions, inside: SVGTemplateResult): SVGTemplateResult => svg`<g
  class=${classes(mark, options)}
  data-mark=${markKey(mark)}
  role="button"
  tabindex=${options.tabStop === markKey(mark) ? '0' : '-1'}
  aria-pressed=${mark.kind === 'link' ? (mark.id === options.inHand ? 'true' : 'false') : nothing}
  aria-label=${options.label(mark)}
>${inside}</g>`;

const hatch = (from: number, to: number, y: number): string =>
  Array.from(
    { length: Math.max(0, Math.floor((to - from) / 7)) },
    (_, i) => `M${(from + 7 * (i + 1)).toFixed(1)} ${y}l-6 6`,
  ).join('');

/** A site: its uncertainty as a band, the ground at its marker, the ladder to the atoms of its clocks. */
export function siteMark(
  { site, x, y, half, groundFrom, groundTo }: PlacedSite,
  options: FigureOptions,
): SVGTemplateResult {
  const bandFrom = Math.min(groundFrom, x - 10);
  const bandTo = Math.max(groundTo, x + 10);
  const reach = Math.max(half, 8) + 3;
  const inside = svg`${
    half > 0
      ? svg`<rect x=${bandFrom} y=${y - half} width=${bandTo - bandFrom} height=${2 * half} class="s-band"/>
        <path d="M${bandFrom} ${y - half}H${bandTo}M${bandFrom} ${y + half}H${bandTo}" class="s-edge"/>`
      : nothing
  }
    <line x1=${groundFrom} x2=${groundTo} y1=${y} y2=${y} class="s-ground"/>
    <path d=${hatch(groundFrom, groundTo, y)} class="s-hatch"/>
    <path d="M${x - 5} ${y}a5 5 0 0 1 10 0z" class="s-bolt"/>
    <rect x=${bandFrom - 4} y=${y - reach} width=${bandTo - bandFrom + 8} height=${2 * reach} class="focus"/>
    <rect x=${bandFrom} y=${y - Math.max(half, 12)} width=${bandTo - bandFrom} height=${2 * Math.max(half, 12)} class="hit flat"/>`;
  return role({ kind: 'site', id: site.id }, options, inside);
}

/** Name and numbers of a site, drawn over everything. */
export const siteLabelOf = (
  { site, label, lines }: PlacedSite,
  options: FigureOptions,
): SVGTemplateResult | typeof nothing =>
  label === null
    ? nothing
    : svg`<g data-mark=${`site ${site.id}`} aria-hidden="true" class=${classes({ kind: 'site', id: site.id }, options)}>${siteLabel(label, lines)}</g>`;

function siteLabel(box: { readonly x: number; readonly y: number; readonly width: number }, lines: readonly string[]) {
  const x = box.x + box.width / 2;
  return svg`<text x=${x} y=${box.y + 14} text-anchor="middle" class="sn halo">${lines[0]}</text>
    ${lines.slice(1).map((line, i) => {
      const [symbol = '', ...rest] = line.split(' ');
      return svg`<text x=${x} y=${box.y + 30 + 15 * i} text-anchor="middle" class="${i === 0 ? 'l' : 'l l-2'} halo">${sy(symbol)} ${rest.map((part, k) => svg`${k > 0 ? ' ' : nothing}${svgNumber(part)}`)}</text>`;
    })}`;
}

/** The ladder from the marker: a rung at the end of each step. */
export const ladder = ({ x, y, markerY, rungs }: PlacedClock): SVGTemplateResult => {
  const all = [y, markerY, ...rungs];
  const inner = rungs.slice(0, -1);
  return svg`<line x1=${x} x2=${x} y1=${Math.min(...all)} y2=${Math.max(...all)} class="s-tie"/>
    <path d=${inner.map((rung) => `M${x - 5} ${rung.toFixed(1)}h10`).join('')} class="s-tie"/>`;
};

/** The atoms. `held`: an end of the link in hand. */
export function clockMark(
  { clock, x, y, label }: PlacedClock,
  held: boolean,
  options: FigureOptions,
): SVGTemplateResult {
  const inside = svg`<g class=${held ? 'held' : ''}>
      <circle cx=${x} cy=${y} r="5" class="s-ring"/><circle cx=${x} cy=${y} r="1.8" class="s-dot"/>
      ${label ? svg`<text x=${label.x} y=${label.y + 11} class="lb halo id">${clock.id}</text>` : nothing}
    </g>
    <circle cx=${x} cy=${y} r="10" class="focus"/><circle cx=${x} cy=${y} r="13" class="hit flat"/>`;
  return role({ kind: 'clock', id: clock.id }, options, inside);
}

/** Uncertainty of a link: a band of one vertical thickness at both ends. Drawn below all lines. */
export function linkBand({ a, b, half }: PlacedLink, held: boolean): SVGTemplateResult | typeof nothing {
  if (half <= 0) return nothing;
  const [up, down] = [-half, half].map((d) => [`${a[0]} ${a[1] + d}`, `${b[0]} ${b[1] + d}`] as const) as [Edge, Edge];
  return svg`<g class=${held ? 'held' : ''}><path d="M${up[0]}L${up[1]}L${down[1]}L${down[0]}Z" class="s-rib"/>
    <path d="M${up[0]}L${up[1]}M${down[0]}L${down[1]}" class="s-edge"/></g>`;
}
type Edge = readonly [from: string, to: string];

/** A link: its line, dotted through the breaks with a slash at each edge. */
export function linkMark(
  { link, a, b, half }: PlacedLink,
  { breaks }: SectionScale,
  options: FigureOptions,
): SVGTemplateResult {
  const { whole, gaps, slashes } = throughBreaks(a, b, breaks);
  const reach = Math.max(half, 5) + 4;
  const around = `M${a[0]} ${a[1] - reach}L${b[0]} ${b[1] - reach}V${b[1] + reach}L${a[0]} ${a[1] + reach}Z`;
  const inside = svg`${whole.map((d) => svg`<path d=${d} class=${options.lineClass(link.id)}/>`)}
    <path d=${gaps} class="s-gap"/><path d=${slashes} class="s-slash"/>
    <path d=${around} class="focus"/><line x1=${a[0]} y1=${a[1]} x2=${b[0]} y2=${b[1]} class="hit"/>`;
  return role({ kind: 'link', id: link.id }, options, inside);
}

/** Its label, drawn over everything. */
export const linkLabelOf = (
  { link, label, lines }: PlacedLink,
  options: FigureOptions,
): SVGTemplateResult | typeof nothing =>
  label === null
    ? nothing
    : svg`<g data-mark=${`link ${link.id}`} aria-hidden="true" class=${classes({ kind: 'link', id: link.id }, options)}>${linkLabel(label, lines)}</g>`;

function linkLabel(
  { x, y, width, anchor }: { x: number; y: number; width: number; anchor: string },
  lines: readonly string[],
) {
  const at = anchor === 'start' ? x : anchor === 'end' ? x + width : x + width / 2;
  return lines.map((line, i) => {
    const [first = '', ...rest] = line.split(' ');
    const words = rest.join(' ');
    const text =
      i === 0
        ? svg`<tspan class="b id">${first}</tspan><tspan class="l-2"> ${words}</tspan>`
        : i === 1
          ? svg`<tspan class="sy">${first}</tspan> ${svgNumber(words)}`
          : svg`${svgNumber(first)} ${words}`;
    return svg`<text x=${at} y=${y + 11 + 15 * i} text-anchor=${anchor} class="l ${i === 1 ? 'b id' : ''} halo">${text}</text>`;
  });
}

type Point = readonly [x: number, y: number];

/** The parts of a straight line outside the breaks, those inside, and the slashes at the edges. */
function throughBreaks(a: Point, b: Point, breaks: SectionScale['breaks']) {
  const [low, high] = a[1] > b[1] ? [a, b] : [b, a];
  const crossed = breaks.filter(({ top, bottom }) => low[1] > bottom && high[1] < top);
  const x = (y: number) => low[0] + ((low[1] - y) / (low[1] - high[1])) * (high[0] - low[0]);
  const whole: string[] = [];
  let gaps = '';
  let slashes = '';
  let from: Point = low;
  for (const { top, bottom } of crossed) {
    whole.push(`M${from[0].toFixed(1)} ${from[1]}L${x(bottom).toFixed(1)} ${bottom}`);
    gaps += `M${x(bottom).toFixed(1)} ${bottom}L${x(top).toFixed(1)} ${top}`;
    for (const y of [bottom, top]) slashes += `M${(x(y) - 6).toFixed(1)} ${y + 2.5}l12 -5`;
    from = [x(top), top];
  }
  whole.push(`M${from[0].toFixed(1)} ${from[1]}L${high[0]} ${high[1]}`);
  return { whole, gaps, slashes };
}
