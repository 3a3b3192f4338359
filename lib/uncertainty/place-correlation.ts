import { chordDistanceM, geodesicDistanceM } from '../earth/geodesic-distance.js';
import type { Place } from './inputs.js';

/** Below this an exponential is left out: 1e-20 of a variance is far under the rounding of its sum. */
const NEGLIGIBLE_EXPONENT = 46;

/** exp(−d/L) between places, d the geodesic distance, as a dense symmetric matrix in rows. */
export function correlationBetweenPlaces(places: readonly Place[], lengthM: number): Float64Array {
  const n = places.length;
  const rho = new Float64Array(n * n);
  for (let p = 0; p < n; p++) {
    rho[p * n + p] = 1;
    for (let q = p + 1; q < n; q++) {
      const a = places[p]!.position;
      const b = places[q]!.position;
      if (!a || !b) throw new Error(`internal: ${places[a ? q : p]!.key} has no position for a correlation length`);
      const near = chordDistanceM(a, b) < NEGLIGIBLE_EXPONENT * lengthM;
      rho[p * n + q] = near ? Math.exp(-geodesicDistanceM(a, b) / lengthM) : 0;
      rho[q * n + p] = rho[p * n + q]!;
    }
  }
  return rho;
}
