import { systematicGradient, transitionOffset } from '../model/frequency-comparison.js';
import { contributions } from '../uncertainty/budget.js';
import { combineGradients } from '../uncertainty/gradient.js';
import { comparisonOf } from './comparison.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** What weighs in: the prediction alone, or the comparison of a measurement with it. */
export type Weighed = 'prediction' | 'comparison';

/** Share of each input in the variance of a link's answer, by path; shares add up to 1 together with `statistics`. */
export interface Weights {
  readonly byPath: ReadonlyMap<string, number>;
  /** share of the measurements' statistics; 0 for the prediction */
  readonly statistics: number;
  /** standard uncertainty of what is weighed, as a fraction of frequency */
  readonly u: number;
}

/** Weights of a link, or null where its ends have no common level. The comparison takes the link's first measurement; without
 *  one, systematics and ratio alone stand beside the prediction. */
export function weightsOf(solved: SolvedCampaign, link: number, weighed: Weighed): Weights | null {
  const { model } = solved;
  const q = solved.links[link];
  if (!q) return null;
  const { campaign } = model;
  const stated = campaign.links[link]!;
  let gradient = q.y.gradient;
  let statisticalVariance = 0;
  if (weighed === 'comparison') {
    const measurement = campaign.measurements.findIndex((m) => m.link === stated.id && !m.check);
    const comparison = measurement < 0 ? null : comparisonOf(solved, measurement);
    statisticalVariance = Math.max(0, comparison?.offset.statisticalVariance ?? 0);
    gradient =
      comparison?.residual?.gradient ??
      combineGradients([
        [1, systematicGradient(model, stated)],
        [-1, transitionOffset(model, stated).gradient],
        [-1, q.y.gradient],
      ]);
  }
  const inputVariance = model.covariance.variance(gradient);
  const variance = inputVariance + statisticalVariance;
  const scale = variance > 0 ? inputVariance / variance : 0;
  return {
    byPath: new Map(
      contributions(model.covariance, gradient).map((c) => [model.inputs[c.input]!.path, c.share * scale]),
    ),
    statistics: variance > 0 ? statisticalVariance / variance : 0,
    u: Math.sqrt(variance),
  };
}
