import type { Campaign } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import { frequencyOfTransitionHz } from '../clocks/transition-frequency.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import type { Model } from '../model/model.js';
import { hasLevel } from '../model/site-potentials.js';
import { contributions } from '../uncertainty/budget.js';
import { chiSquareUpperTail } from '../uncertainty/distributions/index.js';
import type { Dependent } from '../uncertainty/gradient.js';
import { allChecks, potentialByDetermination } from './checks.js';
import { combinationWarnings, groupWarnings } from './predict-warnings.js';
import type { BudgetRow, Prediction } from './prediction.js';
import { difference, estimateOf, redshiftAgainstTT } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

/** What offset gravity alone produces between each pair of clocks, how sure that is, and which input limits it.
 *  Sites and dW in the campaign's permanent-tide system; y and redshift always in mean tide, which is what a clock feels.
 * @throws {CampaignError} the campaign contradicts itself */
export const predict = (campaign: Campaign): Prediction => predictionOf(solveCampaign(campaign));

export function predictionOf(solved: SolvedCampaign): Prediction {
  const { model, potentials } = solved;
  const { campaign, covariance } = model;
  const level = campaign.sites.map((_, s) => hasLevel(potentials, s));
  const estimate = (d: Dependent) => estimateOf(covariance, d);

  const sites = campaign.sites.map((site, s) => ({
    id: site.id,
    W: level[s] ? estimate(potentials.sites[s]!) : null,
    C: level[s] ? estimate(difference(model.referencePotential[s]!, potentials.sites[s]!)) : null,
    determinations: model.determinations.flatMap((d) =>
      d.site === s
        ? [
            {
              kind: site.determinations[d.position]!.kind,
              W: level[s] ? estimate(potentialByDetermination(d, potentials)) : null,
            },
          ]
        : [],
    ),
  }));
  const clocks = campaign.clocks.map((clock, i) => {
    const s = model.siteIndex.get(clock.site)!;
    const W = solved.clocks[i]!;
    return {
      id: clock.id,
      site: clock.site,
      W: level[s] ? estimate(W) : null,
      redshift: level[s] ? estimate(redshiftAgainstTT(W, model.toMeanTideM2s2[s]!)) : null,
    };
  });
  const links = campaign.links.map((link, i) => {
    const q = solved.links[i] ?? null;
    const hz = frequencyOfTransitionHz(campaign, campaign.clocks[model.clockIndex.get(link.to)!]!.transition);
    const dW = q && estimate(q.dW);
    // y = dW/c² plus a constant, so its u is that of dW
    const y = q && dW && { value: q.y.value, u: dW.u / SPEED_OF_LIGHT_SQUARED_M2_PER_S2 };
    let budget: readonly BudgetRow[] | undefined;
    return {
      id: link.id,
      from: link.from,
      to: link.to,
      dW,
      y,
      dH: q && estimate(q.dH),
      dHNormal: q?.dHNormal ? estimate(q.dHNormal) : null,
      offsetHz: y && { value: y.value * hz, u: y.u * hz },
      // made when it is read: with hundreds of links a page shows one
      get budget() {
        budget ??= q ? budgetOf(model, q.y) : [];
        return budget;
      },
    };
  });
  const { chi2, dof } = potentials.solution;
  const combination = dof > 0 ? { chi2, dof, p: chiSquareUpperTail(chi2, dof) } : null;
  const warnings: Warning[] = [
    ...model.warnings,
    ...groupWarnings(model, potentials),
    ...combinationWarnings(model, sites, combination),
  ];
  let correlations: Prediction['correlations'] | undefined;
  return {
    format: 'plumbtick-prediction/1',
    ...(campaign.title === undefined ? {} : { title: campaign.title }),
    tide: campaign.tide,
    sites,
    combination,
    clocks,
    links,
    checks: allChecks(solved),
    // made when it is read: of hundreds of links it takes longer than everything else
    get correlations() {
      correlations ??= correlationsOfOffsets(solved);
      return correlations;
    },
    warnings,
  };
}

export function budgetOf(model: Model, y: Dependent): BudgetRow[] {
  return contributions(model.covariance, y.gradient).map(({ input, sensitivity, uy, share }) => {
    const { path, value, u } = model.inputs[input]!;
    return { input: path, value, u, sensitivity, uy, share };
  });
}

function correlationsOfOffsets({ model, links }: SolvedCampaign): Prediction['correlations'] {
  const known = links.flatMap((q, i) => (q ? [{ id: model.campaign.links[i]!.id, gradient: q.y.gradient }] : []));
  const cov = model.covariance.matrix(known.map((k) => k.gradient));
  return {
    links: known.map((k) => k.id),
    matrix: cov.map((row, i) =>
      Array.from(row, (c, j) => {
        if (i === j) return 1;
        const scale = Math.sqrt(row[i]! * cov[j]![j]!);
        return scale > 0 ? c / scale : 0;
      }),
    ),
  };
}
