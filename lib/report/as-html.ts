import { grouped } from './digit-groups.js';
import { type Cell, type Column, headText, printable, type Report, type Table } from './table.js';

const escaped = (text: string): string =>
  printable(text)
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');

/** The old attribute, because pages with a strict Content-Security-Policy refuse styles. */
const align = ({ kind }: Column): string => (kind === 'number' ? ' align="right"' : '');

const field = (column: Column, cell: Cell, i: number): string => {
  const text = cell.kind === 'number' ? grouped(cell.text) : escaped(cell.text);
  return i === 0 && column.kind === 'text'
    ? `<th scope="row" align="left">${text}</th>`
    : `<td${align(column)}>${text}</td>`;
};

/** One table as HTML without scripts and styles. */
export function tableAsHtml(table: Table): string {
  return [
    '<table>',
    `<caption>${escaped(table.title)}</caption>`,
    `<thead><tr>${table.columns.map((column) => `<th scope="col"${align(column)}>${escaped(headText(column))}</th>`).join('')}</tr></thead>`,
    '<tbody>',
    ...table.rows.map((row) => `<tr>${row.map((cell, i) => field(table.columns[i]!, cell, i)).join('')}</tr>`),
    '</tbody>',
    '</table>',
  ].join('\n');
}

/** A report as a piece of HTML to paste into a page. */
export function reportAsHtml(report: Report): string {
  const list = (items: readonly string[]) => ['<ul>', ...items.map((item) => `<li>${item}</li>`), '</ul>'];
  const parts = ['<section>', `<h2>${escaped(report.title)}</h2>`];
  for (const sentence of report.sentences) parts.push(`<p>${escaped(sentence)}</p>`);
  for (const table of report.tables)
    parts.push(tableAsHtml(table), ...table.notes.map((note) => `<p>${escaped(note)}</p>`));
  if (report.cautions.length > 0)
    parts.push(
      ...list(
        report.cautions.map(
          ({ code, path, message }) =>
            `<em>Caution:</em> ${escaped(path === '' ? message : `${path}: ${message}`)} (${escaped(code)})`,
        ),
      ),
    );
  parts.push(...list([...report.conventions, report.provenance].map(escaped)), '</section>');
  return `${parts.join('\n')}\n`;
}
