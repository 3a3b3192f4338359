import { grouped } from './digit-groups.js';
import { type Column, headText, printable, type Report, type Table } from './table.js';

/** Text of a campaign inside a Markdown cell or paragraph: shown as it is, never as markup. */
const escaped = (text: string): string => printable(text).replace(/[\\`*_[\]<>|&~#]/g, (c) => `\\${c}`);

const rule = ({ kind }: Column): string => (kind === 'number' ? '---:' : '---');

export function tableAsMarkdown(table: Table): string {
  const line = (cells: readonly string[]) => `| ${cells.join(' | ')} |`;
  return [
    line(table.columns.map((column) => escaped(headText(column)))),
    line(table.columns.map(rule)),
    ...table.rows.map((row) =>
      line(row.map((cell) => (cell.kind === 'number' ? grouped(cell.text) : escaped(cell.text)))),
    ),
  ].join('\n');
}

export function reportAsMarkdown(report: Report): string {
  const parts: string[] = [`# ${escaped(report.title)}`];
  if (report.sentences.length > 0) parts.push(report.sentences.map(escaped).join('\n'));
  for (const table of report.tables)
    parts.push(`## ${escaped(table.title)}`, tableAsMarkdown(table), ...table.notes.map(escaped));
  if (report.cautions.length > 0)
    parts.push(
      report.cautions
        .map(
          ({ code, path, message }) =>
            `- **Caution:** ${escaped(path === '' ? message : `${path}: ${message}`)} (${escaped(code)})`,
        )
        .join('\n'),
    );
  parts.push([...report.conventions, report.provenance].map((note) => `- ${escaped(note)}`).join('\n'));
  return `${parts.join('\n\n')}\n`;
}
