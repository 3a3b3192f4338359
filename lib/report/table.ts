import type { Warning } from '../campaign/fault.js';

/** What stands in one field of a table. A missing value is the word `none`, a failed one `not computed`: never blank. */
export type Cell =
  | { readonly kind: 'text'; readonly text: string }
  /** A number as shown (`text`: rounded on its own uncertainty, digits not grouped) and as computed, in the unit of its
   *  column; u null where it has none */
  | { readonly kind: 'number'; readonly text: string; readonly value: number; readonly u: number | null }
  | { readonly kind: 'missing'; readonly text: 'none' | 'not computed' };

export interface Column {
  /** Name in the field's terms, without the unit */
  readonly head: string;
  /** Stands once, in the head, after a solidus; null for texts and plain numbers */
  readonly unit: string | null;
  readonly kind: 'text' | 'number';
  /** The column's numbers carry uncertainties: in CSV they get a column of their own */
  readonly withU?: boolean;
}

export interface Table {
  /** Stable word, for choosing one table */
  readonly id: string;
  readonly title: string;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
  /** What a reader must know to read these columns rightly */
  readonly notes: readonly string[];
}

/** An answer as tables: what every way of printing it shares. */
export interface Report {
  readonly title: string;
  /** The finding, in one or two sentences with the numbers in them */
  readonly sentences: readonly string[];
  readonly tables: readonly Table[];
  /** Tide system, signs, W0: valid for all tables */
  readonly conventions: readonly string[];
  readonly cautions: readonly Warning[];
  /** Version and date of the computation; one line */
  readonly provenance: string;
}

export const textColumn = (head: string): Column => ({ head, unit: null, kind: 'text' });
export const numberColumn = (head: string, unit: string | null = null): Column => ({ head, unit, kind: 'number' });
export const estimateColumn = (head: string, unit: string | null): Column => ({
  ...numberColumn(head, unit),
  withU: true,
});

export const textCell = (text: string): Cell => ({ kind: 'text', text });
export const none: Cell = { kind: 'missing', text: 'none' };
export const notComputed: Cell = { kind: 'missing', text: 'not computed' };

/** Head of a column with its unit after a solidus: `ΔW / m²/s²`. */
export const headText = ({ head, unit }: Column): string => (unit === null ? head : `${head} / ${unit}`);

/** Texts of a campaign may hold anything; characters that would steer a terminal or turn the direction of a line are shown by number. */
export const printable = (text: string): string =>
  text.replace(
    // biome-ignore lint/suspicious/noControlCharactersInRegex: these are the characters to be found
    /[\u0000-\u001f\u007f-\u009f\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/g,
    (c) => `\\u{${c.charCodeAt(0).toString(16).padStart(4, '0')}}`,
  );
