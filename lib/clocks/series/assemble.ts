import { CampaignError, faultAt, type Warning } from '../../campaign/fault.js';
import type { Run } from '../deviations/index.js';
import type { ColumnGuess } from './columns.js';
import { type FrequencySeries, pathOfLine, type TimeGap } from './frequency-series.js';
import { inspectValues } from './inspect-values.js';
import type { RowReader } from './row-reader.js';
import { findDisorder, median, reordered, sampled, sortedOrder, spacingOf } from './time-order.js';
import { disorderWarnings, TimeReport } from './time-report.js';

/** How far a sample may start from where it was due and still follow the one before, as a share of its length. */
const TOLERANCE = 0.25;

/** How fast the expected start follows the stamps: jitter and rounding average out, a wrong last digit of τ0 is forgiven. */
const FOLLOW = 0.1;

/** What the assembly needs of the reader's options. */
export interface AssemblyOptions {
  readonly tauS?: number;
}

interface Stored {
  y: Float64Array;
  startS: Float64Array;
  stopS: Float64Array | null;
  u: Float64Array | null;
}

/** Rows as read become a series: in time order, duplicates and overlaps dropped, runs and gaps found, oddities reported. Values are
 *  never changed and gaps never filled. */
export function assembleSeries(
  reader: RowReader,
  columns: ColumnGuess,
  options: AssemblyOptions,
  nominalName: string | null,
): FrequencySeries {
  const warnings: Warning[] = [];
  const warn = (code: string, line: number | null, message: string): void => {
    warnings.push({ code, path: pathOfLine(line), message });
  };
  const rows: Stored = {
    y: reader.y.take(),
    startS: reader.startS.take(),
    stopS: reader.stopS?.take() ?? null,
    u: reader.u?.take() ?? null,
  };
  if (columns.certainty === 'likely') {
    warn(
      'columns-guessed',
      null,
      `columns taken as ${columns.words.join(' ')}: ${columns.reason}. --columns "${columns.words.join(' ')}" confirms it.`,
    );
  }
  if (nominalName !== null) warn('nominal-recognised', null, `values are compared with ${nominalName}.`);
  if (columns.scale !== 1)
    warn(
      'header-scale',
      null,
      `the header states y in units of ${columns.scale.toExponential()}: values are multiplied by it.`,
    );
  if (reader.missing > 0)
    warn(
      'missing-values',
      reader.firstMissingLine,
      `${reader.missing} row${reader.missing === 1 ? '' : 's'} without a value, the first in line ${reader.firstMissingLine}: left out, their time is a gap.`,
    );
  if (reader.invalid > 0)
    warn(
      'invalid-rows',
      null,
      `${reader.invalid} row${reader.invalid === 1 ? '' : 's'} marked not valid: left out, their time is a gap.`,
    );

  const timed = reader.baseDay !== null;
  const stampS = columns.words.includes('mjd') ? 86400 / 10 ** reader.mjdDecimals : 1e-6;
  let lineOf = (i: number): number => reader.lines.lineOf(i);
  let order: Uint32Array | null = null;
  if (timed) {
    const disorder = findDisorder(rows.startS);
    if (disorder.count > 0) {
      const spacing = spacingOf(rows.startS, stampS) ?? 0;
      for (const w of disorderWarnings(disorder, spacing, lineOf)) warnings.push(w);
      order = sortedOrder(rows.startS);
      pick(rows, order);
    }
  }
  const tau = intervalOf(rows, timed, stampS, options, warn);
  const { sampleS, regular } = sampleLength(rows, tau.intervalS, stampS);
  const report = new TimeReport((i) => lineOf(order?.[i] ?? i), tau.intervalS);
  const kept = keepFollowing(rows, tau.intervalS, sampleS, regular, timed ? stampS : 0, report);
  if (kept.keep !== null) {
    pick(rows, kept.keep);
    order = order === null ? kept.keep : Uint32Array.from(kept.keep, (i) => order![i]!);
  }
  warnings.push(...report.warnings(sampleS));
  if (rows.u?.some(Number.isNaN)) {
    warn('u-missing', null, 'u is missing in some rows: the stated u are not used.');
    rows.u = null;
  }
  const finalOrder = order;
  lineOf = finalOrder === null ? lineOf : (i) => reader.lines.lineOf(finalOrder[i]!);
  warnings.push(...inspectValues(rows.y, kept.runs, tau.intervalS, lineOf));
  const lengthS = regular || rows.stopS === null ? null : rows.stopS.map((stop, i) => stop - rows.startS[i]!);
  return {
    y: rows.y,
    startS: rows.startS,
    lengthS,
    u: rows.u,
    originMs: timed ? (reader.baseDay! - 40587) * 86400000 : null,
    sampleS,
    intervalS: tau.intervalS,
    runs: kept.runs,
    gaps: kept.gaps,
    dropped: reader.rows - rows.y.length,
    columns,
    warnings,
    lineOf,
  };
}

function pick(rows: Stored, order: Uint32Array): void {
  rows.y = reordered(rows.y, order);
  rows.startS = reordered(rows.startS, order);
  rows.stopS &&= reordered(rows.stopS, order);
  rows.u &&= reordered(rows.u, order);
}

type Warn = (code: string, line: number | null, message: string) => void;

/** The spacing of the samples: stated, or from the dates, or 1 s with a warning. A file without dates counts rows: they become
 *  seconds here. */
function intervalOf(
  rows: Stored,
  timed: boolean,
  stampS: number,
  options: AssemblyOptions,
  warn: Warn,
): { intervalS: number } {
  const stated = options.tauS ?? null;
  if (!timed) {
    const intervalS = stated ?? 1;
    if (stated === null)
      warn('interval-assumed', null, 'no dates and no --tau: a sampling interval of 1 s is assumed.');
    if (intervalS !== 1) for (let i = 0; i < rows.startS.length; i++) rows.startS[i]! *= intervalS;
    return { intervalS };
  }
  const found = spacingOf(rows.startS, stampS);
  if (stated === null) {
    if (found !== null) return { intervalS: found };
    const length = rows.stopS === null ? null : rows.stopS[0]! - rows.startS[0]!;
    if (length === null) {
      throw new CampaignError([
        faultAt('interval-unknown', '', 'a single date', 'two samples, a stop, or the sampling interval: --tau 1s'),
      ]);
    }
    return { intervalS: length };
  }
  if (found !== null && Math.abs(found - stated) > TOLERANCE * stated) {
    throw new CampaignError([
      faultAt(
        'interval-mismatch',
        '',
        `samples ${found} s apart, stated ${stated} s`,
        'the sampling interval that the dates have',
      ),
    ]);
  }
  return { intervalS: stated };
}

/** The commonest length of a sample, and whether all have it. Without a stop a sample lasts until the next one. */
function sampleLength(rows: Stored, intervalS: number, stampS: number): { sampleS: number; regular: boolean } {
  const { stopS, startS } = rows;
  if (stopS === null) return { sampleS: intervalS, regular: true };
  const length = (i: number): number => stopS[i]! - startS[i]!;
  const middle = median(sampled(startS.length, 20001, length));
  const slack = Math.max(0.01 * middle, 2.02 * stampS);
  // Rounding of the stamps apart, a length next to the spacing is the spacing.
  const sampleS = Math.abs(middle - intervalS) <= slack ? intervalS : middle;
  for (let i = 0; i < startS.length; i++) if (Math.abs(length(i) - middle) > slack) return { sampleS, regular: false };
  return { sampleS, regular: true };
}

interface Kept {
  /** samples that stay; null: all */
  readonly keep: Uint32Array | null;
  readonly runs: readonly Run[];
  readonly gaps: readonly TimeGap[];
}

/** Goes through the samples once in time order: drops those that start before the one before has ended, and cuts runs at gaps and
 *  at samples of another length. */
function keepFollowing(
  rows: Stored,
  intervalS: number,
  sampleS: number,
  regular: boolean,
  stampS: number,
  report: TimeReport,
): Kept {
  const { startS, stopS, y } = rows;
  const n = y.length;
  const tolerance = Math.max(TOLERANCE * Math.min(intervalS, sampleS), 1.01 * stampS);
  const runs: Run[] = [];
  const gaps: TimeGap[] = [];
  const keep = new Uint32Array(n);
  let kept = 1;
  let runFirst = 0;
  let expected = startS[0]!;
  let last = 0;
  const lengthOf = (i: number): number => (stopS === null ? sampleS : stopS[i]! - startS[i]!);
  const sameLength = (i: number): boolean => regular || Math.abs(lengthOf(i) - sampleS) <= 0.01 * sampleS;
  for (let i = 1; i < n; i++) {
    const t = startS[i]!;
    const off = t - (expected + intervalS);
    const follows = Math.abs(off) <= tolerance && t > startS[last]!;
    if (!follows) {
      const end = startS[last]! + lengthOf(last);
      if (t - startS[last]! <= 1e-6) {
        report.duplicate(last, i, y[last]!, y[i]!);
        continue;
      }
      if (end - t > tolerance) {
        report.overlap(last, i, end - t);
        continue;
      }
      // Up to the tolerance an early start is jitter: the sample stays, but opens a new run.
      if (t - end > 1e-6) {
        gaps.push({ startS: end, endS: t });
        report.gap(last, i, t - startS[last]! - intervalS);
      }
    }
    if (!follows || !sameLength(i) || !sameLength(last)) {
      runs.push({ first: runFirst, count: kept - runFirst });
      runFirst = kept;
      expected = t;
    } else {
      expected += intervalS + FOLLOW * off;
      report.jitter(Math.abs(off));
    }
    keep[kept++] = i;
    last = i;
  }
  runs.push({ first: runFirst, count: kept - runFirst });
  report.deadTime(intervalS - sampleS, runs);
  return { keep: kept === n ? null : keep.slice(0, kept), runs, gaps };
}
