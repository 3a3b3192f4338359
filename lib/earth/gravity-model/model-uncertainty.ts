import { CampaignError, faultAt } from '../../campaign/fault.js';
import { type EllipsoidalPosition, geodeticToGeocentric } from '../geocentric.js';
import { GRS80 } from '../level-ellipsoid.js';
import { QuantityRangeError } from '../range-error.js';
import { coefficientIndex, type GravityModel, MAX_SYNTHESIS_DEGREE } from './gravity-model.js';
import { columnRecursion, legendreColumn, RECURSION_SCALE, sectorialFactors } from './legendre.js';

/** A point, and the degree to which the series is summed there if it is not that of the others. */
export type CommissionPoint = EllipsoidalPosition & { readonly maxDegree?: number };

/** Covariance of V between points from the standard deviations of the coefficients, taken as uncorrelated (the file has no more):
 *  cov(V_i, V_j) = Σ_nm (GM/r_i)(GM/r_j)(R²/(r_i·r_j))ⁿ·P̄_nm(i)·P̄_nm(j)·(σ²_C·cos mλ_i·cos mλ_j + σ²_S·sin mλ_i·sin mλ_j).
 *  One pass over the coefficients for all points.
 * @returns covariance matrix, m⁴/s⁴, row by row
 * @throws {CampaignError} `no-sigmas`: the file carries no standard deviations */
export function commissionCovariance(
  model: GravityModel,
  positions: readonly CommissionPoint[],
  maxDegree: number = model.maxDegree,
  onProgress?: (share: number) => void,
): Float64Array {
  const { cosineSigma, sineSigma } = model;
  if (!cosineSigma || !sineSigma)
    throw new CampaignError([
      faultAt(
        'no-sigmas',
        'model',
        `a model with errors: ${model.errors}`,
        'standard deviations of the coefficients, or the u of W stated',
      ),
    ]);
  const most = Math.min(model.maxDegree, MAX_SYNTHESIS_DEGREE);
  const degrees = positions.map((p) => p.maxDegree ?? maxDegree);
  for (const degree of degrees)
    if (!Number.isInteger(degree) || degree < 0 || degree > most)
      throw new QuantityRangeError('maxDegree', degree, `a whole number from 0 to ${most}`);
  const points = positions.map((p, i) => new PointFunctions(model, p, degrees[i]!));
  const count = points.length;
  const highest = Math.max(0, ...degrees);
  const covariance = new Float64Array(count * count);
  const a = new Float64Array(highest + 1);
  const b = new Float64Array(highest + 1);
  const sectorial = sectorialFactors(highest);
  const cosineVariance = new Float64Array(highest + 1);
  const sineVariance = new Float64Array(highest + 1);
  for (let m = 0; m <= highest; m++) {
    columnRecursion(m, highest, a, b);
    for (let n = m; n <= highest; n++) {
      const k = coefficientIndex(n, m);
      cosineVariance[n] = cosineSigma[k]! ** 2;
      sineVariance[n] = sineSigma[k]! ** 2;
    }
    for (const point of points) point.nextOrder(m, a, b, sectorial[m]!);
    for (let i = 0; i < count; i++)
      for (let j = 0; j <= i; j++)
        covariance[i * count + j]! += productOfOrder(points[i]!, points[j]!, m, cosineVariance, sineVariance);
    onProgress?.((m + 1) / (highest + 1));
  }
  for (let i = 0; i < count; i++) for (let j = 0; j < i; j++) covariance[j * count + i] = covariance[i * count + j]!;
  return covariance;
}

/** (GM/r)·qⁿ·P̄_nm and cos mλ, sin mλ at one point, order after order. */
class PointFunctions {
  readonly values: Float64Array;
  cosM = 1;
  sinM = 0;
  vanishes = false;
  readonly #scale: number;
  readonly #t: number;
  readonly #ratio: number;
  readonly #uq: number;
  readonly #longitudeRad: number;
  readonly #maxDegree: number;
  #power: number;

  constructor(model: GravityModel, position: EllipsoidalPosition, maxDegree: number) {
    const { xM, yM, zM } = geodeticToGeocentric(GRS80, position);
    const fromAxis = Math.hypot(xM, yM);
    const radius = Math.hypot(fromAxis, zM);
    this.values = new Float64Array(maxDegree + 1);
    this.#scale = model.gmM3s2 / radius;
    this.#t = zM / radius;
    this.#ratio = model.radiusM / radius;
    this.#uq = (fromAxis / radius) * this.#ratio;
    this.#longitudeRad = position.longitudeRad;
    this.#maxDegree = maxDegree;
    this.#power = 1 / RECURSION_SCALE;
  }

  nextOrder(m: number, a: Float64Array, b: Float64Array, sectorial: number): void {
    if (m > 0) this.#power *= this.#uq;
    this.vanishes = this.#power === 0 || m > this.#maxDegree;
    if (this.vanishes) return;
    this.cosM = Math.cos(m * this.#longitudeRad);
    this.sinM = Math.sin(m * this.#longitudeRad);
    legendreColumn(m, this.#maxDegree, a, b, this.#scale * this.#power * sectorial, this.#t, this.#ratio, this.values);
  }
}

function productOfOrder(
  a: PointFunctions,
  b: PointFunctions,
  m: number,
  cosineVariance: Float64Array,
  sineVariance: Float64Array,
): number {
  if (a.vanishes || b.vanishes) return 0;
  const x = a.values;
  const y = b.values;
  let c = 0;
  let s = 0;
  const end = Math.min(x.length, y.length);
  for (let n = m; n < end; n++) {
    const p = x[n]! * y[n]!;
    c += p * cosineVariance[n]!;
    s += p * sineVariance[n]!;
  }
  return c * a.cosM * b.cosM + s * a.sinM * b.sinM;
}

/** What a model cut off at degree N leaves out of the geoid, as a standard uncertainty, and how far it reaches.
 *  Kaula's rule of thumb for the coefficients, 1e-5/n² (Kaula 1966, Theory of Satellite Geodesy), summed beyond N:
 *  R·1e-5·√(Σ_{n>N} (2n + 1)/n⁴) ≈ 64 m/N; half a wavelength at degree N is 20 000 km/N. A global mean: several times that in
 *  mountains, less on plains. */
export function kaulaOmission(maxDegree: number): {
  readonly geoidHeightM: number;
  readonly correlationLengthM: number;
} {
  if (!Number.isInteger(maxDegree) || maxDegree < 2)
    throw new QuantityRangeError('maxDegree', maxDegree, 'a whole number from 2');
  return { geoidHeightM: 64 / maxDegree, correlationLengthM: 20_000_000 / maxDegree };
}
