import { identifyNoise, type NoiseIdentification } from '../noise-identification.js';
import { deviationInterval } from './confidence-interval.js';
import { allanVariance, hadamardVariance, type VarianceEstimate } from './difference-variance.js';
import {
  type DifferenceEstimator,
  equivalentDegreesOfFreedom,
  type NoiseExponent,
  pooledDegreesOfFreedom,
  totalVarianceDegreesOfFreedom,
} from './equivalent-degrees-of-freedom.js';
import { modifiedAllanVariance } from './modified-allan-variance.js';
import type { PhaseRecord } from './phase-record.js';
import { totalVariance } from './total-variance.js';

/** Allan, overlapping Allan, modified Allan, time, Hadamard, overlapping Hadamard and total deviation. */
export const DEVIATION_KINDS = ['adev', 'oadev', 'mdev', 'tdev', 'hdev', 'ohdev', 'totdev'] as const;

export type DeviationKind = (typeof DEVIATION_KINDS)[number];

export interface Deviation {
  readonly kind: DeviationKind;
  readonly tauS: number;
  readonly averagingFactor: number;
  /** fractional frequency, dimensionless; for `tdev` a time in s */
  readonly value: number;
  /** ends of the 68.3 % interval, same unit */
  readonly lo: number;
  readonly hi: number;
  /** terms in the average (squared differences) */
  readonly n: number;
  readonly edf: number;
  /** noise exponent the interval rests on */
  readonly alpha: NoiseExponent;
  /** the record has gaps: only terms without one are in `n` */
  readonly gapped: boolean;
}

interface Recipe {
  readonly estimate: (record: PhaseRecord, m: number) => VarianceEstimate | null;
  /** null: total variance */
  readonly edf: DifferenceEstimator | null;
  /** lowest noise exponent for which the variance converges */
  readonly lowest: NoiseExponent;
}

const ALLAN = { order: 2, modified: false } as const;
const HADAMARD = { order: 3, modified: false } as const;
const MODIFIED: Recipe = {
  estimate: modifiedAllanVariance,
  edf: { order: 2, modified: true, overlapping: true },
  lowest: -2,
};

const RECIPES: Readonly<Record<DeviationKind, Recipe>> = {
  adev: { estimate: (r, m) => allanVariance(r, m, 'tau'), edf: { ...ALLAN, overlapping: false }, lowest: -2 },
  oadev: { estimate: (r, m) => allanVariance(r, m, 'sample'), edf: { ...ALLAN, overlapping: true }, lowest: -2 },
  mdev: MODIFIED,
  tdev: MODIFIED,
  hdev: { estimate: (r, m) => hadamardVariance(r, m, 'tau'), edf: { ...HADAMARD, overlapping: false }, lowest: -4 },
  ohdev: { estimate: (r, m) => hadamardVariance(r, m, 'sample'), edf: { ...HADAMARD, overlapping: true }, lowest: -4 },
  totdev: { estimate: totalVariance, edf: null, lowest: -2 },
};

function degreesOfFreedom(recipe: Recipe, alpha: NoiseExponent, m: number, estimate: VarianceEstimate): number {
  const byPoints = new Map<number, number>();
  return pooledDegreesOfFreedom(
    estimate.byRun.map(({ points, terms }) => {
      let edf = byPoints.get(points);
      if (edf === undefined) {
        edf = recipe.edf
          ? equivalentDegreesOfFreedom(recipe.edf, alpha, points, m)
          : totalVarianceDegreesOfFreedom(alpha, points, m);
        byPoints.set(points, edf);
      }
      return { terms, edf };
    }),
  );
}

/** 1, 2, 4 … up to the longest averaging factor for which the record holds a term of any kind. */
export function octaveFactors(record: PhaseRecord): number[] {
  let longest = 0;
  for (const run of record.runs) longest = Math.max(longest, run.count - 1);
  const factors: number[] = [];
  for (let m = 1; 2 * m <= longest; m *= 2) factors.push(m);
  return factors;
}

/** The noise at each averaging factor; where there are too few averages to tell, what was told at the next shorter one.
 *  With too few even at the first, white frequency noise is assumed and `identified` is null. */
export function noiseByFactor(
  record: PhaseRecord,
  factors: readonly number[],
): Map<number, { alpha: NoiseExponent; identified: NoiseIdentification | null }> {
  const found = new Map<number, { alpha: NoiseExponent; identified: NoiseIdentification | null }>();
  const first = identifyNoise(record, 1);
  let alpha: NoiseExponent = first?.alpha ?? 0;
  for (const m of [...factors].sort((a, b) => a - b)) {
    const identified = m === 1 ? first : identifyNoise(record, m);
    if (identified) alpha = identified.alpha;
    found.set(m, { alpha, identified });
  }
  return found;
}

/** Every asked-for deviation at every averaging factor, with its 68.3 % interval.
 *  Gaps: nothing is interpolated, and phase is not carried over a gap. A term counts only if all samples in it follow each other,
 *  so the estimate stays free of bias for every noise while `n` falls and long τ drop out; `gapped` marks such results.
 * @param record phase in sampling intervals
 * @param tau0S sampling interval [s]
 * @param factors averaging factors, whole, ≥ 1
 * @param kinds which deviations
 * @returns sorted by kind as asked, then τ; a factor for which the record holds no term is left out */
export function deviationsAt(
  record: PhaseRecord,
  tau0S: number,
  factors: readonly number[],
  kinds: readonly DeviationKind[] = DEVIATION_KINDS,
): Deviation[] {
  const noise = noiseByFactor(record, factors);
  const gapped = record.runs.length > 1;
  const estimates = new Map<string, VarianceEstimate | null>();
  const rows: Deviation[] = [];
  for (const kind of kinds) {
    const recipe = RECIPES[kind];
    for (const [m, { alpha }] of noise) {
      const key = recipe === MODIFIED ? `modified ${m}` : `${kind} ${m}`;
      let estimate = estimates.get(key);
      if (estimate === undefined) {
        estimate = recipe.estimate(record, m);
        estimates.set(key, estimate);
      }
      if (!estimate) continue;
      const used = Math.max(alpha, recipe.lowest) as NoiseExponent;
      const edf = degreesOfFreedom(recipe, used, m, estimate);
      const tauS = m * tau0S;
      // TDEV = τ·MDEV/√3 (NIST SP 1065, section 5.2.6).
      const scale = kind === 'tdev' ? tauS / Math.sqrt(3) : 1;
      const value = Math.sqrt(estimate.variance) * scale;
      const { lo, hi } = deviationInterval(value, edf);
      rows.push({ kind, tauS, averagingFactor: m, value, lo, hi, n: estimate.terms, edf, alpha: used, gapped });
    }
  }
  return rows;
}
