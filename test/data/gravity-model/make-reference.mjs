// Writes reference.json: W, V and gravity of the synthetic models of degree 2, 36, 360, 2190 and 2700 by GeographicLib's GravityModel.
// Run from anywhere: node test/data/gravity-model/make-reference.mjs   (needs g++ and libgeographiclib-dev; two minutes)
import { execFileSync } from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { egmFiles, syntheticModel } from './synthetic-model.mjs';

// GRS80: a, GM, ω by definition; f from Moritz (2000), 1/f = 298.257222100882711…
const ELLIPSOID = { a: 6378137, f: 1 / 298.2572221008827, gm: 3986005e8, angularVelocity: 7292115e-11 };

const points = [
  [90, 0, 0],
  [-90, 0, 2835],
  [90, 123, 8800],
  [89.99, -77.5, 100],
  [0, 0, 0],
  [0, 180, 0],
  [27.988, 86.925, 8848],
  [52.2961, 10.4598, 143.216],
  [-33.9, -179.999, -30],
  [-33.9, 179.999, -30],
  [71.2, -156.6, 12],
  [-77.85, 166.67, 200],
  [5e-5, 32.5, 1134],
  [45, -90, 500],
  [-84.99, 45, 3000],
];

const here = path.dirname(fileURLToPath(import.meta.url));
const work = fs.mkdtempSync(path.join(os.tmpdir(), 'gravity-reference-'));
const program = path.join(work, 'reference');
execFileSync('g++', ['-O2', path.join(here, 'reference.cpp'), '-o', program, '-lGeographicLib']);
const run = (name, degree) =>
  execFileSync(program, ['values', name, work, String(degree), String(ELLIPSOID.a), String(ELLIPSOID.f)], {
    input: points.map((p) => p.join(' ')).join('\n'),
    encoding: 'utf8',
  })
    .trim()
    .split('\n')
    .map((l) => l.split(' ').map(Number));

const cases = [];
for (const [modelDegree, degree] of [
  [2, 2],
  [36, 36],
  [360, 360],
  [2190, 2190],
  [2190, 700],
  [2700, 2700],
]) {
  const name = `synthetic-${modelDegree}`;
  const { properties, coefficients } = egmFiles(syntheticModel(modelDegree), name, ELLIPSOID);
  fs.writeFileSync(path.join(work, `${name}.egm`), properties);
  fs.writeFileSync(path.join(work, `${name}.egm.cof`), coefficients);
  cases.push({
    modelDegree,
    degree,
    // at degree 2700 the reference overflows near the poles: such points are left out
    points: run(name, degree)
      .map(([W, V, east, north, up], i) => ({ lat: points[i][0], lon: points[i][1], h: points[i][2], W, V, east, north, up }))
      .filter((p) => Number.isFinite(p.W)),
  });
}
const version = execFileSync('dpkg-query', ['-W', '-f', '${Version}', 'libgeographiclib-dev'], { encoding: 'utf8' });
const text = JSON.stringify({ program: `GeographicLib GravityModel, Debian ${version}`, seed: 20270503, ellipsoid: ELLIPSOID, cases }, null, 1);
fs.writeFileSync(path.join(here, 'reference.json'), `${text}\n`);
fs.rmSync(work, { recursive: true });
