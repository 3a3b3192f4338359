import type { Campaign } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import {
  type MonteCarloOutput,
  type MonteCarloProgress,
  type MonteCarloResult,
  monteCarloSteps,
} from '../uncertainty/monte-carlo/index.js';
import { expandedUncertaintyOf } from './coverage.js';
import { linkTrials } from './link-trials.js';
import { predictionOf } from './predict.js';
import type { LinkPrediction, Prediction } from './prediction.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';
import { validationSentence } from './validation-sentence.js';

/** How to run the trials. */
export interface MonteCarloRequest {
  /** at least 100, or `auto`: until results are stable (JCGM 101:2008, 7.9) */
  readonly trials: number | 'auto';
  /** whole number from 0 to 2⁵³ − 1; the same seed gives the same trials */
  readonly seed: number;
}

/** The offset y of a link by trials. */
export interface LinkMonteCarlo {
  readonly trials: number;
  readonly seed: number;
  /** null where it doesn't exist: an input has a t distribution with ν ≤ 1 */
  readonly mean: number | null;
  /** null where it is infinite: an input has a t distribution with ν ≤ 2 */
  readonly u: number | null;
  /** probabilistically symmetric 95 % coverage interval */
  readonly interval95: readonly [number, number];
  /** shortest 95 % coverage interval */
  readonly shortest95: readonly [number, number];
  /** y ± k·u by the linear law, k from the effective degrees of freedom */
  readonly linear95: readonly [number, number];
  /** JCGM 101:2008, clause 8: both ends of linear95 within `tolerance` of interval95, apart from the noise of the trials */
  readonly validated: boolean;
  /** half a unit in the second digit of the linear u */
  readonly tolerance: number;
  /** whether the trials are enough to tell a difference of `tolerance` */
  readonly resolved: boolean;
}

export interface MonteCarloPrediction extends Prediction {
  readonly links: readonly (LinkPrediction & { readonly monteCarlo: LinkMonteCarlo | null })[];
}

/** The answer of `predict` with the offset of each link by trials beside it, all at once.
 * @throws {CampaignError} the campaign contradicts itself, or its correlations are beyond its distributions
 * @throws {DomainError} trials or seed outside their domain */
export function predictMonteCarlo(campaign: Campaign, request: MonteCarloRequest): MonteCarloPrediction {
  const steps = predictMonteCarloSteps(campaign, request);
  let step = steps.next();
  while (!step.done) step = steps.next();
  return step.value;
}

/** The same in slices of some milliseconds: yields how far it is and returns the answer, for a worker or between two frames of a
 *  page; who wants no more of it stops asking. */
export function* predictMonteCarloSteps(
  campaign: Campaign,
  request: MonteCarloRequest,
): Generator<MonteCarloProgress, MonteCarloPrediction, void> {
  const solved = solveCampaign(campaign);
  return withMonteCarlo(solved, yield* linkMonteCarloSteps(solved, request));
}

/** Runs the trials of links that have a prediction, in slices; see {@link monteCarloSteps}.
 * @param links indices of the links wanted; default: all. Fewer links draw fewer inputs, so that their trials are others */
export function linkMonteCarloSteps(
  solved: SolvedCampaign,
  request: MonteCarloRequest,
  links: readonly number[] = solved.links.map((_, l) => l),
): Generator<MonteCarloProgress, MonteCarloResult, void> {
  const known = links.filter((l) => solved.links[l]);
  return monteCarloSteps({
    ...linkTrials(solved, known),
    linear: known.map((l) => {
      const { y } = solved.links[l]!;
      const { covariance } = solved.model;
      const { coverageFactor } = expandedUncertaintyOf(covariance, y.gradient, 0.95);
      return { value: y.value, u: Math.sqrt(covariance.variance(y.gradient)), coverageFactor };
    }),
    trials: request.trials,
    seed: request.seed,
    coverage: 0.95,
    jointCovariance: false,
  });
}

/** A prediction with the results of its trials. */
export function withMonteCarlo(solved: SolvedCampaign, result: MonteCarloResult): MonteCarloPrediction {
  const prediction = predictionOf(solved);
  const byLink = new Map(result.outputs.map((y) => [y.name, y]));
  const warnings: Warning[] = result.outputs.flatMap((y) =>
    y.validation.validated
      ? []
      : [{ code: 'linear-not-validated', path: `links.${y.name}`, message: validationSentence(y, result) }],
  );
  if (result.stable === false) {
    warnings.push({
      code: 'trials-not-stable',
      path: '',
      message: `after ${result.trials} trials not every mean, u and interval was stable to half a unit of the second digit of u (JCGM 101, 7.9); the results are of all trials so far.`,
    });
  }
  return {
    ...prediction,
    links: prediction.links.map((link) => {
      const y = byLink.get(link.id);
      return { ...link, monteCarlo: y ? linkMonteCarlo(y, result) : null };
    }),
    warnings: [...prediction.warnings, ...warnings],
  };
}

function linkMonteCarlo(y: MonteCarloOutput, { trials, seed }: MonteCarloResult): LinkMonteCarlo {
  const { validated, tolerance, resolved, linear } = y.validation;
  return {
    trials,
    seed,
    mean: y.mean,
    u: y.u,
    interval95: [y.interval.low, y.interval.high],
    shortest95: [y.shortest.low, y.shortest.high],
    linear95: [y.estimate + linear.low, y.estimate + linear.high],
    validated,
    tolerance,
    resolved,
  };
}
