import type { GeocentricPosition } from '../geocentric.js';

/** A similarity transformation between two terrestrial frames whose seven parameters move linearly in time, in the units in
 *  which the IERS prints them. X₂ = X₁ + T + D·X₁ + R·X₁ with R = [[0, −R₃, R₂], [R₃, 0, −R₁], [−R₂, R₁, 0]]
 *  (IERS Conventions 2010, TN 36, eq. 4.3: the "position vector" sense of rotation). */
export interface FourteenParameters {
  /** decimal year at which the constant parts hold */
  readonly epochYear: number;
  /** T₁, T₂, T₃ in mm and their rates in mm/a */
  readonly translationMm: readonly [number, number, number];
  readonly translationRateMmPerYear: readonly [number, number, number];
  /** D in 1e-9 and its rate in 1e-9/a */
  readonly scalePpb: number;
  readonly scaleRatePpbPerYear: number;
  /** R₁, R₂, R₃ in milliarcseconds and their rates in mas/a */
  readonly rotationMas: readonly [number, number, number];
  readonly rotationRateMasPerYear: readonly [number, number, number];
}

/** The seven parameters at one epoch in SI: m, 1, rad. */
interface SevenParameters {
  readonly t: readonly [number, number, number];
  readonly d: number;
  readonly r: readonly [number, number, number];
}

export type Vector = readonly [number, number, number];

const MAS_TO_RAD = Math.PI / (180 * 3600 * 1000);

function parametersAt(p: FourteenParameters, epochYear: number): SevenParameters {
  const years = epochYear - p.epochYear;
  const at = (value: number, rate: number, unit: number) => (value + rate * years) * unit;
  const vector = (values: Vector, rates: Vector, unit: number): Vector => [
    at(values[0], rates[0], unit),
    at(values[1], rates[1], unit),
    at(values[2], rates[2], unit),
  ];
  return {
    t: vector(p.translationMm, p.translationRateMmPerYear, 1e-3),
    d: at(p.scalePpb, p.scaleRatePpbPerYear, 1e-9),
    r: vector(p.rotationMas, p.rotationRateMasPerYear, MAS_TO_RAD),
  };
}

const cross = (a: Vector, b: Vector): Vector => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];

const toVector = (p: GeocentricPosition): Vector => [p.xM, p.yM, p.zM];
const toPosition = (v: Vector): GeocentricPosition => ({ xM: v[0], yM: v[1], zM: v[2] });

/** T + D·x + R × x: what the transformation adds, or what its rates add per year. */
const displacement = ({ t, d, r }: SevenParameters, x: Vector): Vector => {
  const turned = cross(r, x);
  return [t[0] + d * x[0] + turned[0], t[1] + d * x[1] + turned[1], t[2] + d * x[2] + turned[2]];
};

/** Position in the second frame from that in the first, both at `epochYear`. */
export function transformForward(
  p: FourteenParameters,
  position: GeocentricPosition,
  epochYear: number,
): GeocentricPosition {
  const x = toVector(position);
  const dx = displacement(parametersAt(p, epochYear), x);
  return toPosition([x[0] + dx[0], x[1] + dx[1], x[2] + dx[2]]);
}

/** Position in the first frame from that in the second: the inverse of {@link transformForward} to a nanometre.
 *  Changing the signs of the parameters instead leaves up to 0.1 µm (a rotation of 16 mas squared). */
export function transformBackward(
  p: FourteenParameters,
  position: GeocentricPosition,
  epochYear: number,
): GeocentricPosition {
  const parameters = parametersAt(p, epochYear);
  const target = toVector(position);
  let x = target;
  // the map x ↦ target − displacement(x) contracts by 1e-7 a turn
  for (let i = 0; i < 3; i++) {
    const dx = displacement(parameters, x);
    x = [target[0] - dx[0], target[1] - dx[1], target[2] - dx[2]];
  }
  return toPosition(x);
}

/** What the rates of the parameters add to a velocity, m/a: dX₂/dt − dX₁/dt at a given position. The products of the
 *  parameters with the velocity itself are left out: 1e-7 of it. */
export function velocityChangeMPerYear(p: FourteenParameters, position: GeocentricPosition): Vector {
  const rates: SevenParameters = {
    t: [
      p.translationRateMmPerYear[0] * 1e-3,
      p.translationRateMmPerYear[1] * 1e-3,
      p.translationRateMmPerYear[2] * 1e-3,
    ],
    d: p.scaleRatePpbPerYear * 1e-9,
    r: [
      p.rotationRateMasPerYear[0] * MAS_TO_RAD,
      p.rotationRateMasPerYear[1] * MAS_TO_RAD,
      p.rotationRateMasPerYear[2] * MAS_TO_RAD,
    ],
  };
  return displacement(rates, toVector(position));
}
