import { CampaignError, faultAt } from '../../campaign/fault.js';
import { type EllipsoidalPosition, geodeticToGeocentric } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { LOVE_NUMBERS, type LoveNumbers, tideConversion } from '../permanent-tide.js';
import type { TideSystem } from '../tide-system.js';
import { coefficientIndex } from './gravity-model.js';
import type { GravitySynthesis } from './synthesis.js';

/** W of a gravity model at a point. */
export interface GravityPotential {
  /** gravity potential W = V + ½ω²(X² + Y²), m²/s², in the tide system asked for */
  readonly potentialM2s2: number;
  /** ∂W/∂h upwards along the ellipsoidal normal, m/s²; negative. Without the model's deflection of the vertical, which turns the
   *  pull off the radius: 1e-6 of g */
  readonly perHeightMs2: number;
  /** what the tide conversion added, m²/s² */
  readonly tideShiftM2s2: number;
}

/** W from a gravity model at a point given by GRS80 latitude, longitude and ellipsoidal height. GM, and with it the zero-degree
 *  term, is the model's own; ω is that of GRS80 (7292115e-11 rad/s). The tide conversion is that at a point fixed in space:
 *  zero = free + k₂·W_T, mean = zero + W_T. The height is used as given: convert it to the wanted system before.
 * @param tide system in which W is wanted; @param modelTide that of the coefficients, where the file does not say
 * @throws {CampaignError} `tide-system-unknown`: neither the file nor the caller says in which system the model is
 * @throws {QuantityRangeError} latitude beyond a pole, or not finite */
export function gravityPotential(
  synthesis: GravitySynthesis,
  position: EllipsoidalPosition,
  tide: TideSystem,
  options: { readonly modelTide?: TideSystem; readonly love?: LoveNumbers } = {},
): GravityPotential {
  const { model } = synthesis;
  const from = modelTideSystem(model.tide, options.modelTide);
  const { latitudeRad, longitudeRad } = position;
  const tideShiftM2s2 = tideConversion('fixed-point-potential', from, tide, latitudeRad, options.love ?? LOVE_NUMBERS);
  const point = geodeticToGeocentric(GRS80, position);
  const { potentialM2s2, radialMs2 } = synthesis.potentialAndRadialDerivative(point);
  const fromAxis = Math.hypot(point.xM, point.yM);
  const radius = Math.hypot(fromAxis, point.zM);
  const sine = point.zM / radius;
  const cosine = fromAxis / radius;
  // the normal leans from the radius by φ − ψ ≤ 0.0034; on this side only the flattening's pull northwards (C₂₀) counts
  const sinLean = Math.sin(latitudeRad) * cosine - Math.cos(latitudeRad) * sine;
  const cosLean = Math.cos(latitudeRad) * cosine + Math.sin(latitudeRad) * sine;
  const c20 = synthesis.maxDegree >= 2 ? model.cosine[coefficientIndex(2, 0)]! : 0;
  const ratio = model.radiusM / radius;
  const north = (model.gmM3s2 / radius ** 2) * ratio ** 2 * c20 * Math.sqrt(5) * 3 * sine * cosine;
  const centrifugal = 0.5 * GRS80.omega ** 2 * fromAxis ** 2;
  // longitude enters only through the point; a sum that is not finite is refused rather than handed on
  if (!Number.isFinite(potentialM2s2))
    throw new CampaignError([
      faultAt(
        'not-finite',
        'model',
        `V at longitude ${longitudeRad} rad`,
        'coefficients with which the series can be summed',
      ),
    ]);
  return {
    potentialM2s2: potentialM2s2 + centrifugal + tideShiftM2s2,
    perHeightMs2: radialMs2 * cosLean + north * sinLean + GRS80.omega ** 2 * fromAxis * Math.cos(latitudeRad),
    tideShiftM2s2,
  };
}

/** The file's word, which the caller may only repeat; where the file is silent, the caller's. */
export function modelTideSystem(ofFile: TideSystem | 'unknown', stated: TideSystem | undefined): TideSystem {
  if (ofFile === 'unknown') {
    if (stated) return stated;
    throw new CampaignError([
      faultAt(
        'tide-system-unknown',
        'model',
        'a gravity model without tide_system',
        'its permanent-tide system: "tide": "free", "zero" or "mean"',
      ),
    ]);
  }
  if (stated && stated !== ofFile)
    throw new CampaignError([
      faultAt(
        'tide-system-differs',
        'model',
        `"tide": "${stated}" for a file that says ${ofFile}`,
        `"${ofFile}", or no "tide"`,
      ),
    ]);
  return ofFile;
}
