import type { Distribution } from '../../campaign/campaign.js';
import { DomainError } from '../distributions/domain-error.js';

/** An input quantity as the sampler sees it: its distribution about the estimate. The estimate itself isn't needed, for trials
 *  are drawn and evaluated as deviations from it: a y of 1e-14 with u = 1e-18 would lose four digits otherwise. */
export interface TrialInput {
  /** identity, unique; random streams go with the sorted names, so that the order of the inputs changes nothing */
  readonly name: string;
  readonly distribution: Distribution;
  /** standard uncertainty, ≥ 0, in the input's unit; for `t` the scale s/√n, drawn as x + u·t_ν (JCGM 101:2008, 6.4.9) */
  readonly u: number;
  /** ν of a `t`, > 0; not used by the others */
  readonly dof: number | null;
}

/** Product-moment correlation of the errors of two inputs, by index; pairs not listed are uncorrelated. */
export interface TrialCorrelation {
  readonly first: number;
  readonly second: number;
  /** −1 … 1 */
  readonly rho: number;
}

/** The shape of a distribution, free of scale. */
export type Shape =
  | { readonly kind: 'normal' | 'uniform' | 'triangular' }
  | { readonly kind: 't'; readonly dof: number };

export const NORMAL: Shape = { kind: 'normal' };

/** @throws {DomainError} a `t` without degrees of freedom, or a u that is negative or not a number */
export function shapeOf(input: TrialInput): Shape {
  if (!(input.u >= 0 && input.u < Infinity))
    throw new DomainError(`${input.name}: u`, input.u, 'a finite number, 0 or more');
  if (input.distribution !== 't') return { kind: input.distribution };
  if (input.dof === null || !(input.dof > 0)) {
    throw new DomainError(`${input.name}: dof`, String(input.dof), 'degrees of freedom above 0 for a t distribution');
  }
  return input.dof === Infinity ? NORMAL : { kind: 't', dof: input.dof };
}

export const sameShape = (a: Shape, b: Shape): boolean =>
  a.kind === b.kind && (a.kind !== 't' || b.kind !== 't' || a.dof === b.dof);

/** "t with 3 degrees of freedom", "uniform" */
export const shapeName = (shape: Shape): string =>
  shape.kind === 't' ? `t with ${shape.dof} degrees of freedom` : shape.kind;

/** Standard deviation of the shape in units of u: √(ν/(ν−2)) for t, null where it is infinite (ν ≤ 2); 1 for the others. */
export const standardDeviationInU = (shape: Shape): number | null => {
  if (shape.kind !== 't') return 1;
  return shape.dof > 2 ? Math.sqrt(shape.dof / (shape.dof - 2)) : null;
};
