import { type Cell, type Column, headText, type Report, type Table } from './table.js';

/** RFC 4180: quoted where it must be. */
const field = (text: string): string => (/[",\r\n]|^\s|\s$/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);

const heads = (column: Column): string[] => {
  const head = headText(column);
  return column.withU ? [head, `u(${column.head})${column.unit === null ? '' : ` / ${column.unit}`}`] : [head];
};

/** Numbers unrounded with a plain minus, the uncertainty in a column of its own: for reading into another program. */
const fields = (column: Column, cell: Cell): string[] => {
  if (cell.kind === 'number') {
    const value = String(cell.value);
    return column.withU ? [value, cell.u === null ? '' : String(cell.u)] : [value];
  }
  return column.withU ? [cell.text, ''] : [cell.text];
};

/** One table as comma-separated values: a head line, then the rows; lines end in CR LF (RFC 4180). */
export function tableAsCsv(table: Table): string {
  const lines = [
    table.columns.flatMap(heads),
    ...table.rows.map((row) => table.columns.flatMap((column, i) => fields(column, row[i]!))),
  ];
  return lines.map((line) => `${line.map(field).join(',')}\r\n`).join('');
}

/** All tables of a report, an empty line between them. */
export const reportAsCsv = (report: Report): string => report.tables.map(tableAsCsv).join('\r\n');
