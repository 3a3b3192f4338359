import type { Campaign, Site } from '../campaign/campaign.js';
import { W0_IHRS } from '../constants/defining-constants.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';

/** Height of a site as its first determination states it, m, numbers as they stand: good enough for a default g (3e-6 s⁻²·ΔH). */
export function statedHeightM(campaign: Campaign, site: Site): number {
  return alongFirstDeterminations(
    campaign,
    site,
    (s) => {
      const first = s.determinations[0];
      const gamma0 = () => normalGravity(GRS80, s.latitudeRad, 0);
      switch (first?.kind) {
        case 'gnss-quasigeoid':
          return (first.h ?? s.h)!.value - first.zeta.value;
        case 'gnss-geoid':
          return (first.h ?? s.h)!.value - first.N.value;
        case 'normal-height':
        case 'normal-orthometric-height':
        case 'orthometric-height':
        case 'dynamic-height':
          return first.H.value;
        case 'geopotential-number':
          return first.C.value / gamma0();
        case 'potential':
          return (W0_IHRS.value - first.W.value) / gamma0();
        default:
          return (first?.kind === 'gravity-model' ? first.h?.value : undefined) ?? s.h?.value ?? 0;
      }
    },
    (s) => s.h?.value ?? 0,
    (height, dH) => height + dH,
  );
}

/** Datum to which a site's printed C refers: the first determination's; `ihrs` if it has none. */
export function datumOfGeopotentialNumber(campaign: Campaign, site: Site): string {
  return alongFirstDeterminations(
    campaign,
    site,
    (s) => {
      const first = s.determinations[0];
      return first && 'datum' in first ? first.datum : 'ihrs';
    },
    () => 'ihrs',
    (datum) => datum,
  );
}

/** Follows first determinations that are `levelled-from` back to one that is not; `circular` where they chain in a circle. */
function alongFirstDeterminations<T>(
  campaign: Campaign,
  site: Site,
  end: (site: Site) => T,
  circular: (site: Site) => T,
  step: (value: T, dH: number) => T,
): T {
  const byId = new Map(campaign.sites.map((s) => [s.id, s]));
  const chain: number[] = [];
  const seen = new Set<string>();
  let at = site;
  for (;;) {
    if (seen.has(at.id)) return circular(site);
    seen.add(at.id);
    const first = at.determinations[0];
    if (first?.kind !== 'levelled-from') break;
    chain.push(first.dH.value);
    at = byId.get(first.site)!;
  }
  return chain.reduceRight((value, dH) => step(value, dH), end(at));
}
