import { type ConstituentName, constituentAt, type FundamentalArguments } from './astronomical-arguments.js';

/** One constituent of the ocean's load at a site, as its user states it. */
export interface OceanLoadingConstituent {
  readonly constituent: ConstituentName;
  /** amplitude of the potential that a clock fixed to the crust feels, m²/s², ≥ 0 */
  readonly amplitudeM2s2: number;
  /** Greenwich phase lag G, rad: a positive lag comes later than the equilibrium tide at Greenwich */
  readonly phaseLagRad: number;
}

/** Potential felt at a clock by the load of the ocean tide, m²/s²: Σ f·A·cos(V + u − G), with V the astronomical argument at
 *  Greenwich and f, u the nodal corrections (see astronomical-arguments.ts). Positive slows the clock, as with the solid tide.
 *  The eleven constituents carry about 99 % of the load; minor ones are left out.
 *
 *  A is the whole of what the clock feels: water's attraction and the Earth's answer less the rise of the crust, (1 + k′ − h′) of
 *  the load's potential. From a vertical displacement u (upwards) and a height N of the loading potential, both complex, it is
 *  g·(N − u); displacement tables alone (the form most loading services give) lack N, of the order of half of u.
 * @throws never; amplitudes and phases are checked where they are read */
export function oceanLoadingM2s2(
  constituents: readonly OceanLoadingConstituent[],
  argumentsAt: FundamentalArguments,
): number {
  let sum = 0;
  for (const { constituent, amplitudeM2s2, phaseLagRad } of constituents) {
    const { argumentRad, factor } = constituentAt(constituent, argumentsAt);
    sum += factor * amplitudeM2s2 * Math.cos(argumentRad - phaseLagRad);
  }
  return sum;
}
