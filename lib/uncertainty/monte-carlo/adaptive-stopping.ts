import { DomainError } from '../distributions/domain-error.js';
import { symmetricInterval } from './coverage-intervals.js';
import { numericalTolerance } from './numerical-tolerance.js';
import { sortNumbers } from './sort-numbers.js';

/** Trials per sequence: max(J, 10⁴), J the smallest whole number not below 100/(1 − p) (JCGM 101:2008, 7.9.4 a, b). */
export const trialsPerSequence = (probability: number): number => {
  if (!(probability > 0 && probability < 1)) throw new DomainError('coverage', probability, 'a number between 0 and 1');
  // 100/0.05 in binary is a rounding above 2000
  return Math.max(10_000, Math.ceil(100 / (1 - probability) - 1e-6));
};

/** Running mean and sum of squares of one result over the sequences. */
class Spread {
  #n = 0;
  #mean = 0;
  #squares = 0;

  add(value: number): void {
    this.#n += 1;
    const shift = value - this.#mean;
    this.#mean += shift / this.#n;
    this.#squares += shift * (value - this.#mean);
  }

  /** Standard deviation of the mean of the sequences (JCGM 101:2008, eq. 19). */
  get standardError(): number {
    return Math.sqrt(this.#squares / (this.#n * (this.#n - 1)));
  }
}

/** Watches one output: whether its mean, its standard uncertainty and both ends of its symmetric interval have settled within
 *  the numerical tolerance (JCGM 101:2008, 7.9.4). Where the variance is infinite only the ends are watched. */
export class Stabilisation {
  readonly #probability: number;
  readonly #spreads: readonly Spread[];
  readonly #finiteVariance: boolean;
  #sequences = 0;

  constructor(probability: number, finiteVariance: boolean) {
    this.#probability = probability;
    this.#finiteVariance = finiteVariance;
    this.#spreads = Array.from({ length: 4 }, () => new Spread());
  }

  /** Takes one sequence of trials, which it sorts. */
  add(trials: Float64Array): void {
    const sorted = sortNumbers(trials);
    let sum = 0;
    for (const v of sorted) sum += v;
    const mean = sum / sorted.length;
    let squares = 0;
    for (const v of sorted) squares += (v - mean) * (v - mean);
    const { low, high } = symmetricInterval(
      { trials: sorted.length, lowest: sorted, highest: sorted },
      this.#probability,
    );
    const results = this.#finiteVariance ? [low, high, mean, Math.sqrt(squares / (sorted.length - 1))] : [low, high];
    results.forEach((v, i) => {
      this.#spreads[i]!.add(v);
    });
    this.#sequences += 1;
  }

  /** @param u standard uncertainty of all trials so far, from which δ is taken; half the width of the interval over 1.96 where
   *  there is none */
  isStable(u: number, significantDigits: number): boolean {
    if (this.#sequences < 2) return false;
    if (u === 0) return true; // exact: nothing moves
    const tolerance = numericalTolerance(u, significantDigits);
    const watched = this.#finiteVariance ? this.#spreads : this.#spreads.slice(0, 2);
    return watched.every((s) => 2 * s.standardError < tolerance);
  }
}
