import { DomainError } from '../distributions/domain-error.js';
import { normalQuantile } from '../distributions/index.js';
import { Stabilisation, trialsPerSequence } from './adaptive-stopping.js';
import {
  type SortedEnds,
  shortestInterval,
  symmetricInterval,
  symmetricRanks,
  symmetricStandardErrors,
  type TrialInterval,
} from './coverage-intervals.js';
import { JointCovariance } from './joint-covariance.js';
import { type Histogram, OutputTrials } from './output-trials.js';
import { BLOCK, Sampler } from './sampler.js';
import { shapeOf, type TrialCorrelation, type TrialInput } from './trial-input.js';
import { type LinearResult, type Validation, validate } from './validation.js';

/** A measurement model for trials. */
export interface TrialModel {
  /** names of the output quantities */
  readonly outputs: readonly string[];
  /** Writes y_l(x̂ + d) − y_l(x̂) into out[l][t] for trials t = 0 … count−1, d the deviations per input. Differences, so that
   *  outputs far larger than their uncertainty lose no digits. Must not change `deviations`. */
  evaluate(deviations: readonly Float64Array[], count: number, out: readonly Float64Array[]): void;
}

export interface MonteCarloOptions {
  readonly inputs: readonly TrialInput[];
  readonly correlations: readonly TrialCorrelation[];
  readonly model: TrialModel;
  /** linear results of the outputs: the estimates, and what is to be validated */
  readonly linear: readonly LinearResult[];
  /** number of trials, at least 100; or `auto`: sequences of max(100/(1 − p), 10⁴) until all results are stable */
  readonly trials: number | 'auto';
  /** whole number from 0 to 2⁵³ − 1 */
  readonly seed: number;
  /** coverage probability; default 0.95 */
  readonly coverage?: number;
  /** digits of u that are regarded as meaningful, 1 or 2; default 2, as uncertainties are printed */
  readonly significantDigits?: number;
  /** `auto` gives up here; default 10⁷ */
  readonly largestNumberOfTrials?: number;
  /** covariance of the outputs from the trials; default: for up to 20 outputs */
  readonly jointCovariance?: boolean;
  /** trials to keep at most, over all outputs, about the ends of the intervals; beyond it they too are counted in fine cells.
   *  Default 2²³ (67 MB), enough for 60 outputs of 10⁶ trials */
  readonly keep?: number;
}

/** One output quantity by the trials. */
export interface MonteCarloOutput {
  readonly name: string;
  /** y = f(x̂), as given */
  readonly estimate: number;
  /** mean of the trials; null where it doesn't exist (a t with ν ≤ 1 enters) */
  readonly mean: number | null;
  /** standard deviation of the trials; null where it is infinite (a t with ν ≤ 2 enters) */
  readonly u: number | null;
  /** mean − estimate: more digits than the difference of the two would have; null with the mean */
  readonly meanDeviation: number | null;
  /** probabilistically symmetric coverage interval (JCGM 101:2008, 7.7.2) */
  readonly interval: TrialInterval;
  /** the shortest one (7.7.4) */
  readonly shortest: TrialInterval;
  readonly validation: Validation;
  readonly histogram: Histogram;
}

export interface MonteCarloResult {
  readonly trials: number;
  readonly seed: number;
  readonly coverage: number;
  readonly outputs: readonly MonteCarloOutput[];
  /** covariance matrix of the outputs from the trials (JCGM 102:2011, 7.6); null if not asked for or infinite */
  readonly covariance: readonly (readonly number[])[] | null;
  /** for `auto`: whether results settled before the largest number of trials; null for a fixed number */
  readonly stable: boolean | null;
}

export interface MonteCarloProgress {
  readonly trials: number;
  /** trials to come to; for `auto` the largest number, which is seldom reached */
  readonly of: number;
}

const HISTOGRAM_BINS = 100;

/** Propagates distributions through a model by a Monte Carlo method, a sequence of trials at a time: a generator that yields its
 *  progress and returns the result, so that a worker or a page can drive it in slices and drop it at any point.
 * @throws {CampaignError} correlations that the distributions cannot have
 * @throws {DomainError} options outside their domain, or a model that gives something that is not a number
 * @see JCGM 101:2008, clauses 7 and 8; JCGM 102:2011, clause 7, for several outputs */
export function* monteCarloSteps(options: MonteCarloOptions): Generator<MonteCarloProgress, MonteCarloResult, void> {
  const { model, linear, seed } = options;
  const coverage = options.coverage ?? 0.95;
  const digits = options.significantDigits ?? 2;
  const sequence = trialsPerSequence(coverage);
  const auto = options.trials === 'auto';
  const largest = options.trials === 'auto' ? (options.largestNumberOfTrials ?? 10_000_000) : options.trials;
  if (!Number.isSafeInteger(largest) || largest < 100) {
    throw new DomainError('trials', largest, 'a whole number, at least 100, or auto');
  }
  const names = model.outputs;
  if (linear.length !== names.length) throw new DomainError('linear', `${linear.length} results`, `${names.length}`);
  const sampler = new Sampler(options.inputs, options.correlations, seed);
  const limit = Math.floor((options.keep ?? 2 ** 23) / Math.max(1, names.length));
  const trials = names.map(() => new OutputTrials(coverage, limit, auto ? 0 : largest));
  const moments = existingMoments(options, sampler);
  const stabilisation = auto ? moments.map((m) => new Stabilisation(coverage, m.variance)) : [];
  const joint =
    (options.jointCovariance ?? names.length <= 20) && moments.every((m) => m.variance)
      ? new JointCovariance(names.length)
      : null;
  const out = names.map(() => new Float64Array(BLOCK));
  const sequenceTrials = auto ? names.map(() => new Float64Array(sequence)) : [];

  let done = 0;
  let stable = false;
  while (done < largest && !stable) {
    const target = Math.min(largest, done + sequence);
    const start = done;
    while (done < target) {
      const count = Math.min(BLOCK, target - done);
      sampler.draw(count);
      model.evaluate(sampler.deviations, count, out);
      out.forEach((values, l) => {
        trials[l]!.add(values, count);
        if (auto) sequenceTrials[l]!.set(values.subarray(0, count), done - start);
      });
      joint?.add(out, count);
      done += count;
    }
    trials.forEach((t, l) => {
      if (!Number.isFinite(t.mean)) throw new DomainError(`output ${names[l]}`, t.mean, 'a number in every trial');
    });
    if (auto && target % sequence === 0) {
      stable = true;
      stabilisation.forEach((s, l) => {
        s.add(sequenceTrials[l]!);
        stable = s.isStable(scaleOf(trials[l]!, moments[l]!.variance, coverage), digits) && stable;
      });
    }
    yield { trials: done, of: largest };
  }
  return {
    trials: done,
    seed,
    coverage,
    outputs: names.map((name, l) => outputOf(name, trials[l]!, moments[l]!, linear[l]!, coverage, digits)),
    covariance: joint?.matrix() ?? null,
    stable: auto ? stable : null,
  };
}

/** Runs all steps at once.
 * @param onProgress called after each sequence of trials; returning false stops the run
 * @returns null if the run was stopped, the result otherwise
 * @throws as {@link monteCarloSteps} */
export function runMonteCarlo(options: MonteCarloOptions): MonteCarloResult;
export function runMonteCarlo(
  options: MonteCarloOptions,
  onProgress: (progress: MonteCarloProgress) => boolean,
): MonteCarloResult | null;
export function runMonteCarlo(
  options: MonteCarloOptions,
  onProgress?: (progress: MonteCarloProgress) => boolean,
): MonteCarloResult | null {
  const steps = monteCarloSteps(options);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (onProgress && !onProgress(step.value)) return null;
  }
}

/** Which moments of each output exist: a t with ν ≤ 2 that reaches it has no variance, with ν ≤ 1 no mean. Found by moving that
 *  input alone. */
function existingMoments(options: MonteCarloOptions, sampler: Sampler): { mean: boolean; variance: boolean }[] {
  const { inputs, model } = options;
  const moments = model.outputs.map(() => ({ mean: true, variance: true }));
  inputs.forEach((input, i) => {
    const shape = shapeOf(input);
    if (shape.kind !== 't' || shape.dof > 2 || input.u === 0) return;
    const out = model.outputs.map(() => new Float64Array(2));
    const probe = sampler.deviations.map((_, j) =>
      j === i ? Float64Array.of(input.u, -input.u) : new Float64Array(2),
    );
    model.evaluate(probe, 2, out);
    out.forEach((y, l) => {
      if (y[0] === 0 && y[1] === 0) return;
      moments[l]!.variance = false;
      if (shape.kind === 't' && shape.dof <= 1) moments[l]!.mean = false;
    });
  });
  return moments;
}

/** The u from which the tolerance is taken while trials run. */
function scaleOf(trials: OutputTrials, finiteVariance: boolean, coverage: number): number {
  if (finiteVariance) return Math.sqrt(trials.variance);
  const { low, high } = symmetricInterval(trials.ends(coverage), coverage);
  return (high - low) / (2 * normalQuantile((1 + coverage) / 2));
}

function outputOf(
  name: string,
  trials: OutputTrials,
  moments: { readonly mean: boolean; readonly variance: boolean },
  linear: LinearResult,
  coverage: number,
  digits: number,
): MonteCarloOutput {
  const ends = trials.ends(coverage);
  const symmetric = symmetricInterval(ends, coverage);
  const shortest = shortestInterval(ends, coverage);
  const errors = symmetricStandardErrors(ends, coverage);
  const about = ({ low, high }: TrialInterval): TrialInterval => ({
    low: linear.value + low,
    high: linear.value + high,
  });
  return {
    name,
    estimate: linear.value,
    mean: moments.mean ? linear.value + trials.mean : null,
    u: moments.variance ? Math.sqrt(trials.variance) : null,
    meanDeviation: moments.mean ? trials.mean : null,
    interval: about(symmetric),
    shortest: about(shortest),
    validation: validate(linear, symmetric, errors, digits),
    histogram: histogramOf(trials, ends),
  };
}

/** Bins from the 0.05 % to the 99.95 % quantile. */
function histogramOf(trials: OutputTrials, known: SortedEnds): Histogram {
  const probability = 0.999;
  const { low, high } = symmetricRanks(trials.count, probability);
  const covered = low < known.lowest.length && high >= known.trials - known.highest.length;
  const { low: from, high: to } = symmetricInterval(covered ? known : trials.ends(probability), probability);
  // an output that never moves still gets a bin of some width
  const half = (to - from) / 2 || Math.abs(from) * 1e-9 || 1;
  const middle = (from + to) / 2;
  return trials.histogram(middle - half, middle + half, HISTOGRAM_BINS);
}
