import type { Radians } from '../quantity/radians.js';
import { GRS80, WGS84 } from './level-ellipsoid.js';
import { checkLatitude, geopotentialOfNormalHeight } from './normal-field.js';

/** The normal gravity field with which normal heights were made: it turns them back into geopotential numbers. */
export interface NormalHeightField {
  readonly id: string;
  /** C of a point of normal height H, m²/s², and its derivative to H, m/s² */
  geopotential(
    latitudeRad: Radians,
    normalHeightM: number,
  ): { readonly geopotentialM2s2: number; readonly perHeightMs2: number };
  readonly source: string;
}

/** Normal gravity on an ellipsoid by a printed formula γ_e·(1 + β·sin²φ + β₄·sin⁴φ + β₁·sin²2φ). */
interface GravityFormula {
  readonly gammaEquator: number;
  readonly sin2: number;
  readonly sin4: number;
  readonly sin2Double: number;
  /** ellipsoid: semi-major axis m, flattening */
  readonly a: number;
  readonly f: number;
}

/** m = ω²a²b/GM, alike to 1e-6 on every ellipsoid of the Earth. */
const M = 0.00345;

/** Gravity of the Potsdam system, in which the older formulas and the gravity beside them were given, is 14 mGal too high
 *  (IAG 1971, International Gravity Standardization Net 1971). Where both were in it, H came out right, but C = H·γ̄ did not. */
const POTSDAM_EXCESS_MS2 = 14e-5;

/** C = H·γ̄ with γ̄ = γ₀·(1 − (1 + f + m − 2f·sin²φ)·H/a + H²/a²): Hofmann-Wellenhof & Moritz, Physical Geodesy (2006), eq. (4-60). */
function byFormula(id: string, source: string, formula: GravityFormula, potsdam: boolean): NormalHeightField {
  return {
    id,
    source,
    geopotential(latitudeRad, H) {
      checkLatitude(latitudeRad);
      const s2 = Math.sin(latitudeRad) ** 2;
      const double2 = Math.sin(2 * latitudeRad) ** 2;
      const gamma0 =
        formula.gammaEquator * (1 + formula.sin2 * s2 + formula.sin4 * s2 * s2 + formula.sin2Double * double2);
      const linear = (1 + formula.f + M - 2 * formula.f * s2) / formula.a;
      const quadratic = 1 / (formula.a * formula.a);
      const offset = potsdam ? POTSDAM_EXCESS_MS2 : 0;
      return {
        geopotentialM2s2: H * (gamma0 * (1 - linear * H + quadratic * H * H) - offset),
        perHeightMs2: gamma0 * (1 - 2 * linear * H + 3 * quadratic * H * H) - offset,
      };
    },
  };
}

const GRS67_FORMULA: GravityFormula = {
  gammaEquator: 9.78031846,
  sin2: 0.005278895,
  sin4: 0.000023462,
  sin2Double: 0,
  a: 6378160,
  f: 1 / 298.247167427,
};
const INTERNATIONAL_1930: GravityFormula = {
  gammaEquator: 9.78049,
  sin2: 0.0052884,
  sin4: 0,
  sin2Double: -0.0000059,
  a: 6378388,
  f: 1 / 297,
};
const HELMERT_1901: GravityFormula = {
  gammaEquator: 9.7803,
  sin2: 0.005302,
  sin4: 0,
  sin2Double: -0.000007,
  a: 6378245,
  f: 1 / 298.3,
};

const closed = (id: string, ellipsoid: typeof GRS80, source: string): NormalHeightField => ({
  id,
  source,
  geopotential: (latitudeRad, H) => geopotentialOfNormalHeight(ellipsoid, latitudeRad, H),
});

/** Fields by the names a campaign may give them. The names with `potsdam` are for heights whose measured gravity was in the Potsdam
 *  system like the formula; the plain names take the formula as it is printed. */
export const NORMAL_HEIGHT_FIELDS: readonly NormalHeightField[] = [
  closed('GRS80', GRS80, 'Moritz (2000), closed form'),
  closed('WGS84', WGS84, 'NIMA TR8350.2 (2000), closed form'),
  byFormula('GRS67', 'IAG (1971), Geodetic Reference System 1967, Special Publication 3', GRS67_FORMULA, false),
  byFormula('International1930', 'Cassinis (1930), international gravity formula', INTERNATIONAL_1930, false),
  byFormula('International1930-potsdam', 'Cassinis (1930), gravity in the Potsdam system', INTERNATIONAL_1930, true),
  byFormula('Helmert1901', 'Helmert (1901), as used with the ellipsoid of Krassovsky', HELMERT_1901, false),
  byFormula('Helmert1901-potsdam', 'Helmert (1901), gravity in the Potsdam system', HELMERT_1901, true),
];

const tidy = (text: string): string => text.toLowerCase().replace(/[\s_-]+/g, '');

/** The field a text names (`GRS 80`, `international 1930`), or null. */
export const readNormalHeightField = (text: string): NormalHeightField | null =>
  NORMAL_HEIGHT_FIELDS.find((field) => tidy(field.id) === tidy(text)) ?? null;
