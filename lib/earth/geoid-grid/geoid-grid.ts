import type { Warning } from '../../campaign/fault.js';
import type { TideSystem } from '../tide-system.js';

/** What the bounds of a grid mean: its outermost nodes, or the outer edges of cells whose middles are the nodes. */
export type Registration = 'nodes' | 'edges';

/** Whether the values are geoid heights N or height anomalies ζ. They differ by decimetres in mountains, so unknown is a question. */
export type GeoidSurface = 'geoid' | 'quasigeoid' | 'unknown';

export type GridFormat = 'isg-2.0' | 'isg-1.01' | 'isg-1.0' | 'gtx' | 'geotiff';

/** A grid of geoid heights or height anomalies over geodetic latitude and longitude. Rows and columns as in the file; latitude of row
 *  i is firstLatitudeDeg + i·latitudeStepDeg, longitude of column j likewise, either step may be negative. Degrees, since that is what
 *  the nodes are exact in. */
export interface GeoidGrid {
  readonly format: GridFormat;
  /** name of the model in the file, else the file's */
  readonly name: string;
  readonly registration: Registration;
  /** how the registration was found, in words with the numbers */
  readonly registrationReason: string;
  readonly surface: GeoidSurface;
  readonly tide: TideSystem | 'unknown';
  /** what the header says of the zero level (its `height datum`), of ellipsoid and frame; null where it is silent */
  readonly heightDatum: string | null;
  readonly ellipsoid: string | null;
  readonly frame: string | null;
  readonly rows: number;
  readonly columns: number;
  readonly firstLatitudeDeg: number;
  readonly latitudeStepDeg: number;
  readonly firstLongitudeDeg: number;
  readonly longitudeStepDeg: number;
  /** columns in a full turn where the grid goes all the way round (one less than `columns` if the first stands there again), else null */
  readonly period: number | null;
  /** the header as it stands, for the reader's eye */
  readonly header: readonly { readonly key: string; readonly value: string }[];
  readonly warnings: readonly Warning[];
  /** Values of a block in metres, row by row; NaN where the file has none. The block must lie inside the grid.
   * @throws {CampaignError} the file is damaged there */
  readBlock(firstRow: number, firstColumn: number, rows: number, columns: number): Promise<Float64Array>;
  /** rows that are cheapest read together */
  readonly rowsPerBlock: number;
}

export const latitudeOfRowDeg = (grid: GeoidGrid, row: number): number =>
  grid.firstLatitudeDeg + row * grid.latitudeStepDeg;

export const longitudeOfColumnDeg = (grid: GeoidGrid, column: number): number =>
  grid.firstLongitudeDeg + column * grid.longitudeStepDeg;

/** The period of a row of nodes, if it closes round the Earth. A millionth of a cell is the rounding of a header. */
export function periodOf(columns: number, longitudeStepDeg: number): number | null {
  const turn = 360 / Math.abs(longitudeStepDeg);
  const period = Math.round(turn);
  if (Math.abs(turn - period) > 1e-4) return null;
  return period === columns || period === columns - 1 ? period : null;
}
