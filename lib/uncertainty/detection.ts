import { normalQuantile } from './distributions/index.js';

/** A two-sided test and the chance that it shows what is there. */
export interface DetectionTest {
  /** chance of a false alarm, α */
  readonly size: number;
  /** chance of showing a discrepancy of the smallest detectable size, 1 − β */
  readonly power: number;
}

/** Test of one comparison. */
export const COMPARISON_TEST: DetectionTest = { size: 0.05, power: 0.8 };
/** Test of one observation in an adjustment (Baarda 1968, A testing procedure for use in geodetic networks). */
export const NETWORK_TEST: DetectionTest = { size: 0.001, power: 0.8 };

/** Smallest detectable discrepancy in units of its standard uncertainty: z(1 − α/2) + z(1 − β). For two-sided tests the far
 *  tail is left out, as usual: below 1e-6 of the power here. */
export const detectionFactor = ({ size, power }: DetectionTest): number =>
  normalQuantile(1 - size / 2) + normalQuantile(power);

/** 2.801585: size 0.05, power 0.8. */
export const DETECTION_FACTOR = detectionFactor(COMPARISON_TEST);
