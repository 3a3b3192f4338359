import { html, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import { multiples, roundStep, stepLabel } from './round-step.js';

/** Trials beside the linear result, all as deviations from the estimate in one unit. */
export interface HistogramFigure {
  /** edges of the first and the last bin */
  readonly low: number;
  readonly high: number;
  /** probability density in each bin, per unit */
  readonly densities: readonly number[];
  /** density of the linear result at a deviation */
  readonly linear: (deviation: number) => number;
  readonly linearInterval: readonly [number, number];
  readonly trialsInterval: readonly [number, number];
  /** digits after the point in the ends of the intervals */
  readonly decimals: number;
  /** coverage of both, as printed */
  readonly coverage: string;
}

const MARGIN = 12;
const TOP = 20;
/** Points of the curve. */
const CURVE = 120;

/** Bins as a band, the linear density as a curve over them; under the axis the two coverage intervals, one under the other. */
export function histogram(figure: HistogramFigure, width: number): TemplateResult {
  const { low, high, densities, linear, linearInterval, trialsInterval, decimals, coverage } = figure;
  const plot = Math.round(width < 420 ? 134 : 164);
  const base = TOP + plot;
  const height = base + 98;
  const x = (value: number) => MARGIN + ((value - low) / (high - low)) * (width - 2 * MARGIN);
  const curve = Array.from({ length: CURVE + 1 }, (_, i) => low + ((high - low) * i) / CURVE);
  const top = Math.max(...densities, ...curve.map(linear));
  const y = (density: number) => base - (density / top) * plot;
  const merged = rebinned(densities, width < 420 ? 4 : 2);
  const step = (high - low) / merged.length;
  const outline = merged.map((d, i) => `V${px(y(d))}H${px(x(low + (i + 1) * step))}`).join('');
  const line = curve.map((at, i) => `${i === 0 ? 'M' : 'L'}${px(x(at))} ${px(y(linear(at)))}`).join('');
  const tick = roundStep((high - low) / (width / 70));
  const signed = (value: number) => stepLabel(value, tick).replace(/^(?=[1-9]|0\.)/, value > 0 ? '+' : '');
  const end = (value: number) => `${value > 0 ? '+' : ''}${value.toFixed(decimals)}`.replace('-', '\u2212');
  const bar = (
    [from, to]: readonly [number, number],
    at: number,
    label: string,
    className: string,
  ): SVGTemplateResult => {
    const middle = (x(from) + x(to)) / 2;
    return svg`<line x1=${px(x(from))} x2=${px(x(to))} y1=${at} y2=${at} class=${className}/>
      ${[from, to].map((value) => svg`<line x1=${px(x(value))} x2=${px(x(value))} y1=${at - 4} y2=${at + 4} class="s-end"/>`)}
      <text x=${px(middle)} y=${at + 4} text-anchor="middle" class="l halo">${label}</text>
      <text x=${px(x(from) - 6)} y=${at + 4} text-anchor="end" class="l2">${end(from)}</text>
      <text x=${px(x(to) + 6)} y=${at + 4} text-anchor="start" class="l2">${end(to)}</text>`;
  };
  return html`<svg
    class="hist"
    width=${width}
    height=${height}
    viewBox="0 0 ${width} ${height}"
    role="img"
    aria-label=${`Trials beside the linear result, y minus its estimate in 1e-18. Linear ${coverage}: ${end(linearInterval[0])} to ${end(linearInterval[1])}; trials ${coverage}: ${end(trialsInterval[0])} to ${end(trialsInterval[1])}.`}
  >
    <path d=${`M${px(x(low))} ${base}${outline}V${base}Z`} class="s-hist" />
    <path d=${line} class="s-curve" />
    <line x1=${MARGIN} x2=${width - MARGIN} y1=${base} y2=${base} class="s-axis" />
    ${multiples(tick, low, high).map(
      (value) => svg`<line x1=${px(x(value))} x2=${px(x(value))} y1=${base} y2=${base + 6} class="s-axis"/>
        <text x=${px(x(value))} y=${base + 18} text-anchor="middle" class="l2">${signed(value)}</text>`,
    )}
    <text x=${width - MARGIN} y=${base + 36} text-anchor="end" class="l2"><tspan class="sy">y</tspan> minus its estimate / 1e-18</text>
    ${bar(linearInterval, base + 58, `linear ${coverage}`, 's-end')}
    ${bar(trialsInterval, base + 82, `trials ${coverage}`, 's-mc')}
  </svg>`;
}

const px = (value: number): number => Math.round(10 * value) / 10;

/** Neighbouring bins together: a figure of 300 px has no room for a hundred. */
function rebinned(densities: readonly number[], together: number): number[] {
  const merged: number[] = [];
  for (let i = 0; i < densities.length; i += together) {
    const some = densities.slice(i, i + together);
    merged.push(some.reduce((sum, d) => sum + d, 0) / some.length);
  }
  return merged;
}
