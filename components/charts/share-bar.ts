import { html, nothing, svg, type TemplateResult } from 'lit';
import { roundStep } from './round-step.js';

/** One zero and one scale for all bars of a budget. */
export interface ShareScale {
  readonly from: number;
  readonly to: number;
}

export const shareScale = (shares: readonly number[]): ShareScale => ({
  from: Math.min(0, ...shares),
  to: Math.max(0.05, ...shares),
});

export type ShareKind = 'input' | 'shared';

const percent = (fraction: number): string => `${(100 * fraction).toFixed(2)}%`;

/** A share of the variance as a bar from zero: solid one input, outlined a shared source; left of zero a negative share.
 *  Widths in percent, as attributes: a strict Content-Security-Policy refuses style. */
export function shareBar(share: number, kind: ShareKind, { from, to }: ShareScale): TemplateResult {
  const at = (value: number) => (value - from) / (to - from);
  const zero = percent(at(0));
  const negative = share < 0;
  const className = negative ? 's-neg' : kind === 'shared' ? 's-grp' : 's-bar';
  return html`<svg class="bar" width="100%" height="12" aria-hidden="true">
    <line x1=${zero} x2=${zero} y1="0" y2="12" class="s-axis" />
    ${
      share === 0
        ? nothing
        : svg`<rect x=${negative ? percent(at(share)) : zero} y="2" width=${percent(Math.abs(share) / (to - from))} height="8" class=${className}/>`
    }
  </svg>`;
}

/** A scale that ends on round shares, with the lines between. */
export interface ShareAxis extends ShareScale {
  readonly ticks: readonly number[];
}

/** Round steps, not more than seven of them. */
export function shareAxis(shares: readonly number[]): ShareAxis {
  const { from, to } = shareScale(shares);
  const step = roundStep((to - from) / 7);
  const first = Math.floor(from / step + 1e-9);
  const last = Math.ceil(to / step - 1e-9);
  return {
    from: first * step,
    to: last * step,
    ticks: Array.from({ length: last - first + 1 }, (_, i) => (first + i) * step),
  };
}

const ROW = 31;

/** The bar of a row in a table of shares, the grid running through all rows. @param whatIf share with a change, as a tick; null: none */
export function axisBar(share: number, kind: ShareKind, axis: ShareAxis, whatIf: number | null): TemplateResult {
  const at = (value: number) => (value - axis.from) / (axis.to - axis.from);
  const zero = percent(at(0));
  const negative = share < 0;
  return html`<svg class="bar" width="100%" height=${ROW} aria-hidden="true">
    ${axis.ticks.map((tick) => {
      const x = percent(at(tick));
      return svg`<line x1=${x} x2=${x} y1="0" y2=${ROW} class=${Math.abs(tick) < 1e-9 ? 's-axis' : 's-grid'}/>`;
    })}
    ${
      share === 0
        ? nothing
        : svg`<rect x=${negative ? percent(at(share)) : zero} y="10" width=${percent(Math.abs(share) / (axis.to - axis.from))} height="11" class=${negative ? 's-neg' : kind === 'shared' ? 's-grp' : 's-bar'}/>`
    }
    ${
      whatIf === null
        ? nothing
        : svg`<line x1=${percent(at(whatIf))} x2=${percent(at(whatIf))} y1="4" y2="27" class="s-wi no-print"/>`
    }
  </svg>`;
}

/** Numbers under the grid, in percent. */
export function axisNumbers(axis: ShareAxis): TemplateResult {
  return html`<svg class="axl" width="100%" height="20" aria-hidden="true">
    ${axis.ticks.map(
      (tick) =>
        svg`<text x=${percent((tick - axis.from) / (axis.to - axis.from))} y="14" text-anchor="middle" class="l2">${String(Math.round(100 * tick)).replace('-', '\u2212')}</text>`,
    )}
  </svg>`;
}
