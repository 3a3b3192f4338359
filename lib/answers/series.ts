import type { Warning } from '../campaign/fault.js';
import {
  DEVIATION_KINDS,
  type DeviationKind,
  deviationsAt,
  octaveFactors,
  type PhaseRecord,
  phaseRecordOf,
} from '../clocks/deviations/index.js';
import type { MeanBasis, MeanUncertainty } from '../clocks/mean-uncertainty.js';
import { NOISE_NAMES } from '../clocks/noise-identification.js';
import { reduceSeries } from '../clocks/reduction.js';
import { type FrequencySeries, instantOf } from '../clocks/series/index.js';

/** What `plumbtick series` says of a file of frequency data. */
export interface SeriesAnswer {
  /** valid samples */
  readonly samples: number;
  /** spacing of the samples [s] */
  readonly interval: number;
  /** time without valid samples; ISO 8601 instants in UTC, or seconds from the first row for a file without dates */
  readonly gaps: readonly { readonly start: string | number; readonly end: string | number }[];
  /** rows that did not become a sample */
  readonly dropped: number;
  /** mean fractional frequency, weighted by length; u is its noise alone, null for a single sample */
  readonly mean: { readonly value: number; readonly u: number | null };
  /** how u was come by */
  readonly basis: { readonly rule: MeanBasis; readonly tau: number | null; readonly words: string };
  /** the noise by name, at the longest τ at which it can be told; null with fewer than 30 samples */
  readonly noise: string | null;
  readonly deviations: readonly SeriesDeviation[];
  readonly warnings: readonly Warning[];
}

export interface SeriesDeviation {
  readonly kind: DeviationKind;
  /** s */
  readonly tau: number;
  /** dimensionless; for `tdev` s */
  readonly value: number;
  /** ends of the 68.3 % interval */
  readonly lo: number;
  readonly hi: number;
  readonly n: number;
  /** noise on which the interval rests */
  readonly noise: string;
  /** the record has gaps; terms that one would cut are left out */
  readonly gapped: boolean;
}

export interface SeriesQuestion {
  /** averaging factors [samples]; octaves without */
  readonly factors?: readonly number[];
  /** which deviations; all without */
  readonly kinds?: readonly DeviationKind[];
}

/** Statistics of a frequency series: its mean with the uncertainty that its own noise gives it, the noise by name, and the
 *  deviations with their intervals.
 * @see lib/clocks/deviations, lib/clocks/mean-uncertainty for the methods and their sources */
export function analyseSeries(series: FrequencySeries, question: SeriesQuestion = {}): SeriesAnswer {
  const { mean, uncertainty } = reduceSeries(series);
  const record = phaseRecordOf(series.y, series.runs);
  const warnings: Warning[] = [...series.warnings];
  const factors = question.factors ?? octaveFactors(record);
  const rows = deviationsAt(record, series.intervalS, factors, question.kinds ?? DEVIATION_KINDS);
  warnings.push(...meanWarnings(uncertainty), ...tauWarnings(question, rows, record));
  return {
    samples: series.y.length,
    interval: series.intervalS,
    gaps: series.gaps.map(({ startS, endS }) =>
      series.originMs === null
        ? { start: startS, end: endS }
        : { start: instantOf(series.originMs, startS), end: instantOf(series.originMs, endS) },
    ),
    dropped: series.dropped,
    mean: { value: mean, u: uncertainty.u },
    basis: { rule: uncertainty.basis, tau: uncertainty.deviation?.tauS ?? null, words: uncertainty.words },
    noise: uncertainty.noise === null ? null : NOISE_NAMES[uncertainty.noise.alpha],
    deviations: rows.map(({ kind, tauS, value, lo, hi, n, alpha, gapped }) => ({
      kind,
      tau: tauS,
      value,
      lo,
      hi,
      n,
      noise: NOISE_NAMES[alpha],
      gapped,
    })),
    warnings,
  };
}

function meanWarnings({ basis, words, noise }: MeanUncertainty): Warning[] {
  const warn = (code: string, message: string): Warning => ({ code, path: 'mean', message });
  if (basis === 'not-averageable') return [warn('not-averageable', `${words}.`)];
  if (basis === 'none') return [warn('single-sample', `${words}: the mean has no uncertainty.`)];
  if (basis === 'scatter') return [warn('isolated-samples', `${words}.`)];
  if (noise === null)
    return [
      warn('noise-unknown', 'fewer than 30 samples: the noise is not identified; white frequency noise is assumed.'),
    ];
  return [];
}

function tauWarnings(
  { factors }: SeriesQuestion,
  rows: readonly { averagingFactor: number }[],
  record: PhaseRecord,
): Warning[] {
  const had = new Set(rows.map((r) => r.averagingFactor));
  const lost = (factors ?? []).filter((m) => !had.has(m));
  if (lost.length === 0) return [];
  const longest = Math.max(...record.runs.map((r) => r.count - 1));
  const message = `no deviation at averaging factor ${lost.join(', ')}: the longest stretch without a gap has ${longest} samples, and a term needs two to three times the factor.`;
  return [{ code: 'tau-too-long', path: 'deviations', message }];
}
