import type { Warning } from '../../campaign/fault.js';
import type { Run } from '../deviations/index.js';
import type { ColumnGuess } from './columns.js';

/** A stretch of time without valid data, in seconds on the series' own time axis. */
export interface TimeGap {
  readonly startS: number;
  readonly endS: number;
}

/** Frequency data as read: valid samples in time order, and everything the reader noticed. Time is counted in seconds from
 *  `originMs`, so that a double holds it to a nanosecond over a year. UTC as in ISO 8601 arithmetic, without leap seconds. */
export interface FrequencySeries {
  /** fractional frequency of each sample, averaged over its length; finite */
  readonly y: Float64Array;
  /** start of each sample [s] */
  readonly startS: Float64Array;
  /** length of each sample [s]; null: all last `sampleS` */
  readonly lengthS: Float64Array | null;
  /** standard uncertainty of each y as stated in the file; null without the column or where one is missing */
  readonly u: Float64Array | null;
  /** milliseconds since 1970-01-01T00:00:00Z of time 0; null for a file without dates */
  readonly originMs: number | null;
  /** length of a sample (the commonest) [s] */
  readonly sampleS: number;
  /** spacing of the samples [s]; longer than `sampleS` where the instrument has dead time */
  readonly intervalS: number;
  /** stretches of samples that follow each other */
  readonly runs: readonly Run[];
  readonly gaps: readonly TimeGap[];
  /** rows that did not become a sample: invalid, without value, duplicate, overlapping */
  readonly dropped: number;
  readonly columns: ColumnGuess;
  readonly warnings: readonly Warning[];
  /** line of the file on which a sample stood, counted from 1 */
  lineOf(sample: number): number;
}

/** Where in the file a fault or warning belongs, as its path; '' for the file as a whole. */
export const pathOfLine = (line: number | null): string => (line === null ? '' : `line ${line}`);

/** Length of a sample [s]. */
export const lengthOfSampleS = (series: FrequencySeries, i: number): number => series.lengthS?.[i] ?? series.sampleS;

/** An instant of the series' time axis as ISO 8601 in UTC, to the millisecond; the bare seconds for a file without dates. */
export const instantOf = (originMs: number | null, seconds: number): string => {
  if (originMs === null) return `${Number(seconds.toPrecision(12))} s`;
  return new Date(Math.round(originMs + seconds * 1000)).toISOString().replace('.000Z', 'Z');
};
