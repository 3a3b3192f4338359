import type { Campaign, Clock, Link } from '../campaign/campaign.js';
import { intersectionOfIntervals, totalLengthS } from '../clocks/intervals.js';
import { formatInstant } from '../quantity/index.js';

/** When a plan is met, in calendar terms. */
export interface Met {
  /** ISO 8601, UTC */
  readonly at: string;
  /** before the window ends */
  readonly inWindow: boolean;
}

/** The instant at which so much common time has been gathered since the window's start. Within the window measured intervals
 *  count as they lie; stated uptimes spread evenly over them. Beyond the window everything goes on at its mean share.
 * @param wallClockS time needed at the mean share of the window, s
 * @returns null without a window, or for an instant no calendar holds */
export function metAt(
  campaign: Campaign,
  running: readonly (Clock | Link)[],
  uptime: number,
  wallClockS: number,
): Met | null {
  const { window } = campaign;
  if (!window) return null;
  const stated = running.flatMap((x) => (x.available ? [x.available] : []));
  if (stated.length === 0) return met(window.startMs + 1000 * wallClockS, window.endMs);
  const common = intersectionOfIntervals([...stated, [window]]);
  const windowS = (window.endMs - window.startMs) / 1000;
  const neededS = (wallClockS * totalLengthS(common)) / windowS;
  let gathered = 0;
  for (const { startMs, endMs } of common) {
    const length = (endMs - startMs) / 1000;
    if (gathered + length >= neededS) return met(startMs + 1000 * (neededS - gathered), window.endMs);
    gathered += length;
  }
  return uptime > 0 ? met(window.startMs + 1000 * wallClockS, window.endMs) : null;
}

/** Last instant that ISO 8601 with four digits of the year can name. */
const LAST_MS = Date.UTC(9999, 11, 31);

const met = (ms: number, endMs: number): Met | null =>
  ms <= LAST_MS ? { at: formatInstant(Math.ceil(ms / 1000) * 1000), inWindow: ms <= endMs } : null;
