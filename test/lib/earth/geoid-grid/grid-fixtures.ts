import { readFileSync } from 'node:fs';
import { CampaignError, type Fault } from '../../../../lib/campaign/fault.js';
import { bytesSource } from '../../../../lib/earth/file-bytes/byte-source.js';
import {
  type GeoidGrid,
  gridExcerpt,
  type InterpolationMethod,
  interpolate,
  openGeoidGrid,
} from '../../../../lib/earth/geoid-grid/index.js';

export const dataFile = (name: string): Uint8Array =>
  new Uint8Array(readFileSync(new URL(`../../../data/${name}`, import.meta.url)));

export const open = (bytes: Uint8Array, name = 'test'): Promise<GeoidGrid> => openGeoidGrid(bytesSource(name, bytes));

export const valueAt = async (
  grid: GeoidGrid,
  lat: number,
  lon: number,
  method?: InterpolationMethod,
): Promise<number> => interpolate(await gridExcerpt(grid, lat, lon), lat, lon, method).valueM;

/** The first fault with which something is refused. */
export async function faultOf(run: () => unknown): Promise<Fault> {
  try {
    await run();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults[0]!;
    throw error;
  }
  throw new Error('nothing was refused');
}

export const text = (s: string): Uint8Array => new TextEncoder().encode(s);

/** An ISG 2.0 grid of 3 × 4 nodes, 10·row + column, with entries of the head replaced, added or (null) left out. */
export function isg(
  changes: Readonly<Record<string, string | null>> = {},
  rows: readonly string[] = ['0 1 2 3', '10 11 12 13', '20 21 22 23'],
): Uint8Array {
  const head: Record<string, string | null> = {
    'model name': 'TEST',
    'data type': 'quasi-geoid',
    'data units': 'meters',
    'data format': 'grid',
    'data ordering': 'N-to-S, W-to-E',
    'ref ellipsoid': 'GRS80',
    'ref frame': 'ETRS89',
    'height datum': '---',
    'tide system': 'zero-tide',
    'coord type': 'geodetic',
    'coord units': 'deg',
    'lat min': '50.000000',
    'lat max': '51.000000',
    'lon min': '10.000000',
    'lon max': '11.500000',
    'delta lat': '0.500000',
    'delta lon': '0.500000',
    nrows: '3',
    ncols: '4',
    nodata: '-9999.0000',
    'ISG format': '2.0',
    ...changes,
  };
  const lines = Object.entries(head).flatMap(([key, value]) =>
    value === null ? [] : [`${key} ${key === 'nrows' ? '=' : ':'} ${value}`],
  );
  return text(['begin_of_head ===', ...lines, 'end_of_head ===', ...rows, ''].join('\n'));
}

/** A GTX grid from a function of row (from the south) and column. */
export function gtx(
  [south, west, dLat, dLon]: readonly [number, number, number, number],
  rows: number,
  columns: number,
  value: (row: number, column: number) => number,
  littleEndian = false,
): Uint8Array {
  const view = new DataView(new ArrayBuffer(40 + 4 * rows * columns));
  for (const [i, x] of [south, west, dLat, dLon].entries()) view.setFloat64(8 * i, x, littleEndian);
  view.setInt32(32, rows, littleEndian);
  view.setInt32(36, columns, littleEndian);
  for (let r = 0; r < rows; r++)
    for (let c = 0; c < columns; c++) view.setFloat32(40 + 4 * (r * columns + c), value(r, c), littleEndian);
  return new Uint8Array(view.buffer);
}
