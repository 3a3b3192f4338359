import { type CsvCell, CsvError, type CsvRecord, parseCsv, type Separator, separatorOf } from '../csv-text.js';
import { CampaignError, type Fault, faultAt } from '../fault.js';
import { quoted } from '../json-text.js';
import { TextPlaces } from '../text-place.js';
import { type ColumnHead, type FieldNames, readHead } from './table-head.js';

/** The value of one row in one field, with what the columns beside it and the head say of it. */
export interface Entry {
  readonly cell: CsvCell;
  readonly head: ColumnHead;
  readonly u: { readonly cell: CsvCell; readonly unit: string | null } | null;
  readonly source: CsvCell | null;
  readonly tide: CsvCell | null;
}

export interface Row {
  readonly start: number;
  readonly entries: ReadonlyMap<string, Entry>;
}

export interface ReadTable {
  readonly text: string;
  readonly heads: readonly ColumnHead[];
  readonly rows: readonly Row[];
}

/** Splits a table into rows of named fields.
 * @param separator null: the one that the first line is parted by
 * @param ignored names of columns to pass over
 * @throws {CampaignError} no head, an unknown or doubled column, a row with more or fewer fields than the head */
export function readTable(
  text: string,
  known: readonly FieldNames[],
  separator: Separator | null,
  ignored: readonly string[],
): ReadTable {
  const places = new TextPlaces(text);
  const faults: Fault[] = [];
  const refuse = (code: string, path: string, start: number, found: string, expected: string) =>
    faults.push({ ...faultAt(code, path, found, expected), ...places.at(start) });
  const stop = (): never => {
    throw new CampaignError(faults);
  };
  const parted = separator ?? separatorOf(text);
  let records: CsvRecord[] = [];
  try {
    records = parseCsv(text, parted);
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const { code, start, found, expected } = error.fault;
    refuse(code, '', start, found, expected);
    return stop();
  }
  const [first, ...rest] = records;
  if (first === undefined) {
    refuse(
      'empty-table',
      '',
      0,
      'a table without a line',
      'a first line with the names of the columns: id,lat,lon,h / m',
    );
    return stop();
  }
  const heads = first.cells.map((cell): ColumnHead | null => {
    if (cell.text.trim() === '' || ignored.includes(cell.text.trim())) return null;
    const head = readHead(cell, known);
    if ('role' in head) return head;
    refuse(head.code, 'head', cell.start, quoted(cell.text), head.expected);
    return null;
  });
  const seen = new Map<string, ColumnHead>();
  for (const head of heads) {
    if (head === null) continue;
    const key = `${head.role} ${head.field}`;
    if (seen.has(key))
      refuse('duplicate-column', 'head', head.cell.start, quoted(head.cell.text), `one column of ${head.field}`);
    seen.set(key, head);
  }
  for (const head of heads)
    if (head !== null && head.role !== 'value' && !seen.has(`value ${head.field}`))
      refuse(
        'column-alone',
        'head',
        head.cell.start,
        quoted(head.cell.text),
        `a column ${quoted(head.field)} beside it`,
      );
  for (const record of rest) checkLength(record, first, parted, refuse);
  if (rest.length === 0) refuse('empty-table', '', first.start, 'a head without rows', 'a line for each item below it');
  if (faults.length > 0) stop();
  return { text, heads: heads.filter((h) => h !== null), rows: rest.map((record) => rowOf(record, heads)) };
}

function checkLength(
  record: CsvRecord,
  head: CsvRecord,
  separator: Separator,
  refuse: (code: string, path: string, start: number, found: string, expected: string) => void,
): void {
  const [found, expected] = [record.cells.length, head.cells.length];
  if (found === expected) return;
  const comma =
    separator === ',' && found > expected && record.cells.some(({ text }) => /^\d+(?:\(|\s|$)/.test(text.trim()))
      ? '. A decimal comma splits a number in two here: write 143.216, or part the fields by semicolons and still write decimal points'
      : '';
  const at = record.cells[Math.min(found, expected) - 1]?.start ?? record.start;
  refuse('field-count', '', at, `${found} fields`, `${expected}, as the head has${comma}`);
}

function rowOf(record: CsvRecord, heads: readonly (ColumnHead | null)[]): Row {
  const cellOf = new Map<string, { head: ColumnHead; cell: CsvCell }>();
  heads.forEach((head, i) => {
    const cell = record.cells[i]!;
    // an empty cell says nothing: never 0
    if (head !== null && cell.text.trim() !== '')
      cellOf.set(`${head.role} ${head.field}`, { head, cell: trimmed(cell) });
  });
  const entries = new Map<string, Entry>();
  for (const { head, cell } of cellOf.values()) {
    if (head.role !== 'value') continue;
    const u = cellOf.get(`u ${head.field}`);
    entries.set(head.field, {
      cell,
      head,
      u: u ? { cell: u.cell, unit: u.head.unit ?? head.unit } : null,
      source: cellOf.get(`source ${head.field}`)?.cell ?? null,
      tide: cellOf.get(`tide ${head.field}`)?.cell ?? null,
    });
  }
  return { start: record.cells[0]?.start ?? record.start, entries };
}

const trimmed = ({ text, start }: CsvCell): CsvCell => ({
  text: text.trim(),
  start: start + (text.length - text.trimStart().length),
});
