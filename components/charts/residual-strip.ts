import { css, html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import { roundStep } from './round-step.js';

/** A difference on a strip: its value, its ±U, and what was asked about, all in the unit of the strip. */
export interface StripValue {
  readonly value: number;
  /** half length of the bar */
  readonly expanded: number;
  /** ± this is the discrepancy asked about; null: none */
  readonly effect: number | null;
  readonly kind: 'agree' | 'differ' | 'inconclusive' | 'open';
}

/** Half the width that all strips of a table share: round, so that effects and the bars of what agrees are on it. */
export function stripReach(values: readonly StripValue[]): number {
  const needed = values.flatMap(({ value, expanded, effect, kind }) => [
    ...(effect === null ? [] : [1.12 * effect]),
    ...(kind === 'agree' || kind === 'open' ? [1.05 * (Math.abs(value) + expanded)] : []),
  ]);
  const least = needed.length > 0 ? Math.max(...needed) : Math.max(0, ...values.map(({ expanded }) => expanded));
  return least > 0 ? roundStep(least) : 1;
}

const HEIGHT = 30;
const MIDDLE = 15;

const percent = (fraction: number): string => `${(100 * fraction).toFixed(2)}%`;

/** The strip of one row. Widths in percent, as attributes: it takes the width of its cell, its lettering none. */
export function residualStrip({ value, expanded, effect, kind }: StripValue, reach: number): TemplateResult {
  const at = (x: number) => percent((Math.min(Math.max(x, -reach), reach) / reach + 1) / 2);
  const tick = (x: number, half: number, className: string) =>
    svg`<line x1=${at(x)} x2=${at(x)} y1=${MIDDLE - half} y2=${MIDDLE + half} class=${className}/>`;
  const off = Math.abs(value) > reach;
  return html`<svg class="strip" width="100%" height=${HEIGHT} aria-hidden="true">
    <line x1="0" x2="100%" y1=${MIDDLE} y2=${MIDDLE} class="s-base" />
    ${kind === 'differ' && off ? nothing : bar(value, expanded, reach, kind, at)}
    ${effect === null || effect > reach ? nothing : svg`${tick(-effect, 8, 's-effect')}${tick(effect, 8, 's-effect')}`}
    ${tick(0, 10, 's-axis')}
    ${kind === 'differ' && off ? arrow(value > 0) : dot(value, kind, at, off)}
  </svg>`;
}

function bar(
  value: number,
  expanded: number,
  reach: number,
  kind: StripValue['kind'],
  at: (x: number) => string,
): SVGTemplateResult | typeof nothing {
  if (expanded <= 0) return nothing;
  const [from, to] = [value - expanded, value + expanded];
  const width = percent((Math.min(to, reach) - Math.max(from, -reach)) / reach / 2);
  const ends = [from, to].filter((x) => Math.abs(x) <= reach);
  const open = kind === 'inconclusive';
  return svg`<rect x=${at(from)} y=${MIDDLE - 5} width=${width} height="10" class="s-strip"/>
    ${
      open
        ? svg`<line x1=${at(from)} x2=${at(to)} y1=${MIDDLE - 5} y2=${MIDDLE - 5} class="s-unsure"/>
          <line x1=${at(from)} x2=${at(to)} y1=${MIDDLE + 5} y2=${MIDDLE + 5} class="s-unsure"/>`
        : nothing
    }
    ${ends.map((x) => svg`<line x1=${at(x)} x2=${at(x)} y1=${MIDDLE - 7} y2=${MIDDLE + 7} class=${open ? 's-unsure' : 's-end'}/>`)}`;
}

const dot = (value: number, kind: StripValue['kind'], at: (x: number) => string, off: boolean) =>
  off
    ? nothing
    : svg`<circle cx=${at(value)} cy=${MIDDLE} r="4" class=${{ agree: 's-dot', open: 's-dot', differ: 's-wrong', inconclusive: 's-open' }[kind]}/>`;

/** Off the strip: an arrow from zero to its edge. A nested drawing, for a path knows no percent. */
const arrow = (right: boolean): SVGTemplateResult => {
  const [tail, edge] = right ? ['51.5%', '100%'] : ['48.5%', '0%'];
  return svg`<line x1=${tail} x2=${edge} y1=${MIDDLE} y2=${MIDDLE} class="s-off"/>
    <svg x=${edge} y=${MIDDLE} overflow="visible"><path d=${right ? 'M0 0l-11 -5v10z' : 'M0 0l11 -5v10z'} class="s-wrong"/></svg>
    <text x=${right ? '76%' : '24%'} y=${MIDDLE - 6} text-anchor="middle" class="l2 halo">off the strip</text>`;
};

export const residualStripStyles = css`
  .s-base {
    stroke: var(--p-hair);
    stroke-width: 1px;
  }
  .s-strip {
    fill: var(--p-band);
  }
  .s-end {
    stroke: var(--p-ink);
    stroke-width: 1.25px;
  }
  .s-effect {
    stroke: var(--p-accent);
    stroke-width: 1.25px;
  }
  .s-unsure {
    fill: none;
    stroke: var(--p-caution);
    stroke-width: 1.25px;
    stroke-dasharray: 4 3;
  }
  .s-open {
    fill: var(--p-paper);
    stroke: var(--p-caution);
    stroke-width: 1.75px;
  }
  .s-wrong {
    fill: var(--p-fault);
  }
  .s-off {
    stroke: var(--p-fault);
    stroke-width: 2.5px;
  }
`;
