import type { Campaign } from '../../../lib/campaign/campaign.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';

type Loose = { [key: string]: unknown };

/** A small valid campaign with what a test wants to say on top. */
export const campaignOf = (rest: Loose): Campaign =>
  readCampaignValue({ format: 'plumbtick-campaign/1', sites: [], ...rest }).campaign;

/** A site with gravity, so that no default steps in. */
export const site = (id: string, determinations: Loose[], more: Loose = {}): Loose => ({
  id,
  lat: 48,
  lon: 9,
  g: '9.8090000(30) m/s²',
  determinations,
  ...more,
});

export const normal = (H: string, datum = 'ihrs', more: Loose = {}): Loose => ({
  kind: 'normal-height',
  datum,
  H: { value: H, tide: 'mean', ...more },
});

export const levelled = (from: string, dH: string, more: Loose = {}): Loose => ({
  kind: 'levelled-from',
  site: from,
  dH,
  ...more,
});

/** One strontium clock per site, on the marker, and a link from each to the next. */
export const clocksAndLinks = (...sites: string[]): Loose => ({
  clocks: sites.map((s) => ({ id: `k-${s}`, site: s, transition: '87Sr' })),
  links: sites.slice(1).map((s, i) => ({ id: `${sites[i]}-${s}`, from: `k-${sites[i]}`, to: `k-${s}` })),
});
