import { type Radians, radToDeg } from '../../quantity/radians.js';
import { INLAND_CELL_ROWS } from './inland-cells.js';

/** Whether a place may lie within 50 km of a coast of the open sea. False is sure; true also stands for places up to about
 *  100 km inland and for islands and lakes the coarse outline does not know: half-degree cells, see inland-cells.ts. */
export function mayBeNearOpenCoast(latitudeRad: Radians, longitudeRad: Radians): boolean {
  const rows = INLAND_CELL_ROWS.split('|');
  const row = rows[Math.min(rows.length - 1, Math.floor((radToDeg(latitudeRad) + 90) * 2))];
  if (row === undefined) return true;
  const degrees = radToDeg(longitudeRad) + 180;
  const column = Math.floor((degrees - 360 * Math.floor(degrees / 360)) * 2);
  let end = 0;
  for (let i = 0; i < row.length; i += 2) {
    end += Number.parseInt(row.slice(i, i + 2), 36);
    // the first run of a row is outside, the second inland, and so on
    if (column < end) return i % 4 === 0;
  }
  return true;
}
