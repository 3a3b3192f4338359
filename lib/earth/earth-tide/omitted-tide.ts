import type { Radians } from '../../quantity/radians.js';
import { mayBeNearOpenCoast } from './open-coast.js';

/** What the tide at a site leaves out, each as a bound on the potential felt, m²/s². */
export interface OmittedTide {
  /** resonance of the liquid core in the diurnal tides: 0.06·|sin 2φ| */
  readonly diurnalResonanceM2s2: number;
  /** motion of the pole, 0.11·|sin 2φ|: 0.3″ from the secular pole; 0 where pole coordinates are given */
  readonly poleTideM2s2: number;
  /** 0.4 within 50 km of an open coast; 0 inland and where amplitudes and phases are given */
  readonly oceanLoadingM2s2: number;
  /** air and groundwater: 0.1 */
  readonly airAndWaterM2s2: number;
}

/** Bounds on what is left out at a site; sizes after Voigt, Denker & Timmen (2016), Metrologia 53:1365, as rules of thumb. */
export function omittedTide(
  latitudeRad: Radians,
  longitudeRad: Radians,
  given: { readonly oceanLoading: boolean; readonly pole: boolean },
): OmittedTide {
  const sin2phi = Math.abs(Math.sin(2 * latitudeRad));
  return {
    diurnalResonanceM2s2: 0.06 * sin2phi,
    poleTideM2s2: given.pole ? 0 : 0.11 * sin2phi,
    oceanLoadingM2s2: given.oceanLoading || !mayBeNearOpenCoast(latitudeRad, longitudeRad) ? 0 : 0.4,
    airAndWaterM2s2: 0.1,
  };
}

/** All of it together; they may add up, so they are added, not squared. */
export const totalOmittedM2s2 = (o: OmittedTide): number =>
  o.diurnalResonanceM2s2 + o.poleTideM2s2 + o.oceanLoadingM2s2 + o.airAndWaterM2s2;
