import { grouped } from './digit-groups.js';
import { type Cell, type Column, headText, printable, type Report, type Table } from './table.js';

/** Columns of a terminal that a text takes: marks that sit on a letter take none, East Asian wide letters two. */
export function displayWidth(text: string): number {
  let width = 0;
  for (const c of text) {
    if (/\p{Mark}/u.test(c)) continue;
    width +=
      /[\u1100-\u115f\u2e80-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\uffe0-\uffe6]|\p{Emoji_Presentation}/u.test(
        c,
      )
        ? 2
        : 1;
  }
  return width;
}

const padEnd = (text: string, width: number) => text + ' '.repeat(Math.max(0, width - displayWidth(text)));
const padStart = (text: string, width: number) => ' '.repeat(Math.max(0, width - displayWidth(text))) + text;

/** A number splits where its units end, at the point if one stands outside the bracket: never at the bracket's own point. */
function splitAtPoint(cell: Cell): readonly [string, string] {
  if (cell.kind !== 'number') return [printable(cell.text), ''];
  const text = grouped(cell.text);
  const at = text.search(/[.(e]/);
  return at < 0 ? [text, ''] : [text.slice(0, at), text.slice(at)];
}

interface LaidOut {
  readonly head: string;
  readonly body: readonly string[];
}

/** Integer part right, the rest left, in a fixed width: the decimal points of a column stand under each other. */
function layOut(column: Column, cells: readonly Cell[]): LaidOut {
  const head = headText(column);
  const headWidth = displayWidth(head);
  if (column.kind === 'text') {
    const texts = cells.map((cell) => printable(cell.text));
    const width = Math.max(headWidth, ...texts.map(displayWidth));
    return { head: padEnd(head, width), body: texts.map((text) => padEnd(text, width)) };
  }
  const parts = cells.map(splitAtPoint);
  const right = Math.max(0, ...parts.map(([, rest]) => displayWidth(rest)));
  const left = Math.max(headWidth - right, ...parts.map(([whole]) => displayWidth(whole)));
  return {
    head: padStart(head, left + right),
    body: parts.map(([whole, rest]) => padStart(whole, left) + padEnd(rest, right)),
  };
}

/** One table for a terminal: head, rule, rows; columns two spaces apart. */
export function tableAsText(table: Table): string {
  const columns = table.columns.map((column, i) =>
    layOut(
      column,
      table.rows.map((row) => row[i]!),
    ),
  );
  const line = (cells: readonly string[]) => cells.join('  ').trimEnd();
  return [
    line(columns.map(({ head }) => head)),
    columns.map(({ head }) => '─'.repeat(displayWidth(head))).join('  '),
    ...table.rows.map((_, i) => line(columns.map(({ body }) => body[i]!))),
  ].join('\n');
}

/** Breaks at spaces (not at no-break ones), later lines indented. */
export function wrap(text: string, width = 96, indent = ''): string {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line !== '' && displayWidth(line) + 1 + displayWidth(word) > width) {
      lines.push(line);
      line = indent + word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  return [...lines, line].join('\n');
}

export function reportAsText(report: Report): string {
  const parts: string[] = [printable(report.title)];
  if (report.sentences.length > 0) parts.push(report.sentences.map((s) => wrap(printable(s))).join('\n'));
  for (const table of report.tables)
    parts.push(
      [printable(table.title), tableAsText(table), ...table.notes.map((note) => wrap(printable(note)))].join('\n'),
    );
  if (report.cautions.length > 0) parts.push(cautionsAsText(report.cautions));
  parts.push([...report.conventions.map((note) => wrap(printable(note))), report.provenance].join('\n'));
  return `${parts.join('\n\n')}\n`;
}

/** More cautions than this are counted, not printed: nobody reads the hundredth default. */
const MAX_CAUTIONS = 30;

export function cautionsAsText(cautions: Report['cautions']): string {
  const shown = cautions
    .slice(0, MAX_CAUTIONS)
    .map(({ code, path, message }) =>
      wrap(`Caution: ${printable(path === '' ? message : `${path}: ${message}`)} [${printable(code)}]`, 96, '  '),
    );
  const rest = cautions.length - shown.length;
  return [...shown, ...(rest > 0 ? [`Caution: ${rest} more like these; --json lists all of them`] : [])].join('\n');
}
