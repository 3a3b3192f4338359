import type { DeterminationObservation, Model } from '../model/model.js';
import { hasLevel, type SitePotentials } from '../model/site-potentials.js';
import { combineGradients, type Dependent } from '../uncertainty/gradient.js';
import { comparisonOf, residualEstimate, zOf } from './comparison.js';
import type { CheckResult } from './prediction.js';
import { difference, estimateOf } from './quantities.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** Determinations, then measurements, with `"use": "check"`. */
export function allChecks(solved: SolvedCampaign): CheckResult[] {
  const { model } = solved;
  const measured = model.campaign.measurements.flatMap((m, i) => {
    if (!m.check) return [];
    const residual = residualEstimate(solved, comparisonOf(solved, i));
    return residual ? [{ path: `measurements.${i}`, residual, z: zOf(residual) }] : [];
  });
  return [...determinationChecks(model, solved.potentials), ...measured];
}

/** W that one determination alone gives; levelling starts from the other site's result. */
export function potentialByDetermination(d: DeterminationObservation, potentials: SitePotentials): Dependent {
  if (d.from === null) return d;
  const other = potentials.sites[d.from]!;
  return {
    value: other.value + d.value,
    gradient: combineGradients([
      [1, other.gradient],
      [1, d.gradient],
    ]),
  };
}

/** Determinations with `"use": "check"` against the fit. */
function determinationChecks(model: Model, potentials: SitePotentials): CheckResult[] {
  return model.determinations
    .filter((d) => d.check)
    .flatMap((d) => {
      const comparable = d.from === null ? hasLevel(potentials, d.site) : sharedLevel(potentials, d.site, d.from);
      if (!comparable) return [];
      const residual = estimateOf(
        model.covariance,
        difference(potentialByDetermination(d, potentials), potentials.sites[d.site]!),
      );
      return [{ path: d.path, residual, z: residual.u > 0 ? residual.value / residual.u : null }];
    });
}

const sharedLevel = (p: SitePotentials, a: number, b: number): boolean =>
  p.groups.groupOfSite[a] === p.groups.groupOfSite[b] || (hasLevel(p, a) && hasLevel(p, b));
