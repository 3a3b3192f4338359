// Spherical-harmonic synthesis per point on one core against GeographicLib's GravityModel, built from Debian's package in the same run
// (test/data/gravity-model/reference.cpp), with the same synthetic coefficients; and the reading of a large ICGEM file.
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { commissionCovariance, GravitySynthesis, IcgemReader } from '../../dist/index.js';
import { egmFiles, gfcPieces, syntheticModel } from '../data/gravity-model/synthetic-model.mjs';

export const name = 'gravity-model';

const INSTALL = 'apt-get install libgeographiclib-dev g++';
const SECONDS = 2;
const WGS84 = { angularVelocity: 7292115e-11, a: 6378137, f: 1 / 298.257223563, gm: 3.986004418e14 };

const asModel = (m) => ({
  name: 'synthetic',
  format: 'icgem1.0',
  maxDegreeOfFile: m.maxDegree,
  tide: 'zero',
  errors: 'formal',
  warnings: [],
  ...m,
  cosineSigma: m.sigma,
  sineSigma: m.sigma,
});

/** Processor time of this program, so that others on the machine do not count; the reference counts its own alike. */
const cpuMs = () => process.cpuUsage().user / 1000;

/** The points of the C++ program: all latitudes and longitudes in turn. */
function pointAt(i) {
  const phi = (((17.3 * i) % 170) - 85) * (Math.PI / 180);
  const lambda = (((47.9 * i) % 360) - 180) * (Math.PI / 180);
  const r = 6372000;
  return { xM: r * Math.cos(phi) * Math.cos(lambda), yM: r * Math.cos(phi) * Math.sin(lambda), zM: r * Math.sin(phi) };
}

function millisecondsPerCall(f) {
  for (let i = 0; i < 4; i++) f(i);
  const start = cpuMs();
  let calls = 0;
  do for (let i = 0; i < 4; i++) f(calls++);
  while (cpuMs() - start < 1000 * SECONDS);
  return (cpuMs() - start) / calls;
}

/** ms per point of W with gradient, of the disturbing potential alone, and along a parallel; null without the library. */
function reference(model) {
  const work = fs.mkdtempSync(path.join(os.tmpdir(), 'gravity-bench-'));
  try {
    const program = path.join(work, 'reference');
    const source = fileURLToPath(new URL('../data/gravity-model/reference.cpp', import.meta.url));
    execFileSync('g++', ['-O3', source, '-o', program, '-lGeographicLib'], { stdio: 'ignore' });
    const { properties, coefficients } = egmFiles(model, 'bench', WGS84);
    fs.writeFileSync(path.join(work, 'bench.egm'), properties);
    fs.writeFileSync(path.join(work, 'bench.egm.cof'), coefficients);
    const [w, t, circle] = execFileSync(program, ['time', 'bench', work, String(model.maxDegree), String(SECONDS)], {
      encoding: 'utf8',
    })
      .split(' ')
      .map(Number);
    return { w, t, circle };
  } catch {
    return null;
  } finally {
    fs.rmSync(work, { recursive: true, force: true });
  }
}

const ms = (x) => `${x.toPrecision(3)} ms`;

export async function run() {
  const rows = [];
  const add = (label, ours, theirs, note) =>
    rows.push({
      case: label,
      ours: ms(ours),
      reference: theirs === undefined ? null : ms(theirs),
      ratio: theirs === undefined ? null : ours / theirs,
      note: theirs === undefined ? INSTALL : note,
    });
  for (const degree of [360, 2190]) {
    const model = syntheticModel(degree);
    const theirs = reference(model);
    const synthesis = new GravitySynthesis(asModel(model));
    const v = millisecondsPerCall((i) => synthesis.potentialM2s2(pointAt(i)));
    const both = millisecondsPerCall((i) => synthesis.potentialAndRadialDerivative(pointAt(i)));
    add(`degree ${degree}, W at a point`, v, theirs?.w, 'the reference always forms the gradient too');
    add(`degree ${degree}, W and its vertical derivative`, both, theirs?.w, 'the reference forms three components');
    add(`degree ${degree}, potential without gradient`, v, theirs?.t, 'reference: GravityModel::T');
    const parallel = synthesis.alongParallel(5.1e6, 3.8e6);
    add(
      `degree ${degree}, further point of a parallel`,
      millisecondsPerCall((i) => parallel.potentialM2s2(i)),
      theirs?.circle,
      'reference: GravityCircle::W',
    );
  }
  const large = syntheticModel(2190);
  const pieces = [...gfcPieces(large, { sigmas: true })].map((text) =>
    Buffer.from(text.replace(/(\.\d{12})\d{4}e/g, '$1e')),
  );
  const bytes = pieces.reduce((s, p) => s + p.length, 0);
  const start = cpuMs();
  const reader = new IcgemReader();
  for (const piece of pieces) reader.push(piece);
  const read = reader.end();
  const seconds = (cpuMs() - start) / 1000;
  rows.push({
    case: `reading ${(bytes / 1e6).toFixed(0)} MB of .gfc`,
    ours: `${(bytes / 1e6 / seconds).toFixed(0)} MB/s, ${seconds.toFixed(2)} s`,
    reference: null,
    ratio: null,
    note: null,
  });
  const places = Array.from({ length: 10 }, (_, i) => ({
    latitudeRad: 0.8 + 0.01 * i,
    longitudeRad: 0.2 * i,
    heightM: 100,
  }));
  const before = cpuMs();
  commissionCovariance(read, places);
  rows.push({
    case: 'commission covariance of 10 sites, degree 2190',
    ours: `${(cpuMs() - before).toFixed(0)} ms`,
    reference: null,
    ratio: null,
    note: null,
  });
  return rows;
}
