import { type MeasuredOffset, measuredOffset, transitionOffset } from '../model/frequency-comparison.js';
import { combineGradients, type Dependent } from '../uncertainty/gradient.js';
import type { Estimate } from './prediction.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** A measured offset beside the predicted one, with what their difference depends on. */
export interface Comparison {
  readonly offset: MeasuredOffset;
  /** y + offset(to) − offset(from); null without a level */
  readonly predicted: Dependent | null;
  /** systematic error of the measurement − error of the prediction */
  readonly residual: Dependent | null;
}

export function comparisonOf(solved: SolvedCampaign, measurement: number): Comparison {
  const { model } = solved;
  const offset = measuredOffset(model, measurement);
  const q = solved.links[model.campaign.links.indexOf(offset.link)];
  if (!q) return { offset, predicted: null, residual: null };
  const ratio = transitionOffset(model, offset.link);
  const predicted = {
    value: q.y.value + ratio.value,
    gradient: combineGradients([
      [1, q.y.gradient],
      [1, ratio.gradient],
    ]),
  };
  const residual = {
    value: offset.yMean - predicted.value,
    gradient: combineGradients([
      [1, offset.systematic],
      [-1, predicted.gradient],
    ]),
  };
  return { offset, predicted, residual };
}

/** residual / u; null where both sides are exact */
export const zOf = (r: Estimate): number | null => (r.u > 0 ? r.value / r.u : null);

/** Residual with its standard uncertainty; null without a level. */
export function residualEstimate(
  { model }: SolvedCampaign,
  { offset, predicted, residual }: Comparison,
): Estimate | null {
  if (!residual || !predicted) return null;
  // a stated whole u is taken as the variance of the measurement, whatever the systematics add up to
  const variance = offset.measurement.includesSystematic
    ? offset.measurement.y.u ** 2 + model.covariance.variance(predicted.gradient)
    : offset.statisticalVariance + model.covariance.variance(residual.gradient);
  return { value: residual.value, u: Math.sqrt(variance) };
}
