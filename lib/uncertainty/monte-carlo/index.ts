export type { TrialInterval } from './coverage-intervals.js';
export {
  type MonteCarloOptions,
  type MonteCarloOutput,
  type MonteCarloProgress,
  type MonteCarloResult,
  monteCarloSteps,
  runMonteCarlo,
  type TrialModel,
} from './monte-carlo.js';
export { numericalTolerance } from './numerical-tolerance.js';
export type { Histogram } from './output-trials.js';
export { BLOCK } from './sampler.js';
export type { TrialCorrelation, TrialInput } from './trial-input.js';
export type { LinearResult, Validation } from './validation.js';
export { weightedSum } from './weighted-sum.js';
