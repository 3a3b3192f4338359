// `npm run bench`: every test/bench/*.bench.mjs on the built library, in one table. A bench exports `name` and an async `run()`
// that returns rows { case, ours, reference, ratio, note }: `ours` and `reference` are texts with a unit, `ratio` is ours over
// reference (or null), and where the reference program is not installed `reference` is null and `note` the command that installs it.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from './build.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));
const folder = path.join(root, 'test', 'bench');
const only = process.argv.slice(2);

await build();
const names = (fs.existsSync(folder) ? fs.readdirSync(folder) : [])
  .filter((name) => name.endsWith('.bench.mjs'))
  .filter((name) => only.length === 0 || only.some((word) => name.includes(word)))
  .sort();
if (names.length === 0) {
  console.error(`No bench ${only.length ? `matches ${only.join(', ')}` : 'was found'} in test/bench.`);
  process.exit(1);
}

const rows = [];
let failed = 0;
for (const name of names) {
  const bench = await import(pathToFileURL(path.join(folder, name)).href);
  process.stderr.write(`${bench.name} …\n`);
  try {
    for (const row of await bench.run())
      rows.push({
        case: `${bench.name}: ${row.case}`,
        ours: row.ours,
        reference: row.reference ?? (row.note ? `reference absent: ${row.note}` : 'none'),
        ratio: row.ratio === null || row.ratio === undefined ? '' : row.ratio.toPrecision(3),
        note: row.reference === null ? '' : (row.note ?? ''),
      });
  } catch (error) {
    failed += 1;
    rows.push({ case: bench.name, ours: `failed: ${error.message}`, reference: '', ratio: '', note: '' });
  }
}

const columns = ['case', 'ours', 'reference', 'ratio', 'note'].filter(
  (key) => key !== 'note' || rows.some((row) => row.note),
);
const width = (key) => Math.max(key.length, ...rows.map((row) => row[key].length));
const line = (row) =>
  columns
    .map((key) => row[key].padEnd(width(key)))
    .join('  ')
    .trimEnd();
console.log(line(Object.fromEntries(columns.map((key) => [key, key]))));
console.log(columns.map((key) => '─'.repeat(width(key))).join('  '));
for (const row of rows) console.log(line(row));
const [cpu] = os.cpus();
console.log(
  `\nmachine: ${cpu?.model.trim() ?? 'unknown processor'} × ${os.cpus().length}, ${(os.totalmem() / 2 ** 30).toFixed(0)} GiB, ${os.type()} ${os.release()}, Node ${process.version}`,
);
process.exitCode = failed ? 1 : 0;
