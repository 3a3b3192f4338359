import type { PublishedConstant } from '../../constants/defining-constants.js';

/** The Sun's gravitational parameter. Of its two values (TDB, TCB) the difference, 1.5e-8 of it, is of no account here. */
export const GM_SUN = {
  value: 1.32712440041e20,
  unit: 'm³/s²',
  standardUncertainty: 1e10,
  source: 'IERS Conventions 2010 (TN 36), table 1.1, TDB-compatible',
} as const satisfies PublishedConstant;

/** The Moon's gravitational parameter: the mass ratio Moon/Earth 0.0123000371 times 3.986004418e14 m³/s². */
export const GM_MOON = {
  value: 0.0123000371 * 3.986004418e14,
  unit: 'm³/s²',
  standardUncertainty: 2e5,
  source: 'IERS Conventions 2010 (TN 36), table 1.1: GM of the Earth and the Moon–Earth mass ratio',
} as const satisfies PublishedConstant;
