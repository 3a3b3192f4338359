import { html, nothing, type TemplateResult } from 'lit';
import type { SitePair } from '../../lib/answers/site-pairs.js';
import type { Campaign, Source } from '../../lib/campaign/campaign.js';
import { formatLength } from '../../lib/quantity/index.js';
import { linkLineClass, linkLineWords } from '../charts/link-line.js';
import * as words from './map-words.js';

const MOST_PAIRS = 15;

/** Per pair of sites how far apart they are and what they share of the source's error. */
export function pairsTable(
  campaign: Campaign,
  pairs: readonly SitePair[],
  inHand: string | null,
): TemplateResult | typeof nothing {
  if (pairs.length === 0) return nothing;
  // those that are linked first: they are what the campaign is about
  const ordered = [...pairs].sort((p, q) => Number(q.links.length > 0) - Number(p.links.length > 0));
  const shown = ordered.slice(0, MOST_PAIRS);
  const shared = pairs.some((pair) => pair.shared);
  const symbol = words.quantitySymbol(pairs.find((pair) => pair.shared)?.shared?.quantity ?? '');
  return html`<table class="pairs">
        <caption class="only-spoken">Sites two by two</caption>
        <thead>
          <tr>
            <th scope="col">pair</th>
            <th scope="col">distance</th>
            ${
              shared
                ? html`<th scope="col"><i class="s">ρ</i> of <i class="s">${symbol}</i></th>
                    <th scope="col"><i class="s">u</i>(Δ<i class="s">${symbol}</i>)</th>
                    <th scope="col">if apart</th>`
                : nothing
            }
          </tr>
        </thead>
        <tbody>
          ${shown.map(
            (pair) => html`<tr class=${inHand !== null && pair.links.includes(inHand) ? 'held' : ''}>
              <th scope="row">
                ${words.pairName(campaign, pair)} ${pair.links.length > 0 ? html`<small>${pair.links.join(', ')}</small>` : nothing}
              </th>
              <td>${words.distance(pair.distanceM)}</td>
              ${
                !shared
                  ? nothing
                  : pair.shared
                    ? html`<td>${words.correlation(pair.shared.correlation)}</td>
                        <td>${words.inputSize(pair.shared.uDifference, pair.shared.quantity)}</td>
                        <td>${words.inputSize(pair.shared.uIfApart, pair.shared.quantity)}</td>`
                    : html`<td class="dim">none</td><td class="dim">none</td><td class="dim">none</td>`
              }
            </tr>`,
          )}
        </tbody>
      </table>
      ${pairs.length > shown.length ? html`<p class="note">${pairs.length - shown.length} more pairs are left out.</p>` : nothing}`;
}

/** What the lines of the map mean. */
export function mapKey(campaign: Campaign, source: Source | null, editable: boolean): TemplateResult {
  const kinds = [...new Set(campaign.links.map(({ kind }) => kind))];
  const line = (className: string) =>
    html`<svg width="44" height="12" aria-hidden="true"><path d="M0 6H44" class=${className} /></svg>`;
  return html`<ul class="key-row">
        ${source?.correlationLengthM === undefined ? nothing : html`<li>${line('s-reach')} <span>reach of a source: at ${formatLength(source.correlationLengthM, 3)} <i class="s">ρ</i> has fallen to 0.37</span></li>`}
        ${kinds.map((kind) => html`<li>${line(linkLineClass(kind))} ${linkLineWords(kind)}, as the geodesic</li>`)}
        <li>${line('s-coast')} coast, good to 6 km</li>
      </ul>
      ${
        editable
          ? html`<p class="note no-print">
              A site can be dragged, or moved with the arrow keys: 1 km, with Shift 10 km. Heights do not follow.
            </p>`
          : nothing
      }`;
}
