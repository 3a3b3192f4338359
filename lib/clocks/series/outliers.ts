import { normalQuantile } from '../../uncertainty/distributions/index.js';
import { median, sampled } from './time-order.js';

/** Neighbours on each side with which a value is compared. */
const NEIGHBOURS = 10;

/** Fewest values among which one can stand out. */
const FEWEST = 10;

/** Median absolute deviation to standard deviation of a normal law. */
const MAD_TO_SIGMA = 1.482602218505602;

export interface Outliers {
  /** sample numbers, rising */
  readonly samples: readonly number[];
  /** robust standard deviation of a value about its neighbours; 0 where most values are alike */
  readonly scale: number;
  /** distance from which a value counts as an outlier, in `scale` */
  readonly limit: number;
  /** median of the neighbours of sample i */
  localMedian(i: number): number;
  /** distance of sample i from its neighbours, in `scale` */
  distanceOf(i: number): number;
}

/** Values that stand out from their neighbours, by the median absolute deviation of the residuals about a moving median (Hampel),
 *  so that a step, a drift or a random walk is no crowd of outliers. The limit is 5 (Riley 2008, NIST SP 1065, section 10.11), and
 *  higher in records so long that chance alone would pass it. */
export function findOutliers(y: Float64Array): Outliers {
  const n = y.length;
  const window = new Float64Array(2 * NEIGHBOURS);
  const localMedian = (i: number): number => {
    const from = Math.max(0, Math.min(i - NEIGHBOURS, n - 1 - 2 * NEIGHBOURS));
    const to = Math.min(n, from + 2 * NEIGHBOURS + 1);
    let k = 0;
    for (let j = from; j < to; j++) {
      if (j === i) continue;
      // Insertion sort: twenty values, nearly free.
      const v = y[j]!;
      let p = k++;
      while (p > 0 && window[p - 1]! > v) {
        window[p] = window[p - 1]!;
        p--;
      }
      window[p] = v;
    }
    const half = k >> 1;
    return k % 2 === 1 ? window[half]! : 0.5 * (window[half - 1]! + window[half]!);
  };
  const limit = Math.max(5, n > 0 ? -normalQuantile(0.025 / n) : 5);
  const nothing = (scale: number): Outliers => ({ samples: [], scale, limit, localMedian, distanceOf: () => 0 });
  if (n < FEWEST) return nothing(0);
  const residuals = sampled(n, 4001, (i) => Math.abs(y[i]! - localMedian(i)));
  let scale = MAD_TO_SIGMA * median(residuals);
  if (scale === 0) {
    // Most values are alike to the last digit (a coarse counter): the mean deviation still tells how coarse.
    scale = residuals.reduce((sum, r) => sum + r, 0) / residuals.length;
    if (scale === 0) return nothing(0);
  }
  const distanceOf = (i: number): number => Math.abs(y[i]! - localMedian(i)) / scale;
  const samples: number[] = [];
  // An outlier also differs from the value beside it; only where that is so the moving median is worked out.
  const suspicious = 0.7 * limit * scale;
  let before = false;
  for (let i = 0; i < n; i++) {
    const left = i > 0 && Math.abs(y[i]! - y[i - 1]!) > suspicious;
    const right = i + 1 < n && Math.abs(y[i + 1]! - y[i]!) > suspicious;
    before = (left || right || before) && distanceOf(i) > limit;
    if (before) samples.push(i);
  }
  return { samples, scale, limit, localMedian, distanceOf };
}
