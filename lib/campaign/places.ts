import { readConstituent } from '../earth/earth-tide/astronomical-arguments.js';
import type { PositionReading } from '../earth/projected-position/resolve-position.js';
import { resolvePosition } from '../earth/projected-position/resolve-position.js';
import { degToRad } from '../quantity/index.js';
import type { Campaign, Measured, Remarks, Route, Site, SitePosition } from './campaign.js';
import type { site } from './schema/campaign-schema.js';
import type { ReadOf } from './schema/descriptor.js';
import type { oceanLoading, pole, position, route } from './schema/places.js';

const ARCSEC_RAD = Math.PI / 648_000;

const remarksOf = ({ note, reference, date }: Remarks): Remarks => ({
  ...(note === undefined ? {} : { note }),
  ...(reference === undefined ? {} : { reference }),
  ...(date === undefined ? {} : { date }),
});

/** A position as the projection takes it. */
export function toSitePosition(p: ReadOf<typeof position>): SitePosition {
  const x = p.x ?? p.easting;
  const y = p.y ?? p.northing;
  return {
    ...remarksOf(p),
    crs: p.crs,
    ...(x === undefined ? {} : { x }),
    ...(y === undefined ? {} : { y }),
    ...(p.z === undefined ? {} : { z: p.z }),
    ...(p.lat === undefined ? {} : { latDeg: p.lat }),
    ...(p.lon === undefined ? {} : { lonDeg: p.lon }),
  };
}

export const fromSitePosition = (p: SitePosition): ReadOf<typeof position> => ({
  crs: p.crs,
  ...(p.x === undefined ? {} : { x: p.x }),
  ...(p.y === undefined ? {} : { y: p.y }),
  ...(p.z === undefined ? {} : { z: p.z }),
  ...(p.latDeg === undefined ? {} : { lat: p.latDeg }),
  ...(p.lonDeg === undefined ? {} : { lon: p.lonDeg }),
  ...remarksOf(p),
});

/** What resolving a position gives; a campaign holds only positions that resolve. */
export const readSitePosition = (p: SitePosition): PositionReading => resolvePosition(p);

/** Latitude, longitude and height of a site, stated or out of its position. */
export function toPlace(s: ReadOf<typeof site>): Pick<Site, 'latitudeRad' | 'longitudeRad' | 'position' | 'h'> {
  const h = s.h ?? null;
  if (s.position === undefined) return { latitudeRad: degToRad(s.lat!), longitudeRad: degToRad(s.lon!), h };
  const position = toSitePosition(s.position);
  const read = readSitePosition(position);
  if (!read.ok) throw new Error(`internal: unchecked position: ${read.expected}`);
  const { latitudeRad, longitudeRad, heightM } = read.position;
  return { latitudeRad, longitudeRad, position, h: h ?? (heightM === null ? null : heightOfPosition(heightM)) };
}

/** A height out of geocentric coordinates: they state no uncertainty and no tide system. */
const heightOfPosition = (heightM: number): Measured => ({
  value: heightM,
  u: 0,
  parts: [],
  distribution: 'normal',
  dof: null,
  tide: null,
  text: null,
});

/** Whether a site's h is that of its geocentric position and was not stated itself. */
export function heightIsOfPosition({ position, h }: Site): boolean {
  if (position?.z === undefined || h === null || h.u > 0 || h.tide !== null || h.text !== null) return false;
  const read = readSitePosition(position);
  return read.ok && read.position.heightM === h.value;
}

/** Whether a site's latitude and longitude are still those of its position; an edit may have moved one of them. */
export function positionHolds({ position, latitudeRad, longitudeRad }: Site): boolean {
  if (position === undefined) return false;
  const read = readSitePosition(position);
  return read.ok && read.position.latitudeRad === latitudeRad && read.position.longitudeRad === longitudeRad;
}

export const toOceanLoading = (list: readonly ReadOf<typeof oceanLoading>[]): NonNullable<Site['oceanLoading']> =>
  list.map((o) => ({
    ...remarksOf(o),
    constituent: readConstituent(o.constituent)!,
    amplitudeM2s2: o.amplitude,
    phaseLagRad: degToRad(o.phase),
  }));

export const toPole = (list: readonly ReadOf<typeof pole>[]): NonNullable<Campaign['pole']> =>
  list.map((p) => ({
    ...remarksOf(p),
    timeMs: p.time ?? null,
    xRad: p.x * ARCSEC_RAD,
    yRad: p.y * ARCSEC_RAD,
  }));

/** The number of arc-seconds with the fewest digits that is these radians. */
function arcsecondsOf(radians: number): number {
  for (let digits = 1; digits < 17; digits++) {
    const short = Number((radians / ARCSEC_RAD).toPrecision(digits));
    if (short * ARCSEC_RAD === radians) return short;
  }
  return radians / ARCSEC_RAD;
}

export const fromPole = (list: NonNullable<Campaign['pole']>): readonly ReadOf<typeof pole>[] =>
  list.map((p) => ({
    ...(p.timeMs === null ? {} : { time: p.timeMs }),
    x: arcsecondsOf(p.xRad),
    y: arcsecondsOf(p.yRad),
    ...remarksOf(p),
  }));

export const toRoute = (r: ReadOf<typeof route>): Route => ({
  ...remarksOf(r),
  via: (r.via ?? []).map((p) => ({
    ...remarksOf(p),
    latitudeRad: degToRad(p.lat),
    longitudeRad: degToRad(p.lon),
    heightM: p.height ?? 0,
    timeMs: p.time ?? null,
  })),
  departureMs: r.departure ?? null,
  arrivalMs: r.arrival ?? null,
});
