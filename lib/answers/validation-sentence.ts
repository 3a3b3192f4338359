import type { MonteCarloOutput, MonteCarloResult } from '../uncertainty/monte-carlo/index.js';

/** Whether the linear result of a link's y holds against the trials, in words, with the ends of both intervals in 1e-18. */
export function validationSentence(y: MonteCarloOutput, { trials, coverage }: MonteCarloResult): string {
  const { validated, resolved, tolerance, differenceLow, differenceHigh, noiseLow, noiseHigh, linear } = y.validation;
  const decimals = tolerance > 0 ? Math.max(0, -Math.floor(Math.log10(tolerance * 1e18))) : 3;
  const n = (value: number): string => (value * 1e18).toFixed(decimals).replace('-', '\u2212');
  const ends = ({ low, high }: { low: number; high: number }): string => `${n(low)} … ${n(high)}`;
  const about = { low: y.estimate + linear.low, high: y.estimate + linear.high };
  const found = `${coverage * 100} % interval of y by ${trials} trials ${ends(y.interval)}, by the linear law ${ends(about)} (1e-18): the ends differ by ${n(differenceLow)} and ${n(differenceHigh)}, ${n(tolerance)} is allowed (half a unit in the second digit of u; JCGM 101, clause 8).`;
  if (!validated) return `${found} The linear result does not hold: use the interval of the trials.`;
  return resolved
    ? `${found} The linear result holds.`
    : `${found} The linear result holds as far as so many trials can tell: they know the ends to ${n(Math.max(noiseLow, noiseHigh))}.`;
}
