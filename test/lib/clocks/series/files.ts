import { CampaignError, type Fault } from '../../../../lib/campaign/fault.js';
import { type FrequencySeries, readFrequencySeries, type SeriesOptions } from '../../../../lib/clocks/series/index.js';
import { whiteFm } from '../simulated-noise.js';

/** Mean and noise of the invented records: an offset of 2.1174e-14 and 1e-16 per sample. */
export const OFFSET = 2.1174e-14;
export const noisy = (n: number, seed = 1): number[] => [...whiteFm(n, 1e-16, seed)].map((v) => v + OFFSET);

/** 2027-05-03T00:00:00Z. */
export const FIRST_DAY = 61528;
export const START_MS = Date.UTC(2027, 4, 3);

export const mjd = (seconds: number, decimals = 10): string => (FIRST_DAY + seconds / 86400).toFixed(decimals);
export const iso = (seconds: number): string => new Date(START_MS + 1000 * seconds).toISOString();
export const value = (y: number): string => y.toExponential(12);

export const lines = (y: readonly number[], line: (v: number, i: number) => string): string =>
  `${y.map(line).join('\n')}\n`;
export const plain = (y: readonly number[]): string => lines(y, (v, i) => `${mjd(i)} ${value(v)}`);

export const codes = (series: FrequencySeries): string[] => series.warnings.map((w) => w.code);
export const message = (series: FrequencySeries, code: string): string => {
  const found = series.warnings.find((w) => w.code === code);
  if (!found) throw new Error(`no warning ${code} among ${codes(series).join(', ')}`);
  return `${found.path} ${found.message}`;
};

export function faultsOf(text: string | Uint8Array, options: SeriesOptions = {}): readonly Fault[] {
  try {
    readFrequencySeries(text, options);
  } catch (error) {
    if (error instanceof CampaignError) return error.faults;
    throw error;
  }
  throw new Error('was read');
}
