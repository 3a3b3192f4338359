// A year of tide at ten minutes for ten sites, against ERFA in Python: its Moon, Sun and Earth rotation and the same sums with numpy,
// which is the fastest way to get them there (arrays over all epochs, one call each).
import { execFileSync } from 'node:child_process';
import { performance } from 'node:perf_hooks';
import { fileURLToPath } from 'node:url';
import { readCampaign, tide } from '../../dist/index.js';

export const name = 'tide';

const SITES = [
  [52.3, 10.5],
  [50.9, 11.7],
  [40.0, -105.3],
  [35.7, 139.8],
  [-39.5, 176.9],
  [-33.8, 151.1],
  [0.0, 32.6],
  [67.9, 23.5],
  [-24.6, -70.4],
  [51.4, -0.3],
];

const campaign = () =>
  readCampaign(
    JSON.stringify({
      format: 'plumbtick-campaign/1',
      window: { start: '2027-01-01T00:00:00Z', end: '2028-01-01T00:00:00Z' },
      sites: SITES.map(([lat, lon], i) => ({ id: `s${i}`, lat, lon, h: { value: 100, tide: 'free' } })),
      clocks: SITES.map((_, i) => ({ id: `c${i}`, site: `s${i}`, transition: '87Sr' })),
      links: SITES.slice(1).map((_, i) => ({ id: `l${i}`, from: 'c0', to: `c${i + 1}` })),
    }),
  ).campaign;

export function run() {
  const read = campaign();
  const started = performance.now();
  const answer = tide(read);
  const seconds = (performance.now() - started) / 1000;
  const script = fileURLToPath(new URL('tide-erfa.py', import.meta.url));
  const label = 'a year at 10 min, 10 sites';
  let reference;
  try {
    reference = JSON.parse(
      execFileSync('/usr/bin/python3', [script], {
        input: JSON.stringify({ sites: SITES, start: answer.series.times[0], samples: answer.series.times.length }),
        encoding: 'utf8',
        stdio: ['pipe', 'pipe', 'ignore'],
      }),
    );
  } catch (error) {
    // 3: the script found no erfa or numpy
    if (error.status !== 3 && error.code !== 'ENOENT') throw error;
    return [
      {
        case: label,
        ours: `${seconds.toFixed(2)} s`,
        reference: null,
        ratio: null,
        note: 'apt-get install python3-erfa python3-numpy',
      },
    ];
  }
  // both have to mean the same thing before their times are compared
  const worst = Math.max(
    ...reference.check.map(([sample, link, y]) => Math.abs(answer.series.links[link].y[sample] - y)),
  );
  if (!(worst < 1e-19)) throw new Error(`differs from ERFA by ${worst}`);
  return [
    {
      case: label,
      ours: `${seconds.toFixed(2)} s`,
      reference: `${reference.seconds.toFixed(2)} s (ERFA ${reference.version}, numpy)`,
      ratio: seconds / reference.seconds,
      note: `largest difference ${worst.toExponential(1)} in y`,
    },
  ];
}
