import { closest } from '../../quantity/index.js';
import type { CsvCell } from '../csv-text.js';

/** What a column says of the value that another column holds, or the value itself. */
export type ColumnRole = 'value' | 'u' | 'source' | 'tide';

/** A head cell, read: name, unit, and what it says of all cells below it. */
export interface ColumnHead {
  readonly field: string;
  readonly role: ColumnRole;
  readonly unit: string | null;
  /** standard uncertainty of every cell that states none, as a text with its unit */
  readonly u: string | null;
  readonly tide: string | null;
  readonly cell: CsvCell;
}

/** Names of a column as people write them; single letters as they are, words in any case. */
export interface FieldNames {
  readonly field: string;
  readonly names: readonly string[];
}

export interface HeadFault {
  readonly code: string;
  readonly cell: CsvCell;
  readonly expected: string;
}

const TIDE = /^(free|zero|mean)(?:[ -]tide)?$/i;
const QUALIFIED = /^(u|source|tide)\s*(?:[([]\s*([^)\]]*?)\s*[)\]]|[ _]\s*(\S.*?))\s*(?=$|[/[(±])/i;

/** Reads a head: `h`, `h / m`, `h [m]`, `h (m)`, `zeta / m, zero`, `h / m ± 8 mm`; `u(h) / mm`, `u_h`; `source(zeta)`; `tide(h)`.
 * @param known fields that may stand there */
export function readHead(cell: CsvCell, known: readonly FieldNames[]): ColumnHead | HeadFault {
  let rest = cell.text.trim();
  let role: ColumnRole = 'value';
  let name: string;
  const qualified = QUALIFIED.exec(rest);
  if (qualified && (qualified[2] ?? qualified[3])) {
    role = qualified[1]!.toLowerCase() as ColumnRole;
    name = (qualified[2] ?? qualified[3])!;
    rest = rest.slice(qualified[0].length);
  } else {
    name = /^[^/[(±,]*/.exec(rest)![0].trim();
    rest = rest.slice(/^[^/[(±,]*/.exec(rest)![0].length);
  }
  const field = fieldOf(name, known);
  if (field === null) return unknownName(cell, name, known);
  let unit: string | null = null;
  let u: string | null = null;
  let tide: string | null = null;
  while (rest.trim() !== '') {
    const piece =
      /^\s*(?:±\s*([^,]+?)|\/\s*([^,[(±]+?)|\[\s*([^\]]*?)\s*\]|\(\s*([^)]*?)\s*\)|,\s*([^,[(±/]+?))\s*(?=$|[,[(±])/.exec(
        rest,
      );
    if (!piece) return { code: 'unreadable-head', cell, expected: HEAD_FORM };
    rest = rest.slice(piece[0].length);
    const word = piece[2] ?? piece[3] ?? piece[4] ?? piece[5];
    if (piece[1] !== undefined) u = piece[1].trim();
    else if (TIDE.test(word!)) tide = TIDE.exec(word!)![1]!.toLowerCase();
    else if (unit === null) unit = word!.trim();
    else return { code: 'unreadable-head', cell, expected: HEAD_FORM };
  }
  // a bare number behind ± is in the column's unit
  if (u !== null && unit !== null && /^[\d.e+-]+$/i.test(u)) u = `${u} ${unit}`;
  return { field, role, unit, u, tide, cell };
}

const HEAD_FORM =
  'a name, its unit and what holds for all cells: "h / m", "zeta [m], zero", "h / m ± 8 mm", "u(h) / mm"';

const isLetter = (name: string): boolean => [...name].length === 1;

function fieldOf(name: string, known: readonly FieldNames[]): string | null {
  const word = name.toLowerCase().replace(/[_-]+/g, ' ');
  const found = known.find(({ names }) =>
    names.some((n) => (isLetter(n) ? n === name : n.toLowerCase().replace(/[_-]+/g, ' ') === word)),
  );
  return found?.field ?? null;
}

function unknownName(cell: CsvCell, name: string, known: readonly FieldNames[]): HeadFault {
  if (name === 'H')
    return {
      code: 'unknown-column',
      cell,
      expected:
        'which height it is: "normal height", "orthometric height" or "dynamic height"; h is the ellipsoidal height',
    };
  const names = known.map(({ names: [first] }) => first!);
  const near = closest(
    name,
    known.flatMap((k) => k.names),
  );
  return {
    code: 'unknown-column',
    cell,
    expected: `${near === null ? 'a column that is known' : `${JSON.stringify(near)}: did you mean that?`} There are: ${names.join(', ')}`,
  };
}
