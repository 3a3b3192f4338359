import type { InputCovariance } from './covariance.js';
import { DomainError } from './distributions/domain-error.js';
import type { Gradient } from './gradient.js';

/** A piece of a result's variance that is independent of all others. */
export interface VarianceBlock {
  /** id of the shared source, or null for the independent part of one input */
  readonly source: string | null;
  /** register indices of the inputs in it */
  readonly inputs: readonly number[];
  /** its part in u²(y), ≥ 0 */
  readonly variance: number;
  /** degrees of freedom, the smallest among its inputs; Infinity if none states any */
  readonly dof: number;
}

/** Splits u²(y) into independent pieces: one per shared source, with the cancellation inside it, and one per part of an input
 *  that names no source. They add up to the variance exactly, for parts of different sources are uncorrelated.
 *
 *  The Welch–Satterthwaite formula holds for independent contributions only (GUM G.4.1, after eq. G.2b); inputs that share a source
 *  are not, but the blocks are. A block's ν is the smallest of its inputs', for the estimates of u inside it may all rest on the
 *  same few observations. */
export function varianceBlocks(covariance: InputCovariance, gradient: Gradient): VarianceBlock[] {
  const blocks: VarianceBlock[] = [];
  const shared = new Map<string, { input: number; loading: number; place: string }[]>();
  gradient.indices.forEach((input, k) => {
    const { parts, dof, place } = covariance.inputs[input]!;
    const c = gradient.values[k]!;
    for (const { u, source } of parts) {
      if (source === null) {
        blocks.push({ source, inputs: [input], variance: (c * u) ** 2, dof: dof ?? Infinity });
        continue;
      }
      const members = shared.get(source);
      const member = { input, loading: c * u, place: place.key };
      if (members) members.push(member);
      else shared.set(source, [member]);
    }
  });
  for (const [source, members] of shared) {
    const field = covariance.sourceField(source);
    if (!field) throw new DomainError('source', source, 'a source of the covariance');
    const at = new Map(field.places.map((p, i) => [p.key, i]));
    let variance = 0;
    for (const a of members) {
      for (const b of members) variance += a.loading * b.loading * field.rho(at.get(a.place)!, at.get(b.place)!);
    }
    const dof = members.reduce((least, m) => Math.min(least, covariance.inputs[m.input]!.dof ?? Infinity), Infinity);
    // what cancels exactly may come out at −1e-16 of its terms
    blocks.push({ source, inputs: members.map((m) => m.input), variance: Math.max(0, variance), dof });
  }
  return blocks;
}

/** Effective degrees of freedom by the Welch–Satterthwaite formula: ν_eff = u⁴/Σ u_b⁴/ν_b over independent contributions.
 *  Fractional; Infinity where no contribution has finite degrees of freedom, or all those that have are 0.
 * @param blocks variances u_b² ≥ 0 and degrees of freedom ν_b > 0
 * @throws {DomainError} if one is outside
 * @see JCGM 100:2008 (GUM), G.4.1, eq. (G.2b) */
export function effectiveDegreesOfFreedom(
  blocks: readonly { readonly variance: number; readonly dof: number }[],
): number {
  let variance = 0;
  for (const b of blocks) {
    if (!(b.variance >= 0 && b.variance < Infinity)) {
      throw new DomainError('variance', b.variance, 'a finite number, 0 or more');
    }
    if (!(b.dof > 0)) throw new DomainError('dof', b.dof, 'degrees of freedom above 0');
    variance += b.variance;
  }
  // as shares, so that variances of 1e-38 don't underflow when squared
  let sum = 0;
  for (const b of blocks) if (b.variance > 0) sum += (b.variance / variance) ** 2 / b.dof;
  return sum > 0 ? 1 / sum : Infinity;
}
