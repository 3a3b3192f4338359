import { css, type SVGTemplateResult, svg } from 'lit';
import { type AxisScale, BETWEEN, logTicks, ONE_THREE, tickLabel } from './axis.js';
import { svgNumber } from './svg-number.js';

/** Px of a plot inside its drawing. */
export interface PlotBox {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export interface LogLogFrame {
  readonly box: PlotBox;
  readonly x: AxisScale;
  readonly y: AxisScale;
  readonly xLabels: readonly number[];
  /** name and unit of the axis below, at its right end */
  readonly xTitle: string;
  /** unit of the left axis behind u(length) */
  readonly yUnit: string;
  /** value of the left axis per unit of the right one; null: no right axis */
  readonly perRightUnit: number | null;
}

/** Grid, axes, ticks and titles of u(length), and of u(y) on the right, against something on a logarithmic axis. */
export function logLogFrame({ box, x, y, xLabels, xTitle, yUnit, perRightUnit }: LogLogFrame): SVGTemplateResult {
  const { left, right, top, bottom } = box;
  const horizontal = logTicks(y.from, y.to, ONE_THREE);
  const rightTicks = perRightUnit === null ? [] : logTicks(y.from / perRightUnit, y.to / perRightUnit, ONE_THREE);
  return svg`
    ${xLabels.map((v) => svg`<path d="M${x.at(v)} ${top}V${bottom}" class="s-grid"/>`)}
    ${horizontal.map((v) => svg`<path d="M${left} ${y.at(v)}H${right}" class="s-grid"/>`)}
    ${logTicks(x.from, x.to, BETWEEN).map((v) => svg`<path d="M${x.at(v)} ${bottom}v3" class="s-tick"/>`)}
    ${xLabels.map(
      (v) => svg`<path d="M${x.at(v)} ${bottom}v5" class="s-axis"/>
        <text x=${x.at(v)} y=${bottom + 18} class="l2" text-anchor="middle">${svgNumber(tickLabel(v))}</text>`,
    )}
    ${horizontal.map(
      (v) => svg`<path d="M${left} ${y.at(v)}h-5" class="s-axis"/>
        <text x=${left - 8} y=${y.at(v) + 4} class="l2" text-anchor="end">${svgNumber(tickLabel(v))}</text>`,
    )}
    ${rightTicks.map(
      (v) => svg`<path d="M${right} ${y.at(v * perRightUnit!)}h5" class="s-axis"/>
        <text x=${right + 9} y=${y.at(v * perRightUnit!) + 4} class="l2">${svgNumber(tickLabel(v))}</text>`,
    )}
    <path d="M${left} ${top}V${bottom}H${right}${perRightUnit === null ? '' : `V${top}`}" class="s-axis"/>
    <text x="0" y=${top - 11}><tspan class="sy">u</tspan>(length) / ${yUnit}</text>
    ${perRightUnit === null ? '' : svg`<text x=${right + 58} y=${top - 11} text-anchor="end"><tspan class="sy">u</tspan>(<tspan class="sy">y</tspan>) / 1e-18</text>`}
    <text x=${right} y=${bottom + 33} text-anchor="end">${xTitle}</text>`;
}

export const plotStyles = css`
  .s-grid {
    fill: none;
    stroke: var(--p-hair);
    stroke-width: 0.75px;
  }
  .s-tick {
    fill: none;
    stroke: var(--p-line);
    stroke-width: 0.75px;
  }
  .s-curve,
  .s-thin,
  .s-stat,
  .s-floor,
  .s-window,
  .s-target,
  .s-drop {
    fill: none;
    stroke: var(--p-ink);
  }
  .s-curve {
    stroke-width: 2px;
  }
  .s-thin {
    stroke-width: 1px;
  }
  .s-thin.s-sat {
    stroke-dasharray: 9 4 2 4;
  }
  .s-thin.s-other {
    stroke-dasharray: 6 4;
  }
  .s-stat {
    stroke-width: 1px;
    stroke-dasharray: 5 3;
  }
  .s-floor {
    stroke-width: 0.9px;
    stroke-dasharray: 1.5 3;
  }
  .s-window {
    stroke: var(--p-line);
    stroke-width: 1px;
  }
  .s-target {
    stroke: var(--p-accent);
    stroke-width: 1.5px;
  }
  .s-drop {
    stroke: var(--p-accent);
    stroke-width: 0.75px;
    stroke-dasharray: 2 3;
  }
  .s-open {
    fill: var(--p-paper);
    stroke: var(--p-accent);
    stroke-width: 2px;
  }
  .s-hollow {
    fill: var(--p-paper);
    stroke: var(--p-ink);
    stroke-width: 1.5px;
  }
  .s-solid {
    fill: var(--p-ink);
  }
  .s-solid.held {
    fill: var(--p-accent);
  }
  .s-seg {
    stroke: var(--p-ink);
    stroke-width: 0.75px;
    fill: var(--p-paper);
  }
  .s-seg.fixed {
    fill: var(--p-band);
  }
  text.target,
  text.held {
    fill: var(--p-accent);
  }
  text.target {
    font-weight: 700;
  }
  text.it {
    font-family: var(--p-symbol-face);
    font-style: italic;
    font-size: 13px;
    fill: var(--p-ink-2);
  }
  .b {
    font-weight: 700;
  }
`;
