import { describe, expect, it } from 'vitest';
import type { Distribution } from '../../lib/campaign/campaign.js';
import { normalQuantile } from '../../lib/uncertainty/distributions/index.js';
import { runMonteCarlo, type TrialInput } from '../../lib/uncertainty/monte-carlo/index.js';
import { expectWithin } from '../lib/uncertainty/expect-relative.js';

/** Examples of JCGM 101:2008 and JCGM 102:2011 and two of the same kind, as transcribed in open libraries' tests; figures marked so
 *  from memory. A tolerance is half of the last printed digit plus four standard errors of 1e6 trials (of an end point
 *  0.0027 u each, and as much again for the published run's own). */

const K = normalQuantile(0.975);
const TRIALS = 1_000_000;

const x = (name: string, u: number, distribution: Distribution = 'normal', dof: number | null = null): TrialInput => ({
  name,
  distribution,
  u,
  dof,
});
/** rectangular over ± half */
const rectangular = (name: string, half: number): TrialInput => x(name, half / Math.sqrt(3), 'uniform');

/** Runs y = f(x̂ + d) − f(x̂), one output. */
function propagate(
  inputs: TrialInput[],
  f: (d: number[]) => number,
  value: number,
  linearU: number,
  significantDigits = 2,
) {
  const d = inputs.map(() => 0);
  const centre = f(d);
  const result = runMonteCarlo({
    inputs,
    correlations: [],
    model: {
      outputs: ['y'],
      evaluate: (deviations, count, out) => {
        for (let t = 0; t < count; t++) {
          for (let i = 0; i < d.length; i++) d[i] = deviations[i]![t]!;
          out[0]![t] = f(d) - centre;
        }
      },
    },
    linear: [{ value, u: linearU, coverageFactor: K }],
    trials: TRIALS,
    seed: 101,
    significantDigits,
  });
  return result.outputs[0]!;
}

const sum = (d: number[]) => d.reduce((s, v) => s + v, 0);

describe('JCGM 101:2008, 9.2: additive model', () => {
  it('table 2, four normals: y = 0.00, u = 2.00, [−3.92, 3.92], linear result validated', () => {
    const y = propagate(
      ['1', '2', '3', '4'].map((n) => x(n, 1)),
      sum,
      0,
      2,
    );
    expectWithin(y.mean!, 0, 0.005 + 4 * 0.002);
    expectWithin(y.u!, 2, 0.005 + 4 * 0.0014);
    expectWithin(y.interval.low, -3.92, 0.005 + 4 * 0.0054);
    expectWithin(y.interval.high, 3.92, 0.005 + 4 * 0.0054);
    expect(y.validation).toMatchObject({ validated: true, resolved: true, tolerance: 0.05 });
  });

  it('table 3, four rectangular: u = 2.00, [−3.88, 3.88], exactly ±2√3·(2 − (3/5)^¼); validated with δ = 0.05', () => {
    const y = propagate(
      ['1', '2', '3', '4'].map((n) => rectangular(n, Math.sqrt(3))),
      sum,
      0,
      2,
    );
    expectWithin(y.u!, 2, 0.005 + 4 * 0.0014);
    const exact = 2 * Math.sqrt(3) * (2 - 0.6 ** 0.25);
    expectWithin(exact, 3.88, 0.005);
    expectWithin(y.interval.low, -exact, 4 * 0.005);
    expectWithin(y.interval.high, exact, 4 * 0.005);
    // normal instead of rectangular draws would give 3.92, eight standard errors off
    expect(y.validation).toMatchObject({ validated: true, tolerance: 0.05 });
  });

  it('9.2.4, the fourth ten times wider: u = 10.1, [−17.0, 17.0] against the linear ±19.9 (from memory): not validated', () => {
    const inputs = ['1', '2', '3'].map((n) => rectangular(n, Math.sqrt(3)));
    const y = propagate([...inputs, rectangular('4', 10 * Math.sqrt(3))], sum, 0, Math.sqrt(103));
    expectWithin(y.u!, 10.1, 0.05 + 4 * 0.005);
    expectWithin(y.interval.low, -17, 0.05 + 4 * 0.014);
    expectWithin(y.interval.high, 17, 0.05 + 4 * 0.014);
    expectWithin(y.validation.linear.high, 19.9, 0.05);
    expect(y.validation).toMatchObject({ validated: false, tolerance: 0.5, resolved: true });
  });
});

describe('JCGM 101:2008, 9.3: mass calibration (inputs and figures from memory)', () => {
  // mg and kg/m³
  const [mass, small, air, weight, reference] = [100_000, 1.234, 1.2, 8000, 8000];
  const inputs = [
    x('m_Rc', 0.05),
    x('dm_Rc', 0.02),
    rectangular('rho_a', 0.1),
    rectangular('rho_W', 1000),
    rectangular('rho_R', 50),
  ];
  const deviation = (d: number[]) =>
    (mass + d[0]! + small + d[1]!) * (1 + (air + d[2]! - 1.2) * (1 / (weight + d[3]!) - 1 / (reference + d[4]!))) -
    mass;
  const y = propagate(inputs, deviation, 1.234, Math.hypot(0.05, 0.02), 1);

  it('mean 1.2341 mg, u = 0.0754 mg, shortest interval [1.0834, 1.3825] mg', () => {
    expectWithin(y.mean!, 1.2341, 5e-5 + 8 * 7.5e-5);
    expectWithin(y.u!, 0.0754, 5e-5 + 8 * 6e-5);
    // the ends of the shortest interval spread by 0.015 u from run to run: along a flat minimum
    expectWithin(y.shortest.low, 1.0834, 4e-3);
    expectWithin(y.shortest.high, 1.3825, 4e-3);
  });

  it('the linear result, u = 0.0539 mg and [1.1285, 1.3395] mg, is not validated with δ = 0.005', () => {
    expectWithin(Math.hypot(0.05, 0.02), 0.0539, 5e-5);
    expectWithin(1.234 + y.validation.linear.low, 1.1285, 6e-5);
    expectWithin(1.234 + y.validation.linear.high, 1.3395, 6e-5);
    expect(y.validation).toMatchObject({ validated: false, tolerance: 0.005 });
    // published: d_low = 0.0451, d_high = 0.0430 for the shortest interval (from memory)
    expectWithin(y.validation.differenceLow, 0.044, 3e-3);
    expectWithin(y.validation.differenceHigh, 0.044, 3e-3);
  });

  it('with second-order terms, u = 0.0750 mg: [1.0870, 1.3810] mg', () => {
    // GUM 5.1.2 note: ½·(∂²f/∂x_i∂x_j)² and ∂f/∂x_i·∂³f/∂x_i∂x_j² terms; here those of ρ_a with ρ_W and ρ_R
    const c = mass / 8000 ** 2;
    const [ua, uw, ur] = [inputs[2]!.u, inputs[3]!.u, inputs[4]!.u];
    const u = Math.sqrt(0.05 ** 2 + 0.02 ** 2 + (c * ua * uw) ** 2 + (c * ua * ur) ** 2);
    expectWithin(u, 0.075, 5e-5);
    expectWithin(1.234 - K * u, 1.087, 1e-4);
    expectWithin(1.234 + K * u, 1.381, 1e-4);
    // the trials know the third-order rest, 0.0754
    expect(y.u!).toBeGreaterThan(u + 1e-4);
  });
});

describe('JCGM 102:2011, 9.3: magnitude and phase from real and imaginary part', () => {
  function magnitudeAndPhase(re: number, rho: number) {
    const magnitude = Math.abs(re);
    return runMonteCarlo({
      inputs: [x('re', 0.01), x('im', 0.01)],
      correlations: rho === 0 ? [] : [{ first: 0, second: 1, rho }],
      model: {
        outputs: ['magnitude', 'phase'],
        evaluate: (d, count, out) => {
          for (let t = 0; t < count; t++) {
            const a = re + d[0]![t]!;
            const b = d[1]![t]!;
            out[0]![t] = Math.hypot(a, b) - magnitude;
            out[1]![t] = Math.atan2(b, a);
          }
        },
      },
      linear: [
        { value: magnitude, u: 0.01, coverageFactor: K },
        { value: 0, u: 0.01 / magnitude, coverageFactor: K },
      ],
      trials: TRIALS,
      seed: 102,
    });
  }

  it('table 6, re = 0.001, r = 0: magnitude 0.013(7), phase 0.000(1.744); linear 0.001(10), 0(10.0) not validated', () => {
    const { outputs } = magnitudeAndPhase(0.001, 0);
    expectWithin(outputs[0]!.mean!, 0.013, 5e-4);
    expectWithin(outputs[0]!.u!, 0.007, 5e-4);
    expectWithin(outputs[1]!.mean!, 0, 5e-4 + 8 * 0.0017);
    expectWithin(outputs[1]!.u!, 1.744, 5e-4 + 8 * 0.0008);
    expect(outputs.map((y) => y.validation.validated)).toEqual([false, false]);
  });

  it('table 7, re = 0.001, r = 0.9: magnitude 0.012(8), phase −0.556(1.599)', () => {
    const { outputs, covariance } = magnitudeAndPhase(0.001, 0.9);
    expectWithin(outputs[0]!.mean!, 0.012, 5e-4);
    expectWithin(outputs[0]!.u!, 0.008, 5e-4);
    expectWithin(outputs[1]!.mean!, -0.556, 5e-4 + 8 * 0.0016);
    expectWithin(outputs[1]!.u!, 1.599, 5e-4 + 8 * 0.0008);
    // the joint covariance holds the variances of both
    expectWithin(covariance![0]![0]!, outputs[0]!.u! ** 2, 1e-15);
    expectWithin(covariance![1]![1]!, outputs[1]!.u! ** 2, 1e-11);
    expect(covariance![0]![1]).toBe(covariance![1]![0]);
  });

  it('table 7, re = 0.010, r = 0.9: magnitude 0.015(8), phase −0.343(0.903)', () => {
    const { outputs } = magnitudeAndPhase(0.01, 0.9);
    expectWithin(outputs[0]!.mean!, 0.015, 5e-4);
    expectWithin(outputs[0]!.u!, 0.008, 5e-4);
    expectWithin(outputs[1]!.mean!, -0.343, 5e-4 + 8 * 0.0009);
    expectWithin(outputs[1]!.u!, 0.903, 5e-4 + 8 * 0.0006);
  });
});

describe('NPL Report DEM-ES-011 (Cox & Harris 2010), table 9.2: y = ln x, x rectangular on 0.1 … 1.1', () => {
  const y = propagate([rectangular('x', 0.5)], (d) => Math.log(0.6 + d[0]!), Math.log(0.6), 0.5 / Math.sqrt(3) / 0.6);

  it('trials: −0.665(606), shortest interval [−1.895, 0.095]', () => {
    expectWithin(y.mean!, -0.665, 5e-4 + 8 * 6e-4);
    expectWithin(y.u!, 0.606, 5e-4 + 8 * 6e-4);
    expectWithin(y.shortest.low, -1.895, 5e-4 + 0.01);
    expectWithin(y.shortest.high, 0.095, 5e-4 + 1e-4);
  });

  it('linear: −0.511(481), upper end 0.432: not validated', () => {
    expectWithin(Math.log(0.6), -0.511, 5e-4);
    expectWithin(0.5 / Math.sqrt(3) / 0.6, 0.481, 5e-4);
    expectWithin(Math.log(0.6) + y.validation.linear.high, 0.432, 5e-4);
    expect(y.validation.validated).toBe(false);
  });
});

describe('NIST TN 1900 (Possolo 2015), example E13: thermal expansion coefficient, t inputs with ν = 3', () => {
  // the published standard uncertainties are standard deviations of the t: scale u/√3
  const t3 = (name: string, u: number) => x(name, u / Math.sqrt(3), 't', 3);
  const [L0, T0, L1, T1] = [1.4999, 288.15, 1.5021, 373.1];
  const f = ([l0, t0, l1, t1]: number[]) => (L1 + l1! - L0 - l0!) / ((L0 + l0!) * (T1 + t1! - T0 - t0!));
  const value = f([0, 0, 0, 0]);
  const u = Math.sqrt(
    ((L1 * 1e-4) / (L0 ** 2 * (T1 - T0))) ** 2 +
      (2e-4 / (L0 * (T1 - T0))) ** 2 +
      ((value * 0.02) / (T1 - T0)) ** 2 +
      ((value * 0.05) / (T1 - T0)) ** 2,
  );

  it('1.7266e-5 K⁻¹, u = 1.76e-6 K⁻¹ linear, 1.74e-6 K⁻¹ by trials', () => {
    const y = propagate([t3('L0', 1e-4), t3('T0', 0.02), t3('L1', 2e-4), t3('T1', 0.05)], f, value, u);
    expectWithin(value, 1.7266e-5, 5e-10);
    expectWithin(u, 1.76e-6, 5e-9);
    // the fourth moment is infinite: u from trials with ν = 3 spreads by about a per cent
    expectWithin(y.u!, 1.74e-6, 5e-8);
    expectWithin(y.mean!, 1.7266e-5, 1e-8);
  });
});
