import type { Campaign, Link, Site } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { type GeocentricPosition, geodeticToGeocentric } from '../earth/geocentric.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { QuantityRangeError } from '../earth/range-error.js';
import { gravitationalDelayS } from '../earth/signal-path/gravitational-delay.js';
import { type MovedClockTime, movedClockTime, type WayPoint } from '../earth/signal-path/moved-clock.js';
import { sagnacDelayS } from '../earth/signal-path/sagnac.js';
import { alongGeodesic, type PathPoint } from '../earth/signal-path/surface-path.js';
import { statedHeightM } from '../model/first-determination.js';

/** What rotation and gravity do to a link that carries time, s. */
export interface LinkPath {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  /** `surface`: geodesics between the points; `straight`: legs over a satellite */
  readonly way: 'surface' | 'straight';
  /** points between the two sites */
  readonly via: number;
  /** length of the way, m */
  readonly length: number;
  readonly sagnac: {
    /** 2ωA/c² from `from` to `to`: how much later a signal arrives than over a resting Earth */
    readonly oneWay: number;
    /** what stays in a time comparison by signals both ways, half their difference: the one-way delay */
    readonly twoWay: number;
  };
  /** delay by the Earth's gravity on straight legs; null on the surface, where it is below a picosecond */
  readonly gravitationalDelay: {
    readonly oneWay: number;
    /** the same both ways over the same path, so it cancels in half the difference */
    readonly twoWay: number;
  } | null;
  /** what a clock that is carried from site to site gains on one that stays; null without departure and arrival */
  readonly movedClock: {
    readonly duration: number;
    readonly potential: number;
    readonly velocity: number;
    readonly rotation: number;
    readonly total: number;
  } | null;
}

/** The answer of `path`. */
export interface PathAnswer {
  readonly format: 'plumbtick-path/1';
  readonly title?: string;
  readonly links: readonly LinkPath[];
  readonly warnings: readonly Warning[];
}

/** Sagnac and gravitational delays of every link, and the time a carried clock gains: for links that carry time as well as
 *  frequency. All of them are constant as long as the way is, so that none is part of y.
 * @throws {CampaignError} a way that no signal or clock can take */
export function path(campaign: Campaign): PathAnswer {
  const sites = new Map(campaign.sites.map((s) => [s.id, s]));
  const siteOfClock = new Map(campaign.clocks.map((c) => [c.id, sites.get(c.site)!]));
  const warnings: Warning[] = [];
  const links = campaign.links.map((link) => {
    try {
      return linkPath(campaign, link, siteOfClock.get(link.from)!, siteOfClock.get(link.to)!, warnings);
    } catch (error) {
      if (!(error instanceof QuantityRangeError)) throw error;
      throw new CampaignError([
        faultAt('impossible-way', `links.${link.id}.route`, `${error.quantity} = ${error.found}`, error.expected),
      ]);
    }
  });
  return {
    format: 'plumbtick-path/1',
    ...(campaign.title === undefined ? {} : { title: campaign.title }),
    links,
    warnings,
  };
}

const xyz = (p: PathPoint): GeocentricPosition => geodeticToGeocentric(GRS80, p);

/** Above this a way point is a satellite, or something else in sight of both sites: the legs to it are straight. */
const SATELLITE_HEIGHT_M = 100_000;

function linkPath(campaign: Campaign, link: Link, from: Site, to: Site, warnings: Warning[]): LinkPath {
  const end = (site: Site): PathPoint => ({ ...site, heightM: statedHeightM(campaign, site) });
  const via = link.route?.via ?? [];
  const stops: PathPoint[] = [end(from), ...via, end(to)];
  const straight = link.kind === 'satellite' || via.some((p) => p.heightM > SATELLITE_HEIGHT_M);
  if (straight && via.length === 0)
    warnings.push({
      code: 'satellite-missing',
      path: `links.${link.id}.route`,
      message:
        'a satellite link without its satellite: the way is taken along the ground. State "route": {"via": [{"lat", "lon", "height"}]} with the satellite in it.',
    });
  const overSatellite = straight && via.length > 0;
  let length = 0;
  let sagnac = 0;
  let gravitational = 0;
  for (let i = 1; i < stops.length; i++) {
    const [a, b] = [stops[i - 1]!, stops[i]!];
    if (overSatellite) {
      const [p, q] = [xyz(a), xyz(b)];
      length += Math.hypot(q.xM - p.xM, q.yM - p.yM, q.zM - p.zM);
      sagnac += sagnacDelayS([p, q]);
      gravitational += gravitationalDelayS(p, q);
    } else {
      const leg = alongGeodesic(a, b);
      length += leg.lengthM;
      sagnac += sagnacDelayS(leg.points.map(xyz));
    }
  }
  return {
    id: link.id,
    from: link.from,
    to: link.to,
    way: overSatellite ? 'straight' : 'surface',
    via: via.length,
    length,
    sagnac: { oneWay: sagnac, twoWay: sagnac },
    gravitationalDelay: overSatellite ? { oneWay: gravitational, twoWay: 0 } : null,
    movedClock: movedClockOf(link, end(from), end(to)),
  };
}

function movedClockOf(link: Link, from: PathPoint, to: PathPoint): LinkPath['movedClock'] {
  const { route } = link;
  if (route?.departureMs == null || route.arrivalMs === null) return null;
  const points: WayPoint[] = [
    { ...from, timeMs: route.departureMs },
    // the reader has checked that every way point of a moved clock has its time
    ...route.via.map((p) => ({ ...p, timeMs: p.timeMs! })),
    { ...to, timeMs: route.arrivalMs },
  ];
  const t: MovedClockTime = movedClockTime(points);
  return {
    duration: t.durationS,
    potential: t.potentialS,
    velocity: t.velocityS,
    rotation: t.rotationS,
    total: t.totalS,
  };
}
