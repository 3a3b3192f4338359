import { html, nothing, svg, type TemplateResult } from 'lit';

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
