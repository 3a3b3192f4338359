import type { Warning } from '../campaign/fault.js';
import { FREE_AIR_GRADIENT, SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { QuantityRangeError } from '../earth/range-error.js';
import type { Radians } from '../quantity/radians.js';

/** A value with its standard uncertainty, SI; u = 0 is exact. */
export interface Estimate {
  readonly value: number;
  readonly u: number;
}

/** A clock transition as far as an offset in hertz needs it. */
export interface FloorsTransition {
  readonly id: string;
  readonly frequencyHz: Estimate;
}

export interface FloorsInput {
  /** height of the upper floor over the lower, m; −5000…5000, negative counts downward */
  readonly dHM: Estimate;
  /** gravity at the lower floor, m/s²; null: from latitude and height */
  readonly gMs2: Estimate | null;
  /** geodetic latitude; with `gMs2` stated it only checks that value */
  readonly latitudeRad: Radians | null;
  /** height of the lower floor over the ellipsoid or the sea, m: 50 m between the two are 1.5e-4 m/s² */
  readonly heightM: Estimate | null;
  /** decrease of gravity with height, s⁻²; null: 3.086e-6 with u = 10 % */
  readonly gradientPerS2: Estimate | null;
  readonly transitions: readonly FloorsTransition[];
  /** measured offset of the upper clock seen from the lower, every correction applied except gravity's */
  readonly measuredY: Estimate | null;
}

export type FloorsVerdict = 'agree' | 'differ' | 'inconclusive';

/** A single mistake whose size and sign would explain a measurement that differs. */
export type FloorsHint = 'sign-turned' | 'gravity-already-removed';

export interface FloorsMeasured {
  readonly y: Estimate;
  /** measured minus predicted */
  readonly difference: Estimate;
  /** difference over its standard uncertainty; null where both are exact */
  readonly z: number | null;
  /** the smallest discrepancy that would have shown (test size 5 %, power 80 %) */
  readonly smallestDetectable: number;
  readonly verdict: FloorsVerdict;
  readonly hint: FloorsHint | null;
}

export interface FloorsBudgetRow {
  readonly input: 'dH' | 'g' | 'height' | 'gradient';
  readonly value: number;
  readonly u: number;
  /** ∂y/∂input, per SI unit */
  readonly sensitivity: number;
  readonly uy: number;
  /** uy² over u²(y); the inputs are independent, so shares are positive and add up to 1 */
  readonly share: number;
}

export interface FloorsAnswer {
  readonly format: 'plumbtick-floors/1';
  /** W(lower) − W(upper), m²/s² */
  readonly dW: Estimate;
  /** fractional frequency offset of the upper clock seen from the lower, dW/c² */
  readonly y: Estimate;
  /** dW over the mean gravity of the two floors, m: returns the height difference put in */
  readonly dH: Estimate;
  /** what to add to the upper clock's fractional frequency to compare it with the lower: −y */
  readonly correction: Estimate;
  /** per transition asked for, Hz */
  readonly offsetHz: Readonly<Record<string, Estimate>>;
  readonly g: Estimate & { readonly from: 'stated' | 'normal-field' };
  readonly gradient: Estimate & { readonly from: 'stated' | 'default' };
  /** dW = linear + quadratic, m²/s² */
  readonly terms: { readonly linear: number; readonly quadratic: number };
  readonly budget: readonly FloorsBudgetRow[];
  readonly measured: FloorsMeasured | null;
  readonly warnings: readonly Warning[];
}

export const FLOORS_MAX_HEIGHT_DIFFERENCE_M = 5000;
export const GRAVITY_RANGE_MS2 = [9.7, 9.9] as const;

/** Beyond this a free-air gradient may be wrong by the rock or the building round the shaft. */
const LONG_TIE_M = 50;
/** 4πGρ at ρ ≈ 2670 kg/m³: by so much the gradient inside rock is smaller than in free air. */
const ROCK_GRADIENT_PER_S2 = 2.2e-6;
/** Gravity on the ground differs from the normal field by more than this nowhere but in the largest anomalies. */
const LARGE_GRAVITY_DISTURBANCE_MS2 = 3e-3;
/** z(0.975) + z(0.80) of the normal distribution: test size 5 %, power 80 %. */
const DETECTABLE_OVER_U = 2.801585;

/** The inter-floor check: potential difference, frequency offset and what they are made of, for two floors of a house.
 *
 *  W(upper) = W(lower) − (g·Δ − ½·Γ·Δ²), g at the lower floor, Γ the decrease of g with height; y = dW/c², positive for
 *  an upper clock that is higher. First order in 1/c². Neglected: the third-order term, 3e-5 m²/s² (3e-22) at 500 m.
 *  Standard uncertainties by the law of propagation for independent inputs (JCGM 100, 5.1.2).
 * @throws {QuantityRangeError} `out-of-range` for a number that isn't finite, a negative u, |Δ| > 5 km, g outside 9.7…9.9
 * @throws {TypeError} where neither g nor latitude with height is given */
export function floors(input: FloorsInput): FloorsAnswer {
  const { dHM, transitions, measuredY } = input;
  checkEstimate('dHM', dHM, -FLOORS_MAX_HEIGHT_DIFFERENCE_M, FLOORS_MAX_HEIGHT_DIFFERENCE_M);
  const gravity = gravityAtLowerFloor(input);
  const gradient = gradientOf(input);
  const delta = dHM.value;
  const c2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

  const linear = gravity.value * delta;
  const quadratic = -0.5 * gradient.value * delta * delta;
  const dW = linear + quadratic;
  const y = dW / c2;

  // ∂dW/∂x of dW = g·Δ − ½·Γ·Δ²
  const inputs = [
    ['dH', dHM, gravity.value - gradient.value * delta],
    ['g', { value: gravity.value, u: gravity.ownU }, delta],
    ['height', input.heightM ?? { value: 0, u: 0 }, gravity.perHeightPerS2 * delta],
    ['gradient', gradient, -0.5 * delta * delta],
  ] as const;
  const rows = inputs.map(([name, { value, u }, perSi]) => {
    const sensitivity = perSi / c2;
    return { input: name, value, u, sensitivity, uy: Math.abs(sensitivity) * u };
  });
  const uy = Math.hypot(...rows.map((row) => row.uy));
  const budget = rows
    .filter((row) => row.uy > 1e-12 * uy)
    .map((row) => ({ ...row, share: (row.uy / uy) ** 2 }))
    .sort((a, b) => b.share - a.share);

  const offsetHz: Record<string, Estimate> = {};
  for (const { id, frequencyHz } of transitions)
    offsetHz[id] = { value: y * frequencyHz.value, u: Math.hypot(uy * frequencyHz.value, y * frequencyHz.u) };

  return {
    format: 'plumbtick-floors/1',
    dW: { value: dW, u: uy * c2 },
    y: { value: y, u: uy },
    // ḡ = g − ½·Γ·Δ, so dW/ḡ = Δ with exactly its uncertainty: g and Γ enter numerator and denominator alike
    dH: { value: delta, u: dHM.u },
    correction: { value: y === 0 ? 0 : -y, u: uy },
    offsetHz,
    g: { value: gravity.value, u: gravity.u, from: gravity.from },
    gradient: { value: gradient.value, u: gradient.u, from: input.gradientPerS2 ? 'stated' : 'default' },
    terms: { linear, quadratic: quadratic === 0 ? 0 : quadratic },
    budget,
    measured: measuredY ? compare(measuredY, { value: y, u: uy }) : null,
    warnings: warningsOf(input, gravity),
  };
}

interface Gravity extends Estimate {
  readonly from: 'stated' | 'normal-field';
  /** the part of u that isn't the stated height's */
  readonly ownU: number;
  /** ∂g/∂height where g follows from the height, else 0 */
  readonly perHeightPerS2: number;
  /** γ(φ, h) where the place is known */
  readonly normalMs2: number | null;
}

/** g as stated; else γ(φ, h) of GRS80 with u = 5e-4 m/s² + 5e-7 s⁻²·|h|, the scatter of gravity round the normal field. */
function gravityAtLowerFloor({ gMs2, latitudeRad, heightM }: FloorsInput): Gravity {
  if (heightM) checkEstimate('heightM', heightM, -12_000, 9_000);
  const normalMs2 = latitudeRad !== null && heightM ? normalGravity(GRS80, latitudeRad, heightM.value) : null;
  if (gMs2) {
    checkEstimate('gMs2', gMs2, ...GRAVITY_RANGE_MS2);
    return { ...gMs2, from: 'stated', ownU: gMs2.u, perHeightPerS2: 0, normalMs2 };
  }
  if (normalMs2 === null || !heightM) throw new TypeError('floors: neither g nor latitude with height is given');
  const ownU = 5e-4 + 5e-7 * Math.abs(heightM.value);
  const perHeightPerS2 = -FREE_AIR_GRADIENT.value;
  const u = Math.hypot(ownU, perHeightPerS2 * heightM.u);
  return { value: normalMs2, u, from: 'normal-field', ownU, perHeightPerS2, normalMs2 };
}

function gradientOf({ gradientPerS2 }: FloorsInput): Estimate {
  if (!gradientPerS2) return { value: FREE_AIR_GRADIENT.value, u: FREE_AIR_GRADIENT.standardUncertainty };
  checkEstimate('gradientPerS2', gradientPerS2, -1e-4, 1e-4);
  return gradientPerS2;
}

/** Differ when |z| > 2 (VIM 2.47, coverage factor 2). Otherwise the comparison must at least have been able to tell the
 *  whole offset from none, else it says nothing: inconclusive. */
function compare(measured: Estimate, predicted: Estimate): FloorsMeasured {
  checkEstimate('measuredY', measured, -1e-10, 1e-10);
  const value = measured.value - predicted.value;
  const u = Math.hypot(measured.u, predicted.u);
  const smallestDetectable = DETECTABLE_OVER_U * u;
  const beyond = (discrepancy: number) => Math.abs(discrepancy) > 2 * u;
  const verdict = beyond(value) ? 'differ' : smallestDetectable > Math.abs(predicted.value) ? 'inconclusive' : 'agree';
  let hint: FloorsHint | null = null;
  if (verdict === 'differ' && smallestDetectable < Math.abs(predicted.value)) {
    if (!beyond(measured.value + predicted.value)) hint = 'sign-turned';
    else if (!beyond(measured.value)) hint = 'gravity-already-removed';
  }
  const z = u > 0 ? value / u : value === 0 ? 0 : null;
  return { y: measured, difference: { value, u }, z, smallestDetectable, verdict, hint };
}

function warningsOf(input: FloorsInput, gravity: Gravity): Warning[] {
  const c2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
  const delta = Math.abs(input.dHM.value);
  /** a potential as y and as length equivalent, two digits */
  const size = (m2s2: number) => `${exponent(m2s2 / c2)}, ${exponent((1000 * m2s2) / gravity.value)} mm`;
  const warnings: Warning[] = [];
  if (gravity.from === 'normal-field')
    warnings.push({
      code: 'default-gravity',
      path: 'g',
      message: `g is normal gravity at this latitude and height with u = ${exponent(gravity.u)} m/s²: ${size(gravity.u * delta)} in the answer. A measured g takes this away.`,
    });
  else if (gravity.normalMs2 !== null && Math.abs(gravity.value - gravity.normalMs2) > LARGE_GRAVITY_DISTURBANCE_MS2)
    warnings.push({
      code: 'gravity-unlike-place',
      path: 'g',
      message: `g is ${exponent(Math.abs(gravity.value - gravity.normalMs2))} m/s² away from normal gravity at this latitude and height, ${gravity.normalMs2.toFixed(4)} m/s²: ${size(Math.abs(gravity.value - gravity.normalMs2) * delta)}. One of the three may be mistyped.`,
    });
  if (input.gradientPerS2 === null && delta > LONG_TIE_M)
    warnings.push({
      code: 'default-gradient',
      path: 'gradient',
      message: `Over ${LONG_TIE_M} m the free-air gradient may be wrong by the rock round a shaft, up to ½·2.2e-6 s⁻²·Δ²: ${size(0.5 * ROCK_GRADIENT_PER_S2 * delta * delta)}. A measured gradient takes this away.`,
    });
  const gradient = input.gradientPerS2?.value;
  if (gradient !== undefined && !(gradient >= 0 && gradient <= 6e-6))
    warnings.push({
      code: 'gradient-unusual',
      path: 'gradient',
      message: `The gradient is the decrease of g with height, 3.086e-6 s⁻² in free air and positive nearly everywhere; ${exponent(gradient)} s⁻² differs from it by ${size(0.5 * Math.abs(gradient - FREE_AIR_GRADIENT.value) * delta * delta)} here.`,
    });
  if (input.dHM.u === 0 && delta > 0)
    warnings.push({
      code: 'exact-height',
      path: 'dH',
      message: `The height difference has no uncertainty and is taken as exact; each millimetre is ${exponent((1e-3 * gravity.value) / c2)}.`,
    });
  return warnings;
}

/** Two significant digits: `1.1e-19`, `0.014`, `27`. */
function exponent(value: number): string {
  const magnitude = Math.abs(value);
  const text = magnitude >= 1e-3 && magnitude < 1e4 ? String(Number(value.toPrecision(2))) : value.toExponential(1);
  return text.replace('e+', 'e').replace(/^-/, '\u2212');
}

function checkEstimate(name: string, { value, u }: Estimate, low: number, high: number): void {
  if (!(value >= low && value <= high)) throw new QuantityRangeError(name, value, `${low} … ${high}`);
  if (!(u >= 0 && u < Number.POSITIVE_INFINITY)) throw new QuantityRangeError(`${name}.u`, u, 'zero or positive');
}
