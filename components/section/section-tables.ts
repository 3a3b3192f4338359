import { html, nothing, type TemplateResult } from 'lit';
import type { Section, SectionClock } from '../../lib/answers/section.js';
import { alignedNumber, pointColumn } from '../shared/number.js';
import type { ScaleTexts } from './section-words.js';
import * as words from './section-words.js';

/** One row of the three scales. */
export interface ScaleRow {
  readonly name: TemplateResult | string;
  readonly texts: ScaleTexts;
  readonly sum?: boolean;
}

const KEYS = ['length', 'potential', 'offset'] as const;

/** The three scales side by side, each column aligned on its points. @param kind which heads: of a level or of a difference */
export function scaleTable(caption: string, rows: readonly ScaleRow[], kind: 'level' | 'difference'): TemplateResult {
  const columns = KEYS.map((key) => pointColumn(rows.map(({ texts }) => texts[key])));
  const heads =
    kind === 'level'
      ? html`<th scope="col"><i class="s">C</i>/<i class="s">g</i> / m</th>
          <th scope="col"><i class="s">C</i> / m²/s²</th>
          <th scope="col"><i class="s">C</i>/<i class="s">c</i>² / 1e-18</th>`
      : html`<th scope="col">length / m</th>
          <th scope="col">Δ<i class="s">W</i> / m²/s²</th>
          <th scope="col"><i class="s">y</i> / 1e-18</th>`;
  return html`<table class="tri">
    <caption class="only-spoken">${caption}</caption>
    <thead>
      <tr><td></td>${heads}</tr>
    </thead>
    <tbody>
      ${rows.map(
        ({ name, texts, sum }) => html`<tr class=${sum ? 'sum' : ''}>
          <th scope="row">${name}</th>
          ${KEYS.map((key, i) => html`<td>${alignedNumber(texts[key], columns[i]!)}</td>`)}
        </tr>`,
      )}
    </tbody>
  </table>`;
}

/** The tie of a clock step by step. */
export function tieTable(clock: SectionClock): TemplateResult {
  if (!clock.sum) return html`<p class="note">The file holds no tie: the atoms are taken to be at the marker.</p>`;
  const rows: ScaleRow[] = clock.tie.map(({ name, step, digits }) => ({
    name,
    texts: words.scaleTexts(step, 'signed', digits),
  }));
  if (rows.length > 1) rows.push({ name: 'sum', texts: words.scaleTexts(clock.sum, 'signed'), sum: true });
  return scaleTable(`Tie of clock ${clock.id}`, rows, 'level');
}

export interface LinkRow {
  readonly id: string;
  readonly ends: string;
  readonly texts: ScaleTexts | null;
}

/** Everything on the section as one table. */
export function sectionTable(section: Section, links: readonly LinkRow[]): TemplateResult {
  const W = section.sites.map(words.siteW);
  const C = [...section.sites.map(words.siteC), ...section.clocks.map(words.clockC)];
  const H = section.sites.map(words.siteHeight);
  const known = links.filter(({ texts }) => texts !== null);
  const wide = { W: pointColumn(W), C: pointColumn(C), H: pointColumn(H) };
  return html`<table class="all">
      <caption class="only-spoken">Levels of the markers and the atoms</caption>
      <thead>
        <tr>
          <th scope="col">marker, atoms</th>
          <th scope="col"><i class="s">W</i> <span class="nb">/ m²/s²</span></th>
          <th scope="col"><i class="s">C</i> <span class="nb">/ m²/s²</span></th>
          <th scope="col">normal height <span class="nb">/ m</span></th>
        </tr>
      </thead>
      <tbody>
        ${section.sites.map(
          (site, i) => html`<tr>
              <th scope="row">${site.name}</th>
              <td>${alignedNumber(W[i]!, wide.W)}</td>
              <td>${alignedNumber(C[i]!, wide.C)}</td>
              <td>${alignedNumber(H[i]!, wide.H)}</td>
            </tr>
            ${section.clocks
              .filter((clock) => clock.site === site.id)
              .map(
                (clock) => html`<tr>
                  <th scope="row">atoms of ${clock.id}</th>
                  <td></td>
                  <td>${alignedNumber(words.clockC(clock), wide.C)}</td>
                  <td></td>
                </tr>`,
              )}`,
        )}
      </tbody>
    </table>
    ${
      known.length === 0
        ? nothing
        : html`<div class="lists">
            ${scaleTable(
              'Links',
              known.map(({ id, ends, texts }) => ({ name: html`<b>${id}</b> ${ends}`, texts: texts! })),
              'difference',
            )}
          </div>`
    }`;
}
