import { html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import { type BreakEven, clocksOverDistanceM, type LinkBreakEven } from '../../lib/answers/break-even.js';
import { gnssUncertaintyM, levellingOverDistanceM } from '../../lib/answers/classical-methods.js';
import { formatLength } from '../../lib/quantity/index.js';
import { cutToFrame, downToOneThree, logAxis, logTicks, ONE_THREE, pathOf, upToOneThree } from '../charts/axis.js';
import { type Box, type LabelToPlace, type Obstacle, placeLabels } from '../charts/place-labels.js';
import { logLogFrame, type PlotBox } from '../charts/plot-frame.js';
import { textWidth } from '../charts/text-width.js';

const KM = 1000;
const MM = 1000;
/** A curve is drawn by so many points. */
const POINTS = 160;

export interface DrawnBreakEven {
  readonly answer: BreakEven;
  /** the link whose clocks the level line is of */
  readonly main: LinkBreakEven;
  readonly inHand: boolean;
  readonly width: number;
}

type Point = readonly [x: number, y: number];
type Label = Box & { readonly words: SVGTemplateResult; readonly className: string; readonly anchor: 'start' | 'end' };

/** u of clocks, levelling and GNSS with geoid against distance, the campaign's links as dots. */
export function breakEvenFigure({ answer, main, inHand, width }: DrawnBreakEven): TemplateResult {
  const narrow = width < 656;
  const box: PlotBox = narrow
    ? { left: 40, right: width - 12, top: 26, bottom: 300 }
    : { left: 58, right: width - 62, top: 26, bottom: width < 700 ? 320 : 362 };
  const links = answer.links.filter((l) => l.clocks !== null && l.distance > 0);
  const [near, far] = distances(links);
  const x = logAxis(near / KM, far / KM, box.left, box.right);
  const [low, high] = range(answer, links, main, near, far);
  const y = logAxis(low, high, box.bottom, box.top);
  const at = (distanceM: number, u: number): Point => [x.at(distanceM / KM), y.at(u * MM)];
  const curve = (u: (distanceM: number) => number | null) =>
    cutToFrame(
      Array.from({ length: POINTS + 1 }, (_, i): Point | null => {
        const d = near * (far / near) ** (i / POINTS);
        const value = u(d);
        return value === null || !(value > 0) ? null : at(d, value);
      }).filter((p): p is Point => p !== null),
      box.top,
      box.bottom,
    );
  const { levelling } = answer;
  const gnss = main.gnssModel ?? answer.gnss;
  const clocks = curve((d) => clocksOverDistanceM(main, d));
  const levellingCurve = levelling ? curve((d) => levellingOverDistanceM(levelling, d)) : [];
  const gnssCurve = gnss ? curve((d) => gnssUncertaintyM(gnss, d)) : [];
  const crossings = ([main.beyond.levelling, main.beyond.gnss] as const)
    .flatMap((d) => {
      const u = d === null || d === 0 ? null : clocksOverDistanceM(main, d);
      return d === null || u === null || d < near || d > far ? [] : [{ d, p: at(d, u) }];
    })
    .sort((a, b) => a.d - b.d);
  /** the label of a crossing stands where the next crossing or the frame does not come */
  const toLeft = (px: number, i: number) => i < crossings.length - 1 || px > box.right - 60;
  const openDot =
    main.withoutLimit !== null && main.limit !== null && main.limit.share > 0.5 && main.withoutLimit > 0
      ? at(main.distance, main.withoutLimit)
      : null;
  const labels = place(
    [
      ...links.flatMap((l) => dotLabel(at(l.distance, l.clocks!), l, l === main && inHand ? 'held' : '')),
      ...lineLabel(
        clocks,
        narrow ? `clocks of ${main.id}` : `clocks as good as those of ${main.id}`,
        'b',
        [0.04, 0.2, 0.4],
      ),
      ...lineLabel(levellingCurve, 'levelling', '', [0.55, 0.45, 0.65, 0.35, 0.75]),
      ...lineLabel(gnssCurve, narrow ? 'GNSS, geoid' : 'GNSS and geoid', '', [0.06, 0.2, 0.85, 0.6]),
    ],
    [clocks, levellingCurve, gnssCurve],
    links.map((l) => at(l.distance, l.clocks!)),
    box,
  );
  const height = box.bottom + 40;
  return html`<svg
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label="Uncertainty of a height difference by clocks, levelling and GNSS against distance. The same values stand in the table."
  >
    ${logLogFrame({
      box,
      x,
      y,
      xLabels: logTicks(x.from, x.to, narrow ? [1] : ONE_THREE),
      xTitle: 'distance / km',
      yUnit: 'mm',
      perRightUnit: narrow ? null : (1e-18 / main.yPerM) * MM,
    })}
    ${svg`<path d=${pathOf(levellingCurve)} class="s-level-line"/>
    <path d=${pathOf(gnssCurve)} class="s-gnss-line"/>
    <path d=${pathOf(clocks)} class="s-curve"/>`}
    ${crossings.map(
      ({ d, p: [px, py] }, i) => svg`<path d="M${px} ${py + 5}V${box.bottom}" class="s-drop"/>
        <circle cx=${px} cy=${py} r="4.5" class="s-open"/>
        <text x=${px + (toLeft(px, i) ? -5 : 5)} y=${box.bottom - 7}
          text-anchor=${toLeft(px, i) ? 'end' : 'start'}
          class="lb target halo">${formatLength(d)}</text>`,
    )}
    ${
      openDot === null || openDot[1] > box.bottom
        ? nothing
        : svg`<path d="M${openDot[0]} ${at(main.distance, main.clocks!)[1]}V${openDot[1]}" class="s-floor"/>
          <circle cx=${openDot[0]} cy=${openDot[1]} r="4" class="s-hollow"/>`
    }
    ${links.map((l) => {
      const [px, py] = at(l.distance, l.clocks!);
      return svg`<circle cx=${px} cy=${py} r="4" class="s-solid ${l === main && inHand ? 'held' : ''}"/>`;
    })}
    ${labels.map(
      (l) =>
        svg`<text x=${l.anchor === 'end' ? l.x + l.width : l.x} y=${l.y + 11} text-anchor=${l.anchor} class="halo ${l.className}">${l.words}</text>`,
    )}
  </svg>`;
}

/** Whole decades round the links, from 1 to 1000 km at least. */
function distances(links: readonly LinkBreakEven[]): [number, number] {
  const all = links.map((l) => l.distance);
  return [
    Math.min(KM, 10 ** Math.floor(Math.log10(Math.min(KM, ...all)))),
    Math.max(1000 * KM, 10 ** Math.ceil(Math.log10(Math.max(KM, ...all)))),
  ];
}

function range(
  answer: BreakEven,
  links: readonly LinkBreakEven[],
  main: LinkBreakEven,
  near: number,
  far: number,
): [number, number] {
  const { levelling, gnss } = answer;
  const values = [
    ...links.flatMap((l) => [l.clocks!, l.withoutLimit ?? l.clocks!]),
    ...(levelling ? [levellingOverDistanceM(levelling, 3 * near), levellingOverDistanceM(levelling, far)] : []),
    ...(gnss ? [gnssUncertaintyM(gnss, near), gnssUncertaintyM(gnss, far)] : []),
    main.clocks ?? 1e-3,
  ].filter((v) => v > 0);
  const low = downToOneThree(0.8 * MM * Math.min(...values));
  return [low, Math.min(Math.max(upToOneThree(1.2 * MM * Math.max(...values)), 30 * low), 1e5 * low)];
}

type Placing = LabelToPlace<Label>;
const HEIGHT = 15;

function dotLabel([x, y]: Point, link: LinkBreakEven, className: string): Placing[] {
  const size = formatLength(link.clocks!, 2);
  const width = textWidth(`${link.id} ${size}`, 11.5) + 6;
  const words = svg`<tspan class="b">${link.id}</tspan> ${size}`;
  const spot = (dx: number, dy: number, anchor: 'start' | 'end'): Label => ({
    x: anchor === 'end' ? x + dx - width : x + dx,
    y: y + dy,
    width,
    height: HEIGHT,
    words,
    className,
    anchor,
  });
  return [
    {
      id: `link ${link.id}`,
      essential: false,
      spots: [
        spot(-8, -20, 'end'),
        spot(8, -20, 'start'),
        spot(8, 6, 'start'),
        spot(-8, 6, 'end'),
        spot(8, -8, 'start'),
        spot(-8, -8, 'end'),
      ],
    },
  ];
}

function lineLabel(
  points: readonly (Point | null)[],
  text: string,
  className: string,
  where: readonly number[],
): Placing[] {
  const known = points.filter((p): p is Point => p !== null);
  if (known.length < 4) return [];
  const width = textWidth(text, 11.5, className === 'b') + 4;
  const words = svg`${text}`;
  return [
    {
      id: text,
      essential: false,
      spots: where.flatMap((part): Label[] => {
        const [x, y] = known[Math.floor(part * (known.length - 1))]!;
        const spot = (dx: number, dy: number): Label => ({
          x: x + dx,
          y: y + dy,
          width,
          height: HEIGHT,
          words,
          className,
          anchor: 'start',
        });
        return [spot(2, -20), spot(8, 6), spot(-width - 6, -16)];
      }),
    },
  ];
}

function place(
  labels: readonly Placing[],
  curves: readonly (readonly (Point | null)[])[],
  dots: readonly Point[],
  box: PlotBox,
): Label[] {
  const obstacles: Obstacle[] = [
    ...curves.flatMap((points) =>
      points.flatMap((p) =>
        p === null ? [] : [{ box: { x: p[0] - 2, y: p[1] - 2, width: 6, height: 4 }, weight: 4 }],
      ),
    ),
    ...dots.map(([x, y]) => ({ box: { x: x - 6, y: y - 6, width: 12, height: 12 }, weight: 10 })),
  ];
  const bounds = { x: box.left, y: box.top, width: box.right - box.left, height: box.bottom - box.top - 20 };
  return [...placeLabels(labels, obstacles, bounds).values()].filter((l): l is Label => l !== null);
}
