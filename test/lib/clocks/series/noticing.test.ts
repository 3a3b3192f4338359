import { describe, expect, it } from 'vitest';
import { readFrequencySeries } from '../../../../lib/clocks/series/index.js';
import { powerLawFm, randomWalkFm, whiteFm } from '../simulated-noise.js';
import { codes, iso, lines, message, mjd, noisy, OFFSET, plain, value } from './files.js';

const n = 600;
const y = noisy(n, 3);
const rows = y.map((v, i) => `${mjd(i)} ${value(v)}`);
const read = (all: readonly string[]) => readFrequencySeries(`${all.join('\n')}\n`);

describe('time', () => {
  it('gaps: where, how long, before which line', () => {
    const series = read(rows.filter((_, i) => !(i >= 20 && i < 50) && i !== 400));
    expect(series.y.length).toBe(n - 31);
    expect(series.gaps.map((g) => [Math.round(g.startS * 1e4) / 1e4, Math.round(g.endS * 1e4) / 1e4])).toEqual([
      [20, 50],
      [400, 401],
    ]);
    expect(series.runs).toEqual([
      { first: 0, count: 20 },
      { first: 20, count: 350 },
      { first: 370, count: 199 },
    ]);
    expect(series.dropped).toBe(0);
    expect(message(series, 'gaps')).toMatch(
      /line 21 2 gaps, 31 s in all, before lines 21, 371; the longest, 30 s, before line 21/,
    );
  });

  it('duplicated lines: the first is kept, the others counted; another value at the same time is said', () => {
    const same = read(rows.flatMap((r, i) => (i === 30 || i === 31 ? [r, r] : [r])));
    expect(same.y.length).toBe(n);
    expect(same.dropped).toBe(2);
    expect(same.gaps).toEqual([]);
    expect(message(same, 'duplicate-time')).toMatch(/2 rows .*lines 32, 34.*the same value/);
    const other = read(rows.flatMap((r, i) => (i === 30 ? [r, `${mjd(30)} ${value(y[30]! + 5e-16)}`] : [r])));
    expect(Math.abs(other.y[30]! - y[30]!)).toBeLessThan(1e-26);
    expect(message(other, 'duplicate-time')).toMatch(/1 row .*line 32.*another value, up to 5\.0e-16/);
  });

  it('a whole block pasted twice', () => {
    const series = read([...rows, ...rows.slice(100, 200)]);
    expect(series.y.length).toBe(n);
    expect(series.dropped).toBe(100);
    expect(codes(series)).toEqual(['time-order', 'duplicate-time']);
  });

  it('blocks out of order are sorted, and lines still point at the file', () => {
    const series = read([...rows.slice(200), ...rows.slice(0, 200)]);
    expect(codes(series)).toEqual(['time-order']);
    expect(message(series, 'time-order')).toMatch(/once, at line 401/);
    expect(Math.abs(series.y[0]! - y[0]!)).toBeLessThan(1e-26);
    expect(series.lineOf(0)).toBe(401);
    expect(series.lineOf(200)).toBe(1);
    expect(series.runs).toEqual([{ first: 0, count: n }]);
  });

  it('overlap: a sample that starts before the one before has ended is left out', () => {
    const text = lines(y.slice(0, 50), (v, i) => `${iso(i * 10 - (i === 20 ? 4 : 0))} ${iso(i * 10 + 10)} ${value(v)}`);
    const series = readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] });
    expect(series.dropped).toBe(1);
    expect(series.gaps).toEqual([{ startS: 200, endS: 210 }]);
    expect(message(series, 'overlap')).toMatch(/line 21 .*line 21/);
  });

  it.each([
    ['forward', 86400, 'day-leap', /forward by exactly 1 d at line 301/],
    ['forward by a week', 7 * 86400, 'day-leap', /forward by exactly 7 d at line 301/],
    ['back', -86400, 'day-leap', /back by exactly 1 d at line 301/],
    ['an hour', 3600, 'hour-leap', /forward by exactly 1 h at line 301.*summer time/],
    ['an hour back', -3600, 'hour-leap', /back by exactly 1 h at line 301/],
  ])('a leap: %s', (_, leap, code, text) => {
    for (const stamp of [mjd, iso]) {
      const series = read(y.map((v, i) => `${stamp(i + (i >= 300 ? leap : 0))} ${value(v)}`));
      expect(message(series, code)).toMatch(text);
      expect(series.y.length).toBe(n);
    }
  });

  it.each([86400 + 37, 43200, 2 * 3600])('a pause of %i s is no leap', (pause) => {
    const series = read(y.map((v, i) => `${mjd(i + (i >= 300 ? pause : 0))} ${value(v)}`));
    expect(codes(series)).toEqual(['gaps']);
  });

  it('one mistyped year does not drown the rest', () => {
    const series = read(rows.map((r, i) => (i === 250 ? r.replace('61528', '71528') : r)));
    expect(series.y.length).toBe(n);
    expect(series.intervalS).toBe(1);
    expect(series.runs.map((r) => r.count)).toEqual([250, 349, 1]);
    expect(codes(series)).toContain('time-order');
  });

  it('stamps rounded to 0.9 s at 1 s spacing: the spacing is found, no gap invented, and a real one still seen', () => {
    const series = read(y.map((v, i) => `${mjd(i, 5)} ${value(v)}`));
    expect(series.intervalS).toBe(1);
    expect(series.gaps).toEqual([]);
    expect(series.runs).toHaveLength(1);
    expect(codes(series)).toEqual(['time-jitter']);
    const gap = read(y.map((v, i) => `${mjd(i >= 300 ? i + 5 : i, 5)} ${value(v)}`));
    expect(gap.gaps).toHaveLength(1);
  });

  it('a spacing that is not plain, over a long record', () => {
    const long = noisy(20_000, 4);
    const series = readFrequencySeries(lines(long, (v, i) => `${mjd(i * 1.048576)} ${value(v)}`));
    expect(Math.abs(series.intervalS - 1.048576)).toBeLessThan(1e-6);
    expect(series.runs).toHaveLength(1);
  });

  it('dead time between samples', () => {
    const text = lines(y, (v, i) => `${iso(i * 10)} ${iso(i * 10 + 8)} ${value(v)}`);
    const series = readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] });
    expect(series).toMatchObject({ intervalS: 10, sampleS: 8, lengthS: null });
    expect(series.runs).toHaveLength(1);
    expect(message(series, 'dead-time')).toMatch(/8 s and come every 10 s: 20\.0 % dead time/);
  });

  it('samples of unlike length: each keeps its own, and ends a run', () => {
    const starts = [0, 10, 20, 30, 55, 65, 75];
    const text = lines(starts, (s, i) => `${iso(s)} ${iso(i === 3 ? 55 : s + 10)} ${value(y[i]!)}`);
    const series = readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] });
    expect([...series.lengthS!]).toEqual([10, 10, 10, 25, 10, 10, 10]);
    expect(series.runs).toEqual([
      { first: 0, count: 3 },
      { first: 3, count: 1 },
      { first: 4, count: 3 },
    ]);
    expect(series.gaps).toEqual([]);
  });
});

describe('values', () => {
  it('clean noise of any kind raises nothing', () => {
    const kinds = [whiteFm(n, 1e-16, 5), powerLawFm(512, -1, 1e-16, 6), randomWalkFm(n, 1e-17, 7)];
    for (const noise of kinds) expect(codes(readFrequencySeries(plain([...noise].map((v) => v + OFFSET))))).toEqual([]);
  });

  it('an outlier: its line and distance; it stays in', () => {
    const series = readFrequencySeries(plain(y.map((v, i) => (i === 77 ? v + 2e-15 : v))));
    expect(series.y.length).toBe(n);
    expect(message(series, 'outliers')).toMatch(/line 78 one value .*line 78/);
    expect(codes(series)).toEqual(['outliers']);
  });

  it('two outliers side by side, and one on a random walk', () => {
    const pair = readFrequencySeries(plain(y.map((v, i) => (i === 77 || i === 78 ? v - 3e-15 : v))));
    expect(message(pair, 'outliers')).toMatch(/lines 78, 79/);
    const walk = [...randomWalkFm(n, 1e-17, 8)];
    const series = readFrequencySeries(plain(walk.map((v, i) => v + (i === 200 ? 1e-15 : 0))));
    expect(message(series, 'outliers')).toMatch(/line 201/);
  });

  it('a step: where, how large, and no crowd of outliers', () => {
    const series = readFrequencySeries(plain(y.map((v, i) => (i >= 400 ? v + 8e-16 : v))));
    expect(codes(series)).toEqual(['step']);
    const [, size, line] = /steps by (\S+) near line (\d+)/.exec(message(series, 'step'))!;
    expect(Math.abs(Number(size) - 8e-16)).toBeLessThan(1e-16);
    expect(Math.abs(Number(line) - 401)).toBeLessThanOrEqual(1);
  });

  it('a step across a gap says so', () => {
    const kept = rows
      .map((_, i) => `${mjd(i)} ${value(y[i]! + (i >= 400 ? 8e-16 : 0))}`)
      .filter((_, i) => i < 350 || i >= 400);
    expect(message(read(kept), 'step')).toMatch(/after a gap/);
  });

  it.each([
    [1e3, 300, 350],
    [1e-3, 300, 350],
    [1e6, 120, 121],
    [1e-6, 0, 60],
    [1e3, 590, 600],
    [1e-15, 200, 420],
  ])('a unit slip by %s in samples %s to %s', (factor, from, to) => {
    const series = readFrequencySeries(plain(y.map((v, i) => (i >= from && i < to ? v * factor : v))));
    const where = to - from === 1 ? `line ${from + 1} ` : `lines ${from + 1} to ${to} `;
    expect(message(series, 'unit-slip')).toContain(where);
    expect(message(series, 'unit-slip')).toContain(` ${factor.toExponential(0).replace('+', '')} times`);
    expect(codes(series)).toEqual(['unit-slip']);
  });

  it('a unit slip of noise about zero shows in its scatter', () => {
    const zero = [...whiteFm(n, 1e-16, 12)];
    const series = readFrequencySeries(plain(zero.map((v, i) => (i >= 300 && i < 400 ? v * 1e-3 : v))));
    const [, from, to] = /lines (\d+) to (\d+) the scatter is 1e-3 times/.exec(message(series, 'unit-slip'))!;
    expect(Math.abs(Number(from) - 301)).toBeLessThan(12);
    expect(Math.abs(Number(to) - 400)).toBeLessThan(12);
  });

  it('zeros among values', () => {
    const series = readFrequencySeries(plain(y.map((v, i) => (i % 100 === 50 ? 0 : v))));
    expect(message(series, 'zero-values')).toMatch(/6 values are exactly 0 .*line 51/);
  });

  it('fractions too large to be any', () => {
    expect(codes(readFrequencySeries(plain(y.map((v) => v * 1e15))))).toEqual(['y-too-large']);
  });

  it('a counter that repeats one value is no fault', () => {
    expect(codes(readFrequencySeries(plain(y.map(() => OFFSET))))).toEqual([]);
  });
});
