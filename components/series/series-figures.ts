import { html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import type { SeriesView } from '../../lib/answers/series-view.js';
import { multiples, roundStep, stepLabel } from '../charts/round-step.js';
import { svgNumber } from '../charts/svg-number.js';
import { decades, linear, logarithmic, type ToPx, timeTicks } from './series-scale.js';

interface Frame {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

/** How far beyond the valid samples the frame goes for invalid ones. */
const REACH = 2.5;

const frameOf = (width: number, height: number): Frame => ({
  left: 52,
  right: width - 56,
  top: 24,
  bottom: height - 34,
});

/** What stands at zero: the prediction, or the mean where there is none. */
export const zeroOf = (view: SeriesView): number => view.evaluation?.predicted?.value ?? view.answer.mean.value;
export const zeroName = (view: SeriesView): string => (view.evaluation?.predicted ? 'predicted' : 'mean');

/** Power of ten, a multiple of three, in which a size of y is written. */
export const powerOf = (size: number): number => (size > 0 ? 3 * Math.floor(Math.log10(size) / 3) : -18);

/** Frame, zero line, band and both axes of y minus zero against time. */
function timeFrame(
  title: string,
  view: SeriesView,
  frame: Frame,
  x: ToPx,
  y: ToPx,
  extent: readonly [number, number],
): SVGTemplateResult {
  const { left, right, top, bottom } = frame;
  const [low, high] = extent;
  const power = powerOf(Math.max(-low, high));
  const unit = Number(`1e${power}`);
  const step = roundStep((high - low) / unit / 6);
  const metres = view.lengthPerY;
  const lengthStep = roundStep(((high - low) * metres) / 4);
  const { used } = view;
  const ends = spanOf(view);
  const predicted = view.evaluation?.predicted;
  return svg`
    ${multiples(step, low / unit, high / unit).map(
      (v) => svg`<path d="M${left} ${y(v * unit)}H${right}" class="s-grid"/>
        <path d="M${left} ${y(v * unit)}h-5" class="s-axis"/>
        <text x=${left - 8} y=${y(v * unit) + 4} class="l2" text-anchor="end">${svgNumber(stepLabel(v, step))}</text>`,
    )}
    ${multiples(lengthStep, low * metres, high * metres).map(
      (v) => svg`<path d="M${right} ${y(v / metres)}h5" class="s-axis"/>
        <text x=${right + 9} y=${y(v / metres) + 4} class="l2">${svgNumber(stepLabel(v, lengthStep))}</text>`,
    )}
    ${
      predicted
        ? svg`<rect x=${left} width=${right - left} y=${y(Math.min(high, predicted.u))}
            height=${Math.max(0.5, y(Math.max(low, -predicted.u)) - y(Math.min(high, predicted.u)))} class="s-band"/>`
        : nothing
    }
    <path d="M${left} ${y(0)}H${right}" class="s-zero"/>
    <path d="M${left} ${top}V${bottom}H${right}V${top}" class="s-axis"/>
    <text x="0" y="12">${title}<tspan class="sy">y</tspan> minus ${zeroName(view)} / 1e${power}</text>
    <text x=${right + 56} y="12" text-anchor="end">length / m</text>
    ${timeTicks(ends[0], ends[1], used.originMs, Math.max(2, Math.floor((right - left) / 80))).map(
      ({ atS, label }) => svg`<path d="M${x(atS)} ${bottom}v5" class="s-axis"/>
        <text x=${x(atS)} y=${bottom + 18} class="l2" text-anchor="middle">${svgNumber(label)}</text>`,
    )}
    ${used.originMs === null ? svg`<text x=${right} y=${bottom + 31} class="l2" text-anchor="end">s</text>` : nothing}`;
}

function spanOf({ used, outside }: SeriesView): readonly [number, number] {
  const last = used.y.length - 1;
  const from = Math.min(used.startS[0]!, outside[0]?.startS ?? Number.POSITIVE_INFINITY);
  const to = Math.max(used.startS[last]!, outside.at(-1)?.startS ?? Number.NEGATIVE_INFINITY) + used.sampleS;
  return [from, to];
}

/** Dots, or from three to the px on the range of each column of px. */
function samples(view: SeriesView, x: ToPx, y: ToPx, zero: number, widthPx: number): SVGTemplateResult {
  const { used } = view;
  const half = used.sampleS / 2;
  if (used.y.length <= widthPx / 2)
    return svg`${[...used.y].map((v, i) => svg`<circle cx=${px(x(used.startS[i]! + half))} cy=${px(y(v - zero))} r="1.7" class="s-solid"/>`)}`;
  const columns = new Map<number, [number, number]>();
  used.y.forEach((v, i) => {
    const at = Math.round(x(used.startS[i]! + half));
    const column = columns.get(at);
    if (column === undefined) columns.set(at, [v, v]);
    else if (v < column[0]) column[0] = v;
    else if (v > column[1]) column[1] = v;
  });
  const d = [...columns]
    .map(([at, [min, max]]) => `M${at} ${px(y(max - zero) - 0.6)}V${px(y(min - zero) + 0.6)}`)
    .join('');
  return svg`<path d=${d} class="s-range"/>`;
}

const px = (value: number): string => value.toFixed(1);

/** All samples against time: gaps empty, what lies outside the validity as open dots. */
export function timeFigure(view: SeriesView, width: number): TemplateResult {
  const height = 230;
  const frame = frameOf(width, height);
  const zero = zeroOf(view);
  const [from, to] = spanOf(view);
  let low = Math.min(0, -(view.evaluation?.predicted?.u ?? 0));
  let high = -low;
  for (const v of view.used.y) {
    if (v - zero < low) low = v - zero;
    if (v - zero > high) high = v - zero;
  }
  // invalid samples that lie not too far off are shown where they are; the words under the drawing count all
  const [lowest, highest] = [REACH * low, REACH * high];
  for (const { y: v } of view.outside) {
    if (v - zero < low && v - zero >= lowest) low = v - zero;
    if (v - zero > high && v - zero <= highest) high = v - zero;
  }
  const margin = 0.08 * (high - low) || 1e-18;
  low -= margin;
  high += margin;
  const x = linear(from, to, frame.left, frame.right);
  const y = linear(low, high, frame.bottom, frame.top);
  const inside = view.outside.filter((s) => s.y - zero >= low && s.y - zero <= high);
  const most = Math.max(1, Math.ceil(inside.length / (frame.right - frame.left)));
  return html`<svg
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label="Frequency data against time, y minus the ${zeroName(view) === 'mean' ? 'mean' : 'prediction'}, gaps left empty"
  >
    ${timeFrame('', view, frame, x, y, [low, high])} ${samples(view, x, y, zero, frame.right - frame.left)}
    ${inside
      .filter((_, i) => i % most === 0)
      .map(
        (s) =>
          svg`<circle cx=${px(x(s.startS + view.used.sampleS / 2))} cy=${px(y(s.y - zero))} r="2.4" class="s-invalid"/>`,
      )}
  </svg>`;
}

/** The mean as it grew, with its standard uncertainty as two lines, closing on the prediction. */
export function runningFigure(view: SeriesView, width: number): TemplateResult | typeof nothing {
  const { running } = view;
  const last = running.at(-1);
  if (last === undefined) return nothing;
  const height = 230;
  const frame = frameOf(width, height);
  const zero = zeroOf(view);
  const half = 1.15 * Math.max(view.evaluation?.predicted?.u ?? 0, Math.abs(last.mean - zero) + 3 * last.u) || 1e-18;
  const [from, to] = spanOf(view);
  const x = linear(from, to, frame.left, frame.right);
  const y = linear(-half, half, frame.bottom, frame.top);
  // from where on mean and uncertainty stay in the frame
  const leaves = running.map((r) => Math.abs(r.mean - zero) + r.u > half);
  const shown = running.slice(leaves.lastIndexOf(true) + 1);
  const line = (of: (r: (typeof running)[number]) => number) =>
    shown.map((r, i) => `${i === 0 ? 'M' : 'L'}${px(x(r.endS))} ${px(y(of(r) - zero))}`).join('');
  return html`<svg
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label="Running mean of y with its standard uncertainty, against the ${zeroName(view) === 'mean' ? 'final mean' : 'prediction'}"
  >
    ${timeFrame('running mean of ', view, frame, x, y, [-half, half])}
    <path d=${line((r) => r.mean + r.u)} class="s-u" />
    <path d=${line((r) => r.mean - r.u)} class="s-u" />
    <path d=${line((r) => r.mean)} class="s-mean" />
  </svg>`;
}

/** Overlapping Allan deviation with its 68.3 % intervals, and u of the mean at the valid time; length equivalent on the right. */
export function deviationFigure(view: SeriesView, width: number): TemplateResult | typeof nothing {
  const rows = view.answer.deviations.filter((d) => d.kind === 'oadev' && d.lo > 0);
  if (rows.length === 0) return nothing;
  const height = 280;
  const frame = { ...frameOf(width, height), bottom: height - 38 };
  const { left, right, top, bottom } = frame;
  const meanU = view.answer.mean.u;
  const T = view.reduction.validS;
  const sizes = [...rows.flatMap((d) => [d.lo, d.hi]), ...(meanU === null || meanU === 0 ? [] : [meanU])];
  const [low, high] = [Math.min(...sizes) / 1.5, Math.max(...sizes) * 1.5];
  const [short, long] = [rows[0]!.tau / 1.5, Math.max(T, rows.at(-1)!.tau) * 1.5];
  const x = logarithmic(short, long, left, right);
  const y = logarithmic(low, high, bottom, top);
  const area = [
    ...rows.map((d) => `${px(x(d.tau))} ${px(y(d.hi))}`),
    ...[...rows].reverse().map((d) => `${px(x(d.tau))} ${px(y(d.lo))}`),
  ].join('L');
  const lengths = decades(low * view.lengthPerY, high * view.lengthPerY);
  return html`<svg
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label="Overlapping Allan deviation against averaging time, with 68 % intervals and the uncertainty of the mean"
  >
    ${decades(low, high).map(
      (v) => svg`<path d="M${left} ${y(v)}H${right}" class="s-grid"/><path d="M${left} ${y(v)}h-5" class="s-axis"/>
        <text x=${left - 8} y=${y(v) + 4} class="l2" text-anchor="end">${v.toExponential(0).replace('-', '\u2212')}</text>`,
    )}
    ${lengths.map(
      (v) => svg`<path d="M${right} ${y(v / view.lengthPerY)}h5" class="s-axis"/>
        <text x=${right + 9} y=${y(v / view.lengthPerY) + 4} class="l2">${svgNumber(String(Number(v.toPrecision(3))))}</text>`,
    )}
    ${decades(short, long).map(
      (v) => svg`<path d="M${x(v)} ${top}V${bottom}" class="s-grid"/><path d="M${x(v)} ${bottom}v5" class="s-axis"/>
        <text x=${x(v)} y=${bottom + 18} class="l2" text-anchor="middle">${svgNumber(String(v))}</text>`,
    )}
    <path d="M${area}Z" class="s-band" />
    <path d="M${rows.map((d) => `${px(x(d.tau))} ${px(y(d.value))}`).join('L')}" class="s-mean" />
    ${rows.map((d) => svg`<circle cx=${px(x(d.tau))} cy=${px(y(d.value))} r="2.4" class="s-solid"/>`)}
    ${meanU !== null && meanU > 0 ? svg`<circle cx=${px(x(T))} cy=${px(y(meanU))} r="4" class="s-open"/>` : nothing}
    <path d="M${left} ${top}V${bottom}H${right}V${top}" class="s-axis" />
    <text x="0" y="12"><tspan class="sy">σ</tspan>(<tspan class="sy">τ</tspan>), overlapping Allan</text>
    <text x=${right + 56} y="12" text-anchor="end">length / m</text>
    <text x=${right} y=${bottom + 33} text-anchor="end"><tspan class="sy">τ</tspan> / s</text>
  </svg>`;
}
