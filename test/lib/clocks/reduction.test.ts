import { describe, expect, it } from 'vitest';
import { reduceSeries } from '../../../lib/clocks/reduction.js';
import { type FrequencySeries, readFrequencySeries } from '../../../lib/clocks/series/index.js';
import { SmoothCorrection } from '../../../lib/clocks/smooth-correction.js';
import { iso, lines, noisy, OFFSET, plain, START_MS, value } from './series/files.js';

const at = (s: number) => START_MS + 1000 * s;
const valid = (...pairs: [number, number][]) => pairs.map(([a, b]) => ({ startMs: at(a), endMs: at(b) }));
const mean = (y: readonly number[]) => y.reduce((a, b) => a + b, 0) / y.length;

const y = noisy(1000, 9);
const series = readFrequencySeries(lines(y, (v, i) => `${iso(i)} ${value(v)}`));

/** A tide of the right size and speed: 12.42 h, 1e-17. */
const tide = (timeMs: number) => 1e-17 * Math.sin((2 * Math.PI * timeMs) / (12.42 * 3600_000));

describe('mean of a series', () => {
  it('all samples, their valid time, no dead time', () => {
    const r = reduceSeries(series);
    expect(Math.abs(r.mean - mean(y))).toBeLessThan(1e-27);
    expect(r).toMatchObject({
      samples: 1000,
      outside: 0,
      validS: 1000,
      spanS: 1000,
      deadS: 0,
      correctionMean: null,
      drift: null,
    });
    expect(Math.abs(r.uncertainty.u! / (1e-16 / Math.sqrt(1000)) - 1)).toBeLessThan(0.15);
  });

  it('only what lies wholly in the validity of both clocks and the link', () => {
    const r = reduceSeries(series, {
      validity: [valid([0, 500], [600, 1000]), valid([100.5, 900]), valid([-10, 650], [650, 2000])],
    });
    // clock A: to 500, from 600; clock B cuts sample 100 in half and ends at 900
    const used = y.filter((_, i) => (i >= 101 && i < 500) || (i >= 600 && i < 900));
    expect(r.samples).toBe(used.length);
    expect(r.outside).toBe(1000 - used.length);
    expect(Math.abs(r.mean - mean(used))).toBeLessThan(1e-27);
    expect(r.validS).toBe(used.length);
    expect(r.spanS).toBe(799);
    expect(r.deadS).toBe(100);
  });

  it('validity that parts two samples breaks the run: deviations do not reach over the edge', () => {
    const r = reduceSeries(series, { validity: [valid([0, 40], [40.5, 1000])] });
    expect(r.samples).toBe(999);
    expect(r.uncertainty.deviation!.gapped).toBe(true);
  });

  it('weights by length', () => {
    const text = `${iso(0)} ${iso(10)} 1e-15\n${iso(10)} ${iso(20)} 3e-15\n${iso(20)} ${iso(50)} 8e-15\n`;
    const r = reduceSeries(readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] }));
    expect(Math.abs(r.mean - (10 * 1e-15 + 10 * 3e-15 + 30 * 8e-15) / 50)).toBeLessThan(1e-29);
    expect(r.validS).toBe(50);
  });

  it('takes the tide off at the time of each sample and leaves the static part and the series alone', () => {
    const hours = 30;
    const clean = noisy(hours * 60, 10);
    const withTide = clean.map((v, i) => v + tide(at(60 * i + 30)));
    const s = readFrequencySeries(lines(withTide, (v, i) => `${iso(60 * i)} ${value(v)}`));
    const before = s.y.slice();
    const r = reduceSeries(s, { correction: tide });
    expect(Math.abs(r.mean - mean(clean))).toBeLessThan(1e-23);
    expect(Math.abs(r.correctionMean! - (mean(withTide) - mean(clean)))).toBeLessThan(1e-23);
    expect(Math.abs(r.correctionMean!)).toBeGreaterThan(1e-19);
    expect(s.y).toEqual(before);
    // sign: what is added to y to get what the clocks feel is taken off what they felt
    expect(Math.abs(reduceSeries(s).mean - r.mean - r.correctionMean!)).toBeLessThan(1e-28);
  });

  it('averages the tide over long samples instead of taking their middle', () => {
    const length = 4 * 3600;
    const exact = (a: number, b: number) => {
      let sum = 0;
      for (let k = 0; k < 20_000; k++) sum += tide(a + ((k + 0.5) * (b - a)) / 20_000);
      return sum / 20_000;
    };
    const s = readFrequencySeries(
      lines(
        [0, 1, 2],
        (k) =>
          `${iso(k * length)} ${iso((k + 1) * length)} ${value(OFFSET + exact(at(k * length), at((k + 1) * length)))}`,
      ),
      {
        columns: ['iso', 'stop', 'y'],
      },
    );
    expect(Math.abs(reduceSeries(s, { correction: tide }).mean - OFFSET)).toBeLessThan(3e-24);
  });

  it('a drift is fitted, taken out, and the mean holds at the middle', () => {
    const perSecond = 3e-19;
    const drifting = noisy(2000, 13).map((v, i) => v + perSecond * (i + 0.5 - 1000));
    const s = readFrequencySeries(lines(drifting, (v, i) => `${iso(i)} ${value(v)}`));
    const r = reduceSeries(s, { drift: true });
    expect(Math.abs(r.drift!.perSecond - perSecond)).toBeLessThan(4 * r.drift!.u!);
    // u of the slope of white noise: σ·√(12/N³)
    expect(Math.abs(r.drift!.u! / (1e-16 * Math.sqrt(12 / 2000 ** 3)) - 1)).toBeLessThan(0.1);
    expect(Math.abs(r.mean - OFFSET)).toBeLessThan(3e-18 * 3);
    expect(r.uncertainty.u!).toBeLessThan(0.5 * reduceSeries(s).uncertainty.u!);
  });

  it('with dead time white noise averages over samples, not over measured seconds', () => {
    const text = lines(y, (v, i) => `${iso(i * 10)} ${iso(i * 10 + 2)} ${value(v)}`);
    const r = reduceSeries(readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] }));
    expect(r.validS).toBe(2000);
    expect(r.deadS).toBe(9992 - 2000);
    expect(Math.abs(r.uncertainty.u! / (1e-16 / Math.sqrt(1000)) - 1)).toBeLessThan(0.15);
  });

  it('samples that never follow each other: scatter over √N', () => {
    const every = [0, 100, 263, 503, 853];
    const text = lines(every, (s, i) => `${iso(s)} ${iso(s + 10)} ${value(y[i]!)}`);
    const r = reduceSeries(readFrequencySeries(text, { columns: ['iso', 'stop', 'y'] }));
    const used = y.slice(0, 5);
    const sd = Math.sqrt(used.reduce((sum, v) => sum + (v - mean(used)) ** 2, 0) / 4);
    expect(r.uncertainty.basis).toBe('scatter');
    expect(Math.abs(r.uncertainty.u! / (sd / Math.sqrt(5)) - 1)).toBeLessThan(1e-9);
  });

  it('refuses validity or tide without dates, validity that leaves nothing, a drift of two samples', () => {
    const undated: FrequencySeries = readFrequencySeries(lines(y, value), { tauS: 1 });
    expect(() => reduceSeries(undated, { validity: [valid([0, 1])] })).toThrow(/no dates/);
    expect(() => reduceSeries(undated, { correction: tide })).toThrow(/no dates/);
    expect(() => reduceSeries(series, { validity: [valid([5000, 6000])] })).toThrow(/no sample lies within/);
    expect(() => reduceSeries(series, { correction: () => Number.NaN })).toThrow(/correction at .* is NaN/);
    expect(() => reduceSeries(readFrequencySeries(plain(y.slice(0, 2))), { drift: true })).toThrow(
      /a drift needs three/,
    );
  });
});

describe('interpolated corrections', () => {
  it('asks a semidiurnal tide every ten minutes and is right to 1.2e-6 of it in between', () => {
    let calls = 0;
    const smooth = new SmoothCorrection((t) => {
      calls++;
      return tide(t);
    });
    for (let s = 0; s < 86400; s += 97) expect(Math.abs(smooth.at(at(s)) - tide(at(s)))).toBeLessThan(1.2e-23);
    expect(calls).toBeLessThan(150);
  });
});
