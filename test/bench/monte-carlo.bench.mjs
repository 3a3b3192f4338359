// 1e6 Monte Carlo trials of the offset of every link, against the same model in vectorised NumPy (monte_carlo_reference.py), in the
// same run. Processor time of one core each, best of five (wall time would measure who else uses the machine); both give mean, u,
// symmetric and shortest 95 % interval; ours also the prediction itself, the histogram and the verdict on the linear result.
import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { predictMonteCarlo, readCampaign } from '../../dist/index.js';

export const name = 'Monte Carlo';

const TRIALS = 1_000_000;
const RUNS = 5;
const reference = fileURLToPath(new URL('./monte_carlo_reference.py', import.meta.url));

/** Numbers common to the campaign and the reference program. */
function chain(siteCount, links) {
  return {
    lat: Array.from({ length: siteCount }, (_, i) => 45 + 0.4 * i),
    normalHeight: Array.from({ length: siteCount }, (_, i) => 60 + 35 * i),
    uh: 0.008,
    uzeta: 0.02,
    rhoGnss: 0.3,
    rhoGeoid: 0.6,
    g: 9.807,
    ug: 3e-6,
    gradient: 3.086e-6,
    tie: 1.5,
    utie: 0.001,
    from: links.map(([a]) => a),
    to: links.map(([, b]) => b),
    trials: TRIALS,
    runs: RUNS,
  };
}

function campaignOf(spec) {
  const ids = spec.lat.map((_, i) => `s${String(i).padStart(2, '0')}`);
  const text = JSON.stringify({
    format: 'plumbtick-campaign/1',
    sources: [
      { id: 'gnss', correlation: spec.rhoGnss },
      { id: 'quasigeoid', correlation: spec.rhoGeoid },
    ],
    sites: ids.map((id, i) => ({
      id,
      lat: spec.lat[i],
      lon: 10,
      g: { value: spec.g, u: spec.ug, unit: 'm/s²' },
      h: { value: spec.normalHeight[i] + 45, u: spec.uh, unit: 'm', tide: 'zero', source: 'gnss' },
      determinations: [
        { kind: 'gnss-quasigeoid', zeta: { value: 45, u: spec.uzeta, unit: 'm', tide: 'zero', source: 'quasigeoid' } },
      ],
    })),
    clocks: ids.map((id) => ({
      id: `c-${id}`,
      site: id,
      transition: '87Sr',
      tie: [{ dH: { value: spec.tie, u: spec.utie, unit: 'm' } }],
    })),
    links: spec.from.map((a, l) => ({ id: `l${l}`, from: `c-${ids[a]}`, to: `c-${ids[spec.to[l]]}` })),
  });
  return readCampaign(text).campaign;
}

/** Processor seconds of this process, its compiler and collector threads included. */
function processorSeconds() {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1e6;
}

function best(run) {
  let least = Infinity;
  let result;
  for (let k = 0; k < RUNS; k++) {
    const started = processorSeconds();
    result = run(k);
    least = Math.min(least, processorSeconds() - started);
  }
  return { seconds: least, result };
}

export function run() {
  const ring = (n, steps) => steps.flatMap((s) => Array.from({ length: n }, (_, i) => [i, (i + s) % n]));
  return [
    ['two-site link, 10 inputs', chain(2, [[0, 1]])],
    ['20 sites, 30 links, 100 inputs', chain(20, [...ring(20, [1]), ...ring(20, [7]).slice(0, 10)])],
  ].map(([label, spec]) => {
    const campaign = campaignOf(spec);
    let peak = 0;
    const ours = best((seed) => {
      const answer = predictMonteCarlo(campaign, { trials: TRIALS, seed });
      peak = Math.max(peak, process.memoryUsage().arrayBuffers);
      return answer;
    });
    const time = (seconds) => `${seconds.toPrecision(3)} s`;
    const row = {
      case: `1e6 trials, ${label} (${Math.round(peak / 2 ** 20)} MiB of arrays)`,
      ours: time(ours.seconds),
    };
    const python = spawnSync('python3', [reference], {
      input: JSON.stringify(spec),
      encoding: 'utf8',
      maxBuffer: 2 ** 26,
      env: { ...process.env, OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1', MKL_NUM_THREADS: '1' },
    });
    if (python.status !== 0) {
      return { ...row, reference: null, ratio: null, note: 'python3 -m pip install numpy' };
    }
    const theirs = JSON.parse(python.stdout);
    // a comparison of two programs that differ would be worth nothing
    ours.result.links.forEach(({ id, monteCarlo }, l) => {
      const ratio = monteCarlo.u / theirs.u[l];
      if (Math.abs(ratio - 1) > 0.01) throw new Error(`u of ${id} is ${monteCarlo.u}, by NumPy ${theirs.u[l]}`);
    });
    return {
      ...row,
      reference: `${time(theirs.seconds)} (NumPy ${theirs.numpy})`,
      ratio: ours.seconds / theirs.seconds,
      note: '',
    };
  });
}
