import { grouped } from './digit-groups.js';
import { type Cell, type Column, headText, printable, type Report, type Table } from './table.js';

/** Characters that are markup somewhere on a wiki page: links, templates, tables, bold, headings, signatures, magic words. */
const escaped = (text: string): string =>
  printable(text)
    .replace(/[&<>[\]{}|'~_=\\]/g, (c) => `&#${c.charCodeAt(0)};`)
    .replaceAll('://', ':&#47;&#47;')
    .replace(/^[*#:; -]/, (c) => `&#${c.charCodeAt(0)};`);

const RIGHT = 'style="text-align:right" | ';

const head = (column: Column): string =>
  `! scope="col" ${column.kind === 'number' ? RIGHT : '| '}${escaped(headText(column))}`;

const field = (column: Column, cell: Cell): string =>
  `| ${column.kind === 'number' ? RIGHT : ''}${cell.kind === 'number' ? grouped(cell.text) : escaped(cell.text)}`;

/** One table in the markup of MediaWiki. */
export function tableAsMediaWiki(table: Table): string {
  return [
    '{| class="wikitable"',
    `|+ ${escaped(table.title)}`,
    '|-',
    ...table.columns.map(head),
    ...table.rows.flatMap((row) => ['|-', ...row.map((cell, i) => field(table.columns[i]!, cell))]),
    '|}',
  ].join('\n');
}

/** A report as a section of a wiki page. */
export function reportAsMediaWiki(report: Report): string {
  const parts: string[] = [`== ${escaped(report.title)} ==`];
  if (report.sentences.length > 0) parts.push(report.sentences.map(escaped).join('\n'));
  for (const table of report.tables) parts.push(tableAsMediaWiki(table), ...table.notes.map(escaped));
  if (report.cautions.length > 0)
    parts.push(
      report.cautions
        .map(
          ({ code, path, message }) =>
            `* ''Caution:'' ${escaped(path === '' ? message : `${path}: ${message}`)} (${escaped(code)})`,
        )
        .join('\n'),
    );
  parts.push([...report.conventions, report.provenance].map((note) => `* ${escaped(note)}`).join('\n'));
  return `${parts.join('\n\n')}\n`;
}
