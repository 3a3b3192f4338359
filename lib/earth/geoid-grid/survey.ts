import type { Warning } from '../../campaign/fault.js';
import { type GeoidGrid, latitudeOfRowDeg, longitudeOfColumnDeg } from './geoid-grid.js';

/** The Earth's geoid stays between about −107 m and +86 m. */
const MOST_HEIGHT_M = 120;
/** A square of so many equal values is a fill-in; one row of them is a pole. */
const CONSTANT_BLOCK = 5;
/** A node that differs from the mean of its neighbours by so many times what nodes of this grid typically do (median), and by a metre. */
const OUTLIER_MEDIANS = 100;
const OUTLIER_LEAST_M = 1;
const SAMPLE_EVERY = 7;

/** What a pass over all values of a grid shows. */
export interface GridSurvey {
  readonly leastM: number;
  readonly mostM: number;
  readonly missing: number;
  readonly count: number;
  readonly warnings: readonly Warning[];
}

interface Suspect {
  readonly row: number;
  readonly column: number;
  readonly valueM: number;
  readonly differenceM: number;
}

/** Looks at every value once, a few rows at a time, for what no geoid can be: heights beyond 120 m, single values far off their
 *  neighbours, squares of equal values, and a seam where the first column of a closed grid stands there again with other values.
 * @throws {CampaignError} the file is damaged somewhere */
export async function surveyGrid(grid: GeoidGrid, onProgress?: (share: number) => void): Promise<GridSurvey> {
  const survey = new Survey(grid);
  for (let row = 0; row < grid.rows; row += grid.rowsPerBlock) {
    const rows = Math.min(grid.rowsPerBlock, grid.rows - row);
    const block = await grid.readBlock(row, 0, rows, grid.columns);
    for (let i = 0; i < rows; i++) survey.takeRow(block.subarray(i * grid.columns, (i + 1) * grid.columns));
    onProgress?.((row + rows) / grid.rows);
  }
  return survey.result();
}

class Survey {
  readonly #grid: GeoidGrid;
  #least = Number.POSITIVE_INFINITY;
  #most = Number.NEGATIVE_INFINITY;
  #missing = 0;
  #beyond = 0;
  #worst: Suspect | null = null;
  #rows: Float64Array[] = [];
  #row = 0;
  /** side of the largest square of equal values that ends at each column of the row before */
  #squares: Int32Array;
  #largest = { side: 0, row: 0, column: 0, valueM: 0 };
  #sampled: number[] = [];
  #suspects: Suspect[] = [];
  #seamM = 0;

  constructor(grid: GeoidGrid) {
    this.#grid = grid;
    this.#squares = new Int32Array(grid.columns);
  }

  takeRow(row: Float64Array): void {
    const { columns, period } = this.#grid;
    for (let j = 0; j < columns; j++) {
      const v = row[j]!;
      if (Number.isNaN(v)) {
        this.#missing++;
        continue;
      }
      if (v < this.#least) this.#least = v;
      if (v > this.#most) this.#most = v;
      if (Math.abs(v) > MOST_HEIGHT_M) {
        this.#beyond++;
        if (!this.#worst || Math.abs(v) > Math.abs(this.#worst.valueM))
          this.#worst = { row: this.#row, column: j, valueM: v, differenceM: 0 };
      }
    }
    if (period === columns - 1) this.#seamM = Math.max(this.#seamM, Math.abs(row[0]! - row[columns - 1]!) || 0);
    this.#countSquares(row);
    this.#rows.push(row);
    if (this.#rows.length > 3) this.#rows.shift();
    if (this.#rows.length === 3) this.#compareWithNeighbours();
    this.#row++;
  }

  #countSquares(row: Float64Array): void {
    const above = this.#rows.at(-1);
    const next = new Int32Array(row.length);
    for (let j = 0; j < row.length; j++) {
      const v = row[j]!;
      if (Number.isNaN(v)) continue;
      const joined = above && j > 0 && above[j] === v && above[j - 1] === v && row[j - 1] === v;
      next[j] = joined ? 1 + Math.min(next[j - 1]!, this.#squares[j]!, this.#squares[j - 1]!) : 1;
      if (next[j]! > this.#largest.side) this.#largest = { side: next[j]!, row: this.#row, column: j, valueM: v };
    }
    this.#squares = next;
  }

  /** The middle one of three rows against the mean of its four neighbours. */
  #compareWithNeighbours(): void {
    const [before, middle, after] = this.#rows as [Float64Array, Float64Array, Float64Array];
    const row = this.#row - 1;
    for (let j = 1; j < middle.length - 1; j++) {
      const valueM = middle[j]!;
      const differenceM = valueM - (before[j]! + after[j]! + middle[j - 1]! + middle[j + 1]!) / 4;
      if (Number.isNaN(differenceM)) continue;
      const size = Math.abs(differenceM);
      if ((row * middle.length + j) % SAMPLE_EVERY === 0 || middle.length < 100) this.#sample(size);
      if (size > OUTLIER_LEAST_M) this.#suspect({ row, column: j, valueM, differenceM });
    }
  }

  #sample(size: number): void {
    if (this.#sampled.length < 200_000) this.#sampled.push(size);
  }

  #suspect(suspect: Suspect): void {
    const smallest = this.#suspects.at(-1);
    if (this.#suspects.length >= 50 && smallest && Math.abs(suspect.differenceM) <= Math.abs(smallest.differenceM))
      return;
    this.#suspects.push(suspect);
    this.#suspects.sort((a, b) => Math.abs(b.differenceM) - Math.abs(a.differenceM));
    this.#suspects.length = Math.min(this.#suspects.length, 50);
  }

  result(): GridSurvey {
    const count = this.#grid.rows * this.#grid.columns;
    const warnings: Warning[] = [];
    const worst = this.#worst;
    if (worst)
      warnings.push({
        code: 'implausible-height',
        path: this.#at(worst.row, worst.column),
        message: `${this.#beyond} of ${count} values are beyond ±${MOST_HEIGHT_M} m, where no geoid lies; the largest is ${format(worst.valueM)} m. Another unit, an unmarked value for "none", or no geoid at all?`,
      });
    const outlier = this.#outlier();
    if (outlier)
      warnings.push({
        code: 'outlier',
        path: this.#at(outlier.row, outlier.column),
        message: `${format(outlier.valueM)} m is ${format(outlier.differenceM)} m off the mean of its four neighbours, far more than anywhere else in this grid.`,
      });
    const { side, row, column, valueM } = this.#largest;
    if (side >= CONSTANT_BLOCK)
      warnings.push({
        code: 'constant-block',
        path: this.#at(row, column),
        message: `${side} × ${side} neighbouring values are all ${format(valueM)} m: filled in rather than computed?`,
      });
    if (this.#seamM > 0.001)
      warnings.push({
        code: 'seam',
        path: 'header',
        message: `the first and the last column are the same meridian but differ by up to ${format(this.#seamM)} m; the first is used.`,
      });
    if (this.#missing === count)
      warnings.push({ code: 'no-values', path: '', message: 'the grid has no value anywhere.' });
    return { leastM: this.#least, mostM: this.#most, missing: this.#missing, count, warnings };
  }

  #outlier(): Suspect | null {
    const largest = this.#suspects[0];
    if (!largest || this.#sampled.length === 0) return null;
    const sorted = this.#sampled.sort((a, b) => a - b);
    const median = sorted[Math.floor(sorted.length / 2)]!;
    return Math.abs(largest.differenceM) > Math.max(OUTLIER_LEAST_M, OUTLIER_MEDIANS * median) ? largest : null;
  }

  #at(row: number, column: number): string {
    const degrees = (x: number) => Number(x.toFixed(6));
    return `${degrees(latitudeOfRowDeg(this.#grid, row))}, ${degrees(longitudeOfColumnDeg(this.#grid, column))}`;
  }
}

const format = (metres: number): string => Number(metres.toFixed(4)).toString();
