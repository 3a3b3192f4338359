import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type DeviationKind,
  deviationsAt,
  octaveFactors,
  phaseRecordOf,
  type Run,
} from '../../../../lib/clocks/deviations/index.js';
import { randomWalkFm, whiteFm } from '../simulated-noise.js';

/** The definitions of NIST SP 1065 written out on averages of frequency, term by term, on a grid where NaN marks a missing sample:
 *  another route than the library's, which goes through phase and runs. */
function naive(kind: DeviationKind, grid: readonly number[], m: number): { value: number; n: number } | null {
  const n = grid.length;
  const average = (from: number): number => {
    let sum = 0;
    for (let i = from; i < from + m; i++) sum += grid[i]!;
    return sum / m;
  };
  const squares: number[] = [];
  const take = (x: number): void => {
    if (!Number.isNaN(x)) squares.push(x * x);
  };
  const mean = (factor: number) =>
    squares.length === 0
      ? null
      : { value: Math.sqrt(squares.reduce((a, b) => a + b, 0) / (factor * squares.length)), n: squares.length };
  // Averages that do not overlap begin anew after every gap.
  const starts: number[] = [];
  for (let i = 0, k = 0; i < n; i++, k++) {
    if (Number.isNaN(grid[i]!)) k = -1;
    else if (k % m === 0) starts.push(i);
  }
  switch (kind) {
    case 'adev':
      for (const s of starts) if (s + 2 * m <= n) take(average(s + m) - average(s));
      return mean(2);
    case 'oadev':
      for (let s = 0; s + 2 * m <= n; s++) take(average(s + m) - average(s));
      return mean(2);
    case 'hdev':
      for (const s of starts) if (s + 3 * m <= n) take(average(s + 2 * m) - 2 * average(s + m) + average(s));
      return mean(6);
    case 'ohdev':
      for (let s = 0; s + 3 * m <= n; s++) take(average(s + 2 * m) - 2 * average(s + m) + average(s));
      return mean(6);
    case 'mdev':
    case 'tdev':
      for (let s = 0; s + 3 * m - 1 <= n; s++) {
        let sum = 0;
        for (let i = s; i < s + m; i++) sum += average(i + m) - average(i);
        take(sum / m);
      }
      return mean(2);
    case 'totdev':
      return null;
  }
}

/** Total deviation by building the reflected phase record (SP 1065, eq. 25). */
function naiveTotal(y: readonly number[], m: number): { value: number; n: number } {
  const x = [0];
  for (const v of y) x.push(x.at(-1)! + v);
  const n = x.length;
  const left = Array.from({ length: n - 2 }, (_, k) => 2 * x[0]! - x[n - 2 - k]!);
  const right = Array.from({ length: n - 2 }, (_, k) => 2 * x[n - 1]! - x[n - 2 - k]!);
  const star = [...left, ...x, ...right];
  let sum = 0;
  for (let i = 1; i < n - 1; i++) {
    const at = i + n - 2;
    sum += (star[at - m]! - 2 * star[at]! + star[at + m]!) ** 2;
  }
  return { value: Math.sqrt(sum / (2 * m * m * (n - 2))), n: n - 2 };
}

function runsOf(grid: readonly number[]): { y: Float64Array; runs: Run[] } {
  const y: number[] = [];
  const runs: Run[] = [];
  let first = 0;
  for (const v of [...grid, Number.NaN]) {
    if (!Number.isNaN(v)) y.push(v);
    else {
      if (y.length > first) runs.push({ first, count: y.length - first });
      first = y.length;
    }
  }
  return { y: Float64Array.from(y), runs };
}

const KINDS = ['adev', 'oadev', 'mdev', 'tdev', 'hdev', 'ohdev'] as const;
const value = fc.integer({ min: -1000, max: 1000 });
const grids = fc.array(fc.oneof({ weight: 12, arbitrary: value }, { weight: 1, arbitrary: fc.constant(Number.NaN) }), {
  minLength: 3,
  maxLength: 80,
});

describe('deviations against their definitions', () => {
  it('every kind, on records with and without gaps: same terms, same value', () => {
    fc.assert(
      fc.property(grids, fc.integer({ min: 1, max: 9 }), fc.constantFrom(...KINDS), (grid, m, kind) => {
        const { y, runs } = runsOf(grid);
        fc.pre(y.length > 0);
        const tau0 = 4;
        const [row] = deviationsAt(phaseRecordOf(y, runs), tau0, [m], [kind]);
        const expected = naive(kind, grid, m);
        expect(row?.n ?? 0).toBe(expected?.n ?? 0);
        if (!row || !expected) return;
        const scale = kind === 'tdev' ? (m * tau0) / Math.sqrt(3) : 1;
        expect(Math.abs(row.value - expected.value * scale)).toBeLessThan(1e-9 * scale);
        expect(row.tauS).toBe(m * tau0);
        expect(row.gapped).toBe(runs.length > 1);
      }),
      { numRuns: 600 },
    );
  });

  it('total deviation: reflected at both ends; with gaps each run at its own ends, weighted by terms', () => {
    fc.assert(
      fc.property(grids, fc.integer({ min: 1, max: 12 }), (grid, m) => {
        const { y, runs } = runsOf(grid);
        fc.pre(y.length > 0);
        const [row] = deviationsAt(phaseRecordOf(y, runs), 1, [m], ['totdev']);
        let sum = 0;
        let n = 0;
        for (const { first, count } of runs) {
          if (count < 2 * m) continue;
          const part = naiveTotal([...y.slice(first, first + count)], m);
          sum += part.value ** 2 * part.n;
          n += part.n;
        }
        expect(row?.n ?? 0).toBe(n);
        if (row) expect(Math.abs(row.value - Math.sqrt(sum / n))).toBeLessThan(1e-9);
      }),
      { numRuns: 400 },
    );
  });

  it('the moving sum of MDEV keeps its digits over 3e5 moves in phase that wanders far', () => {
    const y = randomWalkFm(300_000, 1, 6);
    const record = phaseRecordOf(y, [{ first: 0, count: y.length }]);
    // At τ0 both are ½⟨(y₁ − y₀)²⟩.
    const [oadev, mdev] = deviationsAt(record, 1, [1], ['oadev', 'mdev']);
    expect(Math.abs(mdev!.value / oadev!.value - 1)).toBeLessThan(1e-11);
  });

  it('counts octaves up to half the longest run', () => {
    const y = new Float64Array(1000).map((_, i) => i % 7);
    expect(octaveFactors(phaseRecordOf(y, [{ first: 0, count: 1000 }]))).toEqual([1, 2, 4, 8, 16, 32, 64, 128, 256]);
    expect(
      octaveFactors(
        phaseRecordOf(y, [
          { first: 0, count: 5 },
          { first: 5, count: 40 },
        ]),
      ),
    ).toEqual([1, 2, 4, 8, 16]);
  });
});

describe('what the deviations must not see', () => {
  const noise = whiteFm(4096, 1e-18, 11);
  const table = (y: Float64Array, kinds?: readonly DeviationKind[]) =>
    deviationsAt(phaseRecordOf(y, [{ first: 0, count: y.length }]), 1, [1, 8, 64], kinds);

  it('an offset four orders above the noise', () => {
    const plain = table(noise);
    // 2e-14 keeps 3e-30 in a double, 3e-12 of the noise: nothing more may be lost.
    const shifted = table(noise.map((v) => v + 2e-14));
    plain.forEach((row, i) => {
      expect(Math.abs(shifted[i]!.value / row.value - 1)).toBeLessThan(1e-10);
    });
  });

  it('a linear drift, for Hadamard; Allan sees drift·τ/√2', () => {
    const drift = 1e-17;
    const drifting = noise.map((v, i) => v + drift * i);
    const plain = table(noise, ['hdev', 'ohdev']);
    table(drifting, ['hdev', 'ohdev']).forEach((row, i) => {
      expect(Math.abs(row.value / plain[i]!.value - 1)).toBeLessThan(1e-8);
    });
    const ramp = table(
      noise.map((_, i) => drift * i),
      ['oadev'],
    );
    for (const row of ramp) expect(Math.abs(row.value / ((drift * row.tauS) / Math.SQRT2) - 1)).toBeLessThan(1e-9);
  });

  it('the direction of time, for overlapping ones', () => {
    const kinds = ['oadev', 'mdev', 'ohdev', 'totdev'] as const;
    const back = table(Float64Array.from(noise).reverse(), kinds);
    table(noise, kinds).forEach((row, i) => {
      expect(Math.abs(back[i]!.value / row.value - 1)).toBeLessThan(1e-10);
    });
  });

  it('white noise: σ/√m, and MDEV a factor √2 below ADEV at long τ (textbook)', () => {
    const [one] = table(noise, ['oadev']);
    const [, , long] = table(noise, ['oadev']);
    const [, , modified] = table(noise, ['mdev']);
    expect(Math.abs((long!.value * 8) / one!.value - 1)).toBeLessThan(0.25);
    expect(Math.abs((modified!.value * Math.SQRT2) / long!.value - 1)).toBeLessThan(0.25);
  });
});

describe('records that cannot be', () => {
  it('refuses runs outside the samples, no sample, a factor that is no whole number', () => {
    const y = Float64Array.of(1, 2, 3);
    expect(() => phaseRecordOf(y, [{ first: 1, count: 3 }])).toThrow(/outside the 3 samples/);
    expect(() => phaseRecordOf(new Float64Array(0), [])).toThrow(RangeError);
    expect(() => deviationsAt(phaseRecordOf(y, [{ first: 0, count: 3 }]), 1, [1.5])).toThrow(/whole number/);
  });
});
