import { formatDuration } from '../quantity/index.js';
import { chiSquareUpperTail, studentTCdf } from '../uncertainty/distributions/index.js';
import { type Deviation, deviationsAt, octaveFactors, type PhaseRecord } from './deviations/index.js';
import { identifyNoise, NOISE_NAMES, type NoiseIdentification } from './noise-identification.js';

/** How the statistical uncertainty of a mean was come by. */
export type MeanBasis =
  /** σ_y(τ)·√(τ/T): the noise averages down */
  | 'white-extrapolation'
  /** σ_y at the longest τ that is known well enough: the noise does not average down any more */
  | 'longest-trusted-tau'
  /** random walk: σ_y at the longest trusted τ, carried up to T; a longer mean is a worse one */
  | 'not-averageable'
  /** scatter of the samples about the mean: too few of them follow each other for a deviation */
  | 'scatter'
  /** a single sample */
  | 'none';

export interface MeanUncertainty {
  /** standard uncertainty of the mean by noise alone; null for a single sample */
  readonly u: number | null;
  readonly basis: MeanBasis;
  /** the deviation it rests on; null where none could be had */
  readonly deviation: Deviation | null;
  /** the noise named for the whole record: at the longest τ that still gives 128 averages; null with fewer than 30 samples */
  readonly noise: NoiseIdentification | null;
  /** for `longest-trusted-tau`: probability that the mean of the next equal stretch lies within ±u and within ±√2·u of this one */
  readonly nextMean: { readonly withinU: number; readonly withinRoot2U: number } | null;
  /** the choice in words, for the reader of the result */
  readonly words: string;
}

/** Averages for which the noise is named rightly in ≥ 97 of 100 pure cases (white, flicker, random walk; simulated). */
const AVERAGES_FOR_A_NAME = 128;

/** Degrees of freedom from which a deviation is trusted: below ten its 68 % interval is wider than −19 %, +31 %. */
const TRUSTED_EDF = 10;

/** Probability below which a long-τ deviation above the white line is not taken for chance. */
const DOUBT = 1e-3;

/** The noise of a record, named where it matters for the mean: at the longest octave τ with enough averages to tell. If that is
 *  phase noise, its kind is taken from the sampling interval, since averaging blurs white into flicker phase noise. */
export function dominantNoise(record: PhaseRecord): NoiseIdentification | null {
  const first = identifyNoise(record, 1);
  let found = first;
  for (const m of octaveFactors(record)) {
    const at = m === 1 ? first : identifyNoise(record, m);
    if (!at || at.averages < AVERAGES_FOR_A_NAME) break;
    found = at;
  }
  return found && first && found.alpha > 0 && first.alpha > 0 ? { ...found, alpha: first.alpha } : found;
}

const percent = (x: number): string => `${(100 * x).toFixed(0)} %`;
const sci = (x: number): string => x.toExponential(1);
const seconds = (s: number): string => `${Number(s.toPrecision(6))} s`;

/** Standard uncertainty of the mean of a record, by its own noise alone.
 *  White FM (and phase noise, for which this is too large rather than too small): σ_y(τ)·√(τ/T), τ the longest with 128 averages,
 *  unless a deviation at longer τ lies above that line beyond chance (χ², p < 0.001). Flicker FM, or white with such an excess: σ_y
 *  at the longest τ with ten degrees of freedom. For flicker the means of two neighbouring stretches differ by √2·σ_y
 *  (definition of the Allan variance, flat in τ), so the next mean lies within ±u of this one with the probability that Student's t
 *  on the deviation's ν degrees of freedom is within ±1/√2 (51 % for ν = 17), and within ±√2·u with that of ±1 (67 %). Random walk and
 *  redder: σ_y at the longest trusted τ times √(T/τ), and flagged: no mean exists that more data would improve.
 * @param record phase in sampling intervals
 * @param tau0S sampling interval [s]
 * @param totalS valid time T behind the mean, gaps left out [s]
 * @param scatter standard uncertainty of the mean by the scatter of the samples, used where no two samples follow each other
 * @see Riley (2008), NIST SP 1065, sections 5.4, 5.5; the choice between the rules is this library's own */
export function meanUncertainty(
  record: PhaseRecord,
  tau0S: number,
  totalS: number,
  scatter: number | null,
): MeanUncertainty {
  const table = deviationsAt(record, tau0S, octaveFactors(record), ['oadev']);
  const first = table[0];
  if (first === undefined) {
    return scatter === null
      ? {
          u: null,
          basis: 'none',
          deviation: null,
          noise: null,
          nextMean: null,
          words: 'a single sample: its noise cannot be told from it',
        }
      : {
          u: scatter,
          basis: 'scatter',
          deviation: null,
          noise: null,
          nextMean: null,
          words: 'no two samples follow each other: scatter of the samples over √N, which supposes white noise',
        };
  }
  const noise = dominantNoise(record);
  const reference = table.find((d) => d.averagingFactor === (noise?.averagingFactor ?? 1)) ?? first;
  const trusted = table.filter((d) => d.edf >= TRUSTED_EDF).at(-1) ?? first;
  const T = formatDuration(totalS);
  if (noise !== null && noise.alpha <= -2) {
    const u = trusted.value * Math.sqrt(totalS / trusted.tauS);
    const words = `${NOISE_NAMES[noise.alpha]}: not averageable; ${sci(trusted.value)} at ${seconds(trusted.tauS)} grows as √T to ${sci(u)} over ${T}, and more data make it no smaller`;
    return { u, basis: 'not-averageable', deviation: trusted, noise, nextMean: null, words };
  }
  const whiteVariance = reference.value ** 2 * reference.tauS;
  const excess = table
    .filter((d) => d.tauS > reference.tauS && d.edf >= 4)
    .filter((d) => chiSquareUpperTail((d.edf * d.value ** 2 * d.tauS) / whiteVariance, d.edf) < DOUBT)
    .at(-1);
  if ((noise !== null && noise.alpha === -1) || excess !== undefined) {
    const deviation = excess !== undefined && excess.tauS > trusted.tauS ? excess : trusted;
    const why =
      noise?.alpha === -1
        ? `${NOISE_NAMES[-1]} at ${seconds(reference.tauS)}`
        : `${seconds(excess!.tauS)} lies above the white line from ${seconds(reference.tauS)} beyond chance`;
    const within = (t: number): number => 1 - 2 * studentTCdf(-t, deviation.edf);
    const nextMean = { withinU: within(Math.SQRT1_2), withinRoot2U: within(1) };
    const words = `${why}: the deviation at the longest trusted τ, ${sci(deviation.value)} at ${seconds(deviation.tauS)}, not extrapolated; the mean of the next ${T} is expected within ±u in ${percent(nextMean.withinU)} and within ±√2·u in ${percent(nextMean.withinRoot2U)} of cases`;
    return { u: deviation.value, basis: 'longest-trusted-tau', deviation, noise, nextMean, words };
  }
  const u = reference.value * Math.sqrt(reference.tauS / totalS);
  const name = noise === null ? 'white FM assumed, fewer than 30 samples' : NOISE_NAMES[noise.alpha];
  const careful = noise !== null && noise.alpha > 0 ? '; phase noise falls faster, so this is an upper estimate' : '';
  const words = `${name} at ${seconds(reference.tauS)}: ${sci(reference.value)} there falls as 1/√T to ${sci(u)} over ${T}${careful}`;
  return { u, basis: 'white-extrapolation', deviation: reference, noise, nextMean: null, words };
}
