import type { EllipsoidShape } from '../geocentric.js';
import { GRS80, WGS84 } from '../level-ellipsoid.js';

const fromInverseFlattening = (a: number, rf: number): EllipsoidShape => ({ a, e2: (1 / rf) * (2 - 1 / rf) });
const fromAxes = (a: number, b: number): EllipsoidShape => ({ a, e2: 1 - (b * b) / (a * a) });

/** Ellipsoids of surveying by the names PROJ definitions give them, with PROJ's numbers. Names outside this list are refused,
 *  for proj4 takes another ellipsoid for them without a word. */
export const ELLIPSOIDS: Readonly<Record<string, EllipsoidShape>> = {
  GRS80: { a: GRS80.a, e2: GRS80.e2 },
  WGS84: { a: WGS84.a, e2: WGS84.e2 },
  WGS72: fromInverseFlattening(6378135, 298.26),
  GRS67: fromInverseFlattening(6378160, 298.247167427),
  aust_SA: fromInverseFlattening(6378160, 298.25),
  intl: fromInverseFlattening(6378388, 297),
  krass: fromInverseFlattening(6378245, 298.3),
  bessel: fromInverseFlattening(6377397.155, 299.1528128),
  airy: fromInverseFlattening(6377563.396, 299.3249646),
  mod_airy: fromAxes(6377340.189, 6356034.446),
  clrk66: fromAxes(6378206.4, 6356583.8),
  clrk80ign: fromInverseFlattening(6378249.2, 293.4660212936269),
  helmert: fromInverseFlattening(6378200, 298.3),
};
