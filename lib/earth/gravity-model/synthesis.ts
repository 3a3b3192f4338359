import type { GeocentricPosition } from '../geocentric.js';
import { QuantityRangeError } from '../range-error.js';
import { coefficientIndex, type GravityModel, MAX_SYNTHESIS_DEGREE } from './gravity-model.js';
import { associatedLegendreGrowth, RECURSION_SCALE, sectorialFactors } from './legendre.js';

/** Gravitational potential along a circle of latitude, one height: the sums over degree are done, a longitude costs one over order. */
export interface ParallelSynthesis {
  /** V at a longitude, m²/s² */
  potentialM2s2(longitudeRad: number): number;
}

/** Below this distance from the centre no series in outward powers is meant to hold. */
const MIN_RADIUS_M = 6_300_000;

/** Sums the series of a {@link GravityModel} by Clenshaw's recursion over degree (Holmes & Featherstone 2002, J. Geodesy 76:279,
 *  section 3, who divide by cosᵐψ and scale; Tscherning & Poder 1982, Boll. Geod. Sci. Aff. 41:349). Stable from pole to pole.
 *
 *  The functions used are p_nm = P̄_nm/(α_nm·cosᵐψ) with α chosen (see legendre.ts) so that
 *    p_{n+1} = 2t·p_n − β_nm·p_{n−1},   β_nm = 1 − (4m² − 1)/(4n² − 1),   t = sin ψ:
 *  no root and no division is left in the inner loop, for α is multiplied into the coefficients once. Copies the coefficients
 *  (16 bytes each), order by order and from the highest degree down, as the recursion runs. */
export class GravitySynthesis {
  readonly model: GravityModel;
  readonly maxDegree: number;
  /** C̄ and S̄ in pairs, times α·scale */
  readonly #pairs: Float64Array;
  /** 1/(4n² − 1) */
  readonly #inverse: Float64Array;
  readonly #sectorial: Float64Array;
  // work space of one call, so that none of it is allocated per point
  readonly #c: Float64Array;
  readonly #s: Float64Array;
  readonly #cRadial: Float64Array;
  readonly #sRadial: Float64Array;
  readonly #cosM: Float64Array;
  readonly #sinM: Float64Array;

  /** @param maxDegree degree to which the series is summed; default all of the model's
   *  @throws {QuantityRangeError} above the model's degree or {@link MAX_SYNTHESIS_DEGREE}, or not a whole number ≥ 0 */
  constructor(model: GravityModel, maxDegree: number = model.maxDegree) {
    const most = Math.min(model.maxDegree, MAX_SYNTHESIS_DEGREE);
    if (!Number.isInteger(maxDegree) || maxDegree < 0 || maxDegree > most)
      throw new QuantityRangeError('maxDegree', maxDegree, `a whole number from 0 to ${most}`);
    this.model = model;
    this.maxDegree = maxDegree;
    this.#inverse = Float64Array.from({ length: maxDegree + 2 }, (_, n) => 1 / (4 * n * n - 1));
    this.#sectorial = sectorialFactors(maxDegree);
    this.#pairs = scaledPairs(model, maxDegree);
    this.#c = new Float64Array(maxDegree + 1);
    this.#s = new Float64Array(maxDegree + 1);
    this.#cRadial = new Float64Array(maxDegree + 1);
    this.#sRadial = new Float64Array(maxDegree + 1);
    this.#cosM = new Float64Array(maxDegree + 1);
    this.#sinM = new Float64Array(maxDegree + 1);
  }

  /** Gravitational potential V at a point outside the Earth, m²/s². Rounding: up to 3e-7 m²/s² at degree 2190.
   *  @throws {QuantityRangeError} nearer than 6300 km to the centre, or not finite */
  potentialM2s2(position: GeocentricPosition): number {
    const { radius, fromAxis, sine, ratio } = this.#polar(position);
    this.#sumOverDegree(sine, ratio, this.#c, this.#s);
    this.#longitudes(position.xM, position.yM, fromAxis);
    return (this.model.gmM3s2 / radius) * this.#sumOverOrder((fromAxis / radius) * ratio, this.#c, this.#s);
  }

  /** V, m²/s², and its derivative outwards along the radius, m/s² (negative). Twice the work of V alone. */
  potentialAndRadialDerivative(position: GeocentricPosition): { potentialM2s2: number; radialMs2: number } {
    const { radius, fromAxis, sine, ratio } = this.#polar(position);
    this.#sumOverDegreeRadial(sine, ratio);
    this.#longitudes(position.xM, position.yM, fromAxis);
    const perRadius = this.model.gmM3s2 / radius;
    const u = (fromAxis / radius) * ratio;
    return {
      potentialM2s2: perRadius * this.#sumOverOrder(u, this.#c, this.#s),
      radialMs2: (-perRadius / radius) * this.#sumOverOrder(u, this.#cRadial, this.#sRadial),
    };
  }

  /** Many points at one latitude and height, at the cost of one and a sum over order each.
   *  @param fromAxisM distance from the axis of rotation; @param zM above the equator's plane */
  alongParallel(fromAxisM: number, zM: number): ParallelSynthesis {
    const { radius, fromAxis, sine, ratio } = this.#polar({ xM: fromAxisM, yM: 0, zM });
    const c = new Float64Array(this.maxDegree + 1);
    const s = new Float64Array(this.maxDegree + 1);
    this.#sumOverDegree(sine, ratio, c, s);
    const scale = this.model.gmM3s2 / radius;
    const u = (fromAxis / radius) * ratio;
    return {
      potentialM2s2: (longitudeRad) => {
        if (!Number.isFinite(longitudeRad))
          throw new QuantityRangeError('longitudeRad', longitudeRad, 'a finite angle');
        this.#longitudes(Math.cos(longitudeRad), Math.sin(longitudeRad), 1);
        return scale * this.#sumOverOrder(u, c, s);
      },
    };
  }

  #polar({ xM, yM, zM }: GeocentricPosition) {
    const fromAxis = Math.hypot(xM, yM);
    const radius = Math.hypot(fromAxis, zM);
    if (!(radius >= MIN_RADIUS_M && radius < Number.POSITIVE_INFINITY))
      throw new QuantityRangeError('distance from the centre of the Earth', radius, `at least ${MIN_RADIUS_M} m`);
    return { radius, fromAxis, sine: zM / radius, ratio: this.model.radiusM / radius };
  }

  /** Σ_n over degree for every order: b_n = c_n + 2tq·b_{n+1} − q²·β_{n+1}·b_{n+2}, result b_m (p_mm = 1), q = R/r. */
  #sumOverDegree(t: number, q: number, cOut: Float64Array, sOut: Float64Array): void {
    const pairs = this.#pairs;
    const inverse = this.#inverse;
    const last = this.maxDegree;
    const first = 2 * t * q;
    const q2 = q * q;
    let i = 0;
    for (let m = 0; m <= last; m++) {
      const beta = (4 * m * m - 1) * q2;
      let c1 = 0;
      let c2 = 0;
      let s1 = 0;
      let s2 = 0;
      for (let n = last; n >= m; n--) {
        const second = q2 - beta * inverse[n + 1]!;
        const c = first * c1 + (pairs[i]! - second * c2);
        const s = first * s1 + (pairs[i + 1]! - second * s2);
        c2 = c1;
        c1 = c;
        s2 = s1;
        s1 = s;
        i += 2;
      }
      cOut[m] = c1;
      sOut[m] = s1;
    }
  }

  /** The same with, beside it, every term times n + 1: −r·∂/∂r of the series. */
  #sumOverDegreeRadial(t: number, q: number): void {
    const pairs = this.#pairs;
    const inverse = this.#inverse;
    const last = this.maxDegree;
    const first = 2 * t * q;
    const q2 = q * q;
    let i = 0;
    for (let m = 0; m <= last; m++) {
      const beta = (4 * m * m - 1) * q2;
      let c1 = 0;
      let c2 = 0;
      let s1 = 0;
      let s2 = 0;
      let cr1 = 0;
      let cr2 = 0;
      let sr1 = 0;
      let sr2 = 0;
      for (let n = last; n >= m; n--) {
        const second = q2 - beta * inverse[n + 1]!;
        const cosine = pairs[i]!;
        const sine = pairs[i + 1]!;
        const c = first * c1 + (cosine - second * c2);
        const s = first * s1 + (sine - second * s2);
        const cr = first * cr1 + ((n + 1) * cosine - second * cr2);
        const sr = first * sr1 + ((n + 1) * sine - second * sr2);
        c2 = c1;
        c1 = c;
        s2 = s1;
        s1 = s;
        cr2 = cr1;
        cr1 = cr;
        sr2 = sr1;
        sr1 = sr;
        i += 2;
      }
      this.#c[m] = c1;
      this.#s[m] = s1;
      this.#cRadial[m] = cr1;
      this.#sRadial[m] = sr1;
    }
  }

  /** cos mλ and sin mλ by turning: the error grows as m·1e-16, on terms of at most 1e-5 of V. */
  #longitudes(x: number, y: number, fromAxis: number): void {
    const c = fromAxis === 0 ? 1 : x / fromAxis;
    const s = fromAxis === 0 ? 0 : y / fromAxis;
    let cm = 1;
    let sm = 0;
    for (let m = 0; m <= this.maxDegree; m++) {
      this.#cosM[m] = cm;
      this.#sinM[m] = sm;
      const next = cm * c - sm * s;
      sm = sm * c + cm * s;
      cm = next;
    }
  }

  /** Σ_m (u·q)ᵐ·P̄_mm/cosᵐψ·(c·cos mλ + s·sin mλ), u = cos ψ. Towards the poles uᵐ underflows to 0: so do those orders. */
  #sumOverOrder(uq: number, c: Float64Array, s: Float64Array): number {
    let factor = 1 / RECURSION_SCALE;
    let sum = 0;
    for (let m = 0; m <= this.maxDegree; m++) {
      sum += factor * this.#sectorial[m]! * (c[m]! * this.#cosM[m]! + s[m]! * this.#sinM[m]!);
      factor *= uq;
      if (factor === 0) break;
    }
    return sum;
  }
}

function scaledPairs(model: GravityModel, maxDegree: number): Float64Array {
  const pairs = new Float64Array((maxDegree + 1) * (maxDegree + 2));
  const growth = new Float64Array(maxDegree + 1);
  let start = 0;
  for (let m = 0; m <= maxDegree; m++) {
    associatedLegendreGrowth(m, maxDegree, growth);
    let i = start;
    for (let n = maxDegree; n >= m; n--, i += 2) {
      const factor = growth[n]! * RECURSION_SCALE;
      const k = coefficientIndex(n, m);
      pairs[i] = model.cosine[k]! * factor;
      pairs[i + 1] = model.sine[k]! * factor;
    }
    start = i;
  }
  return pairs;
}
