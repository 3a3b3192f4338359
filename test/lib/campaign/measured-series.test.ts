import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { evaluate } from '../../../lib/answers/evaluate.js';
import { tide } from '../../../lib/answers/tide.js';
import { CampaignError, type Fault } from '../../../lib/campaign/fault.js';
import { gatherCampaignFiles } from '../../../lib/campaign/gather-files.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { writeCampaign } from '../../../lib/campaign/write.js';
import { bytesSource } from '../../../lib/earth/file-bytes/byte-source.js';
import { expectWithin } from '../../expect-within.js';
import { whiteFm } from '../clocks/simulated-noise.js';

const EXAMPLE = readFileSync(new URL('../../../sites/two-institutes-and-a-summit.json', import.meta.url), 'utf8');

// biome-ignore lint/suspicious/noExplicitAny: a file as JSON.parse gives it
type Json = any;

/** The example with its first measurement changed, and whatever else. */
function campaignWith(measurement: Json, change: (file: Json) => void = () => {}): string {
  const file = JSON.parse(EXAMPLE);
  file.measurements = [{ id: 'mo-1', link: 'mo', ...measurement }];
  change(file);
  return JSON.stringify(file, null, 1);
}

async function read(text: string, files: Readonly<Record<string, string>>) {
  const encoder = new TextEncoder();
  const gathered = await gatherCampaignFiles(text, async (name, use) =>
    files[name] === undefined ? null : use(bytesSource(name, encoder.encode(files[name]))),
  );
  return readCampaign(text, { files: gathered });
}

async function faultsOf(run: () => Promise<unknown>): Promise<readonly Fault[]> {
  try {
    await run();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults;
    throw error;
  }
  throw new Error('nothing was refused');
}

const PLANTED = 3.6401e-14;
const STEP_S = 600;
const START_MS = Date.UTC(2027, 8, 6);
const HOURS_6 = 36;

/** What the tide adds to y of the link in the middle of each sample, from the answer that `tide` gives. */
const tides = (() => {
  const file = JSON.parse(EXAMPLE);
  file.measurements = [];
  file.window = { start: '2027-09-06T00:00:00Z', end: '2027-09-08T00:00:00Z' };
  const { series } = tide(readCampaign(JSON.stringify(file)).campaign, STEP_S / 2);
  const { y } = series.links.find((l) => l.id === 'mo')!;
  return Array.from({ length: (y.length - 1) / 2 }, (_, i) => y[2 * i + 1]!);
})();

const at = (i: number) => new Date(START_MS + 1000 * STEP_S * i).toISOString();
const NOISE = 1e-19;
const noise = whiteFm(tides.length, NOISE, 5);
const sample = (i: number) => PLANTED + tides[i]! + noise[i]!;
const row = (i: number, y = sample(i)) => `${at(i)},${y.toExponential(12)}`;
const csv = (rows: readonly string[]) => `start (UTC),y\n${rows.join('\n')}\n`;
/** Six hours of data: the tide does not average out of them. */
const run = csv(Array.from({ length: HOURS_6 }, (_, i) => row(i)));
const seriesOf = async (text: string, files: Readonly<Record<string, string>> = { 'run.csv': run }) => {
  const { campaign, warnings } = await read(text, files);
  return { campaign, warnings, m: campaign.measurements[0]! };
};

describe('a measured series in place of y', () => {
  it('gives the planted offset within its u, the tide taken off each sample and the permanent tide left in', async () => {
    const { m, warnings } = await seriesOf(campaignWith({ series: 'run.csv' }));
    const expectedU = NOISE / Math.sqrt(HOURS_6);
    expectWithin(m.y.u, expectedU, 0.35 * expectedU);
    expectWithin(m.y.value, PLANTED, 2 * m.y.u);
    expect(m.y.tide).toBeNull();
    expect(m.y.parts).toEqual([{ u: m.y.u, source: null }]);
    const meanTide = tides.slice(0, HOURS_6).reduce((s, v) => s + v, 0) / HOURS_6;
    // left in, the tide would be seen
    expect(Math.abs(meanTide)).toBeGreaterThan(5 * m.y.u);
    expectWithin(m.series!.reduced!.tideMean!, meanTide, 1e-21);
    expect(m.series!.reduced).toMatchObject({ samples: HOURS_6, outside: 0, validS: 21600, deadS: 0 });
    const [note] = warnings.filter((w) => w.code === 'series-reduced');
    expect(note).toMatchObject({ path: 'measurements.0.series' });
    expect(note!.message).toMatch(/36 samples of run\.csv.*no dead time.*tide was taken off.*white FM/);
  });

  it('is evaluated as the same mean stated as y', async () => {
    const { campaign, m } = await seriesOf(campaignWith({ series: 'run.csv' }));
    const stated = readCampaign(campaignWith({ y: { value: m.y.value, u: m.y.u } })).campaign;
    const links = evaluate(campaign).links;
    expect(links).toEqual(evaluate(stated).links);
    expect(links[0]!.verdict).not.toBeNull();
  });

  it('counts only what lies in the availability of both clocks, the link and the measurement', async () => {
    // spoiled outside 01:00 to 05:00, and in the half hour in which the second clock was down
    const good = (i: number) => i >= 6 && i < 30 && !(i >= 12 && i < 15);
    const spoiled = csv(Array.from({ length: HOURS_6 }, (_, i) => row(i, good(i) ? sample(i) : sample(i) + 3e-15)));
    const text = campaignWith({ series: 'run.csv', end: at(30) }, (file) => {
      const [first, second] = file.clocks;
      delete first.uptime;
      first.available = [{ start: at(6), end: '2027-09-10T00:00:00Z' }];
      delete second.uptime;
      second.available = [
        { start: at(0), end: at(12) },
        { start: at(15), end: '2027-09-10T00:00:00Z' },
      ];
    });
    const { m, warnings } = await seriesOf(text, { 'run.csv': spoiled });
    expectWithin(m.y.value, PLANTED, 2.5 * (NOISE / Math.sqrt(21)));
    expect(m.series!.reduced).toMatchObject({ samples: 21, outside: 15, validS: 12600, deadS: 1800 });
    const note = warnings.find((w) => w.code === 'series-reduced')!;
    expect(note.message).toMatch(/15 more lie wholly or partly outside.*dead time 30(\.0)? min, 12(\.5)? %|13 %/);
    expect(warnings.map((w) => w.code)).toContain('noise-unknown');
  });

  it('says of gaps in the file that they are dead time', async () => {
    const gapped = csv(
      Array.from({ length: HOURS_6 }, (_, i) => i)
        .filter((i) => i < 10 || i >= 20)
        .map((i) => row(i)),
    );
    const { m, warnings } = await seriesOf(campaignWith({ series: 'run.csv' }), { 'run.csv': gapped });
    expect(m.series!.reduced).toMatchObject({ samples: 26, deadS: 6000 });
    expectWithin(m.y.value, PLANTED, 3 * m.y.u);
    expect(warnings.some((w) => w.path === 'measurements.0.series' && /run\.csv.*gap/i.test(w.message))).toBe(true);
  });

  it('takes columns and sampling interval as stated; without dates the tide stays in, with a warning', async () => {
    const bare = `${Array.from({ length: HOURS_6 }, (_, i) => `7 ${sample(i).toExponential(12)}`).join('\n')}\n`;
    const series = { file: 'bare.txt', columns: '- y', tau: '10 min' };
    const { m, warnings, campaign } = await seriesOf(campaignWith({ series }), { 'bare.txt': bare });
    const mean = Array.from({ length: HOURS_6 }, (_, i) => sample(i)).reduce((s, y) => s + y, 0) / HOURS_6;
    expectWithin(m.y.value, mean, 1e-24);
    expect(m.series!.reduced).toMatchObject({ tideMean: null, validS: 21600 });
    expect(warnings.map((w) => w.code)).toContain('tide-not-taken-off');
    expect(JSON.parse(writeCampaign(campaign)).measurements[0].series).toEqual({
      file: 'bare.txt',
      columns: '- y',
      tau: 600,
    });
  });

  it('writes the file name and no mean, and is read again from that', async () => {
    const { campaign } = await seriesOf(campaignWith({ series: 'run.csv' }));
    const written = writeCampaign(campaign);
    expect(JSON.parse(written).measurements[0]).toEqual({ id: 'mo-1', link: 'mo', series: 'run.csv' });
    expect((await read(written, { 'run.csv': run })).campaign).toEqual(campaign);
  });

  it('flags a mean that more data would not improve', async () => {
    let walk = 0;
    const steps = whiteFm(tides.length, 1e-17, 9);
    const rows = tides.map((t, i) => {
      walk += steps[i]!;
      return row(i, PLANTED + t + walk);
    });
    const { m, warnings } = await seriesOf(campaignWith({ series: 'run.csv' }), { 'run.csv': csv(rows) });
    expect(m.series!.reduced!.basis).toBe('not-averageable');
    expect(warnings.map((w) => w.code)).toContain('not-averageable');
  });

  it.each<readonly [string, Json, Readonly<Record<string, string>>, string, string, RegExp]>([
    ['a file that is not there', { series: 'run.csv' }, {}, 'file-not-at-hand', 'series', /run\.csv/],
    [
      'a fault inside the file, with its line',
      { series: 'run.csv' },
      { 'run.csv': run.replace(/(\n[^\n]*\n)[^\n]*/, '$12027-09-06T00:10:00Z,oops') },
      'bad-number',
      'series',
      /in run\.csv \(line 3\)/,
    ],
    [
      'y beside it',
      { series: 'run.csv', y: '3.6(1)e-14' },
      { 'run.csv': run },
      'exclusive-keys',
      'y',
      /"y" and "series"/,
    ],
    ['neither', {}, {}, 'missing-key', 'y', /nothing/],
    [
      'a tide label, which a series cannot have',
      { series: 'run.csv', tide: 'zero' },
      { 'run.csv': run },
      'exclusive-keys',
      'tide',
      /"series" and "tide"/,
    ],
    [
      'no common time',
      { series: 'run.csv', start: '2027-09-07T00:00:00Z' },
      { 'run.csv': run },
      'no-common-time',
      'series',
      /2027-09-06T00:00:00Z to 2027-09-06T06:00:00Z/,
    ],
    [
      'a single sample',
      { series: 'run.csv', end: at(1) },
      { 'run.csv': run },
      'single-sample',
      'series',
      /a single valid sample/,
    ],
    [
      'validity beside a file without dates',
      { series: { file: 'run.csv', columns: 'y', tau: 1 }, end: at(1) },
      { 'run.csv': '1e-15\n2e-15\n3e-15\n' },
      'series-without-dates',
      'series',
      /without dates/,
    ],
    [
      'dates that the tide does not reach',
      { series: { file: 'run.csv', columns: 'mjd y' } },
      { 'run.csv': '99000.0 1e-15\n99000.1 2e-15\n99000.2 3e-15\n' },
      'out-of-range',
      'series',
      /2129/,
    ],
  ])('refuses %s', async (_name, measurement, files, code, key, found) => {
    const faults = await faultsOf(() => read(campaignWith(measurement), files));
    expect(faults.map((f) => [f.code, f.path])).toEqual([[code, `measurements.0.${key}`]]);
    expect(faults[0]!.found).toMatch(found);
    expect(faults[0]!.line).toBeGreaterThan(1);
  });

  it('refuses coordinates of the pole that end before the series', async () => {
    const text = campaignWith({ series: 'run.csv' }, (file) => {
      file.pole = [
        { time: '2027-09-01T00:00:00Z', x: 0.1, y: 0.4 },
        { time: at(9), x: 0.1, y: 0.4 },
      ];
    });
    const faults = await faultsOf(() => read(text, { 'run.csv': run }));
    expect(faults.map((f) => [f.code, f.path])).toEqual([['pole-outside-series', 'measurements.0.series']]);
  });
});
