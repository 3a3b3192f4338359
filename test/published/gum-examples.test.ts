import { describe, expect, it } from 'vitest';
import { InputCovariance } from '../../lib/uncertainty/covariance.js';
import { coverageFactor, expandedUncertainty } from '../../lib/uncertainty/coverage.js';
import { effectiveDegreesOfFreedom, varianceBlocks } from '../../lib/uncertainty/effective-degrees-of-freedom.js';
import { gradientOf } from '../../lib/uncertainty/gradient.js';
import type { Input } from '../../lib/uncertainty/inputs.js';
import { leastSquares } from '../../lib/uncertainty/least-squares.js';
import { identity, type Matrix, multiply, transpose } from '../../lib/uncertainty/matrix.js';
import { expectWithin } from '../lib/uncertainty/expect-relative.js';

/** Examples of JCGM 100:2008 (GUM), annex H, as transcribed in open libraries' example files; figures marked so from memory. */

const input = (path: string, value: number, u: number, dof: number | null = null, parts?: Input['parts']): Input => ({
  path,
  value,
  u,
  parts: parts ?? [{ u, source: null }],
  place: { key: path, position: null },
  distribution: 'normal',
  dof,
});

describe('GUM H.1: end-gauge calibration', () => {
  const half = (width: number) => width / Math.sqrt(3);
  const inputs = [
    input('l_s', 50_000_623, 25, 18),
    input('d0', 215, 5.8, 24),
    input('d1', 0, 3.9, 5),
    input('d2', 0, 6.7, 8),
    input('alpha_s', 11.5e-6, half(2e-6)),
    input('delta_alpha', 0, half(1e-6), 50),
    input('theta_bar', -0.1, 0.2),
    input('Delta', 0, 0.5 / Math.SQRT2),
    input('delta_theta', 0, half(0.05), 2),
  ];
  const [ls, d0, d1, d2, alpha, dAlpha, theta, cyclic, dTheta] = inputs.map((x) => x.value) as [
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const temperature = theta + cyclic;
  const length = ls + d0 + d1 + d2 - ls * (dAlpha * temperature + alpha * dTheta);
  const gradient = gradientOf(
    [
      1 - dAlpha * temperature - alpha * dTheta,
      1,
      1,
      1,
      -ls * dTheta,
      -ls * temperature,
      -ls * dAlpha,
      -ls * dAlpha,
      -ls * alpha,
    ].map((c, i) => [i, c] as const),
  );
  const covariance = new InputCovariance(inputs, []);
  const blocks = varianceBlocks(covariance, gradient);

  it('l = 50 000 838 nm with u_c = 32 nm', () => {
    expectWithin(length, 50_000_838, 0.5);
    expectWithin(Math.sqrt(covariance.variance(gradient)), 32, 0.5);
  });

  it('components 25, 5.8, 3.9, 6.7, 2.9, 16.6 nm', () => {
    const components = blocks.map((b) => Math.sqrt(b.variance));
    [25, 5.8, 3.9, 6.7, 0, 2.88679, 0, 0, 16.599].forEach((c, i) => {
      expectWithin(components[i]!, c, 5e-4, inputs[i]!.path);
    });
    expectWithin(
      blocks.reduce((sum, b) => sum + b.variance, 0),
      covariance.variance(gradient),
      1e-9,
    );
  });

  it('ν_eff = 16, and U₉₉ = 93 nm with k = 2.92 (the last two from memory)', () => {
    const dof = effectiveDegreesOfFreedom(blocks);
    expect(Math.floor(dof)).toBe(16);
    expectWithin(dof, 16.7, 0.1); // GUM H.1.6: 16.7, cut to 16 (from memory)
    // the d's alone: GUM has 25.6 with u(d) rounded to 9.7 nm first
    const ofD = effectiveDegreesOfFreedom(blocks.slice(1, 4));
    const uD = Math.sqrt(blocks.slice(1, 4).reduce((sum, b) => sum + b.variance, 0));
    expectWithin(uD, 9.7, 0.05);
    expectWithin(ofD * (9.7 / uD) ** 4, 25.6, 0.05);
    const expanded = expandedUncertainty(32, 0.99, Math.floor(dof)); // GUM takes u_c as rounded
    expectWithin(expanded.coverageFactor, 2.92, 0.005);
    expectWithin(expanded.expandedUncertainty, 93, 0.5);
    expect(expanded).toMatchObject({ coverageProbability: 0.99, degreesOfFreedom: 16 });
  });
});

describe('GUM H.2: resistance and reactance, correlated inputs and outputs', () => {
  // table H.2: five simultaneous observations of V, I in mA, φ
  const observed = [
    [5.007, 4.994, 5.005, 4.99, 4.999],
    [19.663, 19.639, 19.64, 19.685, 19.678].map((mA) => mA / 1000),
    [1.0456, 1.0438, 1.0468, 1.0428, 1.0433],
  ];
  const means = observed.map((row) => row.reduce((a, v) => a + v, 0) / row.length);
  const [V, I, phi] = means as [number, number, number];
  // covariance of the means, GUM eq. (17)
  const sigma: Matrix = observed.map((a, i) =>
    Float64Array.from(observed, (b, j) => a.reduce((sum, v, k) => sum + (v - means[i]!) * (b[k]! - means[j]!), 0) / 20),
  );
  const correlation = (m: Matrix, i: number, j: number) => m[i]![j]! / Math.sqrt(m[i]![i]! * m[j]![j]!);
  const [cos, sin] = [Math.cos(phi), Math.sin(phi)];
  const jacobian: Matrix = [
    Float64Array.of(cos / I, (-V * cos) / I ** 2, (-V * sin) / I),
    Float64Array.of(sin / I, (-V * sin) / I ** 2, (V * cos) / I),
    Float64Array.of(1 / I, -V / I ** 2, 0),
  ];
  const cov = multiply(multiply(jacobian, sigma), transpose(jacobian));

  it('table H.2: V = 4.999 0(32) V, I = 19.661 0(95) mA, φ = 1.044 46(75) rad; r = −0.36, +0.86, −0.65', () => {
    expectWithin(V, 4.999, 5e-5);
    expectWithin(I, 19.661e-3, 5e-8);
    expectWithin(phi, 1.04446, 5e-6);
    [0.0032, 9.5e-6, 7.5e-4].forEach((u, i) => {
      expectWithin(Math.sqrt(sigma[i]![i]!), u, [5e-5, 5e-8, 5e-6][i]!);
    });
    expectWithin(correlation(sigma, 0, 1), -0.36, 5e-3);
    expectWithin(correlation(sigma, 0, 2), 0.86, 5e-3);
    expectWithin(correlation(sigma, 1, 2), -0.65, 5e-3);
  });

  it('table H.3: R = 127.732(71) Ω, X = 219.847(295) Ω, Z = 254.260(236) Ω', () => {
    const values = [(V * cos) / I, (V * sin) / I, V / I];
    [127.732, 219.847, 254.26].forEach((v, i) => {
      expectWithin(values[i]!, v, 5e-4);
    });
    // u(X) is 0.2956 from these data, printed as 0.295
    [0.071, 0.295, 0.236].forEach((u, i) => {
      expectWithin(Math.sqrt(cov[i]![i]!), u, i === 1 ? 6e-4 : 5e-4);
    });
  });

  it('table H.3: correlations −0.588, −0.485, +0.993 (third digits from memory)', () => {
    expectWithin(correlation(cov, 0, 1), -0.588, 1e-3);
    expectWithin(correlation(cov, 0, 2), -0.485, 1e-3);
    expectWithin(correlation(cov, 1, 2), 0.993, 1e-3);
  });
});

describe('GUM H.3: thermometer line', () => {
  const t = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.01, 26.511];
  const b = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.16];
  const design: Matrix = t.map((x) => Float64Array.of(1, x - 20));
  const { estimate, gain, chi2, dof } = leastSquares({
    design,
    observed: Float64Array.from(b),
    covariance: identity(b.length),
    unknowns: 2,
  });
  const s = Math.sqrt(chi2 / dof);
  const inputs = (common: number): Input[] =>
    b.map((v, k) =>
      input(`b${k}`, v, Math.hypot(s, common), dof, [
        { u: s, source: null },
        ...(common > 0 ? [{ u: common, source: 'common' }] : []),
      ]),
    );
  const gradient = (row: ArrayLike<number>) => gradientOf(Array.from(row, (v, k) => [k, v] as const));
  const intercept = gradient(gain[0]!);
  const slope = gradient(gain[1]!);

  it('y₁ = −0.1712(29), y₂ = 0.00218(67), r = −0.930, s = 0.0035', () => {
    expectWithin(estimate[0]!, -0.1712, 5e-5);
    expectWithin(estimate[1]!, 0.00218, 5e-6);
    expect(dof).toBe(9);
    expectWithin(s, 0.0035, 5e-5);
    const m = new InputCovariance(inputs(0), []).matrix([intercept, slope]);
    expectWithin(Math.sqrt(m[0]![0]!), 0.0029, 5e-5);
    expectWithin(Math.sqrt(m[1]![1]!), 0.00067, 5e-6);
    expectWithin(m[0]![1]! / Math.sqrt(m[0]![0]! * m[1]![1]!), -0.93, 5e-4);
  });

  it('b(30 °C) = −0.1494(41)', () => {
    const at30 = gradient(gain[0]!.map((g, k) => g + 10 * gain[1]![k]!));
    expectWithin(estimate[0]! + 10 * estimate[1]!, -0.1494, 5e-5);
    expectWithin(Math.sqrt(new InputCovariance(inputs(0), []).variance(at30)), 0.0041, 5e-5);
  });

  it('a systematic of 0.005 common to all readings: intercept u = 0.005768931, slope unmoved at 0.000667939', () => {
    const covariance = new InputCovariance(inputs(0.005), [
      { id: 'common', correlation: null, correlationLengthM: null },
    ]);
    expectWithin(Math.sqrt(covariance.variance(intercept)), 0.00576893138, 5e-12);
    expectWithin(Math.sqrt(covariance.variance(slope)), 0.00066793877, 5e-12);
    // its block holds the whole of the common error and, by its cancellation, nothing of the slope
    const common = varianceBlocks(covariance, intercept).find((x) => x.source === 'common')!;
    expectWithin(common.variance, 2.5e-5, 1e-16);
    expectWithin(varianceBlocks(covariance, slope).find((x) => x.source === 'common')!.variance, 0, 1e-20);
  });
});

describe('Welch–Satterthwaite', () => {
  it('u 0.57 on 9 degrees of freedom and 0.25 on infinitely many: ν_eff = 12.8 (open libraries’ test value)', () => {
    const blocks = [
      { variance: 0.57 ** 2, dof: 9 },
      { variance: 0.25 ** 2, dof: Infinity },
    ];
    expectWithin(effectiveDegreesOfFreedom(blocks), 12.8, 0.05);
  });

  it('coverage factor 2.17 for ν = 12.5 lies between those of 12 and 13 (GUM G.4.2, interpolation)', () => {
    expectWithin(coverageFactor(0.95, 12), 2.18, 0.005);
    expectWithin(coverageFactor(0.95, 13), 2.16, 0.005);
    expect(coverageFactor(0.95, 12.5)).toBeGreaterThan(coverageFactor(0.95, 13));
    expect(coverageFactor(0.95, 12.5)).toBeLessThan(coverageFactor(0.95, 12));
  });
});
