/** A rectangle in px. */
export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Something a label should keep off. */
export interface Obstacle {
  readonly box: Box;
  /** cost per px² covered; lines cost more than bands, other labels most */
  readonly weight: number;
}

export interface LabelToPlace<Spot extends Box> {
  readonly id: string;
  /** where it may stand, best first */
  readonly spots: readonly Spot[];
  /** without it the figure can't be read: it takes the best spot, free or not */
  readonly essential: boolean;
}

const LABEL_WEIGHT = 20;
/** What a later spot costs beside an earlier one: the better spot wins unless it covers something. */
const LATER_SPOT = 8;
/** More than this, px² times weight, and a label that may go to the list goes there. */
const MOST_COST = 160;

const overlap = (a: Box, b: Box): number => {
  const width = Math.min(a.x + a.width, b.x + b.width) - Math.max(a.x, b.x);
  if (width <= 0) return 0;
  const height = Math.min(a.y + a.height, b.y + b.height) - Math.max(a.y, b.y);
  return height <= 0 ? 0 : width * height;
};

const outside = (box: Box, bounds: Box): number => box.width * box.height - overlap(box, bounds);

const APART_PX = 4;
const padded = ({ x, y, width, height }: Box): Box => ({
  x: x - APART_PX,
  y: y - APART_PX / 2,
  width: width + 2 * APART_PX,
  height: height + APART_PX,
});

/** Gives each label, in order of importance, the spot that covers least; null: no spot is free enough, it moves to the list. */
export function placeLabels<Spot extends Box>(
  labels: readonly LabelToPlace<Spot>[],
  obstacles: readonly Obstacle[],
  bounds: Box,
): ReadonlyMap<string, Spot | null> {
  const all = [...obstacles];
  const placed = new Map<string, Spot | null>();
  for (const { id, spots, essential } of labels) {
    let best: Spot | null = null;
    let least = essential ? Number.POSITIVE_INFINITY : MOST_COST + LATER_SPOT * spots.length;
    spots.forEach((spot, i) => {
      let cost = LATER_SPOT * i + outside(spot, bounds) * LABEL_WEIGHT;
      let covered = outside(spot, bounds) * LABEL_WEIGHT;
      for (const { box, weight } of all) {
        if (cost >= least) return;
        const area = overlap(spot, box) * weight;
        cost += area;
        covered += area;
      }
      if (!essential && covered > MOST_COST) return;
      if (cost < least) {
        least = cost;
        best = spot;
      }
    });
    placed.set(id, best);
    if (best) all.push({ box: padded(best), weight: LABEL_WEIGHT });
  }
  return placed;
}

const SAMPLE_PX = 8;

/** A straight line, or a band of that half thickness read vertically, as obstacles. */
export function lineObstacles(
  a: readonly [number, number],
  b: readonly [number, number],
  half: number,
  weight: number,
): readonly Obstacle[] {
  const count = Math.max(1, Math.ceil(Math.hypot(b[0] - a[0], b[1] - a[1]) / SAMPLE_PX));
  const stepX = (b[0] - a[0]) / count;
  const stepY = (b[1] - a[1]) / count;
  return Array.from({ length: count }, (_, i) => {
    const x = a[0] + i * stepX;
    const y = a[1] + i * stepY;
    return {
      box: {
        x: Math.min(x, x + stepX) - 1,
        y: Math.min(y, y + stepY) - half,
        width: Math.abs(stepX) + 2,
        height: Math.abs(stepY) + 2 * half,
      },
      weight,
    };
  });
}

/** A spot beside a line: its box and on which side of the line the text stands. */
export interface LineSpot extends Box {
  readonly anchor: 'start' | 'middle' | 'end';
}

const ALONG = [0.5, 0.38, 0.62, 0.27, 0.73, 0.18, 0.82];

/** Spots for a label of that size beside a straight line or band, from its middle outwards, on both sides. */
export function spotsAlong(
  a: readonly [number, number],
  b: readonly [number, number],
  half: number,
  width: number,
  height: number,
): readonly LineSpot[] {
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]) || 1;
  const [dx, dy] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length];
  return ALONG.flatMap((t) =>
    [1, -1].map((side) => {
      const [nx, ny] = [-dy * side, dx * side];
      const away = (Math.abs(nx) * width) / 2 + (Math.abs(ny) * height) / 2 + half * Math.abs(dx) + 6;
      const anchor = nx > 0.3 ? 'start' : nx < -0.3 ? 'end' : 'middle';
      return {
        x: a[0] + t * (b[0] - a[0]) + nx * away - width / 2,
        y: a[1] + t * (b[1] - a[1]) + ny * away - height / 2,
        width,
        height,
        anchor,
      } as const;
    }),
  );
}
