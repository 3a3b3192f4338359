// Overlapping Allan deviation at octave τ of 1e7 samples, against vectorised NumPy (deviations_reference.py) on the same samples in the
// same run. Wall time from samples to deviations, best of three each; ours also names the noise and gives the 68.3 % intervals.
import { spawnSync } from 'node:child_process';
import { performance } from 'node:perf_hooks';
import { fileURLToPath } from 'node:url';
import { deviationsAt, octaveFactors, phaseRecordOf } from '../../dist/index.js';

export const name = 'Deviations';

const SAMPLES = 10_000_000;
const RUNS = 3;
const reference = fileURLToPath(new URL('./deviations_reference.py', import.meta.url));

/** Uniform noise of a fixed generator on an offset of 2e-14. */
function samples() {
  const y = new Float64Array(SAMPLES);
  let s = 12345;
  for (let i = 0; i < SAMPLES; i++) {
    s = (Math.imul(s, 1664525) + 1013904223) >>> 0;
    y[i] = (s / 4294967296 - 0.5) * 1e-15 + 2e-14;
  }
  return y;
}

function best(run) {
  let seconds = Number.POSITIVE_INFINITY;
  let result;
  for (let k = 0; k < RUNS; k++) {
    const start = performance.now();
    result = run();
    seconds = Math.min(seconds, (performance.now() - start) / 1000);
  }
  return { seconds, result };
}

export async function run() {
  const y = samples();
  const ours = best(() => {
    const record = phaseRecordOf(y, [{ first: 0, count: y.length }]);
    return deviationsAt(record, 1, octaveFactors(record), ['oadev']);
  });
  const all = best(() => {
    const record = phaseRecordOf(y, [{ first: 0, count: y.length }]);
    return deviationsAt(record, 1, octaveFactors(record));
  });
  const python = spawnSync('python3', [reference, String(SAMPLES)], {
    input: new Uint8Array(y.buffer),
    maxBuffer: 1 << 20,
    encoding: 'utf8',
  });
  const text = (seconds) => `${seconds.toFixed(2)} s`;
  const rows = [
    {
      case: 'OADEV, 1e7 samples, 23 octaves',
      ours: text(ours.seconds),
      reference: null,
      ratio: null,
      note: 'apt-get install python3-numpy',
    },
    {
      case: 'all seven kinds, 1e7 samples',
      ours: text(all.seconds),
      reference: null,
      ratio: null,
      note: '',
    },
  ];
  if (python.status === 0) {
    const numpy = JSON.parse(python.stdout);
    ours.result.forEach((row, i) => {
      const off = Math.abs(row.value / numpy.deviations[i] - 1);
      if (!(off < 1e-7)) throw new Error(`τ = ${row.tauS}: ${row.value}, NumPy has ${numpy.deviations[i]}`);
    });
    rows[0].reference = text(numpy.seconds);
    rows[0].ratio = ours.seconds / numpy.seconds;
    rows[0].note = `NumPy ${numpy.numpy}; same values to 1e-7`;
  }
  return rows;
}
