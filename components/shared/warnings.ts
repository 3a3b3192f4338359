import { html, nothing, type TemplateResult } from 'lit';
import type { Warning } from '../../lib/campaign/fault.js';

/** Notes under a figure: what was assumed, with its size. The word comes first, so that colour is not alone. */
export const warningList = (warnings: readonly Warning[]): TemplateResult | typeof nothing =>
  warnings.length === 0
    ? nothing
    : html`<ul class="warnings">
        ${warnings.map(({ message }) => html`<li><span class="caution">Caution:</span> ${message}</li>`)}
      </ul>`;
