import { nothing, type SVGTemplateResult, svg } from 'lit';
import { linearAxis } from '../charts/axis.js';
import { multiples, roundStep, stepLabel } from '../charts/round-step.js';
import { textWidth } from '../charts/text-width.js';
import { timeTicks, timeTitle } from '../charts/time-axis.js';

/** A link's tide over the window. */
export interface TideCurve {
  readonly id: string;
  /** 1e-18, at the times of the figure */
  readonly values: readonly number[];
  readonly held: boolean;
  /** the one that the sentence speaks of */
  readonly spoken: boolean;
}

/** Class of a curve: in hand, spoken of, or one of the others. */
export const tideLine = ({ held, spoken }: { readonly held: boolean; readonly spoken: boolean }): string =>
  `s-tide ${held ? 'held' : spoken ? 'spoken' : ''}`;

export interface TideFigure {
  readonly width: number;
  /** ms since 1970, UTC */
  readonly times: readonly number[];
  /** those behind first */
  readonly curves: readonly TideCurve[];
  /** mm per 1e-18, of the second axis */
  readonly millimetresPerUnit: number;
  /** the sample that the reader points at */
  readonly cursor: number | null;
}

const BOX = { left: 44, right: 54, top: 24, bottom: 46 };
const HEIGHT = { wide: 260, narrow: 216 };

const signed = (value: number, step: number): string => {
  const text = stepLabel(value, step);
  return text === '0' || text.startsWith('\u2212') ? text : `+${text}`;
};

export const plotLeft = BOX.left;
export const plotWidth = (width: number): number => width - BOX.left - BOX.right;

/** y left, length right, days below; the largest value stands at its curve. */
export function tideFigure({ width, times, curves, millimetresPerUnit, cursor }: TideFigure): SVGTemplateResult {
  const height = width < 656 ? HEIGHT.narrow : HEIGHT.wide;
  const [left, right, top, bottom] = [BOX.left, width - BOX.right, BOX.top, height - BOX.bottom];
  const [start, end] = [times[0]!, times.at(-1)!];
  const x = linearAxis(start, end, left, right);
  const most = Math.max(1e-6, ...curves.flatMap(({ values }) => values.map(Math.abs)));
  const step = roundStep(most / 2.2);
  const reach = Math.ceil((most * 1.02) / (step / 2)) * (step / 2);
  const y = linearAxis(-reach, reach, bottom, top);
  const ticks = timeTicks(start, end, (right - left) / (end - start), width < 656 ? 44 : 56);
  const mmReach = reach * millimetresPerUnit;
  const mmStep = roundStep(mmReach / 2.4);
  const named = curves.at(-1);
  return svg`<g>
    ${multiples(step, -reach, reach).map(
      (
        value,
      ) => svg`<path d="M${left} ${y.at(value)}H${right}" class=${Math.abs(value) < step / 2 ? 's-axis' : 's-grid'}/>
        <path d="M${left} ${y.at(value)}h-5" class="s-axis"/>
        <text x=${left - 8} y=${y.at(value) + 4} text-anchor="end" class="l2">${signed(value, step)}</text>`,
    )}
    ${ticks.map(
      ({
        ms,
        label,
      }) => svg`<path d="M${x.at(ms)} ${top}V${bottom}" class="s-grid"/><path d="M${x.at(ms)} ${bottom}v5" class="s-axis"/>
        ${label === null ? nothing : svg`<text x=${x.at(ms)} y=${bottom + 18} text-anchor="middle" class="l2">${label}</text>`}`,
    )}
    <path d="M${left} ${top}V${bottom}M${right} ${top}V${bottom}" class="s-axis"/>
    ${multiples(mmStep, -mmReach, mmReach).map(
      (mm) => svg`<path d="M${right} ${y.at(mm / millimetresPerUnit)}h5" class="s-axis"/>
        <text x=${right + 9} y=${y.at(mm / millimetresPerUnit) + 4} class="l2">${signed(mm, mmStep)}</text>`,
    )}
    <text x=${left - 34} y=${top - 11}><tspan class="sy">y</tspan> / 1e-18</text>
    <text x=${right + 52} y=${top - 11} text-anchor="end">length / mm</text>
    <text x=${left} y=${bottom + 38}>${timeTitle(start, end)}</text>
    ${curves.map((curve) => svg`<path d=${curvePath(times, curve.values, x.at, y.at)} class=${tideLine(curve)}/>`)}
    ${named ? extremeLabel(named, times, x.at, y.at, left, right) : nothing}
    ${
      cursor === null
        ? nothing
        : svg`<path d="M${x.at(times[cursor]!)} ${top}V${bottom}" class="s-cursor"/>
      ${curves.map(({ values, held }) => svg`<circle cx=${x.at(times[cursor]!)} cy=${y.at(values[cursor]!)} r="3.5" class=${held ? 's-dot held' : 's-dot'}/>`)}`
    }
  </g>`;
}

/** Samples per px that are still drawn one by one. */
const MOST_PER_PX = 12;

/** With more samples: per px column the range that they fill, so that no swing is lost. */
function curvePath(
  times: readonly number[],
  values: readonly number[],
  x: (ms: number) => number,
  y: (value: number) => number,
): string {
  const point = (i: number) => `${x(times[i]!).toFixed(1)} ${y(values[i]!).toFixed(1)}`;
  const px = x(times.at(-1)!) - x(times[0]!);
  if (times.length <= MOST_PER_PX * px) return `M${times.map((_, i) => point(i)).join('L')}`;
  let path = '';
  for (let i = 0; i < times.length; ) {
    const column = Math.floor(x(times[i]!));
    let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY];
    for (; i < times.length && Math.floor(x(times[i]!)) === column; i++) {
      low = Math.min(low, values[i]!);
      high = Math.max(high, values[i]!);
    }
    path += `${path === '' ? 'M' : 'L'}${column} ${y(low).toFixed(1)}V${y(high).toFixed(1)}`;
  }
  return path;
}

function extremeLabel(
  { id, values, held }: TideCurve,
  times: readonly number[],
  x: (ms: number) => number,
  y: (value: number) => number,
  left: number,
  right: number,
): SVGTemplateResult {
  const at = values.reduce((best, value, i) => (Math.abs(value) > Math.abs(values[best]!) ? i : best), 0);
  const value = values[at]!;
  const text = `${id} ${value < 0 ? '\u2212' : '+'}${Math.abs(value).toPrecision(2)}`;
  const wide = textWidth(text, 12, true);
  const toRight = x(times[at]!) + 10 + wide < right;
  const px = toRight ? x(times[at]!) + 9 : Math.max(left + wide + 4, x(times[at]!) - 9);
  return svg`<text x=${px} y=${y(value) + (value < 0 ? 2 : 5)} text-anchor=${toRight ? 'start' : 'end'} class="lb halo ${held ? 'held' : ''}">${text}</text>`;
}
