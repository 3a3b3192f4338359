import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Distribution } from '../../../../lib/campaign/campaign.js';
import { CampaignError } from '../../../../lib/campaign/fault.js';
import {
  type MonteCarloOptions,
  type MonteCarloResult,
  monteCarloSteps,
  runMonteCarlo,
  type TrialCorrelation,
  type TrialInput,
  type TrialModel,
} from '../../../../lib/uncertainty/monte-carlo/index.js';
import { Sampler } from '../../../../lib/uncertainty/monte-carlo/sampler.js';
import { Xoshiro128 } from '../../../../lib/uncertainty/random.js';
import { expectRelative, expectWithin } from '../expect-relative.js';

const input = (
  name: string,
  u: number,
  distribution: Distribution = 'normal',
  dof: number | null = null,
): TrialInput => ({
  name,
  distribution,
  u,
  dof,
});

/** y_l = Σ c_li·x_i */
const linearModel = (...rows: number[][]): TrialModel => ({
  outputs: rows.map((_, l) => `y${l}`),
  evaluate: (d, count, out) => {
    rows.forEach((c, l) => {
      for (let t = 0; t < count; t++) out[l]![t] = c.reduce((sum, v, i) => sum + v * d[i]![t]!, 0);
    });
  },
});

const linear = (u: number, value = 0) => ({ value, u, coverageFactor: 1.959963984540054 });

const run = (
  o: Partial<MonteCarloOptions> & Pick<MonteCarloOptions, 'inputs' | 'model' | 'linear'>,
): MonteCarloResult => runMonteCarlo({ correlations: [], trials: 100_000, seed: 1, ...o });

/** Sample correlation of the deviations of two inputs. */
function sampleCorrelation(inputs: TrialInput[], correlations: TrialCorrelation[], trials: number): number {
  const sampler = new Sampler(inputs, correlations, 5);
  let [aa, bb, ab] = [0, 0, 0];
  for (let n = 0; n < trials; n += 1000) {
    sampler.draw(1000);
    const [a, b] = [sampler.deviations[0]!, sampler.deviations[1]!];
    for (let t = 0; t < 1000; t++) {
      aa += a[t]! * a[t]!;
      bb += b[t]! * b[t]!;
      ab += a[t]! * b[t]!;
    }
  }
  return ab / Math.sqrt(aa * bb);
}

describe('streams', () => {
  it('give each input, by the order of names, its own 2⁶⁴ draws of the seeded generator', () => {
    const inputs = ['b', 'c', 'a'].map((name) => input(name, 1, 'uniform'));
    const sampler = new Sampler(inputs, [], 77);
    sampler.draw(1000);
    sampler.draw(500);
    const generator = Xoshiro128.fromSeed(77);
    for (const i of [2, 0, 1]) {
      const expected = new Float64Array(1500);
      generator.clone().fillUniform(expected, 1500);
      for (let t = 0; t < 500; t++) {
        expectWithin(sampler.deviations[i]![t]!, 2 * Math.sqrt(3) * (expected[1000 + t]! - 0.5), 1e-15);
      }
      generator.jump();
    }
  });
});

describe('correlated draws', () => {
  // standard error of a correlation of 4e5 normal pairs: (1 − ρ²)/√4e5 ≤ 1.6e-3·(1 − ρ²); heavier shapes a little more
  const trials = 400_000;

  it('two uniforms with ρ = 0.9 have ρ = 0.9, not the 0.8915 of a copula whose correlation is ρ itself', () => {
    const found = sampleCorrelation(
      [input('a', 2, 'uniform'), input('b', 0.1, 'uniform')],
      [{ first: 0, second: 1, rho: 0.9 }],
      trials,
    );
    expectWithin(found, 0.9, 1.2e-3);
  });

  it('other pairs have the stated correlation', () => {
    const cases: [TrialInput, TrialInput, number, number][] = [
      [input('a', 1), input('b', 3), -0.6, 4e-3],
      [input('a', 1, 'triangular'), input('b', 3, 'uniform'), 0.8, 3e-3],
      [input('a', 1, 'uniform'), input('b', 3), 0.95, 1e-3],
      [input('a', 1, 't', 8), input('b', 3, 'uniform'), -0.7, 4e-3],
      [input('a', 1, 't', 8), input('b', 3, 't', 8), 0.5, 8e-3],
    ];
    for (const [a, b, rho, tolerance] of cases) {
      expectWithin(
        sampleCorrelation([a, b], [{ first: 1, second: 0, rho }], trials),
        rho,
        tolerance,
        `${a.distribution} ${b.distribution}`,
      );
    }
  });

  it('keep their own distributions: the same quantiles as without correlation', () => {
    const inputs = [input('a', 1, 'uniform'), input('b', 1, 'triangular')];
    const y = linearModel([1, 0], [0, 1]);
    const options = { inputs, model: y, linear: [linear(1), linear(1)], trials: 200_000 };
    const tied = run({ ...options, correlations: [{ first: 0, second: 1, rho: 0.7 }] });
    // 95 % of a uniform: 0.95·√3 = 1.6454; of a triangular: √6·(1 − √0.05) = 1.9018
    expectWithin(tied.outputs[0]!.interval.high, 0.95 * Math.sqrt(3), 4e-3);
    expectWithin(tied.outputs[1]!.interval.high, Math.sqrt(6) * (1 - Math.sqrt(0.05)), 1.2e-2);
    expectWithin(tied.covariance![0]![1]!, 0.7, 4e-3);
  });

  it('a wholly shared error cancels in a difference to rounding', () => {
    const inputs = [input('a', 0.02), input('b', 0.02), input('c', 0.02, 'uniform'), input('d', 0.02, 'uniform')];
    const result = run({
      inputs,
      correlations: [
        { first: 0, second: 1, rho: 1 },
        { first: 2, second: 3, rho: 1 },
      ],
      model: linearModel([1, -1, 0, 0], [0, 0, 1, -1], [1, 1, 0, 0]),
      linear: [linear(0), linear(0), linear(0.04)],
    });
    expect(result.outputs[0]!.u).toBe(0);
    expect(result.outputs[1]!.u).toBe(0);
    expect(result.outputs[0]!.validation.validated).toBe(true);
    expectRelative(result.outputs[2]!.u!, 0.04, 0.01);
  });

  it('twenty inputs in one group have the covariance of the group', () => {
    const n = 20;
    const inputs = Array.from({ length: n }, (_, i) => input(`x${String(i).padStart(2, '0')}`, 1 + i / 10));
    const rho = (i: number, j: number) => Math.exp(-Math.abs(i - j) / 6);
    const correlations: TrialCorrelation[] = [];
    for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) correlations.push({ first: i, second: j, rho: rho(i, j) });
    const c = Array.from({ length: n }, (_, i) => (i % 3) - 1);
    let variance = 0;
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) variance += c[i]! * c[j]! * inputs[i]!.u * inputs[j]!.u * rho(i, j);
    const result = run({ inputs, correlations, model: linearModel(c), linear: [linear(Math.sqrt(variance))] });
    // standard error of u: u/√(2M) = 0.22 %
    expectRelative(result.outputs[0]!.u!, Math.sqrt(variance), 0.009);
    expect(result.outputs[0]!.validation.validated).toBe(true);
  });

  it('names three errors that cannot be so correlated', () => {
    const inputs = ['a', 'b', 'c'].map((n) => input(n, 1));
    const correlations = [
      { first: 0, second: 1, rho: -0.6 },
      { first: 1, second: 2, rho: -0.6 },
      { first: 0, second: 2, rho: -0.6 },
    ];
    const attempt = () => run({ inputs, correlations, model: linearModel([1, 1, 1]), linear: [linear(1)] });
    expect(attempt).toThrow(CampaignError);
    expect(attempt).toThrow('correlations-impossible-together');
    expect(attempt).toThrow(/correlations with (a, b|b, a|a, c|b, c)/);
  });

  it('names a pair whose shapes cannot be so correlated', () => {
    expect(() =>
      run({
        inputs: [input('sites.a.h', 1, 'uniform'), input('sites.b.h', 1)],
        correlations: [{ first: 0, second: 1, rho: 1 }],
        model: linearModel([1, -1]),
        linear: [linear(0)],
      }),
    ).toThrow('sites.a.h: correlation-unreachable: found correlation 1 with sites.b.h');
  });
});

describe('results', () => {
  it('agree with the linear law where the model is linear and inputs are normal', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.record({
            c: fc.double({ min: -3, max: 3, noNaN: true }),
            u: fc.double({ min: 0.1, max: 2, noNaN: true }),
          }),
          {
            minLength: 1,
            maxLength: 4,
          },
        ),
        fc.double({ min: -0.9, max: 0.9, noNaN: true }),
        fc.nat(1e6),
        (terms, rho, seed) => {
          const inputs = terms.map(({ u }, i) => input(`x${i}`, u));
          const correlations = terms.length > 1 ? [{ first: 0, second: 1, rho }] : [];
          let variance = terms.reduce((s, { c, u }) => s + (c * u) ** 2, 0);
          if (terms.length > 1) variance += 2 * rho * terms[0]!.c * terms[0]!.u * terms[1]!.c * terms[1]!.u;
          if (!(variance > 1e-6)) return;
          const u = Math.sqrt(variance);
          const result = runMonteCarlo({
            inputs,
            correlations,
            model: linearModel(terms.map(({ c }) => c)),
            linear: [linear(u, 5)],
            trials: 40_000,
            seed,
          });
          const y = result.outputs[0]!;
          // five standard errors
          expectWithin(y.mean!, 5, (5 * u) / 200);
          expectRelative(y.u!, u, 5 / Math.sqrt(80_000));
          expectWithin(y.interval.low, 5 - 1.96 * u, 5 * 0.0134 * u);
          expectWithin(y.interval.high, 5 + 1.96 * u, 5 * 0.0134 * u);
        },
      ),
      { numRuns: 12, seed: 9 },
    );
  });

  it('scale with the uncertainties: all u doubled, all results doubled, to the last bit', () => {
    const inputs = [
      input('a', 0.3, 'uniform'),
      input('b', 0.5),
      input('c', 0.2, 't', 5),
      input('d', 0.1, 'triangular'),
    ];
    const correlations = [{ first: 0, second: 1, rho: 0.4 }];
    const model = linearModel([1, -2, 1, 3]);
    const once = run({ inputs, correlations, model, linear: [linear(1)], trials: 20_000 });
    const twice = run({
      inputs: inputs.map((x) => ({ ...x, u: 2 * x.u })),
      correlations,
      model,
      linear: [linear(2)],
      trials: 20_000,
    });
    expect(twice.outputs[0]!.u).toBe(2 * once.outputs[0]!.u!);
    expect(twice.outputs[0]!.shortest).toEqual({
      low: 2 * once.outputs[0]!.shortest.low,
      high: 2 * once.outputs[0]!.shortest.high,
    });
  });

  it('do not depend on the order of the inputs', () => {
    const inputs = [input('a', 0.3, 'uniform'), input('b', 0.5), input('c', 0.2), input('d', 0.1, 'triangular')];
    const reversed = inputs.slice().reverse();
    const at = (name: string) => reversed.findIndex((x) => x.name === name);
    const result = run({
      inputs,
      correlations: [
        { first: 0, second: 1, rho: 0.4 },
        { first: 1, second: 2, rho: 0.2 },
      ],
      model: linearModel([1, -2, 1, 3]),
      linear: [linear(1)],
      trials: 20_000,
    });
    const other = run({
      inputs: reversed,
      correlations: [
        { first: at('c'), second: at('b'), rho: 0.2 },
        { first: at('a'), second: at('b'), rho: 0.4 },
      ],
      model: linearModel([3, 1, -2, 1]),
      linear: [linear(1)],
      trials: 20_000,
    });
    // the sums of a trial are added in another order: rounding
    expectRelative(other.outputs[0]!.u!, result.outputs[0]!.u!, 1e-14);
    expectRelative(other.outputs[0]!.interval.high, result.outputs[0]!.interval.high, 1e-14);
  });

  it('repeat with the seed and change with it', () => {
    const options = { inputs: [input('a', 1)], model: linearModel([1]), linear: [linear(1)], trials: 5_000 };
    expect(run(options)).toEqual(run(options));
    expect(run({ ...options, seed: 2 }).outputs[0]!.mean).not.toBe(run(options).outputs[0]!.mean);
  });

  it('keep the digits of y = 1e-14 with u = 1e-18 and of a mean that is off by a thousandth of it', () => {
    const result = run({
      inputs: [input('a', 1e-18)],
      model: {
        outputs: ['y'],
        evaluate: (d, count, out) => {
          for (let t = 0; t < count; t++) out[0]![t] = d[0]![t]! + 1e-21;
        },
      },
      linear: [linear(1e-18, 1e-14)],
    });
    const y = result.outputs[0]!;
    expectRelative(y.u!, 1e-18, 0.01);
    expectWithin(y.meanDeviation!, 1e-21, 5 * 3.2e-21);
    expectWithin(y.mean!, 1e-14 + y.meanDeviation!, 2e-30);
    expectWithin(y.interval.high - 1e-14, 1.96e-18, 4e-20);
    expect(y.validation.validated).toBe(true);
  });

  it('count in cells beyond the limit with the same moments and nearly the same ends', () => {
    const options = {
      inputs: [input('a', 1), input('b', 1, 'uniform')],
      model: linearModel([1, 1]),
      linear: [linear(Math.SQRT2)],
      trials: 60_000,
    };
    const kept = run(options).outputs[0]!;
    const counted = run({ ...options, keep: 10_000 }).outputs[0]!;
    expect(counted.u).toBe(kept.u);
    expectWithin(counted.interval.low, kept.interval.low, 3e-4);
    expectWithin(counted.shortest.high - counted.shortest.low, kept.shortest.high - kept.shortest.low, 6e-4);
    expect(counted.histogram.counts.reduce((s, c) => s + c, counted.histogram.below + counted.histogram.above)).toBe(
      60_000,
    );
  });

  it('give no u where a t with ν ≤ 2 enters, no mean where ν ≤ 1, and leave other outputs alone', () => {
    const result = run({
      inputs: [input('a', 1, 't', 2), input('b', 1, 't', 1), input('c', 1), input('d', 1, 't', 3)],
      model: linearModel([1, 0, 1, 0], [0, 1, 0, 0], [0, 0, 1, 0], [0, 0, 0, 1]),
      linear: [linear(Math.SQRT2), linear(1), linear(1), linear(1)],
    });
    expect(result.outputs.map((y) => y.u === null)).toEqual([true, true, false, false]);
    expect(result.outputs.map((y) => y.mean === null)).toEqual([false, true, false, false]);
    expect(result.covariance).toBeNull();
    // 0.975 quantile of a Cauchy distribution: 12.706
    expectRelative(result.outputs[1]!.interval.high, 12.7062, 0.05);
    expect(result.outputs[1]!.validation.validated).toBe(false);
  });

  it('draw a t as x + u·t_ν: standard deviation u·√(ν/(ν − 2)) (JCGM 101:2008, 6.4.9)', () => {
    const result = run({
      inputs: [input('a', 0.5, 't', 8)],
      model: linearModel([1]),
      linear: [linear(0.5)],
      trials: 200_000,
    });
    expectRelative(result.outputs[0]!.u!, 0.5 * Math.sqrt(8 / 6), 0.01);
    expectRelative(result.outputs[0]!.interval.high, 0.5 * 2.306004, 0.015);
    expect(result.outputs[0]!.validation.validated).toBe(false);
  });

  it('take exact inputs as fixed', () => {
    const result = run({
      inputs: [input('a', 0, 't', 1), input('b', 1)],
      model: linearModel([1000, 1]),
      linear: [linear(1)],
    });
    expectRelative(result.outputs[0]!.u!, 1, 0.01);
  });
});

describe('auto', () => {
  const options = { inputs: [input('a', 1)], model: linearModel([1]), linear: [linear(1)], correlations: [], seed: 3 };

  it('stops when mean, u and both ends stand within half a unit of the second digit of u', () => {
    const result = runMonteCarlo({ ...options, trials: 'auto' });
    expect(result.stable).toBe(true);
    expect(result.trials % 10_000).toBe(0);
    expect(result.trials).toBeGreaterThanOrEqual(20_000);
    // δ = 0.05 for u = 1.0: twice the standard error of an end, 2·0.0267/√h, falls below it at h ≈ 2
    expect(result.trials).toBeLessThanOrEqual(60_000);
    const finer = runMonteCarlo({ ...options, inputs: [input('a', 4.9)], linear: [linear(4.9)], trials: 'auto' });
    // δ = 0.05 for u = 4.9: h ≈ (2·0.131/0.05)² ≈ 27
    expect(finer.trials).toBeGreaterThan(120_000);
    expect(finer.trials).toBeLessThan(600_000);
  });

  it('says so when it gave up', () => {
    const result = runMonteCarlo({
      ...options,
      trials: 'auto',
      inputs: [input('a', 9.4)],
      linear: [linear(9.4)],
      largestNumberOfTrials: 25_000,
    });
    expect(result).toMatchObject({ stable: false, trials: 25_000 });
  });

  it('waits for the slowest output', () => {
    const two = runMonteCarlo({
      ...options,
      model: linearModel([1], [4.9]),
      linear: [linear(1), linear(4.9)],
      trials: 'auto',
    });
    expect(two.trials).toBeGreaterThan(120_000);
  });

  it('stops at ends alone where the variance is infinite, and at once where nothing moves', () => {
    const heavy = runMonteCarlo({
      ...options,
      inputs: [input('a', 1, 't', 2)],
      trials: 'auto',
      largestNumberOfTrials: 3_000_000,
    });
    expect(heavy.stable).toBe(true);
    const exact = runMonteCarlo({ ...options, inputs: [input('a', 0)], linear: [linear(0, 3)], trials: 'auto' });
    expect(exact).toMatchObject({ stable: true, trials: 20_000 });
    expect(exact.outputs[0]).toMatchObject({ mean: 3, u: 0, interval: { low: 3, high: 3 } });
  });
});

describe('driving it', () => {
  const options = {
    inputs: [input('a', 1)],
    model: linearModel([1]),
    linear: [linear(1)],
    correlations: [],
    seed: 3,
    trials: 35_000,
  };

  it('reports progress after each sequence and gives in slices what it gives at once', () => {
    const steps = monteCarloSteps(options);
    const seen: number[] = [];
    let step = steps.next();
    while (!step.done) {
      expect(step.value.of).toBe(35_000);
      seen.push(step.value.trials);
      step = steps.next();
    }
    expect(seen).toEqual([10_000, 20_000, 30_000, 35_000]);
    expect(step.value).toEqual(runMonteCarlo(options));
  });

  it('stops when told to', () => {
    const seen: number[] = [];
    const result = runMonteCarlo(options, ({ trials }) => {
      seen.push(trials);
      return trials < 20_000;
    });
    expect(result).toBeNull();
    expect(seen).toEqual([10_000, 20_000]);
  });

  it('refuses what makes no sense, by name', () => {
    const refuse = (change: Partial<MonteCarloOptions>, words: string) =>
      expect(() => runMonteCarlo({ ...options, ...change })).toThrow(words);
    refuse({ trials: 50 }, 'trials = 50');
    refuse({ trials: 1000.5 }, 'trials = 1000.5');
    refuse({ coverage: 1 }, 'coverage = 1');
    refuse({ seed: -1 }, 'seed = -1');
    refuse({ linear: [] }, 'linear = 0 results');
    refuse({ inputs: [input('a', Number.NaN)] }, 'a: u = NaN');
    refuse({ inputs: [input('a', 1, 't')] }, 'a: dof = null');
    refuse({ correlations: [{ first: 0, second: 0, rho: 0.2 }] }, 'correlation = 0, 0');
    refuse(
      { inputs: [input('a', 1), input('b', 1)], correlations: [{ first: 0, second: 1, rho: 1.5 }] },
      'correlation of a and b = 1.5',
    );
    refuse(
      { model: { outputs: ['y'], evaluate: (_, count, out) => out[0]!.fill(Number.NaN, 0, count) } },
      'output y = NaN',
    );
  });
});
