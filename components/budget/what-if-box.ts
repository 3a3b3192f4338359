import { html, nothing, type TemplateResult } from 'lit';
import type { LinkUncertainty, WhatIfChange } from '../../lib/answers/what-if.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import type { Fault } from '../../lib/campaign/fault.js';
import { formatDays, formatLength } from '../../lib/quantity/index.js';
import { in1e18 } from './budget-words.js';
import type { Edits } from './what-if-edits.js';

interface WhatIfContext {
  readonly campaign: Campaign;
  readonly stated: LinkUncertainty;
  /** null: nothing is changed, or it cannot be computed */
  readonly changed: LinkUncertainty | null;
  readonly faults: readonly Fault[];
  readonly edits: Edits;
  /** what became of the last copy; '' before */
  readonly status: string;
  words(change: WhatIfChange): string;
  /** @param key of the edit; null: all of them */
  putBack(key: string | null): void;
  copy(): void;
}

/** What was changed and what it does to the link, stated value struck through; the campaign stays as it is. */
export function whatIfBox(context: WhatIfContext): TemplateResult {
  const { edits, faults, status, words, putBack, copy } = context;
  const readable = [...edits].filter(([, { change }]) => change !== null);
  if (readable.length === 0)
    return html`<div class="whatif idle no-print" role="status">
      <p>What if something were known better? Set a factor in the last column, or type over a <i class="s">u</i>. The campaign stays as it is.</p>
    </div>`;
  return html`<div class="whatif no-print" role="status" aria-atomic="true">
    ${
      readable.length === 1
        ? html`<p>What if ${words(readable[0]![1].change!)}?</p>`
        : html`<p>What if</p>
            <ul>
              ${readable.map(
                ([key, { change }]) => html`<li>
                  ${words(change!)}
                  <button type="button" class="word" @click=${() => putBack(key)}>put back</button>
                </li>`,
              )}
            </ul>`
    }
    ${faults.length > 0 ? refused(faults) : outcome(context)}
    <p class="buttons">
      <button type="button" class="btn" @click=${() => putBack(null)}>
        ${readable.length > 1 ? 'Put all back' : 'Put back'}
      </button>
      <button type="button" class="btn" @click=${copy}>Copy the changed budget</button>
      <span class="dim">${status}</span>
    </p>
  </div>`;
}

const refused = (faults: readonly Fault[]): TemplateResult =>
  html`<div class="flt">
    <p class="hd">Not computed</p>
    ${faults.map(({ found, expected }) => html`<p>${found}; ${expected}</p>`)}
  </div>`;

function outcome({ campaign, stated, changed }: WhatIfContext): TemplateResult {
  if (!changed) return html``;
  const [was, now] = [stated.outlook, changed.outlook];
  const time = (seconds: number | null) => (seconds === null ? 'never' : formatDays(seconds, 2));
  return html`<p class="result">
      <i class="s">u</i>(<i class="s">y</i>) ${pair(in1e18(stated.y.u, 3), in1e18(changed.y.u, 3))}e-18,
      <span class="nb">${formatLength(changed.dH.u, 2)}</span>, <i class="s">U</i>
      <span class="nb">${formatLength(changed.expanded.dH, 2)}</span>
    </p>
    ${
      was.smallestDetectableM === null || now.smallestDetectableM === null
        ? nothing
        : html`<p>
            smallest discrepancy that would show
            ${pair(formatLength(was.smallestDetectableM, 2), formatLength(now.smallestDetectableM, 2))}
          </p>`
    }
    ${
      campaign.targetM === null
        ? nothing
        : html`<p>
            time to the target of ${formatLength(campaign.targetM)}
            ${pair(time(was.timeToTargetS), time(now.timeToTargetS))}
          </p>`
    }`;
}

const pair = (was: string, now: string): TemplateResult =>
  was === now
    ? html`<span class="nb">${was}</span>`
    : html`<span class="was">${was}</span> <span class="now"><span class="only-spoken">now </span>${now}</span>`;
