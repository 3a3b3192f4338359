import { J2000_MS } from './sun-and-moon.js';

/** The six slow angles from which every tidal frequency is built, degrees, not reduced to one turn. */
export interface FundamentalArguments {
  /** mean lunar time at Greenwich τ = 15°·t − s + h, t hours of UT since midnight */
  readonly tau: number;
  /** mean longitude of the Moon */
  readonly s: number;
  /** mean longitude of the Sun */
  readonly h: number;
  /** longitude of the lunar perigee */
  readonly p: number;
  /** longitude of the Moon's ascending node N (Doodson's N′ is −N) */
  readonly node: number;
  /** longitude of the solar perigee */
  readonly ps: number;
}

/** Mean longitudes: Meeus (1998), Astronomical Algorithms, chapters 22, 25, 47 (after Chapront-Touzé & Chapront 1988 and Simon
 *  et al. 1994). UTC stands for UT1 and TT: 0.01° in s.
 * @param timeMs UTC, milliseconds since 1970 */
export function fundamentalArguments(timeMs: number): FundamentalArguments {
  const t = (timeMs - J2000_MS) / (86_400_000 * 36_525);
  const s = 218.3164477 + t * (481_267.88123421 + t * (-0.0015786 + t / 538_841));
  const h = 280.46646 + t * (36_000.76983 + t * 0.0003032);
  const p = 83.3532465 + t * (4_069.0137287 + t * (-0.01032 - t / 80_053));
  const node = 125.04452 + t * (-1_934.136261 + t * 0.0020708);
  const ps = 282.93735 + t * 1.7195269;
  const dayFraction = timeMs / 86_400_000 - Math.floor(timeMs / 86_400_000);
  return { tau: 360 * dayFraction - s + h, s, h, p, node, ps };
}

/** The eleven constituents for which ocean loading is tabulated. */
export const CONSTITUENT_NAMES = ['M2', 'S2', 'N2', 'K2', 'K1', 'O1', 'P1', 'Q1', 'Mf', 'Mm', 'Ssa'] as const;
export type ConstituentName = (typeof CONSTITUENT_NAMES)[number];

interface Constituent {
  /** multiples of τ, s, h, p */
  readonly doodson: readonly [number, number, number, number];
  /** degrees, added: makes the equilibrium tide positive at Greenwich for argument 0 */
  readonly phase: number;
  /** nodal factor f = f0 + f1·cos N */
  readonly f: readonly [number, number];
  /** nodal angle u = u1·sin N, degrees */
  readonly u: number;
}

/** Doodson numbers, phases (Schwiderski 1980; IERS Conventions 2010 (TN 36), section 7.1.2) and nodal factors (Pugh 1987, Tides,
 *  Surges and Mean Sea-Level, table 4:3; from memory). Tested against the tide-generating potential of the ephemeris. */
const CONSTITUENTS: Readonly<Record<ConstituentName, Constituent>> = {
  M2: { doodson: [2, 0, 0, 0], phase: 0, f: [1, -0.037], u: -2.1 },
  S2: { doodson: [2, 2, -2, 0], phase: 0, f: [1, 0], u: 0 },
  N2: { doodson: [2, -1, 0, 1], phase: 0, f: [1, -0.037], u: -2.1 },
  K2: { doodson: [2, 2, 0, 0], phase: 0, f: [1.024, 0.286], u: -17.7 },
  K1: { doodson: [1, 1, 0, 0], phase: 90, f: [1.006, 0.115], u: -8.9 },
  O1: { doodson: [1, -1, 0, 0], phase: -90, f: [1.009, 0.187], u: 10.8 },
  P1: { doodson: [1, 1, -2, 0], phase: -90, f: [1, 0], u: 0 },
  Q1: { doodson: [1, -2, 0, 1], phase: -90, f: [1.009, 0.187], u: 10.8 },
  Mf: { doodson: [0, 2, 0, 0], phase: 0, f: [1.043, 0.414], u: -23.7 },
  Mm: { doodson: [0, 1, 0, -1], phase: 0, f: [1, -0.13], u: 0 },
  Ssa: { doodson: [0, 0, 2, 0], phase: 0, f: [1, 0], u: 0 },
};

/** Argument at Greenwich V + u, rad, and nodal factor f of a constituent. The tide is f·A·cos(V + u − G), G the phase lag. */
export function constituentAt(
  name: ConstituentName,
  at: FundamentalArguments,
): { readonly argumentRad: number; readonly factor: number } {
  const { doodson, phase, f, u } = CONSTITUENTS[name];
  const node = (at.node * Math.PI) / 180;
  const degrees =
    doodson[0] * at.tau + doodson[1] * at.s + doodson[2] * at.h + doodson[3] * at.p + phase + u * Math.sin(node);
  return { argumentRad: ((degrees % 360) * Math.PI) / 180, factor: f[0] + f[1] * Math.cos(node) };
}

/** The constituent a text names (`m2`, `MF`, `SSA`), or null. */
export function readConstituent(text: string): ConstituentName | null {
  const wanted = text.trim().toUpperCase();
  return CONSTITUENT_NAMES.find((name) => name.toUpperCase() === wanted) ?? null;
}
