import type { Campaign, Datum, Site } from '../campaign/campaign.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import type { Model } from './model.js';

/** A datum whose reference potential the network is to find. */
export interface DatumUnknowns {
  readonly id: string;
  /** index of the offset, or null if W₀ is taken as stated */
  readonly offset: number | null;
  /** indices of the tilt's two parts, m²/s² per m of way to the north and to the east; null if it is not asked for */
  readonly tilt: {
    readonly north: number;
    readonly east: number;
    wayFromOrigin(site: Site): { readonly northM: number; readonly eastM: number };
  } | null;
}

/** Unknowns of the network: the sites' potentials, then what is asked of the datums, in file order. */
export interface NetworkUnknowns {
  readonly sites: number;
  readonly datums: readonly DatumUnknowns[];
  readonly count: number;
}

export function networkUnknowns(model: Model): NetworkUnknowns {
  const { campaign } = model;
  let next = campaign.sites.length;
  const datums = campaign.datums
    .filter((d) => d.estimateOffset || d.estimateTilt)
    .map((d): DatumUnknowns => {
      const offset = d.estimateOffset ? next++ : null;
      if (!d.estimateTilt) return { id: d.id, offset, tilt: null };
      return { id: d.id, offset, tilt: { north: next++, east: next++, wayFromOrigin: wayFromOrigin(campaign, d) } };
    });
  return { sites: campaign.sites.length, datums, count: next };
}

/** Plane way from the datum's origin, else from the middle of the sites that use it: M·Δφ and N·cos φ₀·Δλ on GRS80.
 *  A tilt is a fit of a plane; the curvature of the Earth over it is the user's to judge. */
function wayFromOrigin(campaign: Campaign, datum: Datum) {
  const users = campaign.sites.filter((s) => s.determinations.some((d) => 'datum' in d && d.datum === datum.id));
  const mean = (of: (s: Site) => number) => users.reduce((sum, s) => sum + of(s), 0) / Math.max(1, users.length);
  const latitude = datum.origin?.latitudeRad ?? mean((s) => s.latitudeRad);
  const longitude = datum.origin?.longitudeRad ?? mean((s) => s.longitudeRad);
  const w2 = 1 - GRS80.e2 * Math.sin(latitude) ** 2;
  const primeVertical = GRS80.a / Math.sqrt(w2);
  const meridian = (primeVertical * (1 - GRS80.e2)) / w2;
  return (site: Site) => ({
    northM: meridian * (site.latitudeRad - latitude),
    eastM: primeVertical * Math.cos(latitude) * turn(site.longitudeRad - longitude),
  });
}

/** An angle brought to −π … π: the antimeridian is no border. */
const turn = (radians: number): number => radians - 2 * Math.PI * Math.round(radians / (2 * Math.PI));
