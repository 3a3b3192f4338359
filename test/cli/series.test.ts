import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { SeriesAnswer } from '../../lib/answers/series.js';
import { iso, lines, mjd, noisy, plain, value } from '../lib/clocks/series/files.js';
import { faultsOf, file, folder, plumbtick } from './run-cli.js';

const y = noisy(400, 21);
const answer = (args: readonly string[], input = ''): SeriesAnswer => {
  const { status, stdout, stderr } = plumbtick(['series', ...args, '--json'], input);
  expect(stderr).toBe('');
  expect(status).toBe(0);
  return JSON.parse(stdout) as SeriesAnswer;
};

describe('plumbtick series', () => {
  it('answers with the agreed keys', () => {
    const found = answer([file('plain.txt', plain(y))]);
    for (const key of ['samples', 'interval', 'gaps', 'dropped', 'mean', 'noise', 'deviations', 'warnings'])
      expect(found).toHaveProperty(key);
    expect(Object.keys(found.mean)).toEqual(['value', 'u']);
    for (const key of ['kind', 'tau', 'value', 'lo', 'hi', 'n']) expect(found.deviations[0]).toHaveProperty(key);
    expect(found.samples).toBe(400);
  });

  it('the test suite of the handbook, from a file of values alone', () => {
    const { small } = JSON.parse(readFileSync(new URL('../data/sp1065/deviations.json', import.meta.url), 'utf8')) as {
      small: { y: number[]; deviations: Record<string, Record<string, string>> };
    };
    const { deviations } = answer([file('small.txt', lines(small.y, String)), '--tau', '1s', '--at', '1,2']);
    for (const d of deviations) {
      const printed = small.deviations[d.kind]![d.tau]!;
      if (printed === '70.80608') continue; // printed one unit off in the last digit
      expect(d.value.toPrecision(7)).toBe(printed);
    }
  });

  it('reads standard input', () => {
    expect(answer(['-'], plain(y)).samples).toBe(400);
  });

  it('--tau, --columns and --at', () => {
    const text = lines(y, (v, i) => `${i} ${value(v)} ok`);
    const found = answer([file('three.txt', text), '--tau', '10s', '--columns', '- y valid', '--at', '1,10']);
    expect(found.interval).toBe(10);
    expect([...new Set(found.deviations.map((d) => d.tau))]).toEqual([10, 100]);
  });

  it('a ratio of two transitions, a beat with its carrier, a frequency by its transition', () => {
    const ratio = file('ratio.txt', `${mjd(0)} 1.207507039343337749\n${mjd(1)} 1.207507039343337749\n`);
    expect(Math.abs(answer([ratio, '--columns', 'mjd ratio', '--transition', '171Yb/87Sr']).mean.value)).toBeLessThan(
      1e-15,
    );
    const beat = file('beat.txt', `${mjd(0)} 35000000.0429228\n${mjd(1)} 35000000.0429228\n`);
    const upward = answer([beat, '--columns', 'mjd hz', '--nominal', '35e6', '--carrier', '429228004229872.99']).mean
      .value;
    expect(Math.abs(upward - 1e-16)).toBeLessThan(1e-22);
    const downward = answer([beat, '--columns', 'mjd hz', '--nominal', '35e6', '--carrier', '-429228004229872.99']).mean
      .value;
    expect(downward).toBe(-upward);
    const hz = file('hz.txt', `${mjd(0)} 429228004229872.99\n${mjd(1)} 429228004229872.99\n`);
    expect(answer([hz, '--columns', 'mjd hz', '--transition', '87Sr']).mean.value).toBe(0);
  });

  it('tables for people, and everything as CSV', () => {
    const name = file(
      'gap.txt',
      lines(y, (v, i) => `${iso(i < 100 ? i : i + 60)},${value(v)}`),
    );
    const { status, stdout } = plumbtick(['series', name]);
    expect(status).toBe(0);
    for (const words of [
      '400 samples 1\u00a0s apart',
      'Mean y = 2.11',
      'white FM',
      'OADEV',
      '2027-05-03T00:01:40Z',
      'Caution: line 101',
    ]) {
      expect(stdout).toContain(words);
    }
    for (const line of stdout.split('\n')) expect(line.length, line).toBeLessThanOrEqual(110);
    const csv = plumbtick(['series', name, '--csv', '--table', 'deviations']).stdout.trim().split('\n');
    expect(csv).toHaveLength(1 + answer([name]).deviations.length);
  });

  it('refuses a file with every fault in place', () => {
    const name = file('bad.txt', `${mjd(0)} 1e-15\n${mjd(1)} x\n${mjd(2)} 1e-15\n${mjd(3)} 1,2\n`);
    const faults = faultsOf(plumbtick(['series', name, '--json', '--columns', 'mjd y']));
    expect(faults.map((f) => [f.code, f.line])).toEqual([['decimal-comma', 4]]);
    const local = file(
      'local.txt',
      lines(y, (v, i) => `${iso(i).slice(0, 19)} ${value(v)}`),
    );
    expect(faultsOf(plumbtick(['series', local, '--json']))[0]).toMatchObject({
      code: 'local-time',
      line: 1,
      column: 1,
    });
    const people = plumbtick(['series', local]);
    expect(people.status).toBe(1);
    expect(people.stderr).toContain('local.txt:1:1');
  });

  it('refuses what is no data: empty, a folder, nothing there, bytes', () => {
    expect(faultsOf(plumbtick(['series', file('empty.txt', ''), '--json']))[0]!.code).toBe('no-data');
    expect(faultsOf(plumbtick(['series', folder, '--json']))[0]!.code).toBe('not-a-file');
    expect(faultsOf(plumbtick(['series', 'nowhere.txt', '--json']))[0]!.code).toBe('no-such-file');
    const bytes = Uint8Array.from({ length: 4000 }, (_, i) => (i * 7919) % 256);
    expect(plumbtick(['series', file('bytes.bin', bytes), '--json']).status).toBe(1);
  });

  it.each([
    [['--tau', '0s'], 'expected more than 0'],
    [['--tau', 'soon'], '--tau soon'],
    [['--columns', 'date y'], 'words from: mjd iso'],
    [['--at', '1.5'], 'whole numbers'],
    [['--at', '0'], 'whole numbers'],
    [['--transition', '87Kr'], 'a transition with a recommended frequency'],
    [['--transition', '87Sr', '--nominal', '1'], 'either a transition'],
    [['--carrier', '1'], '--nominal beside it'],
    [['--nominal', 'much'], 'a decimal number is wanted'],
  ])('words that are wrong: %j', (args, words) => {
    const { status, stderr } = plumbtick(['series', file('plain.txt', plain(y)), ...args]);
    expect(status).toBe(2);
    expect(stderr).toContain(words);
  });
});
