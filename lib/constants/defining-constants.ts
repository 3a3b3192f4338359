/** A published value with its unit, its standard uncertainty (0: exact by definition or convention) and where it stands. */
export interface PublishedConstant {
  readonly value: number;
  readonly unit: string;
  readonly standardUncertainty: number;
  readonly source: string;
}

/** Speed of light in vacuum. */
export const SPEED_OF_LIGHT = {
  value: 299_792_458,
  unit: 'm/s',
  standardUncertainty: 0,
  source: 'SI Brochure, 9th ed. (2019), section 2.2',
} as const satisfies PublishedConstant;

/** c², exact in double precision to its last digit: 89 875 517 873 681 764 needs 57 bits, the rounding is 4 m²/s² in 9e16. */
export const SPEED_OF_LIGHT_SQUARED_M2_PER_S2 = SPEED_OF_LIGHT.value * SPEED_OF_LIGHT.value;

/** L_G = 1 − dTT/dTCG. */
export const L_G = {
  value: 6.969290134e-10,
  unit: '1',
  standardUncertainty: 0,
  source: 'IAU 2000 Resolution B1.9; CGPM 2018 Resolution 2',
} as const satisfies PublishedConstant;

/** Reference potential of the International Height Reference System. */
export const W0_IHRS = {
  value: 62_636_853.4,
  unit: 'm²/s²',
  standardUncertainty: 0,
  source: 'IAG 2015 Resolution 1',
} as const satisfies PublishedConstant;

/** Reference potential behind Terrestrial Time, L_G·c²: 62 636 856.0005 m²/s². */
export const W0_TT = {
  value: L_G.value * SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
  unit: 'm²/s²',
  standardUncertainty: 0,
  source: 'L_G·c²; the rounded 62 636 856.0 m²/s² is that of CGPM 2018 Resolution 2',
} as const satisfies PublishedConstant;

/** Gravity decrease with height used where none is stated: the normal free-air gradient, 0.3086 mGal/m.
 *  Its 10 % is the scatter of measured gradients in and near buildings (common practice, no source). */
export const FREE_AIR_GRADIENT = {
  value: 3.086e-6,
  unit: 's⁻²',
  standardUncertainty: 3.086e-7,
  source: 'GRS80 normal field at the surface (Moritz 2000); uncertainty: common practice, no source',
} as const satisfies PublishedConstant;

/** Half the difference of the free-air and twice the Bouguer gradient at 2670 kg/m³: mean gravity of the Helmert height. */
export const HELMERT_FACTOR = {
  value: 4.24e-7,
  unit: 's⁻²',
  standardUncertainty: 0,
  source: 'NGS, NAVD 88 Helmert height H = C/(g + 4.24e-5·H), g in gal, H in m; exact as a definition',
} as const satisfies PublishedConstant;
