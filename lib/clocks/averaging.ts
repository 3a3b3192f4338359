import type { Clock, Link } from '../campaign/campaign.js';
import { delayLimitedPhaseNoise } from './fibre-noise.js';

/** Statistical noise of one comparison of two clocks over a link, as squares of Allan deviations at 1 s. */
export interface ComparisonNoise {
  /** Σ white²: falls with the effective time */
  readonly white2: number;
  /** Σ flicker²: stays */
  readonly flicker2: number;
  /** n·phase² of the link: falls with the square of the effective time, once for each of its n unbroken stretches */
  readonly phase2: number;
}

/** White phase noise of a link as the Allan deviation at 1 s: stated, or from the noise of its fibre. */
export const linkPhaseNoise = ({ fibre, stability }: Link): number =>
  fibre ? delayLimitedPhaseNoise(fibre) : stability.phase;

export function comparisonNoise(from: Clock, to: Clock, link: Link): ComparisonNoise {
  const all = [from, to, link].map((x) => x.stability);
  return {
    white2: all.reduce((s, x) => s + x.white ** 2, 0),
    flicker2: all.reduce((s, x) => s + x.flicker ** 2, 0),
    phase2: link.segments * linkPhaseNoise(link) ** 2,
  };
}

/** Variance of the mean frequency offset: Σ white²/T + Σ flicker² + n·phase²/T².
 *  White frequency noise: Allan deviation of the mean over T; flicker: its floor (Riley, NIST SP 1065, 2008, ch. 3).
 * @param effectiveS time in which clocks and link run together, s, > 0 */
export const statisticalVariance = (noise: ComparisonNoise, effectiveS: number): number =>
  noise.white2 / effectiveS + noise.flicker2 + noise.phase2 / (effectiveS * effectiveS);

/** Effective time after which the variance has come down to `variance`, s; null if the floor is not below it. */
export function effectiveTimeForVariance(noise: ComparisonNoise, variance: number): number | null {
  const room = variance - noise.flicker2;
  if (!(room > 0)) return null;
  // room·T² − white²·T − phase² = 0; both terms under the root are positive, so nothing cancels
  return (noise.white2 + Math.sqrt(noise.white2 ** 2 + 4 * room * noise.phase2)) / (2 * room);
}
