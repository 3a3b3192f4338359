/** One field of a table, and where it stood. */
export interface CsvCell {
  /** without its quotes, doubled quotes inside as one */
  readonly text: string;
  /** index of its first character in the file, behind an opening quote */
  readonly start: number;
}

/** One record: a line, or several where a quoted field holds line ends. */
export interface CsvRecord {
  readonly cells: readonly CsvCell[];
  readonly start: number;
}

export const SEPARATORS = [',', ';', '\t'] as const;
export type Separator = (typeof SEPARATORS)[number];

export interface CsvFault {
  readonly code: 'open-quote' | 'quote-inside' | 'text-after-quote' | 'not-a-table';
  readonly start: number;
  readonly found: string;
  readonly expected: string;
}

/** Thrown where the text can't be read as a table. */
export class CsvError extends Error {
  override readonly name = 'CsvError';
  constructor(readonly fault: CsvFault) {
    super(`${fault.code}: found ${fault.found}; expected ${fault.expected}`);
  }
}

/** The separator that parts the first line into most fields; a comma where none does. */
export function separatorOf(text: string): Separator {
  const first = /[^\r\n]*/.exec(text.replace(/^\ufeff/, '').replace(/^[\r\n]+/, ''))?.[0] ?? '';
  const bare = first.replace(/"(?:[^"]|"")*"/g, '');
  const count = (s: Separator) => bare.split(s).length;
  return SEPARATORS.reduce((best, s) => (count(s) > count(best) ? s : best));
}

/** Reads comma-separated values by RFC 4180, strictly: fields in quotes may hold separators, line ends and doubled quotes; a quote
 *  anywhere else is refused, for it is how a field that was cut in two shows. Line ends CR LF, LF or CR; a byte order mark is
 *  passed over. Records without any text (empty lines, rows of separators alone) are left out.
 * @throws {CsvError} */
export function parseCsv(text: string, separator: Separator): CsvRecord[] {
  const records: CsvRecord[] = [];
  let at = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  while (at < text.length) {
    const start = at;
    const cells: CsvCell[] = [];
    for (;;) {
      const cell = text[at] === '"' ? quotedCell(text, at, separator) : bareCell(text, at, separator);
      cells.push({ text: cell.text, start: cell.start });
      at = cell.end;
      if (text[at] !== separator) break;
      at++;
    }
    if (text[at] === '\r' && text[at + 1] === '\n') at += 2;
    else at++;
    if (cells.some((cell) => cell.text.trim() !== '')) records.push({ cells, start });
  }
  return records;
}

interface Scanned extends CsvCell {
  /** index behind the field: of a separator, a line end, or the end of the text */
  readonly end: number;
}

const endsField = (c: string | undefined, separator: Separator): boolean =>
  c === undefined || c === separator || c === '\n' || c === '\r';

function bareCell(text: string, start: number, separator: Separator): Scanned {
  let end = start;
  while (!endsField(text[end], separator)) {
    if (text[end] === '"')
      throw new CsvError({
        code: 'quote-inside',
        start: end,
        found: 'a double quote inside a field',
        expected: 'the whole field in quotes, and quotes inside it doubled: 52°17\'41.2""N',
      });
    end++;
  }
  return { text: text.slice(start, end), start, end };
}

function quotedCell(text: string, open: number, separator: Separator): Scanned {
  let content = '';
  let at = open + 1;
  for (;;) {
    const close = text.indexOf('"', at);
    if (close < 0)
      throw new CsvError({
        code: 'open-quote',
        start: open,
        found: 'a quote that is never closed',
        expected: 'a closing quote at the end of the field',
      });
    content += text.slice(at, close);
    if (text[close + 1] !== '"') {
      if (!endsField(text[close + 1], separator))
        throw new CsvError({
          code: 'text-after-quote',
          start: close + 1,
          found: 'text behind a closing quote',
          expected: 'the end of the field; a quote inside a field is doubled',
        });
      return { text: content, start: open + 1, end: close + 1 };
    }
    content += '"';
    at = close + 2;
  }
}
