import { html, type TemplateResult } from 'lit';
import type { LinkUncertainty } from '../../lib/answers/what-if.js';
import { formatConcise, formatScaled } from '../../lib/quantity/index.js';
import { alignedNumber, pointColumn } from '../shared/number.js';

/** The link on three scales: predicted, u, U. */
export function scalesTable({ dH, dW, y, expanded }: LinkUncertainty): TemplateResult {
  const size = (value: number) => formatConcise(value, null, { significant: 2 });
  const columns = [
    [formatConcise(dH.value, dH.u, { sign: 'always' }), size(dH.u), size(expanded.dH)],
    [formatConcise(dW.value, dW.u, { sign: 'always' }), size(dW.u), size(expanded.dW)],
    [formatScaled(y.value, y.u, -18, { sign: 'always' }), size(y.u * 1e18), size(expanded.y * 1e18)],
  ];
  const widths = columns.map(pointColumn);
  const rows = ['predicted', html`<i class="s">u</i>`, html`<i class="s">U</i>`];
  return html`<table class="tri">
    <caption class="only-spoken">The link on three scales</caption>
    <thead>
      <tr>
        <td></td>
        <th scope="col">length / m</th>
        <th scope="col">Δ<i class="s">W</i> / m²/s²</th>
        <th scope="col"><i class="s">y</i> / 1e-18</th>
      </tr>
    </thead>
    <tbody>
      ${rows.map(
        (name, r) => html`<tr>
          <th scope="row">${name}</th>
          ${columns.map((texts, c) => html`<td>${alignedNumber(texts[r]!, widths[c]!)}</td>`)}
        </tr>`,
      )}
    </tbody>
  </table>`;
}
