// Reading frequency files of 2e6 rows in pieces of 64 KiB, and the memory that 1e7 rows take.
import { performance } from 'node:perf_hooks';
import { FrequencySeriesParser } from '../../dist/index.js';

export const name = 'Series';

const ROWS = 2_000_000;
const PIECE = 1 << 16;

const noise = () => {
  let s = 12345;
  return () => {
    s = (Math.imul(s, 1664525) + 1013904223) >>> 0;
    return (s / 4294967296 - 0.5) * 1e-15 + 2e-14;
  };
};

const forms = {
  'MJD and y': (i, y) => `${(61528 + i / 86400).toFixed(9)} ${y.toExponential(9)}\n`,
  'ISO 8601 and y, CSV': (i, y) => `${new Date(Date.UTC(2027, 4, 3) + 1000 * i).toISOString()},${y.toExponential(9)}\n`,
  'MJD and a ratio of 21 digits': (i, y) =>
    `${(61528 + i / 86400).toFixed(9)} 1.${String(1e18 + Math.round(y * 1e18)).slice(1)}00\n`,
};
const words = { 'MJD and a ratio of 21 digits': ['mjd', 'ratio'] };

function read(bytes, columns) {
  const parser = new FrequencySeriesParser(columns ? { columns } : {});
  const start = performance.now();
  for (let i = 0; i < bytes.length; i += PIECE) parser.push(bytes.subarray(i, i + PIECE));
  const parsed = performance.now();
  const series = parser.finish();
  return { seconds: (parsed - start) / 1000, finishSeconds: (performance.now() - parsed) / 1000, series };
}

/** Ten million rows, made piece by piece so that only the reader's own memory grows. */
function memory() {
  const parser = new FrequencySeriesParser();
  const next = noise();
  const before = process.memoryUsage();
  let peak = 0;
  const encoder = new TextEncoder();
  for (let i = 0; i < 10_000_000; ) {
    let text = '';
    for (const end = i + 2000; i < end; i++) text += forms['MJD and y'](i, next());
    parser.push(encoder.encode(text));
    if (i % 500_000 === 0) peak = Math.max(peak, process.memoryUsage().arrayBuffers - before.arrayBuffers);
  }
  const series = parser.finish();
  if (series.y.length !== 10_000_000) throw new Error(`${series.y.length} samples of 1e7`);
  return Math.max(peak, process.memoryUsage().arrayBuffers - before.arrayBuffers) / 2 ** 20;
}

export async function run() {
  const rows = [];
  for (const [form, line] of Object.entries(forms)) {
    const next = noise();
    const bytes = new TextEncoder().encode(Array.from({ length: ROWS }, (_, i) => line(i, next())).join(''));
    let best = null;
    for (let k = 0; k < 3; k++) {
      const found = read(bytes, words[form]);
      if (found.series.y.length !== ROWS) throw new Error(`${found.series.y.length} samples of ${ROWS}`);
      if (best === null || found.seconds < best.seconds) best = found;
    }
    const rate = (bytes.length / 1e6 / best.seconds).toFixed(0);
    rows.push({
      case: `${form}, 2e6 rows`,
      ours: `${rate} MB/s (${(ROWS / 1e6 / best.seconds).toFixed(1)} million rows/s), then ${best.finishSeconds.toFixed(2)} s to look it over`,
      reference: null,
      ratio: null,
      note: '',
    });
  }
  rows.push({
    case: '1e7 rows',
    ours: `${memory().toFixed(0)} MiB of columns`,
    reference: null,
    ratio: null,
    note: 'no reference program',
  });
  return rows;
}
