import { normalDensity, studentTDensity } from '../uncertainty/distributions/index.js';

/** Probability density of a quantity minus its estimate by the linear law of propagation: normal, or a t distribution on the
 *  effective degrees of freedom scaled by u, which is the law behind k (GUM G.3.2).
 * @param u standard uncertainty, > 0
 * @param degreesOfFreedom null: infinitely many */
export const linearDensity = (u: number, degreesOfFreedom: number | null): ((deviation: number) => number) =>
  degreesOfFreedom === null
    ? (deviation) => normalDensity(deviation / u) / u
    : (deviation) => studentTDensity(deviation / u, degreesOfFreedom) / u;
