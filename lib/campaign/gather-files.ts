import { type FrequencySeries, FrequencySeriesParser, readColumnWords } from '../clocks/series/index.js';
import { type ByteSource, piecesOf } from '../earth/file-bytes/byte-source.js';
import { type GeoidGrid, gridExcerpt, openGeoidGrid } from '../earth/geoid-grid/index.js';
import {
  commissionCovariance,
  type GravityModel,
  GravitySynthesis,
  gravityPotential,
  MAX_SYNTHESIS_DEGREE,
  readIcgem,
} from '../earth/gravity-model/index.js';
import { LOVE_NUMBERS } from '../earth/permanent-tide.js';
import {
  type CampaignFiles,
  type GravityModelReading,
  type GravityModelRequest,
  type GridReading,
  type GridRequest,
  NO_FILES,
  type RefusedFile,
  type SeriesRequest,
} from './campaign-files.js';
import { CampaignError } from './fault.js';
import { readCampaign } from './read.js';

/** Opens a file that a campaign names and hands it to `use`; null if there is none of that name.
 * @throws {CampaignError} it is there but cannot be read */
export type OpenFile = <T>(name: string, use: (source: ByteSource) => Promise<T>) => Promise<T | null>;

/** Reads of the files that a campaign names what it needs of them: nodes round its sites, potentials at its markers, measured
 *  series. What is refused
 *  is told by the reading of the campaign that follows, at its place there.
 * @param onProgress share of a large file that has been read */
export async function gatherCampaignFiles(
  text: string,
  open: OpenFile,
  onProgress?: (file: string, share: number) => void,
): Promise<CampaignFiles> {
  const grids = new Map<string, GridRequest>();
  const models = new Map<string, GravityModelRequest>();
  const series = new Map<string, SeriesRequest>();
  try {
    readCampaign(text, {
      files: {
        grid: (request) => {
          grids.set(keyOfGrid(request), request);
          return null;
        },
        gravityModel: (request) => {
          models.set(request.file, request);
          return null;
        },
        series: (request) => {
          series.set(keyOfSeries(request), request);
          return null;
        },
      },
    });
  } catch (error) {
    if (!(error instanceof CampaignError)) throw error;
  }
  if (grids.size === 0 && models.size === 0 && series.size === 0) return NO_FILES;
  const gridReadings = await readGrids([...grids.values()], open);
  const modelReadings = new Map<string, GravityModelReading | RefusedFile | null>();
  for (const [file, request] of models)
    modelReadings.set(
      file,
      await orRefusal(() => open(file, (source) => readModel(source, request, (share) => onProgress?.(file, share)))),
    );
  const seriesReadings = new Map<string, FrequencySeries | RefusedFile | null>();
  for (const [key, request] of series)
    seriesReadings.set(
      key,
      await orRefusal(() =>
        open(request.file, (source) => readSeries(source, request, (share) => onProgress?.(request.file, share))),
      ),
    );
  return {
    grid: (request) => gridReadings.get(keyOfGrid(request)) ?? null,
    gravityModel: ({ file }) => modelReadings.get(file) ?? null,
    series: (request) => seriesReadings.get(keyOfSeries(request)) ?? null,
  };
}

const keyOfGrid = ({ file, latitudeDeg, longitudeDeg }: GridRequest): string =>
  JSON.stringify([file, latitudeDeg, longitudeDeg]);

const keyOfSeries = ({ file, columns, tauS }: SeriesRequest): string => JSON.stringify([file, columns, tauS]);

async function orRefusal<T>(read: () => Promise<T>): Promise<T | RefusedFile> {
  try {
    return await read();
  } catch (error) {
    if (error instanceof CampaignError) return { faults: error.faults };
    throw error;
  }
}

/** Each file is opened once for all its places. */
async function readGrids(requests: readonly GridRequest[], open: OpenFile) {
  const readings = new Map<string, GridReading | RefusedFile | null>();
  for (const file of new Set(requests.map((r) => r.file))) {
    const own = requests.filter((r) => r.file === file);
    const found = await orRefusal(() =>
      open(file, async (source) => {
        const grid = await openGeoidGrid(source);
        const nodes: (GridReading | RefusedFile)[] = [];
        for (const { latitudeDeg, longitudeDeg } of own)
          nodes.push(await orRefusal(() => readingAt(grid, latitudeDeg, longitudeDeg)));
        return nodes;
      }),
    );
    own.forEach((request, i) => {
      readings.set(keyOfGrid(request), found === null || 'faults' in found ? found : (found[i] ?? null));
    });
  }
  return readings;
}

async function readingAt(grid: GeoidGrid, latitudeDeg: number, longitudeDeg: number): Promise<GridReading> {
  const { surface, tide, heightDatum, warnings } = grid;
  return { nodes: await gridExcerpt(grid, latitudeDeg, longitudeDeg), surface, tide, heightDatum, warnings };
}

async function readSeries(
  source: ByteSource,
  { columns, tauS }: SeriesRequest,
  onProgress: (share: number) => void,
): Promise<FrequencySeries> {
  const read = columns === undefined ? null : readColumnWords(columns);
  if (read && 'faults' in read) throw new CampaignError(read.faults);
  const parser = new FrequencySeriesParser({
    ...(read ? { columns: read.words } : {}),
    ...(tauS === undefined ? {} : { tauS }),
  });
  for await (const piece of piecesOf(source)) {
    parser.push(piece);
    onProgress(parser.progress.bytes / source.size);
  }
  return parser.finish();
}

async function readModel(
  source: ByteSource,
  { points, tide, k2 }: GravityModelRequest,
  onProgress: (share: number) => void,
): Promise<GravityModelReading> {
  // all of the model where one point wants it; else no more than is wanted
  const wanted = points.map((p) => p.maxDegree);
  const highest = wanted.includes(null) ? null : Math.max(...wanted.map((d) => d ?? 0));
  const model = await readIcgem(piecesOf(source), {
    ...(highest === null ? {} : { maxDegree: highest }),
    totalBytes: source.size,
    onProgress: ({ share }) => onProgress(share ?? 0),
  });
  const degrees = wanted.map((d) => d ?? Math.min(model.maxDegree, MAX_SYNTHESIS_DEGREE));
  const found = sumAtPoints(model, points, degrees, { tide, k2 });
  const hasSigmas = model.cosineSigma !== null && points.some((p) => p.commission);
  return {
    points: found,
    commissionM4s4: hasSigmas
      ? commissionCovariance(
          model,
          points.map((p, i) => ({ ...p, maxDegree: degrees[i]! })),
        )
      : null,
    warnings: model.warnings.filter(
      ({ code }) => code !== 'tide-system-unknown' || points.some((p) => p.modelTide === null),
    ),
  };
}

/** One synthesis per degree, since each holds a copy of the coefficients. */
function sumAtPoints(
  model: GravityModel,
  points: GravityModelRequest['points'],
  degrees: readonly number[],
  { tide, k2 }: Pick<GravityModelRequest, 'tide' | 'k2'>,
): GravityModelReading['points'] {
  const found: GravityModelReading['points'][number][] = [];
  for (const degree of new Set(degrees)) {
    const synthesis = new GravitySynthesis(model, degree);
    points.forEach((p, i) => {
      if (degrees[i] !== degree) return;
      const { potentialM2s2, perHeightMs2 } = gravityPotential(synthesis, p, tide, {
        love: { ...LOVE_NUMBERS, k2 },
        ...(p.modelTide === null ? {} : { modelTide: p.modelTide }),
      });
      found[i] = { maxDegree: degree, potentialM2s2, perHeightMs2 };
    });
  }
  return found;
}
