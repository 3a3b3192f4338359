import { html, nothing, type TemplateResult } from 'lit';
import type { Cell, Column, Table } from '../../lib/report/table.js';
import { alignedNumber, pointColumn, quantityText } from './number.js';

/** A path may be broken after its points. */
const breakable = (text: string): TemplateResult =>
  html`${text.split(/(?<=\w\.)(?=\w)/).map((part, i) => (i === 0 ? part : html`<wbr />${part}`))}`;

const cell = (value: Cell, column: Column, width: string, first: boolean): TemplateResult => {
  if (first && column.kind === 'text' && value.text !== '') return html`<th scope="row">${breakable(value.text)}</th>`;
  if (value.kind === 'number')
    return html`<td class="num">${column.withU ? alignedNumber(value.text, width) : quantityText(value.text)}</td>`;
  return html`<td class=${column.kind === 'number' ? 'num' : ''}>${breakable(value.text)}</td>`;
};

/** A table of so few rows is not broken over pages. */
const SHORT = 14;

/** A neutral table of lib/report as a table of a page, its title as the caption. */
export function reportTable({ title, columns, rows, notes }: Table): TemplateResult {
  const widths = columns.map((_, i) =>
    pointColumn(rows.flatMap((row) => (row[i]?.kind === 'number' ? [row[i].text] : []))),
  );
  return html`<table class="rt ${rows.length <= SHORT ? 'short' : ''}">
      <caption>${title}</caption>
      <thead>
        <tr>
          ${columns.map(
            ({ head, unit, kind }) =>
              html`<th scope="col" class=${kind === 'number' ? 'num' : ''}>${head}${unit === null ? nothing : html` <span class="nb">/ ${unit}</span>`}</th>`,
          )}
        </tr>
      </thead>
      <tbody>
        ${rows.map((row) => html`<tr>${row.map((value, i) => cell(value, columns[i]!, widths[i]!, i === 0))}</tr>`)}
      </tbody>
    </table>
    ${notes.map((note) => html`<p class="rn">${note}</p>`)}`;
}
