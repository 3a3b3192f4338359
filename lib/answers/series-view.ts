import type { Campaign } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { reductionOptions, withReducedSeries } from '../campaign/with-series.js';
import { type Reduction, reducedSamples, reduceSeries } from '../clocks/reduction.js';
import type { FrequencySeries } from '../clocks/series/index.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { siteIndexOfClock } from '../model/model.js';
import { evaluationOf } from './evaluate.js';
import type { LinkEvaluation } from './evaluation.js';
import { meanGravity } from './quantities.js';
import { analyseSeries, type SeriesAnswer } from './series.js';
import { solveCampaign } from './solve-campaign.js';

/** Gravity behind a length equivalent where no place is known, m/s². */
const ROUND_GRAVITY = 9.81;
/** Each stretch of the running mean is longer than the one before by this factor: all together cost eight times the last. */
const GROWTH = 1.15;

/** A mean over the first samples. */
export interface RunningMean {
  /** end of the last sample, s on the axis of the series */
  readonly endS: number;
  readonly mean: number;
  /** statistical standard uncertainty, by the noise of these samples alone */
  readonly u: number;
}

/** A series as an element shows it. */
export interface SeriesView {
  /** the samples that count, the tide off where a campaign says between which places */
  readonly used: FrequencySeries;
  /** samples outside the stated validity, as they stand in the file */
  readonly outside: readonly { readonly startS: number; readonly y: number }[];
  /** of `used`: mean, noise, deviations */
  readonly answer: SeriesAnswer;
  readonly reduction: Reduction;
  readonly running: readonly RunningMean[];
  /** length equivalent of y = 1, m */
  readonly lengthPerY: number;
  /** the mean beside the prediction, as `evaluate` finds it; null without a campaign */
  readonly evaluation: LinkEvaluation | null;
  readonly warnings: readonly Warning[];
}

/** Statistics of a series, and inside a campaign its reduction and comparison as the measurement whose y it is.
 * @param place null: the series alone
 * @throws {CampaignError} no sample left, or a campaign that cannot be computed */
export function seriesView(
  data: FrequencySeries,
  file: string,
  place: { readonly campaign: Campaign; readonly measurement: string } | null,
): SeriesView {
  if (place === null) return viewOf(data, data, ROUND_GRAVITY, null, []);
  const { campaign, measurement: id } = place;
  const found = campaign.measurements.find((m, i) => (m.id ?? String(i)) === id);
  if (found === undefined)
    throw new CampaignError([
      faultAt(
        'unknown-measurement',
        'measurement',
        id,
        `one of ${campaign.measurements.map((m, i) => m.id ?? i).join(', ') || 'none: the campaign has no measurements'}`,
      ),
    ]);
  const measurement = { ...found, includesSystematic: false, y: { ...found.y, tide: null }, series: { file } };
  const alone = { ...campaign, measurements: [{ ...measurement, check: false }], correlations: [] };
  const warnings: Warning[] = [];
  const reduced = withReducedSeries(alone, new Map([[0, data]]), warnings);
  const solved = solveCampaign(reduced);
  const { links } = evaluationOf(solved);
  const { model } = solved;
  const [a, b] = [links[0]!, campaign.links.find((l) => l.id === found.link)!];
  const siteOf = (clock: string) => siteIndexOfClock(model, reduced.clocks[model.clockIndex.get(clock)!]!);
  const g = meanGravity(model, siteOf(b.from), siteOf(b.to)).value;
  const used = reducedSamples(data, reductionOptions(campaign, measurement, data));
  return viewOf(data, used, g, a, warnings);
}

function viewOf(
  data: FrequencySeries,
  used: FrequencySeries,
  gMs2: number,
  evaluation: LinkEvaluation | null,
  warnings: readonly Warning[],
): SeriesView {
  const answer = analyseSeries(used);
  return {
    used,
    outside: samplesNotIn(data, used),
    answer,
    reduction: reduceSeries(used),
    running: runningMeans(used),
    lengthPerY: SPEED_OF_LIGHT_SQUARED_M2_PER_S2 / gMs2,
    evaluation,
    warnings: evaluation === null ? answer.warnings : warnings,
  };
}

function samplesNotIn(data: FrequencySeries, used: FrequencySeries): SeriesView['outside'] {
  const outside: { startS: number; y: number }[] = [];
  if (data.y.length === used.y.length) return outside;
  for (let i = 0, k = 0; i < data.y.length; i++) {
    if (data.startS[i] === used.startS[k]) k++;
    else outside.push({ startS: data.startS[i]!, y: data.y[i]! });
  }
  return outside;
}

function runningMeans(used: FrequencySeries): readonly RunningMean[] {
  const n = used.y.length;
  const counts: number[] = [];
  for (let m = n; m >= 2; m = Math.min(m - 1, Math.floor(m / GROWTH))) counts.unshift(m);
  return counts.flatMap((m) => {
    const { mean, uncertainty, endS } = reduceSeries(firstOf(used, m));
    return uncertainty.u === null ? [] : [{ endS, mean, u: uncertainty.u }];
  });
}

const firstOf = (series: FrequencySeries, count: number): FrequencySeries => ({
  ...series,
  y: series.y.subarray(0, count),
  startS: series.startS.subarray(0, count),
  lengthS: series.lengthS?.subarray(0, count) ?? null,
  u: null,
  runs: series.runs.flatMap(({ first, count: samples }) =>
    first < count ? [{ first, count: Math.min(samples, count - first) }] : [],
  ),
});
