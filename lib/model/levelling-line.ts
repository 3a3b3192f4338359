import type { Determination, Measured, UncertaintyPart } from '../campaign/campaign.js';

type LevelledFrom = Determination & { readonly kind: 'levelled-from' };

/** u(dH) of a line by its length: b·√d random and, in proportion to d, k·d systematic. The two add as squares; k·d carries the
 *  source of k, so that it adds up along lines that share it.
 * @param lengthM levelled distance d, m
 * @param bRootM b, m^½ (1 mm/√km = 3.16e-5 m^½)
 * @param k dimensionless (1 mm/km = 1e-6)
 * @see Vignal 1936, Bull. Géod. 49, 401, for the parting into random and systematic error of levelling (from memory) */
export const levellingUncertaintyM = (lengthM: number, bRootM: number, k: number): number =>
  Math.hypot(bRootM * Math.sqrt(lengthM), k * lengthM);

/** The levelled height difference with its uncertainty: as stated with it, else from length, b and k of its line. A source that
 *  stands at dH is that of k·d where k names none. */
export function levelledDifference({ dH, lengthM, b, k }: LevelledFrom): Measured {
  if (lengthM === undefined || (b === undefined && k === undefined)) return dH;
  const pieces: UncertaintyPart[] = [
    { u: (b?.value ?? 0) * Math.sqrt(lengthM), source: b?.source ?? null },
    { u: (k?.value ?? 0) * lengthM, source: k?.source ?? dH.source ?? null },
  ];
  const parts = pieces.filter(({ u }) => u > 0);
  return { ...dH, u: Math.hypot(...parts.map(({ u }) => u)), parts };
}
