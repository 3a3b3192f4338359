import { type ColumnGuess, guessColumns } from './columns.js';

/** How fields are parted. `blank`: any run of spaces and tabs. */
export type Delimiter = 'blank' | ',' | ';' | '\t';

/** What the first lines of a frequency file tell. */
export interface Head {
  readonly delimiter: Delimiter;
  /** line of the column names, counted from 1, or 0 */
  readonly headerLine: number;
  readonly columns: ColumnGuess;
  /** fields in the first data line */
  readonly width: number;
  /** line of the first data line, counted from 1 */
  readonly firstDataLine: number;
  readonly firstRow: readonly string[];
  /** a power of ten written among the names or in the last remark ("1e-15"), which may be the unit of y */
  readonly scaleSeen: string | null;
}

export interface HeadFault {
  readonly code: string;
  readonly line: number;
  readonly column: number;
  readonly found: string;
  readonly expected: string;
}

/** Data lines that the guess looks at. */
const LINES_LOOKED_AT = 200;

/** Lines that hold no data: empty, or from a mark that clock files use for remarks (common practice, no source). */
export const isComment = (line: string): boolean => /^\s*(#|%|!|\/\/|;|$)/.test(line);

const NUMBERLIKE = /^[+\-−]?(\d|\.\d)/;
const DECIMAL_COMMA = /^[+\-−]?\d+,\d+([eEdD][+\-−]?\d+)?$/;

/** Parts a line into fields; a date and a time of day parted by one blank are one field. */
export function splitFields(line: string, delimiter: Delimiter): string[] {
  const text = line.replace(/\s#.*$/, '');
  if (delimiter === 'blank') {
    const parts = text.trim().split(/[ \t]+/);
    const joined: string[] = [];
    for (let i = 0; i < parts.length; i++) {
      if (/^\d{4}-\d{2}-\d{2}$/.test(parts[i]!) && /^\d{2}:\d{2}/.test(parts[i + 1] ?? '')) {
        joined.push(`${parts[i]} ${parts[i + 1]}`);
        i++;
      } else joined.push(parts[i]!);
    }
    return joined;
  }
  return text.split(delimiter).map((f) => f.trim().replace(/^"|"$/g, '').trim());
}

function delimiterOf(line: string): Delimiter {
  if (line.includes(';')) return ';';
  if (
    line.includes(',') &&
    !line
      .trim()
      .split(/\s+/)
      .every((f) => DECIMAL_COMMA.test(f))
  )
    return ',';
  return line.trim().includes('\t') ? '\t' : 'blank';
}

/** Looks at the first lines of a file: delimiter, header, columns.
 * @param text the beginning of the file, whole lines
 * @returns what was found, or the fault that makes reading on useless */
export function readHead(text: string): Head | HeadFault {
  const lines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  let header: string[] | null = null;
  let headerLine = 0;
  let remark: { text: string; line: number } | null = null;
  let delimiter: Delimiter | null = null;
  let firstDataLine = 0;
  const rows: string[][] = [];
  for (const [i, line] of lines.entries()) {
    if (isComment(line)) {
      if (firstDataLine === 0 && /[a-z]/i.test(line))
        remark = { text: line.replace(/^\s*(#+|%+|!+|\/\/|;)/, ''), line: i + 1 };
      continue;
    }
    delimiter ??= delimiterOf(line);
    const fields = splitFields(line, delimiter);
    if (firstDataLine === 0 && !NUMBERLIKE.test(fields[0]!) && !fields.some((f) => NUMBERLIKE.test(f))) {
      if (header !== null) {
        return {
          code: 'header-twice',
          line: i + 1,
          column: 1,
          found: JSON.stringify(line.trim()),
          expected: 'numbers after the line of names',
        };
      }
      header = fields;
      headerLine = i + 1;
      delimiter = null;
      continue;
    }
    if (firstDataLine === 0) {
      firstDataLine = i + 1;
      if (header !== null) header = splitFields(lines[headerLine - 1]!, delimiter);
    }
    const comma = delimiter === 'blank' || delimiter === ';' ? fields.find((f) => DECIMAL_COMMA.test(f)) : undefined;
    if (comma !== undefined)
      return {
        code: 'decimal-comma',
        line: i + 1,
        column: line.indexOf(comma) + 1,
        found: comma,
        expected: 'a decimal point',
      };
    rows.push(fields);
    if (rows.length === LINES_LOOKED_AT) break;
  }
  if (rows.length === 0 || delimiter === null) {
    return {
      code: 'no-data',
      line: Math.max(1, lines.length),
      column: 1,
      found: 'no line with numbers',
      expected: 'a date and a value on each line',
    };
  }
  const width = rows[0]!.length;
  const scaleSeen =
    /(?:\b1e|10\^?)[-−]\d+/i.exec(headerLine > 0 ? lines[headerLine - 1]! : (remark?.text ?? ''))?.[0] ?? null;
  if (header === null && remark !== null) {
    // The names often stand in the last remark before the data; one that has another number of words is just a remark.
    const fields = splitFields(
      remark.text,
      delimiter === 'blank' || remark.text.includes(delimiter) ? delimiter : 'blank',
    );
    if (fields.length === width && fields.every((f) => f.length < 40)) {
      const guess = guessColumns(fields, rows);
      if (guess.certainty === 'certain') {
        return {
          delimiter,
          headerLine: remark.line,
          columns: guess,
          width,
          firstDataLine,
          firstRow: rows[0]!,
          scaleSeen,
        };
      }
    }
  }
  return {
    delimiter,
    headerLine,
    columns: guessColumns(header, rows),
    width,
    firstDataLine,
    firstRow: rows[0]!,
    scaleSeen,
  };
}
