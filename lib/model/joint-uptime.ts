import type { Campaign, Clock, Link } from '../campaign/campaign.js';
import { CampaignError, faultAt } from '../campaign/fault.js';
import { intersectionOfIntervals, totalLengthS } from '../clocks/intervals.js';

/** Share of the window in which all of these run at once. Stated intervals are intersected; stated uptimes are taken as
 *  independent of each other and of the intervals, so they multiply.
 * @throws {CampaignError} `missing` if intervals stand without a window to measure them against */
export function jointUptimeOf(campaign: Campaign, running: readonly (Clock | Link)[]): number {
  const product = running.reduce((p, x) => (x.available ? p : p * x.uptime), 1);
  const stated = running.flatMap((x) => (x.available ? [x.available] : []));
  if (stated.length === 0) return product;
  const { window } = campaign;
  if (!window)
    throw new CampaignError([
      faultAt('missing', 'window', 'availability intervals without a window', '"window": the span they are a share of'),
    ]);
  const common = intersectionOfIntervals([...stated, [window]]);
  return (product * totalLengthS(common)) / ((window.endMs - window.startMs) / 1000);
}

export const jointUptime = (campaign: Campaign, from: Clock, to: Clock, link: Link): number =>
  jointUptimeOf(campaign, from === to ? [from, link] : [from, to, link]);
