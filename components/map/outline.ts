import type { MapProjection } from '../charts/map-projection.js';

/** A piece of coast. */
export interface Coast {
  /** longitude and latitude by turns, degrees */
  readonly degrees: Float32Array;
  readonly west: number;
  readonly east: number;
  readonly south: number;
  readonly north: number;
}

const GRID_DEG = 0.02;
const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';

/** Coasts out of the text of outline-data.ts. */
export function readOutline(text: string): readonly Coast[] {
  const worth = new Map([...DIGITS].map((digit, i) => [digit, i]));
  let at = 0;
  const next = (): number => {
    let sum = 0;
    for (let shift = 0; ; shift += 5) {
      const digit = worth.get(text[at++] ?? '');
      if (digit === undefined) throw new Error(`internal: the outline breaks off at ${at}`);
      sum += (digit & 31) << shift;
      if (digit < 32) return sum & 1 ? -(sum + 1) / 2 : sum / 2;
    }
  };
  const coasts: Coast[] = [];
  while (at < text.length) {
    const count = next();
    const degrees = new Float32Array(2 * count);
    let [x, y] = [0, 0];
    let [west, east, south, north] = [180, -180, 90, -90];
    for (let i = 0; i < count; i++) {
      x += next();
      y += next();
      const [longitude, latitude] = [x * GRID_DEG, y * GRID_DEG];
      degrees[2 * i] = longitude;
      degrees[2 * i + 1] = latitude;
      west = Math.min(west, longitude);
      east = Math.max(east, longitude);
      south = Math.min(south, latitude);
      north = Math.max(north, latitude);
    }
    coasts.push({ degrees, west, east, south, north });
  }
  return coasts;
}

/** Steps smaller than this are not drawn, px. */
const LEAST_PX = 0.7;

/** The coasts on the map as one path; the world is repeated to the left and right where the map reaches that far. */
export function outlinePath(coasts: readonly Coast[], projection: MapProjection): string {
  const { width, height } = projection.frame;
  const left = projection.toDegreesUnwrapped(0);
  const right = projection.toDegreesUnwrapped(width);
  let path = '';
  for (const turn of [-360, 0, 360])
    for (const { degrees, west, east, south, north } of coasts) {
      if (east + turn < left || west + turn > right) continue;
      if (projection.toPx(north, 0)[1] > height || projection.toPx(south, 0)[1] < 0) continue;
      path += coastPath(degrees, turn, projection);
    }
  return path;
}

/** One coast, without what lies off the map: a line is taken up again where it comes back. */
function coastPath(degrees: Float32Array, turn: number, projection: MapProjection): string {
  const { width, height } = projection.frame;
  let path = '';
  let pen = false;
  let [px, py] = [Number.NaN, Number.NaN];
  for (let i = 0; i < degrees.length; i += 2) {
    const [x, y] = projection.toPx(degrees[i + 1]!, degrees[i]! + turn);
    const last = i + 2 >= degrees.length;
    if (pen && !last && Math.abs(x - px) < LEAST_PX && Math.abs(y - py) < LEAST_PX) continue;
    // a segment that lies wholly on one side of the map
    const off = (x < 0 && px < 0) || (x > width && px > width) || (y < 0 && py < 0) || (y > height && py > height);
    if (Number.isNaN(px) || off) pen = false;
    else {
      if (!pen) path += `M${px.toFixed(1)} ${py.toFixed(1)}`;
      path += `L${x.toFixed(1)} ${y.toFixed(1)}`;
      pen = true;
    }
    [px, py] = [x, y];
  }
  return path;
}
