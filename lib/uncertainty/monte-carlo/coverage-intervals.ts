import { DomainError } from '../distributions/domain-error.js';

/** A coverage interval. */
export interface TrialInterval {
  readonly low: number;
  readonly high: number;
}

/** Ranks, from 0, of the ends of the probabilistically symmetric interval of M sorted trials: JCGM 101:2008, 7.7.2.
 *  `span` is q, the number of trials from one end to the other. */
export function symmetricRanks(trials: number, probability: number): { low: number; high: number; span: number } {
  if (!(probability > 0 && probability < 1)) throw new DomainError('coverage', probability, 'a number between 0 and 1');
  const product = probability * trials;
  // 0.95·10⁶ is a whole number although its product in binary may miss it by a rounding
  const span = Math.abs(product - Math.round(product)) < 1e-6 ? Math.round(product) : Math.floor(product + 0.5);
  const half = (trials - span) / 2;
  const r = Number.isInteger(half) ? half : Math.floor((trials - span + 1) / 2);
  return { low: Math.max(0, r - 1), high: Math.min(trials - 1, Math.max(0, r - 1) + span), span };
}

/** Sorted trials of which only the two ends may be known: rank → value, for the lowest and the highest ranks. */
export interface SortedEnds {
  readonly trials: number;
  /** the lowest trials, rising; at least (1 − p)·M + 1 of them */
  readonly lowest: Float64Array;
  /** the highest trials, rising; as many */
  readonly highest: Float64Array;
}

const atRank = ({ trials, lowest, highest }: SortedEnds, rank: number): number =>
  rank < lowest.length ? lowest[rank]! : highest[rank - (trials - highest.length)]!;

/** Probabilistically symmetric coverage interval (JCGM 101:2008, 7.7.2). */
export function symmetricInterval(ends: SortedEnds, probability: number): TrialInterval {
  const { low, high } = symmetricRanks(ends.trials, probability);
  return { low: atRank(ends, low), high: atRank(ends, high) };
}

/** Shortest coverage interval (JCGM 101:2008, 7.7.4; 5.3.4): of a run of equally short ones the middle one is taken. */
export function shortestInterval(ends: SortedEnds, probability: number): TrialInterval {
  const { span } = symmetricRanks(ends.trials, probability);
  let best = Infinity;
  let first = 0;
  let last = 0;
  for (let r = 0; r + span < ends.trials; r++) {
    const length = atRank(ends, r + span) - atRank(ends, r);
    if (length < best) {
      best = length;
      first = r;
      last = r;
    } else if (length === best && last === r - 1) last = r;
  }
  const r = Math.floor((first + last) / 2);
  return { low: atRank(ends, r), high: atRank(ends, r + span) };
}

/** Standard errors of the ends of the symmetric interval, without a model of the distribution: the rank of a quantile is
 *  binomial, with standard deviation √(M·p·(1−p)), and the trials that many ranks off show what that is worth in y.
 * @see H. A. David & H. N. Nagaraja, Order Statistics, 3rd ed. (2003), sec. 7.1 */
export function symmetricStandardErrors(ends: SortedEnds, probability: number): { low: number; high: number } {
  const { low, high } = symmetricRanks(ends.trials, probability);
  const tail = (1 - probability) / 2;
  const ranks = Math.max(1, Math.round(Math.sqrt(ends.trials * tail * (1 - tail))));
  const error = (rank: number): number => {
    const below = Math.max(0, rank - ranks);
    const above = Math.min(ends.trials - 1, rank + ranks);
    return (atRank(ends, above) - atRank(ends, below)) / 2;
  };
  return { low: error(low), high: error(high) };
}
