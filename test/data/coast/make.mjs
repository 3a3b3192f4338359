// Which half-degree cells of the Earth lie more than 50 km from every coast of the open sea, from the 1:50 million land outline of
// Natural Earth (public domain) as packed in the npm package world-atlas 2.0.2.
//   npm install --no-save world-atlas@2.0.2 topojson-client@3.1.0 && node make.mjs > ../../../lib/earth/earth-tide/inland-cells.ts
// A cell counts as inland if its centre is on land and farther from the coast than 50 km and the cell's half diagonal, so that every
// place in it is. Inner rings (the Caspian Sea) are no open coast.
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { feature } from 'topojson-client';

const CELL_DEG = 0.5;
const REACH_KM = 50;
const R = 6371;
const rad = Math.PI / 180;
const topology = JSON.parse(readFileSync(createRequire(import.meta.url).resolve('world-atlas/land-50m.json'), 'utf8'));
const geometry = feature(topology, topology.objects.land);
const polygons = geometry.features.flatMap((f) =>
  f.geometry.type === 'Polygon' ? [f.geometry.coordinates] : f.geometry.coordinates,
);

// points of the coast every 2 km, hashed by degree
const hash = new Map();
const add = (lon, lat) => {
  const key = Math.floor(lat) * 360 + (((Math.floor(lon) % 360) + 360) % 360);
  const list = hash.get(key) ?? [];
  hash.set(key, list);
  list.push([Math.cos(lat * rad) * Math.cos(lon * rad), Math.cos(lat * rad) * Math.sin(lon * rad), Math.sin(lat * rad)]);
};
for (const [ring] of polygons)
  for (let i = 1; i < ring.length; i++) {
    const [a, b] = [ring[i - 1], ring[i]];
    // the frame of the flat map is no coast, nor is a jump across it
    if (Math.abs(b[0] - a[0]) > 180 || (Math.abs(a[0]) > 179.99 && Math.abs(b[0]) > 179.99) || (a[1] < -89.9 && b[1] < -89.9)) continue;
    const km = Math.hypot((b[0] - a[0]) * Math.cos(a[1] * rad), b[1] - a[1]) * rad * R;
    const n = Math.max(1, Math.ceil(km / 2));
    for (let k = 0; k < n; k++) add(a[0] + ((b[0] - a[0]) * k) / n, a[1] + ((b[1] - a[1]) * k) / n);
  }

// rings across 180° made continuous in longitude; one round the pole is closed through it
const rings = polygons.map(([ring]) => {
  const out = [ring[0].slice()];
  for (let i = 1; i < ring.length; i++) {
    const step = ring[i][0] - ring[i - 1][0];
    out.push([out[i - 1][0] + step - 360 * Math.round(step / 360), ring[i][1]]);
  }
  const turns = out.at(-1)[0] - out[0][0];
  return Math.abs(turns) > 180 ? [...out, [out.at(-1)[0], -90], [out[0][0], -90], out[0]] : out;
});
const inside = (lon, lat, ring) => {
  let odd = false;
  for (let i = 0, j = ring.length - 1; i < ring.length; j = i++) {
    const [xi, yi] = ring[i];
    const [xj, yj] = ring[j];
    if (yi > lat !== yj > lat && lon < ((xj - xi) * (lat - yi)) / (yj - yi) + xi) odd = !odd;
  }
  return odd;
};
const boxes = rings.map((ring) => {
  const box = [Infinity, -Infinity, Infinity, -Infinity];
  for (const [x, y] of ring) {
    box[0] = Math.min(box[0], x);
    box[1] = Math.max(box[1], x);
    box[2] = Math.min(box[2], y);
    box[3] = Math.max(box[3], y);
  }
  return box;
});
const onLand = (lon, lat) =>
  rings.some((ring, i) =>
    [-360, 0, 360].some((turn) => {
      const [west, east, south, north] = boxes[i];
      const x = lon + turn;
      return x > west && x < east && lat > south && lat < north && inside(x, lat, ring);
    }),
  );

const farFromCoast = (lon, lat, km) => {
  const p = [Math.cos(lat * rad) * Math.cos(lon * rad), Math.cos(lat * rad) * Math.sin(lon * rad), Math.sin(lat * rad)];
  const chord2 = (2 * Math.sin(km / R / 2)) ** 2;
  const dLat = Math.ceil(km / 111) + 1;
  const dLon = Math.abs(lat) > 87 ? 180 : Math.min(180, Math.ceil(km / (111 * Math.cos((Math.abs(lat) + 1) * rad))) + 1);
  for (let y = Math.floor(lat) - dLat; y <= Math.floor(lat) + dLat; y++)
    for (let x = Math.floor(lon) - dLon; x <= Math.floor(lon) + dLon; x++)
      for (const q of hash.get(y * 360 + (((x % 360) + 360) % 360)) ?? [])
        if ((p[0] - q[0]) ** 2 + (p[1] - q[1]) ** 2 + (p[2] - q[2]) ** 2 <= chord2) return false;
  return true;
};

const rows = [];
let count = 0;
for (let i = 0; i < 180 / CELL_DEG; i++) {
  const lat = -90 + (i + 0.5) * CELL_DEG;
  const half = (CELL_DEG / 2) * rad * R;
  const reach = REACH_KM + Math.hypot(half, half * Math.cos((Math.abs(lat) - CELL_DEG / 2) * rad));
  let row = '';
  let state = false;
  let run = 0;
  for (let j = 0; j < 360 / CELL_DEG; j++) {
    const lon = -180 + (j + 0.5) * CELL_DEG;
    const now = onLand(lon, lat) && farFromCoast(lon, lat, reach);
    if (now) count++;
    if (now !== state) {
      row += run.toString(36).padStart(2, '0');
      state = now;
      run = 0;
    }
    run++;
  }
  rows.push(state ? row + run.toString(36).padStart(2, '0') : row);
}
process.stderr.write(`${count} inland cells, ${rows.join('|').length} characters\n`);
process.stdout.write(`/** Half-degree cells that lie wholly on land and more than ${REACH_KM} km from every coast of the open sea. Rows from south to north, a row
 *  from 180° west as lengths of runs, outside and inside by turns, two base-36 digits each; what a row leaves out is outside.
 *  Made by test/data/coast/make.mjs from the 1:50 million land outline of Natural Earth (public domain). */
export const INLAND_CELL_ROWS =
  '${rows.join('|')}';
`);
