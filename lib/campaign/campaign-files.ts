import type { FrequencySeries } from '../clocks/series/frequency-series.js';
import type { GeoidSurface } from '../earth/geoid-grid/geoid-grid.js';
import type { GridExcerpt } from '../earth/geoid-grid/interpolation.js';
import type { Radians } from '../quantity/radians.js';
import type { TideSystem } from './campaign.js';
import type { Fault, Warning } from './fault.js';

/** What a campaign asks of a geoid or quasigeoid grid. */
export interface GridRequest {
  readonly file: string;
  readonly latitudeDeg: number;
  readonly longitudeDeg: number;
}

/** What a grid says about a place. */
export interface GridReading {
  readonly nodes: GridExcerpt;
  readonly surface: GeoidSurface;
  readonly tide: TideSystem | 'unknown';
  readonly heightDatum: string | null;
  readonly warnings: readonly Warning[];
}

/** What a campaign asks of a gravity model: all its sites at once, since their errors go together. */
export interface GravityModelRequest {
  readonly file: string;
  readonly points: readonly {
    readonly latitudeRad: Radians;
    readonly longitudeRad: Radians;
    /** ellipsoidal height, m, in the campaign's tide system */
    readonly heightM: number;
    /** null: all of the model */
    readonly maxDegree: number | null;
    /** as stated for a file that does not say */
    readonly modelTide: TideSystem | null;
    /** whether the standard deviations of the coefficients are needed */
    readonly commission: boolean;
  }[];
  /** system in which W is wanted */
  readonly tide: TideSystem;
  readonly k2: number;
}

/** What a gravity model says about the points of a request, in their order. */
export interface GravityModelReading {
  readonly points: readonly {
    readonly maxDegree: number;
    readonly potentialM2s2: number;
    readonly perHeightMs2: number;
  }[];
  /** commission covariance between the points, m⁴/s², in rows; null if the file gives no standard deviations */
  readonly commissionM4s4: Float64Array | null;
  readonly warnings: readonly Warning[];
}

/** What a campaign asks of a file of frequency data. */
export interface SeriesRequest {
  readonly file: string;
  /** words of the columns; guessed if absent */
  readonly columns?: string;
  /** sampling interval, s */
  readonly tauS?: number;
}

/** Something that was refused while a file was read; paths are those inside the file. */
export interface RefusedFile {
  readonly faults: readonly Fault[];
}

/** Files beside a campaign, read before it. null: the file is not at hand. */
export interface CampaignFiles {
  grid(request: GridRequest): GridReading | RefusedFile | null;
  gravityModel(request: GravityModelRequest): GravityModelReading | RefusedFile | null;
  series(request: SeriesRequest): FrequencySeries | RefusedFile | null;
}

/** No file beside the campaign: nodes that it keeps itself are used, anything else is refused. */
export const NO_FILES: CampaignFiles = { grid: () => null, gravityModel: () => null, series: () => null };
