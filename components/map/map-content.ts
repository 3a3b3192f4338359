import type { Campaign, Site, Source } from '../../lib/campaign/campaign.js';
import type { GeodeticPosition } from '../../lib/earth/geodesic-distance.js';
import { geodesicCircle, geodesicLine } from '../../lib/earth/geodesic-line.js';
import type { MapLink, MapSite } from '../charts/map-plan.js';
import * as words from './map-words.js';

/** Where a site is: as the campaign says, or on its way while it is dragged. */
export type PositionOf = (site: Site) => GeodeticPosition;

/** A reach beyond this is no circle on a map any more. */
const MOST_REACH_M = 8e6;

/** Sites with their clocks and the reach of the source. */
export function mapSites(
  { sites, clocks }: Campaign,
  source: Source | null,
  narrow: boolean,
  positionOf: PositionOf,
): readonly MapSite[] {
  const reachM = source?.correlationLengthM;
  return sites.map((site) => {
    const position = positionOf(site);
    const own = clocks.filter((clock) => clock.site === site.id).map(({ id }) => id);
    return {
      id: site.id,
      name: narrow ? site.id : (site.name ?? site.id).split(',')[0]!.trim(),
      clocks: own.length > 2 ? `${own.length} clocks` : own.join(', '),
      position,
      reach: reachM !== undefined && reachM < MOST_REACH_M ? geodesicCircle(position, reachM, 72) : [],
    };
  });
}

/** Links between sites as geodesics. */
export function mapLinks({ links, clocks, sites }: Campaign, positionOf: PositionOf): readonly MapLink[] {
  const siteOf = (clock: string) => sites.find(({ id }) => id === clocks.find((one) => one.id === clock)!.site)!;
  return links.flatMap((link) => {
    const [a, b] = [siteOf(link.from), siteOf(link.to)];
    if (a === b) return [];
    const [p, q] = [positionOf(a), positionOf(b)];
    const rough = geodesicLine(p, q, 1).lengthM;
    const { points, lengthM } = geodesicLine(p, q, Math.max(4, Math.min(64, Math.ceil(rough / 50_000))));
    const stated = link.lengthM === null ? '' : ` ${words.distance(link.lengthM)}`;
    return [
      {
        id: link.id,
        line: points,
        lines: [
          `${link.id} ${link.kind ?? ''}${stated}`.trim(),
          `${stated === '' ? '' : 'along '}${words.distance(lengthM)}`,
        ],
      },
    ];
  });
}
