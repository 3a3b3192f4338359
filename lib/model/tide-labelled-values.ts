import type { Campaign, Measured, Site, TideSystem } from '../campaign/campaign.js';
import { type TideQuantity, tideConversion } from '../earth/permanent-tide.js';
import type { Radians } from '../quantity/radians.js';
import { assumedTide } from './tide-labels.js';

/** A value of the campaign whose meaning hangs on a permanent-tide system. */
export interface TideLabelledValue {
  /** path of the value, which is that of its input */
  readonly path: string;
  readonly quantity: TideQuantity;
  /** as stated; null: no label stands there */
  readonly stated: TideSystem | null;
  /** as used */
  readonly used: TideSystem;
  /** latitude of the value, and of the lower end or benchmark against which it counts, or null */
  readonly latitudeRad: Radians;
  readonly againstLatitudeRad: Radians | null;
  /** the determinations in the fit that convert it, as paths; null: every use of the input */
  readonly determinations: readonly string[] | null;
}

/** What the value would be wrong by, in its SI unit, if its label were another: converted as `other`, minus as used. */
export function errorOfLabel(value: TideLabelledValue, other: TideSystem, { tide, love }: Campaign): number {
  const convert = (from: TideSystem, latitude: Radians) => tideConversion(value.quantity, from, tide, latitude, love);
  const at = (latitude: Radians) => convert(other, latitude) - convert(value.used, latitude);
  return at(value.latitudeRad) - (value.againstLatitudeRad === null ? 0 : at(value.againstLatitudeRad));
}

/** Every such value that the fit uses, in file order: h, ζ, N, H, C, W, a levelled dH that is labelled, and a W₀ that a benchmark
 *  carries. */
export function tideLabelledValues(campaign: Campaign): TideLabelledValue[] {
  const found: TideLabelledValue[] = [];
  const seen = new Set<string>();
  const add = (
    path: string,
    quantity: TideQuantity,
    measured: Measured,
    site: Site,
    against: Radians | null = null,
  ) => {
    if (seen.has(path)) return;
    seen.add(path);
    found.push({
      path,
      quantity,
      stated: measured.tide,
      used: measured.tide ?? assumedTide(quantity, campaign.tide),
      latitudeRad: site.latitudeRad,
      againstLatitudeRad: against,
      determinations: null,
    });
  };
  const origins = new Map<string, string[]>();
  for (const site of campaign.sites)
    site.determinations.forEach((d, n) => {
      if (d.check || d.candidate) return;
      const path = `sites.${site.id}.determinations.${n}`;
      const origin = 'datum' in d ? (campaign.datums.find(({ id }) => id === d.datum)?.origin ?? null) : null;
      const benchmark = origin?.latitudeRad ?? null;
      const refersToBenchmark = () => {
        if ('datum' in d && benchmark !== null) origins.set(d.datum, [...(origins.get(d.datum) ?? []), path]);
      };
      switch (d.kind) {
        case 'potential':
          add(`${path}.W`, 'potential', d.W, site);
          break;
        case 'geopotential-number':
          refersToBenchmark();
          add(`${path}.C`, 'geopotential-number', d.C, site, benchmark);
          break;
        case 'gnss-quasigeoid':
        case 'gnss-geoid':
        case 'gravity-model':
          if (d.h) add(`${path}.h`, 'ellipsoidal-height', d.h, site);
          else if (site.h) add(`sites.${site.id}.h`, 'ellipsoidal-height', site.h, site);
          if (d.kind === 'gnss-quasigeoid') add(`${path}.zeta`, 'geoid-height', d.zeta, site);
          if (d.kind === 'gnss-geoid') add(`${path}.N`, 'geoid-height', d.N, site);
          break;
        case 'levelled-from': {
          const lower = campaign.sites.find(({ id }) => id === d.site)!;
          if (d.dH.tide !== null) add(`${path}.dH`, 'physical-height', d.dH, site, lower.latitudeRad);
          break;
        }
        default:
          refersToBenchmark();
          add(`${path}.H`, 'physical-height', d.H, site, benchmark);
      }
    });
  for (const { id, origin, W0 } of campaign.datums) {
    const determinations = origins.get(id);
    if (!origin || !determinations) continue;
    found.push({
      path: `datums.${id}.W0`,
      quantity: 'potential',
      stated: W0.tide,
      used: W0.tide ?? assumedTide('potential', campaign.tide),
      latitudeRad: origin.latitudeRad,
      againstLatitudeRad: null,
      determinations,
    });
  }
  return found;
}
