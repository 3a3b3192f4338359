import { CampaignError, type Warning } from '../../campaign/fault.js';
import type { ByteSource } from '../file-bytes/byte-source.js';
import { type GeoidGrid, type GeoidSurface, periodOf, type Registration } from './geoid-grid.js';
import { BlockReader } from './tiff/blocks.js';
import { readTiffDirectories, type TiffDirectory } from './tiff/directory.js';
import { readGdalMetadata } from './tiff/gdal-metadata.js';
import { readGeoKeys } from './tiff/geo-keys.js';

const NEW_SUBFILE_TYPE = 254;
const IMAGE_WIDTH = 256;
const IMAGE_LENGTH = 257;
const IMAGE_DESCRIPTION = 270;
const MODEL_PIXEL_SCALE = 33550;
const MODEL_TIEPOINT = 33922;
const MODEL_TRANSFORMATION = 34264;
const GDAL_NODATA = 42113;

const refuse = (code: string, path: string, found: string, expected: string): never => {
  throw new CampaignError([{ code, path, line: null, column: null, found, expected }]);
};

/** Metres per unit of a vertical grid, by the names of the EPSG list. */
const UNITS_M: Readonly<Record<string, number>> = {
  metre: 1,
  meter: 1,
  m: 1,
  millimetre: 0.001,
  mm: 0.001,
  centimetre: 0.01,
  cm: 0.01,
  foot: 0.3048,
  'us survey foot': 1200 / 3937,
};

/** What a sample may hold, by its description in PROJ's Geodetic TIFF grids. */
const SURFACES: Readonly<Record<string, GeoidSurface>> = {
  geoid_undulation: 'geoid',
  geoid_height: 'geoid',
  height_anomaly: 'quasigeoid',
};

/** Reads a vertical grid in a GeoTIFF file (OGC 19-008r4, GeoTIFF 1.1; the profile "Geodetic TIFF grids" of the PROJ documentation):
 *  geographic coordinates, strips or tiles, uncompressed, deflate or LZW, predictors 2 and 3, scale and offset. Blocks are read and
 *  unpacked as they are needed.
 * @throws {CampaignError} what in the file stands against it */
export async function readGeoTiff(source: ByteSource): Promise<GeoidGrid> {
  const images = (await readTiffDirectories(source)).filter((d) => (d.number(NEW_SUBFILE_TYPE, 0) & 1) === 0);
  const image = images[0];
  if (!image) return refuse('tiff-directory', 'tiff', 'only reduced images', 'an image of full resolution');
  const warnings: Warning[] = [];
  if (images.length > 1)
    warnings.push({
      code: 'subgrids-not-used',
      path: 'tiff',
      message: `the file holds ${images.length} grids; the first is used. A finer one may cover the place: save it as a file of its own.`,
    });
  const keys = readGeoKeys(image);
  if (keys.modelType !== 2)
    refuse(
      'not-geographic',
      'GTModelType',
      keys.modelType === 1 ? 'a projected grid' : `model type ${keys.modelType ?? 'missing'}`,
      '2: latitude and longitude',
    );
  if (keys.angularUnit !== null && keys.angularUnit !== 9102)
    refuse('not-geographic', 'GeogAngularUnits', String(keys.angularUnit), '9102: degrees');
  const metadata = readGdalMetadata(image);
  if (metadata.type !== null && !/^VERTICAL_OFFSET_GEOGRAPHIC_TO_VERTICAL$/i.test(metadata.type))
    refuse(
      'wrong-grid',
      'TYPE',
      metadata.type,
      'VERTICAL_OFFSET_GEOGRAPHIC_TO_VERTICAL: a grid of geoid heights or height anomalies',
    );
  const sample = Math.max(
    0,
    metadata.samples.findIndex((s) => s !== undefined && Object.hasOwn(SURFACES, s.description ?? '')),
  );
  const { description = null, unit = null, scale = 1, offset = 0 } = metadata.samples[sample] ?? {};
  if (
    description !== null &&
    /offset|velocity|translation|accuracy/i.test(description) &&
    !Object.hasOwn(SURFACES, description)
  )
    refuse('wrong-grid', 'DESCRIPTION', description, 'geoid_undulation');
  const unitM = unit === null ? 1 : UNITS_M[unit.toLowerCase()];
  if (unitM === undefined) return refuse('unit', 'UNITTYPE', unit ?? '', Object.keys(UNITS_M).join(', '));

  if (!Number.isFinite(scale) || scale === 0 || !Number.isFinite(offset))
    refuse('scale', 'GDAL_METADATA', `scale ${scale}, offset ${offset}`, 'numbers, the scale other than 0');
  const columns = image.number(IMAGE_WIDTH, 0);
  const rows = image.number(IMAGE_LENGTH, 0);
  if (rows < 2 || columns < 2)
    refuse('wrong-size', 'tiff', `${rows} rows of ${columns} values`, 'two rows and columns at least');
  const georeference = readGeoreference(image);
  const registration = chooseRegistration(keys.rasterType, georeference, rows, warnings);
  const shift = registration.kind === 'edges' ? 0.5 : 0;
  const firstLatitudeDeg = georeference.latitudeDeg + shift * georeference.latitudeStepDeg;
  const firstLongitudeDeg = georeference.longitudeDeg + shift * georeference.longitudeStepDeg;
  const nodata = parseNodata(image.text(GDAL_NODATA));
  const blocks = new BlockReader(source, image, rows, columns);
  return {
    format: 'geotiff',
    name: image.text(IMAGE_DESCRIPTION)?.split('\n')[0] || source.name,
    registration: registration.kind,
    registrationReason: registration.reason,
    surface: SURFACES[description ?? ''] ?? 'unknown',
    tide: 'unknown',
    heightDatum: metadata.targetCrs ?? (keys.verticalCrs === null ? null : `EPSG:${keys.verticalCrs}`),
    ellipsoid: null,
    frame: keys.geodeticCrs === null ? null : `EPSG:${keys.geodeticCrs}`,
    rows,
    columns,
    firstLatitudeDeg,
    latitudeStepDeg: georeference.latitudeStepDeg,
    firstLongitudeDeg,
    longitudeStepDeg: georeference.longitudeStepDeg,
    period: periodOf(columns, georeference.longitudeStepDeg),
    header: [
      {
        key: 'raster type',
        value: keys.rasterType === null ? 'missing' : keys.rasterType === 1 ? 'pixel is area' : 'pixel is point',
      },
      { key: 'samples', value: blocks.description },
      { key: 'scale, offset', value: `${scale}, ${offset}` },
      { key: 'nodata', value: nodata === null ? 'none' : String(nodata) },
      { key: 'description', value: description ?? 'missing' },
      { key: 'unit', value: unit ?? 'missing (metre)' },
    ],
    warnings,
    rowsPerBlock: blocks.rowsPerBlock,
    readBlock: async (firstRow, firstColumn, count, wide) => {
      const block = await blocks.read(sample, firstRow, firstColumn, count, wide);
      const none = nodata === null ? Number.NaN : blocks.asStored(nodata);
      // the value for "none" is meant before scale and offset
      for (let i = 0; i < block.length; i++) {
        const raw = block[i]!;
        block[i] = raw === none || !Number.isFinite(raw) ? Number.NaN : (offset + scale * raw) * unitM;
      }
      return block;
    },
  };
}

interface Georeference {
  /** of the reference point of the first sample: its middle or its corner */
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  readonly latitudeStepDeg: number;
  readonly longitudeStepDeg: number;
}

/** OGC 19-008r4, annex B.6: tie point and scale, or a matrix without rotation. */
function readGeoreference(image: TiffDirectory): Georeference {
  const tie = image.numbers(MODEL_TIEPOINT);
  const scale = image.numbers(MODEL_PIXEL_SCALE);
  const matrix = image.numbers(MODEL_TRANSFORMATION);
  let found: Georeference | null = null;
  if (tie && tie.length === 6 && scale && scale.length >= 2) {
    const [i, j, , x, y] = tie as [number, number, number, number, number];
    found = {
      longitudeStepDeg: scale[0]!,
      latitudeStepDeg: -scale[1]!,
      longitudeDeg: x - i * scale[0]!,
      latitudeDeg: y + j * scale[1]!,
    };
  } else if (matrix && matrix.length === 16) {
    if (matrix[1] !== 0 || matrix[4] !== 0)
      refuse('georeference', 'ModelTransformation', 'a rotated grid', 'rows along parallels');
    found = {
      longitudeStepDeg: matrix[0]!,
      latitudeStepDeg: matrix[5]!,
      longitudeDeg: matrix[3]!,
      latitudeDeg: matrix[7]!,
    };
  }
  if (
    !found ||
    !Object.values(found).every(Number.isFinite) ||
    found.latitudeStepDeg === 0 ||
    found.longitudeStepDeg === 0
  )
    return refuse(
      'georeference',
      'tiff',
      'no usable tie point and scale, or matrix',
      'ModelTiepoint and ModelPixelScale, or ModelTransformation',
    );
  if (Math.abs(found.latitudeDeg) > 91 || Math.abs(found.longitudeDeg) > 541)
    refuse(
      'georeference',
      'tiff',
      `first sample at ${found.latitudeDeg}, ${found.longitudeDeg}`,
      'latitude and longitude in degrees',
    );
  return found;
}

/** Pixel-is-point states nodes, pixel-is-area cell corners; a grid cannot have nodes beyond a pole, which refutes a wrong one. */
function chooseRegistration(
  rasterType: number | null,
  { latitudeDeg, latitudeStepDeg }: Georeference,
  rows: number,
  warnings: Warning[],
): { readonly kind: Registration; readonly reason: string } {
  const slack = 1e-6 * Math.abs(latitudeStepDeg);
  const fits = (kind: Registration) => {
    const first = latitudeDeg + (kind === 'edges' ? 0.5 : 0) * latitudeStepDeg;
    const last = first + (rows - 1) * latitudeStepDeg;
    return Math.max(Math.abs(first), Math.abs(last)) <= 90 + slack;
  };
  const stated: Registration | null = rasterType === 1 ? 'edges' : rasterType === 2 ? 'nodes' : null;
  const reason = `first latitude ${latitudeDeg} by ${latitudeStepDeg}, ${rows} rows: ${fits('nodes') ? 'fit' : 'do not fit'} between the poles as nodes, ${fits('edges') ? 'fit' : 'do not fit'} as cell edges; the file says ${stated === null ? 'nothing' : stated === 'edges' ? 'pixel is area' : 'pixel is point'}`;
  if (stated) {
    if (!fits(stated))
      refuse('registration', 'GTRasterType', reason, 'a raster type with which all nodes lie between the poles');
    return { kind: stated, reason };
  }
  const possible = (['edges', 'nodes'] as const).filter(fits);
  const [kind] = possible;
  if (!kind) return refuse('registration', 'GTRasterType', reason, 'nodes between the poles');
  if (possible.length > 1)
    warnings.push({
      code: 'registration-doubtful',
      path: 'GTRasterType',
      message: `the file does not say whether its samples are points or areas; taken as areas, which is the default of GeoTIFF. If that is wrong, every node lies half a cell off: ${((Math.abs(latitudeStepDeg) / 2) * 111.2).toPrecision(2)} km.`,
    });
  return { kind, reason };
}

function parseNodata(text: string | null): number | null {
  if (text === null || text.trim() === '') return null;
  const value = /^\s*[+-]?nan\s*$/i.test(text) ? Number.NaN : Number(text);
  if (Number.isNaN(value) && !/nan/i.test(text)) return refuse('nodata', 'GDAL_NODATA', text, 'a number');
  return value;
}
