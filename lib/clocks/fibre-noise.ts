import { SPEED_OF_LIGHT } from '../constants/defining-constants.js';

/** Part a of the fibre's noise that a round-trip compensation leaves: S_left(f) = a·(2πfτ)²·S_fibre(f) for noise that is
 *  uniform along the fibre and uncorrelated from piece to piece (Williams, Swann & Newbury 2008, J. Opt. Soc. Am. B 25, 1284;
 *  the number from memory). */
export const DELAY_LIMITED_PART = 1 / 3;

/** Group index of standard single-mode fibre near 1550 nm (common practice, no source). */
export const FIBRE_GROUP_INDEX = 1.468;

/** Optical carrier of most links, 1542 nm (common practice, no source), Hz. */
export const FIBRE_CARRIER_HZ = 194.4e12;

export interface FibreNoise {
  readonly lengthM: number;
  /** S_fibre(f)·f²/L: phase noise of the unstabilised fibre per length, rad²·Hz/m; falls as 1/f² */
  readonly noiseRad2HzPerM: number;
  /** bandwidth in which the phase is read, Hz: that of the counter or filter, at most that of the servo, c/(4·n·L) */
  readonly bandwidthHz: number;
  readonly carrierHz: number;
  readonly groupIndex: number;
}

/** One-way delay, s. */
export const fibreDelayS = ({ lengthM, groupIndex }: Pick<FibreNoise, 'lengthM' | 'groupIndex'>): number =>
  (groupIndex * lengthM) / SPEED_OF_LIGHT.value;

/** Bandwidth of a servo that is limited by the delay, 1/(4τ), Hz (Williams, Swann & Newbury 2008, from memory). */
export const servoBandwidthHz = (fibre: Pick<FibreNoise, 'lengthM' | 'groupIndex'>): number =>
  1 / (4 * fibreDelayS(fibre));

/** White phase noise that a stabilised fibre keeps because of its delay, as the Allan deviation at 1 s, falling as 1/τ.
 *  With S_fibre = h·L/f² the rest S = a·(2πτ)²·h·L does not depend on f: white phase noise, whose Allan variance in the
 *  bandwidth f_h is 3·f_h·S/(2πν)² at 1 s (Riley 2008, NIST SP 1065, section 3.2). Grows as L^(3/2).
 * @returns dimensionless, ≥ 0 */
export function delayLimitedPhaseNoise(fibre: FibreNoise): number {
  const { lengthM, noiseRad2HzPerM, bandwidthHz, carrierHz } = fibre;
  const tau = fibreDelayS(fibre);
  const leftRad2PerHz = DELAY_LIMITED_PART * (2 * Math.PI * tau) ** 2 * noiseRad2HzPerM * lengthM;
  return Math.sqrt(3 * bandwidthHz * leftRad2PerHz) / (2 * Math.PI * carrierHz);
}
