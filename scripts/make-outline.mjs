// Makes components/map/outline-data.ts, the coast of the map: from the 1:50 million land outline of Natural Earth (public domain) as
// packed in the npm package world-atlas 2.0.2 (ISC). Run once, by hand, in a folder outside the project:
//   npm install --no-save world-atlas@2.0.2
//   node …/scripts/make-outline.mjs node_modules/world-atlas/land-50m.json > …/components/map/outline-data.ts
// Lines are thinned (Douglas and Peucker 1973) until no point lies more than 0.04° off, and put on a grid of 0.02°: within
// 6 km together. Islets below 0.12° are left out.
import fs from 'node:fs';

const TOLERANCE_DEG = 0.04;
const GRID_DEG = 0.02;
const LEAST_DEG = 0.12;
const DIGITS = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_';

const { transform, arcs } = JSON.parse(fs.readFileSync(process.argv[2], 'utf8'));

/** TopoJSON: quantised deltas → degrees. */
function degrees(arc) {
  let [x, y] = [0, 0];
  return arc.map(([dx, dy]) => {
    x += dx;
    y += dy;
    return [x * transform.scale[0] + transform.translate[0], y * transform.scale[1] + transform.translate[1]];
  });
}

function thinned(points) {
  const keep = new Uint8Array(points.length);
  keep[0] = 1;
  keep[points.length - 1] = 1;
  const spans = [[0, points.length - 1]];
  while (spans.length > 0) {
    const [a, b] = spans.pop();
    const shrink = Math.cos((points[a][1] * Math.PI) / 180) || 0.01;
    const at = (i) => [points[i][0] * shrink, points[i][1]];
    const [[ax, ay], [bx, by]] = [at(a), at(b)];
    const length = Math.hypot(bx - ax, by - ay);
    let [most, where] = [0, -1];
    for (let i = a + 1; i < b; i++) {
      const [x, y] = at(i);
      const off =
        length < 1e-9 ? Math.hypot(x - ax, y - ay) : Math.abs((bx - ax) * (ay - y) - (ax - x) * (by - ay)) / length;
      if (off > most) [most, where] = [off, i];
    }
    if (most > TOLERANCE_DEG) {
      keep[where] = 1;
      spans.push([a, where], [where, b]);
    }
  }
  return points.filter((_, i) => keep[i]);
}

/** The cut at ±180° and the rim at the pole are no coast. */
const onSeam = ([x, y]) => Math.abs(x) > 179.99 || y < -89.9;
function coasts(points) {
  const pieces = [[]];
  points.forEach((point, i) => {
    const before = points[i - 1];
    // over the date line a coast begins anew on the other side
    if (before && ((onSeam(point) && onSeam(before)) || Math.abs(point[0] - before[0]) > 180)) pieces.push([]);
    pieces.at(-1).push(point);
  });
  return pieces.filter((piece) => piece.length > 1);
}

/** Signed integers, five bits a digit, the sixth says that more follow. */
function written(value) {
  let left = value < 0 ? -2 * value - 1 : 2 * value;
  let text = '';
  do {
    const digit = left & 31;
    left >>= 5;
    text += DIGITS[left > 0 ? digit | 32 : digit];
  } while (left > 0);
  return text;
}

/** Rocks and islets are smaller than a site's ring. */
const isSmall = (points) => {
  const extent = (k) => Math.max(...points.map((p) => p[k])) - Math.min(...points.map((p) => p[k]));
  return extent(0) < LEAST_DEG && extent(1) < LEAST_DEG;
};

let text = '';
for (const piece of arcs.map(degrees).flatMap(coasts)) {
  if (isSmall(piece)) continue;
  const line = thinned(piece).map((point) => point.map((degree) => Math.round(degree / GRID_DEG)));
  const distinct = line.filter((point, i) => i === 0 || point.join() !== line[i - 1].join());
  if (distinct.length < 3) continue; // smaller than the tolerance
  let [px, py] = [0, 0];
  text += written(distinct.length);
  for (const [x, y] of distinct) {
    text += written(x - px) + written(y - py);
    [px, py] = [x, y];
  }
}
console.log(`/** Coasts of the world as lines: number of points, then longitude and latitude of each as steps of 0.02° from the one before;
 *  signed integers, five bits a digit, the sixth bit says that more follow. Within 6 km of the 1:50 million outline of Natural
 *  Earth (public domain), out of which scripts/make-outline.mjs made it. */
export const OUTLINE =
  '${text}';`);
