import { type Reduction, type ReductionOptions, reduceSeries } from '../clocks/reduction.js';
import { type FrequencySeries, instantOf } from '../clocks/series/frequency-series.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { TIDE_FIRST_MS, TIDE_LAST_MS } from '../earth/earth-tide/sun-and-moon.js';
import { feltTideAtSites } from '../model/felt-tide-at-sites.js';
import { formatDuration } from '../quantity/index.js';
import { offsetSizeText } from '../quantity/size.js';
import type { Campaign, Measurement, SeriesUse, TimeInterval } from './campaign.js';
import type { CampaignFiles } from './campaign-files.js';
import { CampaignError, type Fault, faultAt, type Warning } from './fault.js';
import { faultInFile } from './fault-in-file.js';

const pathOf = (index: number): string => `measurements.${index}.series`;

/** The series of the measurements that have one, by position; what is not at hand or refused becomes a fault. */
export function openSeries(
  { measurements }: Campaign,
  files: CampaignFiles,
  faults: Fault[],
): ReadonlyMap<number, FrequencySeries> {
  const found = new Map<number, FrequencySeries>();
  measurements.forEach(({ series }, i) => {
    if (series === undefined) return;
    const reading = files.series(series);
    if (reading === null)
      faults.push(
        faultAt(
          'file-not-at-hand',
          pathOf(i),
          series.file,
          'the file beside the campaign; or "y", the mean that came out of it, with its statistical uncertainty',
        ),
      );
    else if ('faults' in reading) faults.push(...reading.faults.map((f) => faultInFile(f, pathOf(i), series.file)));
    else found.set(i, reading);
  });
  return found;
}

/** Puts the reduced mean of its series in place of each y: mean over the time in which both clocks, the link and the measurement
 *  are stated to be valid, each sample freed of the tide's difference between the two sites at its time. The permanent tide stays
 *  in, so y is in mean tide. u is what the noise of the series leaves of the mean.
 * @param campaign its heights are known: the tide is wanted there
 * @throws {CampaignError} no sample left, a single one, dates that the file does not have or the tide does not reach */
export function withReducedSeries(
  campaign: Campaign,
  opened: ReadonlyMap<number, FrequencySeries>,
  warnings: Warning[],
): Campaign {
  if (opened.size === 0) return campaign;
  const faults: Fault[] = [];
  const measurements = campaign.measurements.map((measurement, i) => {
    const data = opened.get(i);
    if (data === undefined) return measurement;
    try {
      return reduced(campaign, measurement, measurement.series!, data, pathOf(i), warnings);
    } catch (error) {
      if (!(error instanceof CampaignError)) throw error;
      faults.push(...error.faults);
      return measurement;
    }
  });
  if (faults.length > 0) throw new CampaignError(faults);
  return { ...campaign, measurements };
}

function reduced(
  campaign: Campaign,
  measurement: Measurement,
  use: SeriesUse,
  data: FrequencySeries,
  path: string,
  warnings: Warning[],
): Measurement {
  const refuse = (code: string, found: string, expected: string): never => {
    throw new CampaignError([faultAt(code, path, `${use.file}, ${found}`, expected)]);
  };
  const validity = validityOf(campaign, measurement);
  const dated = data.originMs !== null;
  if (!dated && validity.length > 0)
    refuse(
      'series-without-dates',
      'without dates',
      'a file with MJD or ISO 8601 dates, since "available", "start" or "end" say when it is valid',
    );
  if (dated) checkTideReaches(campaign, data, refuse);
  let reduction: Reduction;
  try {
    reduction = reduceSeries(data, reductionOptions(campaign, measurement, data));
  } catch (error) {
    if (!(error instanceof RangeError)) throw error;
    return refuse(
      'no-common-time',
      spanText(data),
      'samples wholly inside the time in which both clocks, the link and the measurement are stated to be valid',
    );
  }
  const { u } = reduction.uncertainty;
  if (u === null)
    return refuse(
      'single-sample',
      'a single valid sample',
      'two samples or more, since their noise gives the uncertainty; or "y" with its uncertainty',
    );
  warnings.push(
    ...data.warnings.map((w) => ({
      ...w,
      path,
      message: `${use.file}${w.path === '' ? '' : `, ${w.path}`}: ${w.message}`,
    })),
    ...reductionWarnings(use.file, data, reduction, path),
  );
  const { mean, uncertainty } = reduction;
  return {
    ...measurement,
    y: { ...measurement.y, value: mean, u, parts: u > 0 ? [{ u, source: null }] : [] },
    series: {
      ...use,
      reduced: {
        basis: uncertainty.basis,
        words: uncertainty.words,
        samples: reduction.samples,
        outside: reduction.outside,
        validS: reduction.validS,
        deadS: reduction.deadS,
        tideMean: reduction.correctionMean,
      },
    },
  };
}

/** What goes into the reduction of a measurement's series: when its parts are valid, and the tide to take off. */
export function reductionOptions(
  campaign: Campaign,
  measurement: Measurement,
  data: FrequencySeries,
): Pick<ReductionOptions, 'validity' | 'correction'> {
  const validity = validityOf(campaign, measurement);
  return {
    ...(validity.length > 0 ? { validity } : {}),
    ...(data.originMs === null ? {} : { correction: tideOfLink(campaign, measurement) }),
  };
}

/** Stated validity of the two clocks, the link and the measurement itself; none where nothing is stated. */
function validityOf({ clocks, links }: Campaign, m: Measurement): (readonly TimeInterval[])[] {
  const link = links.find((l) => l.id === m.link)!;
  const parts = [link, ...clocks.filter((c) => c.id === link.from || c.id === link.to)];
  const stated = parts.flatMap((p) => (p.available ? [p.available] : []));
  if (m.startMs === null && m.endMs === null) return stated;
  const own = { startMs: m.startMs ?? Number.NEGATIVE_INFINITY, endMs: m.endMs ?? Number.POSITIVE_INFINITY };
  return [...stated, [own]];
}

/** (δW_A − δW_B)/c² of a measurement's link as a function of UTC. */
function tideOfLink(campaign: Campaign, m: Measurement): (timeMs: number) => number {
  const link = campaign.links.find((l) => l.id === m.link)!;
  const siteOf = (id: string) => {
    const clock = campaign.clocks.find((c) => c.id === id)!;
    return campaign.sites.find((s) => s.id === clock.site)!;
  };
  const felt = feltTideAtSites(campaign, [siteOf(link.from), siteOf(link.to)]);
  const now = new Float64Array(2);
  return (timeMs) => {
    felt.at(timeMs, now);
    return (now[0]! - now[1]!) / SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
  };
}

/** Interpolation reaches twenty minutes beyond the samples. */
const REACH_MS = 1_200_000;

function checkTideReaches(
  { pole = [] }: Campaign,
  data: FrequencySeries,
  refuse: (code: string, found: string, expected: string) => never,
): void {
  const { startMs, endMs } = spanOf(data);
  if (startMs - REACH_MS < TIDE_FIRST_MS || endMs + REACH_MS > TIDE_LAST_MS)
    refuse('out-of-range', spanText(data), 'dates within 1950 to 2100, for which the tide is known');
  const first = pole[0]?.timeMs;
  const last = pole.at(-1)?.timeMs;
  if (first != null && last != null && (first > startMs || last < endMs))
    refuse(
      'pole-outside-series',
      spanText(data),
      '"pole" coordinates that reach over the series; or one position without a time',
    );
}

function spanOf(data: FrequencySeries): TimeInterval {
  const origin = data.originMs ?? 0;
  const last = data.y.length - 1;
  return {
    startMs: origin + 1000 * data.startS[0]!,
    endMs: origin + 1000 * (data.startS[last]! + (data.lengthS?.[last] ?? data.sampleS)),
  };
}

const spanText = (data: FrequencySeries): string => {
  const { startMs, endMs } = spanOf(data);
  const at = (ms: number) => instantOf(data.originMs, (ms - (data.originMs ?? 0)) / 1000);
  return `${at(startMs)} to ${at(endMs)}`;
};

function reductionWarnings(file: string, data: FrequencySeries, reduction: Reduction, path: string): Warning[] {
  const { samples, outside, validS, spanS, deadS, correctionMean, uncertainty, startS, endS } = reduction;
  const at = (seconds: number) => instantOf(data.originMs, seconds);
  const left = outside === 0 ? '' : `; ${outside} more lie wholly or partly outside the stated validity`;
  // a rounding of the dates in the file is no dead time
  const isDead = deadS > 1e-6 * spanS;
  const dead = isDead
    ? `; dead time ${formatDuration(deadS)}, ${((100 * deadS) / spanS).toPrecision(2)} %, which the mean does not speak for`
    : '; no dead time';
  const tide =
    correctionMean === null
      ? ''
      : ` The tide was taken off each sample: ${offsetSizeText(correctionMean)} in the mean.`;
  const found: Warning[] = [
    {
      code: 'series-reduced',
      path,
      message: `y is the mean of ${samples} samples of ${file}, ${formatDuration(validS)} from ${at(startS)} to ${at(endS)}${left}${dead}.${tide} u is statistics alone: ${uncertainty.words}.`,
    },
  ];
  if (correctionMean === null)
    found.push({
      code: 'tide-not-taken-off',
      path,
      message: `${file} has no dates: the tide is left in y, up to some 1e-17 between sites far apart.`,
    });
  if (uncertainty.basis === 'not-averageable')
    found.push({
      code: 'not-averageable',
      path,
      message: `${file}: the noise is a random walk; the mean depends on when it was taken, and more data make u no smaller.`,
    });
  if (uncertainty.basis === 'white-extrapolation' && uncertainty.noise === null)
    found.push({
      code: 'noise-unknown',
      path,
      message: `${file}: fewer than 30 samples; the noise is not identified, white frequency noise is assumed.`,
    });
  return found;
}
