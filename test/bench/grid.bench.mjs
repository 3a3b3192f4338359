// Geoid grids: opening and reading one value, and looking through the whole grid, of EGM96 at 15′ (1 million nodes) as GTX and as ISG;
// values at many points against PROJ's cct in the same run.
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { performance } from 'node:perf_hooks';
import { bytesSource, gridExcerpt, interpolate, openGeoidGrid, surveyGrid } from '../../dist/index.js';
import { egm96Centimetres, egm96Gtx } from '../data/egm96-15/egm96-grid.mjs';

export const name = 'grid';

const POINTS = 100_000;

function asIsg(cm) {
  const head = [
    'begin_of_head',
    'model name : EGM96',
    'data type : geoid',
    'data units : meters',
    'data format : grid',
    'data ordering : N-to-S, W-to-E',
    'coord type : geodetic',
    'coord units : deg',
    'lat min = -90.000000',
    'lat max = 90.000000',
    'lon min = 0.000000',
    'lon max = 359.750000',
    'delta lat = 0.250000',
    'delta lon = 0.250000',
    'nrows = 721',
    'ncols = 1440',
    'nodata = -9999.0000',
    'ISG format = 2.0',
    'end_of_head',
  ];
  const rows = Array.from({ length: 721 }, (_, i) =>
    Array.from(cm.subarray(1440 * i, 1440 * (i + 1)), (v) => (v / 100).toFixed(4).padStart(10)).join(' '),
  );
  return new Uint8Array(Buffer.from(`${[...head, ...rows].join('\n')}\n`));
}

/** Seconds of processor time, so that others on the machine do not count. */
const timed = async (f) => {
  const start = process.cpuUsage().user;
  const result = await f();
  return [(process.cpuUsage().user - start) / 1e6, result];
};

function projSeconds(gtx) {
  const work = fs.mkdtempSync(path.join(os.tmpdir(), 'grid-bench-'));
  try {
    const file = path.join(work, 'egm96.gtx');
    fs.writeFileSync(file, gtx);
    const words = ['-d', '6', '+proj=vgridshift', `+grids=${file}`, '+multiplier=1'];
    const run = (count) => {
      const input = Array.from(
        { length: count },
        (_, i) => `${((47.9 * i) % 360) - 180} ${((17.3 * i) % 170) - 85} 0 0`,
      ).join('\n');
      const start = performance.now();
      execFileSync('cct', words, { input: `${input}\n`, maxBuffer: 2 ** 28 });
      return (performance.now() - start) / 1000;
    };
    return run(POINTS) - run(1);
  } catch {
    return null;
  } finally {
    fs.rmSync(work, { recursive: true, force: true });
  }
}

export async function run() {
  const cm = egm96Centimetres();
  const gtx = egm96Gtx(cm, -180);
  const isg = asIsg(cm);
  const rows = [];
  const plain = (label, ours) => rows.push({ case: label, ours, reference: null, ratio: null, note: null });
  const [opening, grid] = await timed(() => openGeoidGrid(bytesSource('egm96.gtx', gtx)));
  plain('open GTX, 4 MB', `${(1000 * opening).toFixed(1)} ms`);
  const [parsing] = await timed(() => openGeoidGrid(bytesSource('egm96.isg', isg)));
  plain(`read ISG, ${(isg.length / 1e6).toFixed(1)} MB`, `${(isg.length / 1e6 / parsing).toFixed(0)} MB/s`);
  const [survey] = await timed(() => surveyGrid(grid));
  plain('look through 1.04 million nodes', `${(1000 * survey).toFixed(0)} ms`);
  const [reading] = await timed(async () => {
    let sum = 0;
    for (let i = 0; i < POINTS; i++) {
      const [lat, lon] = [((17.3 * i) % 170) - 85, ((47.9 * i) % 360) - 180];
      sum += interpolate(await gridExcerpt(grid, lat, lon), lat, lon).valueM;
    }
    return sum;
  });
  const proj = projSeconds(gtx);
  rows.push({
    case: 'a value, 16 nodes read',
    ours: `${((1e6 * reading) / POINTS).toFixed(1)} µs`,
    reference: proj === null ? null : `${((1e6 * proj) / POINTS).toFixed(1)} µs`,
    ratio: proj === null ? null : reading / proj,
    note: proj === null ? 'apt-get install proj-bin' : 'cct, its reading and writing of text included',
  });
  return rows;
}
