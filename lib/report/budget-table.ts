import { inputUnit } from './input-unit.js';
import { decimalCell, OFFSET, sizeCell, statedCell } from './numbers.js';
import { type Cell, type Column, estimateColumn, numberColumn, textCell, textColumn } from './table.js';

/** y in units of 1e-18 */
const PER_OFFSET_UNIT = 1e18;

/** One input of a budget: as stated, and what it does to y. */
interface Contribution {
  readonly input: string;
  readonly value: number;
  readonly u: number;
  readonly sensitivity: number;
  readonly uy: number;
  readonly share: number;
}

export const BUDGET_TITLE = 'Budget: what each input contributes to u(y)';

export const SHARE_NOTE =
  'share is the part of the variance u²(y), correlations included: shares add up to 100 %, and one can be negative. c = ∂y/∂input.';

export const budgetColumns: readonly Column[] = [
  textColumn('input'),
  estimateColumn('stated', null),
  textColumn('unit'),
  numberColumn('c', '1e-18 per unit'),
  numberColumn('u(y)', OFFSET.unit),
  numberColumn('share', '%'),
];

export const budgetCells = ({ input, value, u, sensitivity, uy, share }: Contribution): readonly Cell[] => [
  textCell(input),
  statedCell({ value, u }),
  textCell(inputUnit(input)),
  sizeCell(sensitivity * PER_OFFSET_UNIT, 3),
  sizeCell(uy * PER_OFFSET_UNIT),
  shareCell(share),
];

/** Rows that weigh little, as one. */
export const restCells = (rest: readonly Contribution[]): readonly Cell[] => [
  textCell(rest.length === 1 ? rest[0]!.input : `${rest.length} more inputs together`),
  ...budgetColumns.slice(1, -1).map(() => textCell('')),
  shareCell(rest.reduce((sum, { share }) => sum + share, 0)),
];

const shareCell = (share: number): Cell => decimalCell(100 * share, 1);
