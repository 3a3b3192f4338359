import { CampaignError, faultAt } from '../../campaign/fault.js';
import { type GeoidGrid, latitudeOfRowDeg, longitudeOfColumnDeg } from './geoid-grid.js';

/** How a value between nodes is found. `bicubic`: cubic convolution with a = −1/2 (Keys 1981, IEEE Trans. ASSP 29:1153), over 4 × 4 nodes;
 *  smooth, exact for a surface of second degree. */
export type InterpolationMethod = 'bilinear' | 'bicubic';

/** The nodes round a point, up to 4 × 4, southern and western first: all that an interpolation there needs, so that it can be kept in a
 *  campaign in place of the grid. Longitudes run on across ±180°. */
export interface GridExcerpt {
  readonly latitudesDeg: readonly number[];
  readonly longitudesDeg: readonly number[];
  /** metres, a row per latitude; null where the grid has no value */
  readonly valuesM: readonly (readonly (number | null)[])[];
}

export interface GridNode {
  readonly latitudeDeg: number;
  /** −180 … 180 */
  readonly longitudeDeg: number;
  readonly valueM: number | null;
}

export interface InterpolatedValue {
  readonly valueM: number;
  /** the four nodes round the point: south-west, south-east, north-west, north-east */
  readonly nodes: readonly GridNode[];
}

/** A millionth of a millimetre on the ground: the rounding of a node's own coordinates, not a place outside. */
const ROUNDING_CELLS = 1e-9;

/** Cell, counted from the south-western node, and place in it, 0 … 1. */
interface Place {
  readonly cell: number;
  readonly fraction: number;
}

/** Place along an axis of `count` nodes, or null outside. At the last node the cell before it, with fraction 1. */
function placeOnAxis(position: number, count: number): Place | null {
  if (!(position >= -ROUNDING_CELLS && position <= count - 1 + ROUNDING_CELLS)) return null;
  const cell = Math.min(Math.max(Math.floor(position), 0), count - 2);
  const fraction = position - cell;
  // a point that is a node but for rounding takes that node alone
  const nearest = Math.round(fraction);
  return { cell, fraction: Math.abs(fraction - nearest) <= ROUNDING_CELLS ? nearest : fraction };
}

/** Reads the nodes round a point.
 * @param latitudeDeg −90 … 90; @param longitudeDeg any finite angle, turns are taken off
 * @throws {CampaignError} `outside-grid` */
export async function gridExcerpt(grid: GeoidGrid, latitudeDeg: number, longitudeDeg: number): Promise<GridExcerpt> {
  if (!(Math.abs(latitudeDeg) <= 90) || !Number.isFinite(longitudeDeg))
    throw new CampaignError([
      faultAt(
        'position',
        '',
        `latitude ${latitudeDeg}, longitude ${longitudeDeg}`,
        'degrees, latitude from −90 to 90, longitude east',
      ),
    ]);
  const { rows, columns, period } = grid;
  // counted from the south and from the west, whatever the order in the file
  const north = grid.latitudeStepDeg > 0;
  const east = grid.longitudeStepDeg > 0;
  const south = latitudeOfRowDeg(grid, north ? 0 : rows - 1);
  const west = longitudeOfColumnDeg(grid, east ? 0 : columns - 1);
  const step = { lat: Math.abs(grid.latitudeStepDeg), lon: Math.abs(grid.longitudeStepDeg) };
  const row = placeOnAxis((latitudeDeg - south) / step.lat, rows);
  const turned = longitudeDeg - west - 360 * Math.floor((longitudeDeg - west) / 360);
  // just west of the first node the turn leads to just below 360°
  const along = turned / step.lon;
  const full = 360 / step.lon;
  const column = placeOnAxis(full - along <= ROUNDING_CELLS ? 0 : along, period === null ? columns : period + 1);
  if (!row || !column) throw new CampaignError([outside(grid, latitudeDeg, longitudeDeg, south, west)]);

  const firstRow = Math.max(0, row.cell - 1);
  const lastRow = Math.min(rows - 1, row.cell + 2);
  const wrap = period !== null;
  const firstColumn = wrap ? column.cell - 1 : Math.max(0, column.cell - 1);
  const lastColumn = wrap ? column.cell + 2 : Math.min(columns - 1, column.cell + 2);
  const rowNumbers = range(firstRow, lastRow);
  const columnNumbers = range(firstColumn, lastColumn);
  // a closed row whose first column stands there again counts periods, not columns, from the west
  const inFile = columnNumbers
    .map((c) => (period === null ? c : ((c % period) + period) % period))
    .map((c) => (east ? c : columns - 1 - c));
  const valuesM: (number | null)[][] = [];
  for (const r of rowNumbers) valuesM.push(await readColumns(grid, north ? r : rows - 1 - r, inFile));
  return {
    latitudesDeg: rowNumbers.map((r) => latitudeOfRowDeg(grid, north ? r : rows - 1 - r)),
    longitudesDeg: columnNumbers.map((c) => west + c * step.lon),
    valuesM,
  };
}

/** Values of some columns of a row, at one go where they stand together (everywhere but across the seam). */
async function readColumns(grid: GeoidGrid, row: number, columns: readonly number[]): Promise<(number | null)[]> {
  const first = Math.min(...columns);
  const last = Math.max(...columns);
  const value = (v: number | undefined) => (v === undefined || Number.isNaN(v) ? null : v);
  if (last - first === columns.length - 1) {
    const block = await grid.readBlock(row, first, 1, columns.length);
    return columns.map((c) => value(block[c - first]));
  }
  const values: (number | null)[] = [];
  for (const c of columns) values.push(value((await grid.readBlock(row, c, 1, 1))[0]));
  return values;
}

const range = (first: number, last: number): number[] => Array.from({ length: last - first + 1 }, (_, i) => first + i);

function outside(grid: GeoidGrid, latitudeDeg: number, longitudeDeg: number, south: number, west: number) {
  const north = south + (grid.rows - 1) * Math.abs(grid.latitudeStepDeg);
  const east = west + (grid.columns - 1) * Math.abs(grid.longitudeStepDeg);
  const edge =
    grid.registration === 'edges' ? ' (the outermost nodes are cell middles; beyond them nothing is extrapolated)' : '';
  return faultAt(
    'outside-grid',
    '',
    `latitude ${latitudeDeg}, longitude ${longitudeDeg}`,
    `latitude ${round(south)} … ${round(north)}, longitude ${grid.period === null ? `${round(west)} … ${round(east)}` : 'any'}${edge}`,
  );
}

const round = (degrees: number): number => Number(degrees.toFixed(12));

/** Value at a point from the nodes round it. Nodes of weight 0 (a point on a grid line) need no value.
 * @throws {CampaignError} `outside-grid`; `nodata`: a node that counts has no value; `stencil`: bicubic within one cell of the border */
export function interpolate(
  excerpt: GridExcerpt,
  latitudeDeg: number,
  longitudeDeg: number,
  method: InterpolationMethod = 'bilinear',
): InterpolatedValue {
  const { latitudesDeg, longitudesDeg, valuesM } = excerpt;
  const rows = latitudesDeg.length;
  const columns = longitudesDeg.length;
  const latitudeStep = (latitudesDeg[rows - 1]! - latitudesDeg[0]!) / (rows - 1);
  const longitudeStep = (longitudesDeg[columns - 1]! - longitudesDeg[0]!) / (columns - 1);
  const row = placeOnAxis((latitudeDeg - latitudesDeg[0]!) / latitudeStep, rows);
  // the turn that brings the longitude nearest to the middle of the excerpt
  const middle = (longitudesDeg[0]! + longitudesDeg[columns - 1]!) / 2;
  const near = longitudeDeg - 360 * Math.round((longitudeDeg - middle) / 360);
  const column = placeOnAxis((near - longitudesDeg[0]!) / longitudeStep, columns);
  if (!row || !column)
    throw new CampaignError([
      faultAt(
        'outside-grid',
        '',
        `latitude ${latitudeDeg}, longitude ${longitudeDeg}`,
        `latitude ${latitudesDeg[0]} … ${latitudesDeg[rows - 1]}, longitude ${longitudesDeg[0]} … ${longitudesDeg[columns - 1]}: the nodes that are kept`,
      ),
    ]);
  const weights = method === 'bilinear' ? linearWeights : cubicWeights;
  let valueM = 0;
  for (const [i, wi] of weights(row, rows)) {
    for (const [j, wj] of weights(column, columns)) {
      const node = valuesM[i]![j];
      if (node === null || node === undefined)
        throw new CampaignError([
          faultAt(
            'nodata',
            '',
            `no value at the node ${round(latitudesDeg[i]!)}, ${round(normalized(longitudesDeg[j]!))}`,
            `values at all ${method === 'bilinear' ? 'four' : 'sixteen'} nodes round the point${method === 'bicubic' ? '; bilinear needs four' : ''}`,
          ),
        ]);
      valueM += wi * wj * node;
    }
  }
  const nodes = [0, 1].flatMap((i) =>
    [0, 1].map((j) => ({
      latitudeDeg: round(latitudesDeg[row.cell + i]!),
      longitudeDeg: round(normalized(longitudesDeg[column.cell + j]!)),
      valueM: valuesM[row.cell + i]![column.cell + j]!,
    })),
  );
  return { valueM, nodes };
}

/** The nodes that a campaign can keep in place of the grid: all of them, or the four round the point where one further out has no value;
 *  null where one of these has none. */
export function nodesToKeep(excerpt: GridExcerpt, latitudeDeg: number, longitudeDeg: number): GridExcerpt | null {
  const isWhole = ({ valuesM }: GridExcerpt) => valuesM.every((row) => row.every((v) => v !== null));
  if (isWhole(excerpt)) return excerpt;
  const { latitudesDeg, longitudesDeg, valuesM } = excerpt;
  const middle = (longitudesDeg[0]! + longitudesDeg.at(-1)!) / 2;
  const near = longitudeDeg - 360 * Math.round((longitudeDeg - middle) / 360);
  const cellOf = (nodes: readonly number[], x: number) =>
    Math.max(0, Math.min(nodes.filter((n) => n <= x).length - 1, nodes.length - 2));
  const row = cellOf(latitudesDeg, latitudeDeg);
  const column = cellOf(longitudesDeg, near);
  const four = {
    latitudesDeg: latitudesDeg.slice(row, row + 2),
    longitudesDeg: longitudesDeg.slice(column, column + 2),
    valuesM: valuesM.slice(row, row + 2).map((values) => values.slice(column, column + 2)),
  };
  return isWhole(four) ? four : null;
}

/** Longitude within −180 … 180; the antimeridian keeps its sign. */
const normalized = (degrees: number): number =>
  Math.abs(degrees) <= 180 ? degrees : degrees - 360 * Math.round(degrees / 360);

type Weights = readonly (readonly [node: number, weight: number])[];

const linearWeights = ({ cell, fraction }: Place): Weights =>
  (
    [
      [cell, 1 - fraction],
      [cell + 1, fraction],
    ] as const
  ).filter(([, weight]) => weight !== 0);

/** Keys (1981), eq. (15) with a = −1/2. */
function cubicWeights({ cell, fraction: t }: Place, count: number): Weights {
  if (t === 0 || t === 1) return [[cell + t, 1]];
  if (cell < 1 || cell + 2 >= count)
    throw new CampaignError([
      faultAt(
        'stencil',
        '',
        'a point within one cell of the border of the grid',
        'two nodes on every side for bicubic interpolation; bilinear needs one',
      ),
    ]);
  const s = 1 - t;
  return [
    [cell - 1, -0.5 * t * s * s],
    [cell, 1 + t * t * (1.5 * t - 2.5)],
    [cell + 1, 1 + s * s * (1.5 * s - 2.5)],
    [cell + 2, -0.5 * s * t * t],
  ];
}
