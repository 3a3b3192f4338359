import type { Campaign } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import {
  type MeasuredOffset,
  statisticalCovariance,
  toMeanTideOffset,
  transitionOffset,
} from '../model/frequency-comparison.js';
import { siteIndexOfClock } from '../model/model.js';
import { hasLevel } from '../model/site-potentials.js';
import { DETECTION_FACTOR } from '../uncertainty/detection.js';
import { chiSquareUpperTail, normalCdf } from '../uncertainty/distributions/index.js';
import { combineGradients, type Dependent } from '../uncertainty/gradient.js';
import { cholesky, forwardSolve } from '../uncertainty/matrix.js';
import { allChecks } from './checks.js';
import { type Comparison, comparisonOf, residualEstimate, zOf } from './comparison.js';
import type { Evaluation, LinkEvaluation, Verdict } from './evaluation.js';
import type { Estimate } from './prediction.js';
import { difference, estimateOf, lengthEquivalent, meanGravity, normalHeight } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';
import { suspectsOf } from './suspects/suspects.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** Does the measured offset agree with the predicted one, and what height difference does it imply?
 *  Verdict by metrological compatibility, |residual| ≤ 2u (VIM 2.47, κ = 2), `inconclusive` where a discrepancy of the size
 *  asked about would not have shown.
 * @throws {CampaignError} */
export const evaluate = (campaign: Campaign): Evaluation => evaluationOf(solveCampaign(campaign));

export function evaluationOf(solved: SolvedCampaign): Evaluation {
  const { model } = solved;
  const { campaign, covariance } = model;
  const comparisons = campaign.measurements.map((_, i) => comparisonOf(solved, i));
  const used = comparisons.filter((c) => !c.offset.measurement.check);
  const effectM = campaign.effectM ?? (campaign.targetM === null ? null : 10 * campaign.targetM);
  const warnings: Warning[] = [...model.warnings];
  if (effectM === null && used.length > 0)
    warnings.push({
      code: 'no-effect',
      path: 'effect',
      message:
        'neither effect nor target is stated: a disagreement can be told, but not whether agreement says anything.',
    });
  const links = used.map((c) => linkEvaluation(solved, c, effectM));

  const comparable = used.flatMap((c) => (c.residual ? [{ offset: c.offset, residual: c.residual }] : []));
  const v = covariance.matrix(comparable.map((c) => c.residual.gradient));
  statisticalCovariance(
    model,
    comparable.map((c) => c.offset),
  ).forEach((row, i) => {
    row.forEach((x, j) => {
      v[i]![j]! += x;
    });
  });
  const factor = comparable.length > 0 ? cholesky(v) : null;
  const dof = comparable.length;
  if (!factor && dof > 0)
    warnings.push({
      code: 'residuals-not-independent',
      path: 'measurements',
      message: 'the covariance of the residuals is singular (exact or repeated measurements): χ² is not computed.',
    });
  const white = factor
    ? forwardSolve(
        factor,
        comparable.map((c) => Float64Array.of(c.residual.value)),
      )
    : null;
  const chi2 = white ? white.reduce((s, row) => s + row[0]! * row[0]!, 0) : null;
  return {
    effectM,
    links,
    chi2,
    dof,
    p: chi2 === null ? null : chiSquareUpperTail(chi2, dof),
    birge: chi2 === null ? null : Math.sqrt(chi2 / dof),
    checks: allChecks(solved),
    warnings,
  };
}

function linkEvaluation(solved: SolvedCampaign, comparison: Comparison, effectM: number | null): LinkEvaluation {
  const { model } = solved;
  const { offset, predicted } = comparison;
  const residual = residualEstimate(solved, comparison);
  const z = residual ? zOf(residual) : null;
  const { dW, g, dHNormal } = inferredDependents(solved, offset);
  const ratio = transitionOffset(model, offset.link);
  const perLength = C2 / g.value;
  const smallestDetectableM = residual ? DETECTION_FACTOR * residual.u * perLength : null;
  let verdict: Verdict | null = null;
  if (z !== null && Math.abs(z) > 2) verdict = 'differ';
  else if (residual && effectM !== null && z !== null)
    verdict = smallestDetectableM! > effectM ? 'inconclusive' : 'agree';
  const withStatistics = (d: Dependent, perY: number): Estimate => ({
    value: d.value,
    u: Math.sqrt(model.covariance.variance(d.gradient) + perY * perY * offset.statisticalVariance),
  });
  return {
    id: offset.link.id,
    measurement: offset.measurement.id ?? offset.index,
    measured: { value: offset.yMean, u: measuredStandardUncertainty(solved, offset) },
    predicted: predicted && estimateOf(model.covariance, predicted),
    ratioOffset: ratio.gradient.indices.length === 0 ? null : estimateOf(model.covariance, ratio),
    residual,
    residualLength: residual && { value: residual.value * perLength, u: residual.u * perLength },
    z,
    p: z === null ? null : 2 * normalCdf(-Math.abs(z)),
    verdict,
    smallestDetectableM,
    effectOffset: effectM === null ? null : effectM / perLength,
    suspects: verdict === 'differ' ? suspectsOf(solved, offset.index) : [],
    inferred: {
      dW: withStatistics(dW, C2),
      dH: withStatistics(lengthEquivalent(dW, g), C2 / g.value),
      dHNormal: dHNormal && withStatistics(dHNormal.dependent, dHNormal.perY),
    },
  };
}

const measuredStandardUncertainty = ({ model }: SolvedCampaign, offset: MeasuredOffset): number =>
  offset.measurement.includesSystematic
    ? offset.measurement.y.u
    : Math.sqrt(offset.statisticalVariance + model.covariance.variance(offset.systematic));

/** What the clocks say of the potential: (y − ratio offsets)·c², in the campaign's tide system. */
function inferredDependents(solved: SolvedCampaign, offset: MeasuredOffset) {
  const { model } = solved;
  const { link } = offset;
  const a = model.clockIndex.get(link.from)!;
  const siteA = siteIndexOfClock(model, model.campaign.clocks[a]!);
  const siteB = siteIndexOfClock(model, model.campaign.clocks[model.clockIndex.get(link.to)!]!);
  const ratio = transitionOffset(model, link);
  const dW: Dependent = {
    value: (offset.yMean - toMeanTideOffset(model, link, model.campaign.tide) - ratio.value) * C2,
    gradient: combineGradients([
      [C2, offset.systematic],
      [-C2, ratio.gradient],
    ]),
  };
  const g = meanGravity(model, siteA, siteB);
  if (!hasLevel(solved.potentials, siteA)) return { dW, g, dHNormal: null };
  const WA = solved.clocks[a]!;
  const there = difference(WA, dW);
  const atB = normalHeight(model, siteB, there);
  const perPotential = normalHeightSlope(model, siteB, there);
  return {
    dW,
    g,
    dHNormal: { dependent: difference(atB, normalHeight(model, siteA, WA)), perY: perPotential * C2 },
  };
}

/** dH* / d(−W), s²/m: how a statistical error of dW moves the normal height. */
function normalHeightSlope(model: SolvedCampaign['model'], site: number, W: Dependent): number {
  const probe = normalHeight(model, site, { value: W.value, gradient: { indices: [0], values: [1] } });
  return -probe.gradient.values[0]!;
}
