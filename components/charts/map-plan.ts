import type { GeodeticPosition } from '../../lib/earth/geodesic-distance.js';
import type { MapProjection } from './map-projection.js';
import {
  type Box,
  type LabelToPlace,
  type LineSpot,
  lineObstacles,
  type Obstacle,
  placeLabels,
} from './place-labels.js';
import { textWidth } from './text-width.js';

/** A site as the map draws it. */
export interface MapSite {
  readonly id: string;
  readonly name: string;
  /** ids of its clocks, as written beside the ring */
  readonly clocks: string;
  readonly position: GeodeticPosition;
  /** how far a source reaches round it, closed; empty without a source */
  readonly reach: readonly GeodeticPosition[];
}

export interface MapLink {
  readonly id: string;
  /** the geodesic between its ends */
  readonly line: readonly GeodeticPosition[];
  /** lines of the label, the first with the id */
  readonly lines: readonly string[];
}

export type Points = readonly (readonly [x: number, y: number])[];

export interface PlacedMapSite {
  readonly site: MapSite;
  readonly x: number;
  readonly y: number;
  readonly reach: Points;
  readonly name: Box | null;
  readonly clocks: Box | null;
}

export interface PlacedMapLink {
  readonly link: MapLink;
  readonly points: Points;
  readonly label: LineSpot | null;
}

/** Sites and links in px. */
export interface MapPlan {
  readonly sites: readonly PlacedMapSite[];
  readonly links: readonly PlacedMapLink[];
}

const RING_PX = 6;
const LINE_PX = 14;
/** A reach larger than this is no place for a name outside it. */
const MOST_REACH_PX = 150;
const MANY_LINKS = 20;
const ALONG = [0.5, 0.38, 0.62, 0.28, 0.72, 0.18, 0.82];

/** Names stand outside the reach, ids at the ring, labels along their lines; what would meet is left to the table. */
export function mapPlan(
  sites: readonly MapSite[],
  links: readonly MapLink[],
  inHand: string | null,
  projection: MapProjection,
): MapPlan {
  const { width, height } = projection.frame;
  const places = sites.map((site) => {
    const [x, y] = projection.place(site.position);
    return { site, x, y, reach: projection.line(site.reach) };
  });
  const lines = links.map((link) => ({ link, points: projection.line(link.line) }));
  const inside = ({ x, y }: { readonly x: number; readonly y: number }) =>
    x >= 0 && x <= width && y >= 0 && y <= height;
  const shown = places.filter(inside);

  const obstacles: Obstacle[] = [
    ...shown.map(({ x, y }) => ({ box: { x: x - 8, y: y - 8, width: 16, height: 16 }, weight: 25 })),
    ...lines.flatMap(({ points }) => points.slice(1).flatMap((point, i) => lineObstacles(points[i]!, point, 3, 5))),
    ...places.flatMap(({ reach }) => reach.slice(1).flatMap((point, i) => lineObstacles(reach[i]!, point, 1.5, 2))),
    // the scale bar's corner
    { box: { x: width - 150, y: height - 44, width: 150, height: 44 }, weight: 8 },
  ];
  const labels: LabelToPlace<LineSpot>[] = [
    ...shown.map(({ site, x, y }) => ({
      id: `clocks ${site.id}`,
      essential: false,
      spots: site.clocks === '' ? [] : ringSpots(x, y, textWidth(site.clocks, 12, true), 13, RING_PX + 3),
    })),
    ...shown.map(({ site, x, y, reach }) => {
      const radius = reach.length === 0 ? 0 : Math.abs(reach[0]![1] - y);
      const away = radius > 0 && radius < MOST_REACH_PX ? radius + 6 : RING_PX + 18;
      const size = textWidth(site.name, 15);
      return {
        id: `site ${site.id}`,
        essential: true,
        spots: [...ringSpots(x, y, size, 18, away), ...ringSpots(x, y, size, 18, RING_PX + 18)],
      };
    }),
    ...[...lines]
      .sort((p, q) => Number(q.link.id === inHand) - Number(p.link.id === inHand))
      .map(({ link, points }) => {
        const words = lines.length > MANY_LINKS ? link.lines.slice(0, 1) : link.lines;
        const wide = Math.max(...words.map((line) => textWidth(line, 12)));
        return { id: `link ${link.id}`, essential: false, spots: curveSpots(points, wide, LINE_PX * words.length) };
      }),
  ];
  const placed = placeLabels(labels, obstacles, { x: 2, y: 2, width: width - 4, height: height - 4 });
  return {
    sites: places.map((place) => ({
      ...place,
      name: inside(place) ? (placed.get(`site ${place.site.id}`) ?? null) : null,
      clocks: inside(place) ? (placed.get(`clocks ${place.site.id}`) ?? null) : null,
    })),
    links: lines.map(({ link, points }) => ({
      link: lines.length > MANY_LINKS ? { ...link, lines: link.lines.slice(0, 1) } : link,
      points,
      label: placed.get(`link ${link.id}`) ?? null,
    })),
  };
}

/** Right, left, above, below and the corners of a circle round the ring. */
function ringSpots(x: number, y: number, width: number, height: number, away: number): LineSpot[] {
  const slant = away * 0.75;
  return [
    [x + away, y - height / 2],
    [x - away - width, y - height / 2],
    [x - width / 2, y - away - height],
    [x - width / 2, y + away],
    [x + slant, y - slant - height / 2],
    [x - slant - width, y - slant - height / 2],
    [x + slant, y + slant - height / 2],
    [x - slant - width, y + slant - height / 2],
  ].map(([left = 0, top = 0]) => ({ x: left, y: top, width, height, anchor: 'start' }));
}

/** Beside a curve, from its middle outwards, on both sides. */
function curveSpots(points: Points, width: number, height: number): LineSpot[] {
  const last = points.length - 1;
  return ALONG.flatMap((t) => {
    const i = Math.max(1, Math.min(last - 1, Math.round(t * last)));
    const [before, at, after] = [points[i - 1], points[i], points[i + 1] ?? points[i]];
    if (!before || !at || !after) return [];
    const length = Math.hypot(after[0] - before[0], after[1] - before[1]) || 1;
    const [dx, dy] = [(after[0] - before[0]) / length, (after[1] - before[1]) / length];
    return [1, -1].map((side): LineSpot => {
      const [nx, ny] = [-dy * side, dx * side];
      const away = (Math.abs(nx) * width) / 2 + (Math.abs(ny) * height) / 2 + 7;
      return {
        x: at[0] + nx * away - width / 2,
        y: at[1] + ny * away - height / 2,
        width,
        height,
        anchor: nx > 0.3 ? 'start' : nx < -0.3 ? 'end' : 'middle',
      };
    });
  });
}
