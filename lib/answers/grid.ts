import type { TideSystem } from '../campaign/campaign.js';
import { CampaignError, type Warning } from '../campaign/fault.js';
import type { ByteSource } from '../earth/file-bytes/byte-source.js';
import {
  type GeoidGrid,
  type GeoidSurface,
  type GridExcerpt,
  type GridFormat,
  gridExcerpt,
  type InterpolationMethod,
  interpolate,
  latitudeOfRowDeg,
  longitudeOfColumnDeg,
  nodesToKeep,
  openGeoidGrid,
  type Registration,
  surveyGrid,
} from '../earth/geoid-grid/index.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { tideConversion } from '../earth/permanent-tide.js';
import { degToRad } from '../quantity/radians.js';

/** A value read off a geoid or quasigeoid grid, and the grid as it was understood. Angles in degrees, lengths in metres. */
export interface GridAnswer {
  readonly format: GridFormat;
  readonly name: string;
  readonly registration: Registration;
  /** both ways of counting, in words */
  readonly registrationReason: string;
  readonly surface: GeoidSurface;
  readonly tide: TideSystem | 'unknown';
  readonly heightDatum: string | null;
  readonly ellipsoid: string | null;
  readonly frame: string | null;
  /** outermost nodes, steps, and how many */
  readonly nodesFrom: { readonly lat: number; readonly lon: number };
  readonly nodesTo: { readonly lat: number; readonly lon: number };
  readonly step: { readonly lat: number; readonly lon: number };
  readonly rows: number;
  readonly columns: number;
  readonly at: { readonly lat: number; readonly lon: number };
  readonly method: InterpolationMethod;
  readonly value: number;
  /** the same point by the other method; null where its nodes are not there */
  readonly otherMethod: { readonly method: InterpolationMethod; readonly value: number } | null;
  /** the four nodes round the point; value null where the grid has none (and needs none) */
  readonly nodes: readonly { readonly lat: number; readonly lon: number; readonly value: number | null }[];
  /** up to 4 × 4 nodes round the place, which a campaign can keep as `nodes` in place of the file; null where one of the four nearest has no value */
  readonly keep: {
    readonly lat: readonly number[];
    readonly lon: readonly number[];
    readonly values: readonly (readonly number[])[];
  } | null;
  readonly range: { readonly least: number; readonly most: number; readonly missing: number };
  readonly warnings: readonly Warning[];
}

export interface GridQuestion {
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
  /** default bilinear */
  readonly method?: InterpolationMethod;
  /** share of the file looked through, 0…1 */
  readonly onProgress?: (share: number) => void;
}

/** More than this between bilinear and bicubic means that the nodes are too far apart for the place. */
const COARSE_M = 0.01;

/** Opens a grid, reads the value at a place, and looks through the whole grid for what no geoid can be.
 * @throws {CampaignError} the file is refused, the place lies outside, or a node that counts has no value */
export async function grid(source: ByteSource, question: GridQuestion): Promise<GridAnswer> {
  const { latitudeDeg, longitudeDeg, method = 'bilinear', onProgress } = question;
  const opened = await openGeoidGrid(source);
  const excerpt = await gridExcerpt(opened, latitudeDeg, longitudeDeg);
  const { valueM, nodes } = interpolate(excerpt, latitudeDeg, longitudeDeg, method);
  const other = otherMethod(excerpt, latitudeDeg, longitudeDeg, method);
  const kept = nodesToKeep(excerpt, latitudeDeg, longitudeDeg);
  const survey = await surveyGrid(opened, onProgress);
  const south = opened.latitudeStepDeg > 0 ? 0 : opened.rows - 1;
  const west = opened.longitudeStepDeg > 0 ? 0 : opened.columns - 1;
  const corner = (row: number, column: number) => ({
    lat: rounded(latitudeOfRowDeg(opened, row)),
    lon: rounded(longitudeOfColumnDeg(opened, column)),
  });
  return {
    format: opened.format,
    name: opened.name,
    registration: opened.registration,
    registrationReason: opened.registrationReason,
    surface: opened.surface,
    tide: opened.tide,
    heightDatum: opened.heightDatum,
    ellipsoid: opened.ellipsoid,
    frame: opened.frame,
    nodesFrom: corner(south, west),
    nodesTo: corner(opened.rows - 1 - south, opened.columns - 1 - west),
    step: { lat: rounded(Math.abs(opened.latitudeStepDeg)), lon: rounded(Math.abs(opened.longitudeStepDeg)) },
    rows: opened.rows,
    columns: opened.columns,
    at: { lat: latitudeDeg, lon: longitudeDeg },
    method,
    value: valueM,
    otherMethod: other,
    nodes: nodes.map((n) => ({ lat: n.latitudeDeg, lon: n.longitudeDeg, value: n.valueM })),
    keep: kept && { lat: kept.latitudesDeg, lon: kept.longitudesDeg, values: kept.valuesM as readonly number[][] },
    range: { least: survey.leastM, most: survey.mostM, missing: survey.missing },
    warnings: [
      ...opened.warnings,
      ...survey.warnings,
      ...unknownWarnings(opened, latitudeDeg),
      ...(other && Math.abs(other.value - valueM) > COARSE_M
        ? [
            {
              code: 'coarse-grid',
              path: '',
              message: `bilinear and bicubic interpolation differ by ${Math.abs(other.value - valueM).toFixed(3)} m here: the nodes are too far apart for the shape of the surface, and the uncertainty of the value is at least of that size.`,
            },
          ]
        : []),
    ],
  };
}

function otherMethod(
  excerpt: GridExcerpt,
  lat: number,
  lon: number,
  method: InterpolationMethod,
): GridAnswer['otherMethod'] {
  const other = method === 'bilinear' ? 'bicubic' : 'bilinear';
  try {
    return { method: other, value: interpolate(excerpt, lat, lon, other).valueM };
  } catch (error) {
    if (error instanceof CampaignError) return null;
    throw error;
  }
}

/** What the header leaves open and a campaign has to say, with its size. */
function unknownWarnings(opened: GeoidGrid, latitudeDeg: number): Warning[] {
  const warnings: Warning[] = [];
  const latitudeRad = degToRad(latitudeDeg);
  const gamma = normalGravity(GRS80, latitudeRad, 0);
  const metres = (x: number) => `${Math.abs(x).toFixed(3)} m`;
  if (opened.surface === 'unknown')
    warnings.push({
      code: 'surface-unknown',
      path: 'header',
      message:
        'the file does not say whether its values are geoid heights N or height anomalies ζ (quasigeoid). They differ by about the Bouguer anomaly times the height over g: 25 mm (2.8e-18) for 50 mGal at 500 m. Ask who made it; a campaign states it by `N` or `zeta`.',
    });
  if (opened.tide === 'unknown')
    warnings.push({
      code: 'tide-unknown',
      path: 'header',
      message: `the file does not say in which permanent-tide system its values are. At this latitude mean minus zero is ${metres(tideConversion('geoid-height', 'zero', 'mean', latitudeRad))}, zero minus tide-free ${metres(tideConversion('geoid-height', 'free', 'zero', latitudeRad))}. A campaign states it by "tide".`,
    });
  if (opened.heightDatum === null)
    warnings.push({
      code: 'zero-level-unknown',
      path: 'header',
      message: `the file does not say to which potential its zero refers. With and without the zero-degree term of the IHRS the values differ by ${metres((62636853.4 - GRS80.U0) / gamma)} (8.3e-17). A campaign states it by "datum": "ihrs", "u0-grs80" or one of its own.`,
    });
  return warnings;
}

const rounded = (degrees: number): number => Number(degrees.toFixed(12));
