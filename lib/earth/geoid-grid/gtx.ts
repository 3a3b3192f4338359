import { CampaignError, type Warning } from '../../campaign/fault.js';
import { type ByteSource, viewOf } from '../file-bytes/byte-source.js';
import { type GeoidGrid, periodOf } from './geoid-grid.js';

const HEADER_BYTES = 40;
/** The value for "none" in the description of the format; single precision. */
const NODATA = Math.fround(-88.8888);
/** No geoid height reaches a tenth of this: other numbers for "none" (−9999, 1e30) are all beyond it. */
const BEYOND_ANY_HEIGHT_M = 1000;

interface GtxHeader {
  readonly littleEndian: boolean;
  readonly southDeg: number;
  readonly westDeg: number;
  readonly latitudeStepDeg: number;
  readonly longitudeStepDeg: number;
  readonly rows: number;
  readonly columns: number;
}

function readHeader(view: DataView, littleEndian: boolean): GtxHeader {
  const double = (at: number) => view.getFloat64(at, littleEndian);
  return {
    littleEndian,
    southDeg: double(0),
    westDeg: double(8),
    latitudeStepDeg: double(16),
    longitudeStepDeg: double(24),
    rows: view.getInt32(32, littleEndian),
    columns: view.getInt32(36, littleEndian),
  };
}

/** Whether the numbers can be those of a grid on the Earth at all; a wrong byte order never gives such. */
const isPossible = (h: GtxHeader): boolean =>
  Math.abs(h.southDeg) <= 91 &&
  Math.abs(h.westDeg) <= 361 &&
  h.latitudeStepDeg > 1e-6 &&
  h.latitudeStepDeg <= 90 &&
  h.longitudeStepDeg > 1e-6 &&
  h.longitudeStepDeg <= 180 &&
  h.rows >= 2 &&
  h.columns >= 2;

const refuse = (code: string, found: string, expected: string): never => {
  throw new CampaignError([{ code, path: 'header', line: null, column: null, found, expected }]);
};

export const looksLikeGtx = (start: Uint8Array): boolean => {
  if (start.length < HEADER_BYTES) return false;
  const view = viewOf(start);
  return isPossible(readHeader(view, false)) || isPossible(readHeader(view, true));
};

/** Reads a GTX grid: 40 bytes of head (latitude and longitude of the south-western node, the steps, rows, columns), then single-precision
 *  values from the south-western node, row by row northwards; big-endian (NOAA VDatum, Transformation grid formats). Values
 *  are fetched from the source as they are needed.
 * @throws {CampaignError} the head is none, the size does not agree, or nodes lie beyond a pole */
export async function readGtx(source: ByteSource): Promise<GeoidGrid> {
  const start = await source.read(0, HEADER_BYTES);
  if (start.length < HEADER_BYTES) refuse('not-gtx', `${start.length} bytes`, `a head of ${HEADER_BYTES} bytes`);
  const header = [false, true].map((little) => readHeader(viewOf(start), little)).find(isPossible);
  if (!header)
    return refuse('not-gtx', 'a head whose numbers are no grid on the Earth in either byte order', 'a GTX grid');
  const { southDeg, westDeg, latitudeStepDeg, longitudeStepDeg, rows, columns, littleEndian } = header;
  const needed = HEADER_BYTES + 4 * rows * columns;
  if (source.size < needed)
    refuse(
      'file-truncated',
      `${source.size} bytes`,
      `${needed} bytes for ${rows} rows of ${columns} values, as the head says`,
    );
  if (source.size > needed)
    refuse('wrong-size', `${source.size} bytes`, `${needed} bytes for ${rows} rows of ${columns} values`);
  const northDeg = southDeg + (rows - 1) * latitudeStepDeg;
  const slack = 1e-6 * latitudeStepDeg;
  const reason = `the format states the south-western node, ${southDeg}, ${westDeg}, and the steps: rows up to latitude ${northDeg}`;
  if (southDeg < -90 - slack || northDeg > 90 + slack)
    refuse(
      'registration',
      reason,
      `nodes between −90° and 90°${Math.abs(southDeg + latitudeStepDeg / 2) <= 90 && northDeg <= 90 + latitudeStepDeg / 2 + slack ? '; the head seems to state the corner of a cell, half a step off its node' : ''}`,
    );
  return {
    format: 'gtx',
    name: source.name,
    registration: 'nodes',
    registrationReason: reason,
    surface: 'unknown',
    tide: 'unknown',
    heightDatum: null,
    ellipsoid: null,
    frame: null,
    rows,
    columns,
    firstLatitudeDeg: southDeg,
    latitudeStepDeg,
    firstLongitudeDeg: westDeg,
    longitudeStepDeg,
    period: periodOf(columns, longitudeStepDeg),
    header: [
      { key: 'lower left latitude', value: String(southDeg) },
      { key: 'lower left longitude', value: String(westDeg) },
      { key: 'delta latitude', value: String(latitudeStepDeg) },
      { key: 'delta longitude', value: String(longitudeStepDeg) },
      { key: 'rows', value: String(rows) },
      { key: 'columns', value: String(columns) },
      { key: 'byte order', value: littleEndian ? 'little-endian' : 'big-endian' },
    ],
    warnings: headerWarnings(header),
    rowsPerBlock: Math.max(1, Math.floor(2 ** 18 / columns)),
    readBlock: async (firstRow, firstColumn, count, wide) => {
      const block = new Float64Array(count * wide);
      // neighbouring whole rows are one stretch of the file
      const whole = wide === columns;
      for (let i = 0; i < (whole ? 1 : count); i++) {
        const offset = HEADER_BYTES + 4 * ((firstRow + i) * columns + firstColumn);
        const bytes = await source.read(offset, 4 * wide * (whole ? count : 1));
        const view = viewOf(bytes);
        if (bytes.length < 4 * wide) refuse('file-truncated', `${source.size} bytes`, `a value at byte ${offset}`);
        for (let j = 0; j < bytes.length / 4; j++) {
          const value = view.getFloat32(4 * j, littleEndian);
          block[i * wide + j] = value === NODATA || !(Math.abs(value) < BEYOND_ANY_HEIGHT_M) ? Number.NaN : value;
        }
      }
      return block;
    },
  };
}

function headerWarnings(h: GtxHeader): Warning[] {
  const warnings: Warning[] = [];
  if (h.littleEndian)
    warnings.push({
      code: 'byte-order',
      path: 'header',
      message: 'the file is little-endian, against the description of the format; read as such.',
    });
  const phase = (origin: number, step: number) => Math.abs((((origin / step) % 1) + 1) % 1);
  const isHalf = (x: number) => Math.abs(x - 0.5) < 1e-3;
  if (isHalf(phase(h.southDeg, h.latitudeStepDeg)) && isHalf(phase(h.westDeg, h.longitudeStepDeg)))
    warnings.push({
      code: 'half-step-nodes',
      path: 'header',
      message: `the nodes lie at half steps (${h.southDeg}, ${h.westDeg} by ${h.latitudeStepDeg}): right for a grid of cell middles; if the head states cell corners by mistake, every node is half a cell off, ${((h.latitudeStepDeg / 2) * 111.2).toPrecision(2)} km.`,
    });
  return warnings;
}
