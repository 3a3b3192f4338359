import { html, nothing, svg, type TemplateResult } from 'lit';

/** Errors of one source: what each input alone does to the result, and what is left of them together. */
export interface SignedBars {
  /** c·u of each input, signed */
  readonly effects: readonly number[];
  /** what they would make if they were independent, ± */
  readonly independent: number;
  /** what is left with their correlation, ± */
  readonly left: number;
}

const percent = (fraction: number): string => `${(100 * fraction).toFixed(2)}%`;
const LINE = 11;

/** Each input's effect as a bar to its side of zero; below them, about the same zero, what is left of all together as a band, and
 *  what independent errors would make as dashed ends. Reads as: long bars to both sides, a narrow band, much has cancelled. */
export function signedBars({ effects, independent, left }: SignedBars): TemplateResult {
  const reach = 1.04 * Math.max(independent, left, ...effects.map(Math.abs));
  const at = (value: number) => percent(0.5 + value / (2 * reach));
  const wide = (value: number) => percent(value / (2 * reach));
  const bottom = effects.length * LINE + 6;
  const height = bottom + 18;
  return html`<svg class="signed" width="100%" height=${height} aria-hidden="true">
    <line x1="50%" x2="50%" y1="0" y2=${height} class="s-axis" />
    ${effects.map((effect, i) =>
      effect === 0
        ? nothing
        : svg`<rect x=${effect < 0 ? at(effect) : '50%'} y=${i * LINE + 2} width=${wide(Math.abs(effect))} height="6" class="s-bar"/>`,
    )}
    ${[-independent, independent].map((x) => svg`<line x1=${at(x)} x2=${at(x)} y1=${bottom - 2} y2=${bottom + 14} class="s-ind"/>`)}
    <rect x=${at(-left)} y=${bottom} width=${wide(2 * left)} height="12" class="s-band" />
    ${[-left, left].map((x) => svg`<line x1=${at(x)} x2=${at(x)} y1=${bottom} y2=${bottom + 12} class="s-end"/>`)}
  </svg>`;
}
