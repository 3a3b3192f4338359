import { describe, expect, it } from 'vitest';
import { analyseSeries } from '../../../lib/answers/series.js';
import { DEVIATION_KINDS } from '../../../lib/clocks/deviations/index.js';
import { readFrequencySeries } from '../../../lib/clocks/series/index.js';
import { iso, lines, noisy, plain, value } from '../clocks/series/files.js';
import { powerLawFm, randomWalkFm } from '../clocks/simulated-noise.js';

const y = noisy(256, 2);

describe('what is said of a series', () => {
  it('every kind at octaves, with intervals round the value and the number of terms', () => {
    const answer = analyseSeries(readFrequencySeries(plain(y)));
    expect(answer).toMatchObject({ samples: 256, interval: 1, gaps: [], dropped: 0, noise: 'white FM', warnings: [] });
    expect(answer.basis.rule).toBe('white-extrapolation');
    for (const kind of DEVIATION_KINDS) {
      const rows = answer.deviations.filter((d) => d.kind === kind);
      expect(rows.map((d) => d.tau)).toEqual(
        ['mdev', 'tdev', 'hdev', 'ohdev'].includes(kind) ? [1, 2, 4, 8, 16, 32, 64] : [1, 2, 4, 8, 16, 32, 64, 128],
      );
      for (const d of rows) {
        expect(d.lo).toBeLessThan(d.value);
        expect(d.hi).toBeGreaterThan(d.value);
        expect(d.n).toBeGreaterThanOrEqual(1);
        expect(d.gapped).toBe(false);
      }
    }
    const n = (kind: string, tau: number) => answer.deviations.find((d) => d.kind === kind && d.tau === tau)!.n;
    expect([n('adev', 8), n('oadev', 8), n('mdev', 8), n('hdev', 8), n('ohdev', 8), n('totdev', 8)]).toEqual([
      31, 241, 234, 30, 233, 255,
    ]);
  });

  it('at given averaging factors, naming those that no stretch is long enough for', () => {
    const answer = analyseSeries(readFrequencySeries(lines(y, value), { tauS: 10 }), { factors: [1, 10, 100, 1000] });
    expect([...new Set(answer.deviations.map((d) => d.tau))]).toEqual([10, 100, 1000]);
    expect(answer.warnings.map((w) => w.code)).toEqual(['tau-too-long']);
    expect(answer.warnings[0]!.message).toMatch(/factor 1000: the longest stretch without a gap has 256 samples/);
  });

  it('gaps as instants, and deviations marked by them', () => {
    const answer = analyseSeries(readFrequencySeries(lines(y, (v, i) => `${iso(i < 100 ? i : i + 60)} ${value(v)}`)));
    expect(answer.gaps).toEqual([{ start: '2027-05-03T00:01:40Z', end: '2027-05-03T00:02:40Z' }]);
    expect(answer.deviations.every((d) => d.gapped)).toBe(true);
    expect(Math.max(...answer.deviations.map((d) => d.tau))).toBe(64);
  });

  it('gaps of a file without dates in seconds', () => {
    const answer = analyseSeries(
      readFrequencySeries(
        lines(y, (v, i) => `${i === 9 ? 'nan' : value(v)}`),
        { tauS: 2 },
      ),
    );
    expect(answer.gaps).toEqual([{ start: 18, end: 20 }]);
  });

  it('says when a mean cannot be averaged, and on what it rests', () => {
    const walk = analyseSeries(readFrequencySeries(plain([...randomWalkFm(2000, 1e-17, 3)])));
    expect(walk.noise).toBe('random-walk FM');
    expect(walk.warnings.map((w) => w.code)).toContain('not-averageable');
    const flicker = analyseSeries(readFrequencySeries(plain([...powerLawFm(2048, -1, 1e-17, 3)])));
    expect(flicker.basis.rule).toBe('longest-trusted-tau');
    expect(flicker.basis.words).toMatch(/next 34\.1\u00a0min is expected within ±u in \d+ %/);
  });

  it('few samples: white noise is assumed and said to be', () => {
    const answer = analyseSeries(readFrequencySeries(plain(y.slice(0, 12))));
    expect(answer.noise).toBeNull();
    expect(answer.warnings.map((w) => w.code)).toEqual(['noise-unknown']);
    expect(answer.mean.u).toBeGreaterThan(0);
  });

  it('a single sample has a mean and no uncertainty', () => {
    const answer = analyseSeries(readFrequencySeries(lines([1e-15], value), { tauS: 1 }));
    expect(answer.mean).toEqual({ value: 1e-15, u: null });
    expect(answer.deviations).toEqual([]);
    expect(answer.warnings.map((w) => w.code)).toEqual(['single-sample']);
  });
});
