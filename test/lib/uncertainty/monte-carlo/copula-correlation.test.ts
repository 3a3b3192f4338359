import { describe, expect, it } from 'vitest';
import { CampaignError } from '../../../../lib/campaign/fault.js';
import { CopulaCorrelations } from '../../../../lib/uncertainty/monte-carlo/copula-correlation.js';
import { hermiteCoefficients } from '../../../../lib/uncertainty/monte-carlo/hermite-coefficients.js';
import { pivotedCholesky } from '../../../../lib/uncertainty/monte-carlo/pivoted-cholesky.js';
import type { Shape } from '../../../../lib/uncertainty/monte-carlo/trial-input.js';
import { expectRelative, expectWithin } from '../expect-relative.js';

const normal: Shape = { kind: 'normal' };
const uniform: Shape = { kind: 'uniform' };
const triangular: Shape = { kind: 'triangular' };
const t = (dof: number): Shape => ({ kind: 't', dof });

const solve = (a: Shape, b: Shape, rho: number): number =>
  new CopulaCorrelations().scoreCorrelation({ name: 'first', shape: a }, { name: 'second', shape: b }, rho);

describe('score correlation of a Gaussian copula', () => {
  // [shape, shape, score correlation, product-moment correlation by two-dimensional integration: test/data/distributions/copula.py]
  const integrated: [Shape, Shape, number, number][] = [
    [triangular, triangular, 0.9, 0.8986373606436557],
    [triangular, uniform, -0.6, -0.5877729000525168],
    [t(5), t(5), 0.8, 0.790117494611923],
    [t(3), uniform, 0.7, 0.5994438337924684],
    [t(3), t(12.5), 0.5, 0.45675655113624],
    [triangular, t(4), 0.3, 0.2885160978947342],
    [normal, triangular, 0.5, 0.4981473665902691],
    [normal, t(3), 0.5, 0.45490670759537666],
    [uniform, uniform, 0.9, 0.8914561316801002],
  ];

  it('undoes what two-dimensional integration says of each pair of shapes', () => {
    for (const [a, b, r, rho] of integrated) {
      expectWithin(solve(a, b, rho), r, 1e-12, `${a.kind} ${b.kind}`);
      expectWithin(solve(b, a, -rho), -r, 1e-12, `${b.kind} ${a.kind}`);
    }
  });

  it('is 2·sin(πρ/6) for two uniforms (Pearson 1907), also by the series', () => {
    for (const rho of [-0.95, -0.3, 0.1, 0.9])
      expectRelative(solve(uniform, uniform, rho), 2 * Math.sin((Math.PI * rho) / 6), 1e-15);
    const a = hermiteCoefficients(uniform);
    const r = 2 * Math.sin((Math.PI * 0.9) / 6);
    expectRelative(
      a.reduce((sum, c, n) => sum + c * c * r ** (2 * n + 1), 0),
      0.9,
      1e-13,
    );
  });

  it('is ρ for two normals and ρ/√(3/π) for a normal and a uniform', () => {
    expect(solve(normal, normal, 0.37)).toBeCloseTo(0.37, 14);
    expectRelative(solve(normal, uniform, 0.37), 0.37 / Math.sqrt(3 / Math.PI), 1e-13);
  });

  it('keeps ±1 for equal shapes, also where rounding has left 1 − 1e-16 or 1 + 1e-16', () => {
    for (const shape of [normal, uniform, triangular, t(3)]) {
      expect(solve(shape, shape, 1)).toBe(1);
      expect(solve(shape, shape, -1)).toBe(-1);
      expect(solve(shape, shape, 1 + 2.3e-16)).toBe(1);
      expectWithin(solve(shape, shape, 1 - 1.2e-16), 1, 1e-14);
    }
  });

  it('names a pair that cannot be so correlated, with the bound √(3/π) = 0.9772 for a normal and a uniform', () => {
    let fault: CampaignError | null = null;
    try {
      solve(normal, uniform, 0.98);
    } catch (e) {
      fault = e as CampaignError;
    }
    expect(fault).toBeInstanceOf(CampaignError);
    expect(fault!.faults[0]).toMatchObject({
      code: 'correlation-unreachable',
      path: 'first',
      found: 'correlation 0.98 with second',
    });
    expect(fault!.faults[0]!.expected).toContain('0.9772');
    expect(solve(normal, uniform, -0.977)).toBeLessThan(-0.999);
  });

  it('refuses a correlation of a t that has no variance', () => {
    expect(() => solve(t(2), normal, 0.1)).toThrow('correlation-undefined');
    expect(() => solve(normal, t(1.5), 0.1)).toThrow('second: correlation-undefined');
  });
});

describe('pivoted Cholesky factor', () => {
  const product = (rows: readonly Float64Array[], i: number, j: number) =>
    rows[i]!.reduce((s, v, k) => s + v * rows[j]![k]!, 0);

  it('gives back a matrix of full rank, and one of rank 2', () => {
    const full = [Float64Array.of(1, 0.5, -0.2), Float64Array.of(0.5, 1, 0.3), Float64Array.of(-0.2, 0.3, 1)];
    const half = Math.SQRT1_2;
    const two = [Float64Array.of(1, 0, half), Float64Array.of(0, 1, half), Float64Array.of(half, half, 1)];
    for (const [m, rank] of [
      [full, 3],
      [two, 2],
    ] as const) {
      const factor = pivotedCholesky(m);
      if ('indefiniteAt' in factor) throw new Error('refused');
      expect(factor.rank).toBe(rank);
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++) expectWithin(product(factor.rows, i, j), m[i]![j]!, 1e-15);
    }
  });

  it('needs one column for errors that are wholly shared', () => {
    const m = Array.from({ length: 5 }, () => new Float64Array(5).fill(1));
    expect(pivotedCholesky(m)).toMatchObject({ rank: 1 });
  });

  it('passes ρ = −½ among three, the limit, and points at ρ = −0.6', () => {
    const equal = (rho: number) =>
      Array.from({ length: 3 }, (_, i) => Float64Array.from({ length: 3 }, (_, j) => (i === j ? 1 : rho)));
    expect(pivotedCholesky(equal(-0.5))).toMatchObject({ rank: 2 });
    expect(pivotedCholesky(equal(-0.6))).toHaveProperty('indefiniteAt');
  });

  it('points at a matrix whose diagonal vanishes while the rest does not', () => {
    const m = [Float64Array.of(1, 1, 1), Float64Array.of(1, 1, 0.999), Float64Array.of(1, 0.999, 1)];
    expect(pivotedCholesky(m)).toHaveProperty('indefiniteAt');
  });
});
