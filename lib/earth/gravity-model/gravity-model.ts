import type { Warning } from '../../campaign/fault.js';
import type { TideSystem } from '../tide-system.js';

/** What the model's standard deviations are: formal ones of the adjustment, calibrated against independent data, or none. */
export type CoefficientErrors = 'calibrated' | 'formal' | 'unknown' | 'no';

/** The Earth's gravitational potential as fully normalised spherical-harmonic coefficients:
 *  V = (GM/r)·Σ_n (R/r)ⁿ·Σ_m P̄_nm(sin ψ)·(C̄_nm·cos mλ + S̄_nm·sin mλ), ψ geocentric (Heiskanen & Moritz 1967, Physical Geodesy, section
 *  2-5, with the normalisation of section 1-14). Coefficients stand by degree: index {@link coefficientIndex}, so a lower degree is a prefix. */
export interface GravityModel {
  readonly name: string;
  /** where it came from, for messages */
  readonly format: 'icgem1.0' | 'icgem2.0';
  /** degree up to which every coefficient was read */
  readonly maxDegree: number;
  /** degree that the file states for itself */
  readonly maxDegreeOfFile: number;
  /** geocentric gravitational constant of the model, m³/s² */
  readonly gmM3s2: number;
  /** reference radius R of the model, m */
  readonly radiusM: number;
  /** permanent-tide system of C̄₂₀; unknown where the file does not say */
  readonly tide: TideSystem | 'unknown';
  readonly errors: CoefficientErrors;
  readonly cosine: Float64Array;
  readonly sine: Float64Array;
  /** standard deviations of the coefficients; null without them. Single precision: they have few digits */
  readonly cosineSigma: Float32Array | null;
  readonly sineSigma: Float32Array | null;
  readonly warnings: readonly Warning[];
}

/** Place of degree n, order m: n(n + 1)/2 + m. */
export const coefficientIndex = (degree: number, order: number): number => (degree * (degree + 1)) / 2 + order;

/** Number of coefficients (of one kind) up to a degree. */
export const coefficientCount = (maxDegree: number): number => coefficientIndex(maxDegree + 1, 0);

/** Highest degree for which the recursions here keep clear of overflow anywhere on Earth: that of Holmes & Featherstone (2002),
 *  J. Geodesy 76:279, section 4. Checked against an independent program at 2190. */
export const MAX_SYNTHESIS_DEGREE = 2700;
