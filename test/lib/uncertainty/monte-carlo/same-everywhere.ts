import type { TrialInput } from '../../../../lib/uncertainty/monte-carlo/index.js';
import { runMonteCarlo } from '../../../../lib/uncertainty/monte-carlo/index.js';
import { Xoshiro128 } from '../../../../lib/uncertainty/random.js';

/** A run with every shape, correlated and not, and a model with a logarithm: the same to 12 digits in Node and in browsers. Asserted
 *  against the same numbers by same-everywhere.test.ts and by test/components/monte-carlo.test.ts. */
export function runEverywhere(): number[] {
  const input = (name: string, distribution: TrialInput['distribution'], u: number, dof: number | null = null) => ({
    name,
    distribution,
    u,
    dof,
  });
  const result = runMonteCarlo({
    inputs: [
      input('a', 'normal', 0.02),
      input('b', 'uniform', 0.03),
      input('c', 'triangular', 0.01),
      input('d', 't', 0.01, 5.5),
      input('e', 'uniform', 0.02),
      input('f', 't', 0.02, 4),
    ],
    correlations: [
      { first: 1, second: 4, rho: 0.9 },
      { first: 0, second: 5, rho: -0.3 },
      { first: 2, second: 4, rho: 0.2 },
    ],
    model: {
      outputs: ['sum', 'log'],
      evaluate: (d, count, out) => {
        for (let t = 0; t < count; t++) {
          let sum = 0;
          for (const x of d) sum += x[t]!;
          out[0]![t] = sum;
          out[1]![t] = Math.log1p(sum);
        }
      },
    },
    linear: [
      { value: 1, u: 0.06, coverageFactor: 1.96 },
      { value: 0, u: 0.06, coverageFactor: 1.96 },
    ],
    trials: 30_000,
    seed: 2027,
  });
  return [
    ...result.outputs.flatMap((y) => [y.mean!, y.u!, y.interval.low, y.interval.high, y.shortest.low, y.shortest.high]),
    result.covariance![0]![1]!,
  ];
}

/** Sum of the first 10⁵ draws of a seed as whole multiples of 2⁻⁵³: one wrong bit anywhere shows. */
export function sumOfDraws(): string {
  const draws = new Float64Array(100_000);
  Xoshiro128.fromSeed(2027).fillUniform(draws, draws.length);
  let sum = 0n;
  draws.forEach((u, i) => {
    sum += BigInt(u * 2 ** 53) * BigInt((i % 7) + 1);
  });
  return sum.toString();
}

/** From an independent Python program in whole-number arithmetic. */
export const SUM_OF_DRAWS = '1802052046188958255094';

/** From Node 20 on x86-64: no outside check, but the number that every engine has to give. */
export const RESULTS = [
  0.9995174892148273, 0.05979835404401165, 0.88827338047149, 1.1103971221645745, 0.8901916402720385, 1.1120856940795891,
  -0.002281309835532567, 0.06007917374084187, -0.1184757224780897, 0.1047177190564669, -0.11206207279381972,
  0.1097933560551182, 0.0035896845362577813,
];
