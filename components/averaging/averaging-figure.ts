import { html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import type { AveragingFigure, AveragingLink } from '../../lib/answers/averaging-figure.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatDays, formatLength } from '../../lib/quantity/index.js';
import { partText } from '../../lib/report/plan-words.js';
import { cutToFrame, downToOneThree, logAxis, logTicks, pathOf, upToOneThree } from '../charts/axis.js';
import { type Box, type LabelToPlace, type Obstacle, placeLabels } from '../charts/place-labels.js';
import { logLogFrame, type PlotBox } from '../charts/plot-frame.js';
import { textWidth } from '../charts/text-width.js';

const DAY_S = 86_400;
const MM = 1000;

export interface DrawnAveraging {
  readonly figure: AveragingFigure;
  readonly campaign: Campaign;
  /** the link drawn heavy */
  readonly main: AveragingLink;
  /** whether a reader has taken it in hand */
  readonly inHand: boolean;
  readonly width: number;
}

type Label = Box & { readonly words: SVGTemplateResult; readonly className: string };

const lineClass = (kind: string | null): string =>
  kind === 'satellite' ? 's-thin s-sat' : kind === 'fibre' ? 's-thin' : 's-thin s-other';

/** u(height) against days, both logarithmic: one link heavy with its statistics, floor and crossing, the others thin; below, what
 *  limits the one. */
export function averagingFigure({ figure, campaign, main, inHand, width }: DrawnAveraging): TemplateResult {
  const narrow = width < 656;
  const box: PlotBox = narrow
    ? { left: 40, right: width - 12, top: 26, bottom: 282 }
    : { left: 58, right: width - 62, top: 26, bottom: width < 700 ? 288 : 348 };
  const [low, high] = range(figure, main);
  const x = logAxis(figure.fromS / DAY_S, figure.toS / DAY_S, box.left, box.right);
  const y = logAxis(low, high, box.bottom, box.top);
  const { target } = figure.plan;
  const at = (T: number, lengthM: number): readonly [number, number] => [x.at(T / DAY_S), y.at(lengthM * MM)];
  const curve = (points: AveragingLink['points'], of: 'uH' | 'uStatH') =>
    cutToFrame(
      points.filter((p) => p[of] > 0).map((p) => at(p.T, p[of])),
      box.top,
      box.bottom,
    );
  const { plan } = main;
  const windowS = plan.window?.T ?? null;
  const stripTop = box.bottom + 50;
  const height = stripTop + 19;
  const others = figure.links.filter((l) => l !== main);
  const mainCurve = curve(main.points, 'uH');
  const bridged = (plan.bridged?.curve ?? []).filter((p) => p.T >= figure.fromS && p.T <= figure.toS);
  const labels = placed(
    [
      ...labelOfLine(
        mainCurve,
        svg`<tspan class="b">${main.plan.id}</tspan> total`,
        `${main.plan.id} total`,
        inHand ? 'held' : '',
        'start',
      ),
      ...(target === null || !inside(y, target * MM)
        ? []
        : fixedLabel(box.left + 9, y.at(target * MM) - 6, `target ${formatLength(target)}`, 'target')),
      ...(plan.floor > 0 && inside(y, plan.floor * MM)
        ? fixedLabel(box.left + 9, y.at(plan.floor * MM) + 13, `floor ${formatLength(plan.floor, 2)}`, 'l2')
        : []),
      ...(windowS === null || !inside(x, windowS / DAY_S)
        ? []
        : fixedLabel(x.at(windowS / DAY_S) + 5, box.top + 12, `window ${formatDays(windowS)}`, 'l2')),
      ...(narrow
        ? []
        : labelOfLine(curve(main.points, 'uStatH'), svg`statistics alone`, 'statistics alone', 'it', 'end')),
      ...others.flatMap((l) => {
        const { kind } = campaign.links.find(({ id }) => id === l.plan.id)!;
        const words = kind === null || narrow ? '' : ` ${kind}`;
        return labelOfLine(
          curve(l.points, 'uH'),
          svg`<tspan class="b">${l.plan.id}</tspan>${words}`,
          `${l.plan.id}${words}`,
          '',
          'middle',
        );
      }),
    ],
    [mainCurve, curve(main.points, 'uStatH'), ...others.map((l) => curve(l.points, 'uH'))],
    box,
  );
  return html`<svg
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label="Uncertainty of height against averaging time. The same values stand in the table."
  >
    ${logLogFrame({
      box,
      x,
      y,
      xLabels: logTicks(x.from, x.to, [1]),
      xTitle: 'days',
      yUnit: 'mm',
      perRightUnit: narrow ? null : (1e-18 / main.yPerM) * MM,
    })}
    ${windowS === null || !inside(x, windowS / DAY_S) ? nothing : svg`<path d="M${x.at(windowS / DAY_S)} ${box.top}V${box.bottom}" class="s-window"/>`}
    ${others.map((l) => {
      const { kind } = campaign.links.find(({ id }) => id === l.plan.id)!;
      return svg`<path d=${pathOf(curve(l.points, 'uH'))} class=${lineClass(kind)}/>`;
    })}
    <path d=${pathOf(curve(main.points, 'uStatH'))} class="s-stat"/>
    ${plan.floor > 0 && inside(y, plan.floor * MM) ? svg`<path d="M${box.left} ${y.at(plan.floor * MM)}H${box.right}" class="s-floor"/>` : nothing}
    ${target !== null && inside(y, target * MM) ? svg`<path d="M${box.left} ${y.at(target * MM)}H${box.right}" class="s-target"/>` : nothing}
    ${
      bridged.length === 0
        ? nothing
        : svg`<path d=${pathOf(
            cutToFrame(
              bridged.map((p) => at(p.T, p.uH)),
              box.top,
              box.bottom,
            ),
          )} class="s-thin s-other"/>
      ${bridged.filter((p) => inside(y, p.uH * MM)).map((p) => svg`<circle cx=${at(p.T, p.uH)[0]} cy=${at(p.T, p.uH)[1]} r="2.4" class="s-hollow"/>`)}`
    }
    <path d=${pathOf(mainCurve)} class="s-curve"/>
    ${crossing(plan.timeToTarget, target, x, y, box)}
    ${
      plan.window && windowS !== null && inside(x, windowS / DAY_S) && inside(y, plan.window.uH * MM)
        ? svg`<circle cx=${x.at(windowS / DAY_S)} cy=${y.at(plan.window.uH * MM)} r="3.6" class="s-solid"/>
          <text x=${x.at(windowS / DAY_S) + 7} y=${y.at(plan.window.uH * MM) + 18} class="lb halo">${formatLength(plan.window.uH, narrow ? 2 : 3)}</text>`
        : nothing
    }
    ${labels.map((l) => svg`<text x=${l.x} y=${l.y + 11} class="halo ${l.className}">${l.words}</text>`)}
    ${strip(main, campaign, x, box, stripTop)}
  </svg>`;
}

const inside = ({ from, to }: { readonly from: number; readonly to: number }, value: number): boolean =>
  value >= from && value <= to;

/** From half the lowest thing worth seeing to where the main curve begins, at least two decades. */
function range({ plan, links }: AveragingFigure, main: AveragingLink): [number, number] {
  const lowest = [main.plan.floor, plan.target ?? main.plan.floor, main.points.at(-1)?.uH ?? 0].filter((v) => v > 0);
  const low = downToOneThree(0.6 * MM * Math.min(...lowest, ...(lowest.length === 0 ? [1] : [])));
  const tops = [main.points[0]?.uH ?? 0, ...links.map((l) => 3 * (l.plan.window?.uH ?? l.plan.floor))];
  const high = upToOneThree(MM * Math.max(...tops));
  return [low, Math.min(Math.max(high, 100 * low), 1e5 * low)];
}

function crossing(
  timeToTarget: number | null,
  target: number | null,
  x: ReturnType<typeof logAxis>,
  y: ReturnType<typeof logAxis>,
  box: PlotBox,
): SVGTemplateResult | typeof nothing {
  if (timeToTarget === null || target === null) return nothing;
  const days = timeToTarget / DAY_S;
  if (!inside(x, days) || !inside(y, target * MM)) return nothing;
  const [px, py] = [x.at(days), y.at(target * MM)];
  return svg`<path d="M${px} ${py + 5}V${box.bottom}" class="s-drop"/>
    <circle cx=${px} cy=${py} r="4.5" class="s-open"/>
    <text x=${px + 8} y=${py - 9} class="lb target halo">${formatDays(timeToTarget, 2)}</text>`;
}

/** Under the axis: the part that is the largest, along the time. */
function strip(
  main: AveragingLink,
  campaign: Campaign,
  x: ReturnType<typeof logAxis>,
  box: PlotBox,
  top: number,
): SVGTemplateResult {
  return svg`<text x=${box.left} y=${top - 5} class="l2">what limits ${main.plan.id}</text>
    ${main.limits().map(({ fromS, toS, part }) => {
      const [a, b] = [x.at(fromS / DAY_S), x.at(toS / DAY_S)];
      const words = partText(part, campaign);
      const fixed = part.kind === 'systematic' || part.kind === 'ratio' || part.kind === 'flicker';
      return svg`<rect x=${a} y=${top} width=${b - a} height="18" class="s-seg ${fixed ? 'fixed' : ''}"/>
        ${
          textWidth(words, 11.5) + 8 <= b - a
            ? svg`<text x=${(a + b) / 2} y=${top + 13} text-anchor="middle">${words}</text>`
            : nothing
        }`;
    })}`;
}

type Placing = LabelToPlace<Label>;

const LABEL_HEIGHT = 15;

function fixedLabel(x: number, baseline: number, words: string, className: string): Placing[] {
  const width = textWidth(words, className === 'target' ? 12 : 11.5, className === 'target');
  const spot = (dx: number, dy: number): Label => ({
    x: x + dx,
    y: baseline - 11 + dy,
    width,
    height: LABEL_HEIGHT,
    words: svg`${words}`,
    className: className === 'target' ? 'lb target' : className,
  });
  return [
    {
      id: words,
      spots: [spot(0, 0), spot(0, 22), spot(70, 0), spot(140, 0), spot(220, 0)],
      essential: className === 'target',
    },
  ];
}

/** Spots above and below a curve, from where its label belongs outwards. */
function labelOfLine(
  points: readonly (readonly [number, number] | null)[],
  words: SVGTemplateResult,
  text: string,
  className: string,
  where: 'start' | 'middle' | 'end',
): Placing[] {
  const known = points.filter((p): p is readonly [number, number] => p !== null);
  if (known.length < 4) return [];
  const order = { start: [0.12, 0.2, 0.3, 0.45], middle: [0.5, 0.4, 0.6, 0.3, 0.7], end: [0.8, 0.7, 0.6, 0.9] }[where];
  const width = textWidth(text, 11.5) + 4;
  return [
    {
      id: text,
      essential: false,
      spots: order.flatMap((part) => {
        const [px, py] = known[Math.floor(part * (known.length - 1))]!;
        return [
          { x: px + 6, y: py - 20, width, height: LABEL_HEIGHT, words, className },
          { x: px - width - 4, y: py + 6, width, height: LABEL_HEIGHT, words, className },
          { x: px + 4, y: py + 8, width, height: LABEL_HEIGHT, words, className },
        ];
      }),
    },
  ];
}

function placed(
  labels: readonly Placing[],
  curves: readonly (readonly (readonly [number, number] | null)[])[],
  box: PlotBox,
): Label[] {
  const obstacles: Obstacle[] = curves.flatMap((points) =>
    points.flatMap((p) => (p === null ? [] : [{ box: { x: p[0] - 2, y: p[1] - 2, width: 7, height: 4 }, weight: 4 }])),
  );
  const bounds = { x: box.left, y: box.top, width: box.right - box.left, height: box.bottom - box.top };
  return [...placeLabels(labels, obstacles, bounds).values()].filter((l): l is Label => l !== null);
}
