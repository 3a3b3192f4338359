import { sizeText } from '../quantity/size.js';
import type { DetectionTest } from '../uncertainty/detection.js';
import { normalQuantile } from '../uncertainty/distributions/index.js';
import type { AdjustedObservation, Outlier } from './adjustment.js';

/** Observations whose standardised residual exceeds the test's limit (Baarda's data snooping), worst first. One mistake
 *  pulls at its neighbours, so only the first is likely to be one; none is dropped. */
export function suspectedOutliers(observations: readonly AdjustedObservation[], test: DetectionTest): Outlier[] {
  const limit = normalQuantile(1 - test.size / 2);
  return observations
    .flatMap(({ id, standardised }) =>
      standardised !== null && Math.abs(standardised) > limit ? [{ id, standardised }] : [],
    )
    .sort((a, b) => Math.abs(b.standardised) - Math.abs(a.standardised))
    .map((o, i) => ({
      ...o,
      warning: {
        code: 'outlier',
        path: o.id,
        message:
          i === 0
            ? `standardised residual ${sizeText(o.standardised)} beyond ${limit.toFixed(2)} (test size ${test.size}): the first to look at. It stays in the adjustment.`
            : `standardised residual ${sizeText(o.standardised)} beyond ${limit.toFixed(2)}: it may only share the first one's trouble.`,
      },
    }));
}
