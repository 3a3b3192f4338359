import type { Campaign, Determination, Measured, Site } from '../../campaign/campaign.js';

/** One mistake that could stand in a campaign, and the campaign with it taken out. */
export interface Mistake {
  /** stable word for its kind */
  readonly code: string;
  /** path of what would be wrong */
  readonly path: string;
  /** the mistake, in words */
  readonly mistake: string;
  /** what to look at to confirm or clear it */
  readonly lookAt: string;
  /** the campaign as it would be without the mistake */
  readonly corrected: Campaign;
  /** standard uncertainty of the correction's own size, as a fraction of frequency; 0 where the size is known */
  readonly uOffset: number;
}

export const withSite = (c: Campaign, id: string, edit: (s: Site) => Site): Campaign => ({
  ...c,
  sites: c.sites.map((s) => (s.id === id ? edit(s) : s)),
});

export const withDetermination = (
  c: Campaign,
  site: string,
  n: number,
  edit: (d: Determination) => Determination,
): Campaign =>
  withSite(c, site, (s) => ({ ...s, determinations: s.determinations.map((d, i) => (i === n ? edit(d) : d)) }));

export const withMeasurement = (c: Campaign, index: number, y: (m: Measured) => Measured): Campaign => ({
  ...c,
  measurements: c.measurements.map((m, i) => (i === index ? { ...m, y: y(m.y) } : m)),
});

export const withClockTie = (
  c: Campaign,
  id: string,
  edit: (t: Campaign['clocks'][number]['tie']) => Campaign['clocks'][number]['tie'],
): Campaign => ({
  ...c,
  clocks: c.clocks.map((k) => (k.id === id ? { ...k, tie: edit(k.tie) } : k)),
});

/** An exact value in SI. */
export const exactly = (value: number, tide: Measured['tide'] = null): Measured => ({
  value,
  u: 0,
  parts: [],
  distribution: 'normal',
  dof: null,
  tide,
  text: null,
});

/** Sites whose inputs the link hangs on directly: its ends, and what those are levelled from. */
export function sitesBehind(c: Campaign, ends: readonly string[]): Site[] {
  const byId = new Map(c.sites.map((s) => [s.id, s]));
  const found = new Set<string>();
  const queue = [...ends];
  for (let id = queue.pop(); id !== undefined; id = queue.pop()) {
    if (found.has(id)) continue;
    found.add(id);
    for (const d of byId.get(id)!.determinations) if (d.kind === 'levelled-from' && !d.check) queue.push(d.site);
  }
  return c.sites.filter((s) => found.has(s.id));
}
