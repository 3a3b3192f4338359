import type { Warning } from '../campaign/fault.js';
import { W0_IHRS, W0_TT } from '../constants/defining-constants.js';
import type { Model } from '../model/model.js';
import type { SitePotentials } from '../model/site-potentials.js';
import { sizeText } from '../quantity/size.js';
import type { Prediction, SitePrediction } from './prediction.js';

/** Sites tied only among themselves: their level is unknown, and how to give it one. */
export function groupWarnings(model: Model, { groups }: SitePotentials): Warning[] {
  const names = (sites: readonly number[]) => sites.map((s) => model.campaign.sites[s]!.id).join(', ');
  return groups.sites.flatMap((sites, g) =>
    groups.hasLevel[g]
      ? []
      : [
          {
            code: 'no-level',
            path: `sites.${model.campaign.sites[sites[0]!]!.id}`,
            message:
              sites.length === 1
                ? `${names(sites)} has no determination in the fit: its W, C and redshift are unknown. Give it one, such as gnss-quasigeoid or levelled-from a site that has one.`
                : `${names(sites)} are levelled only among themselves: offsets inside the group are right, W, C, redshift and links out of it are unknown. One determination at any of them, such as gnss-quasigeoid, gives the group its level.`,
          },
        ],
  );
}

/** A combination that its parts do not support. */
export function combinationWarnings(
  model: Model,
  sites: readonly SitePrediction[],
  combination: Prediction['combination'],
): Warning[] {
  const warnings: Warning[] = [];
  if (combination && combination.p < 0.01)
    warnings.push({
      code: 'determinations-disagree',
      path: 'sites',
      message: `the determinations disagree more than their uncertainties allow: χ² = ${combination.chi2.toFixed(1)} at ${combination.dof} degrees of freedom, p = ${sizeText(combination.p)}. u is not scaled for it.`,
    });
  sites.forEach((site, s) => {
    const fitted = model.determinations.filter((d) => d.site === s && !d.check && !d.candidate).map((d) => d.path);
    const own = site.determinations
      .filter((_, i) => fitted.includes(`sites.${site.id}.determinations.${i}`))
      .flatMap((d) => (d.W ? [d.W.value] : []));
    if (!site.W || own.length === 0) return;
    const below = Math.min(...own) - site.W.value;
    const above = site.W.value - Math.max(...own);
    const outside = Math.max(below, above);
    // under a tenth of u (and the rounding of 6e7) it is how correlated inputs work, and nobody's concern
    if (outside > Math.max(1e-6, 0.1 * site.W.u))
      warnings.push({
        code: 'combined-outside',
        path: `sites.${site.id}`,
        message: `the combined W lies ${sizeText(outside)} m²/s² outside all of its determinations: correlated inputs pull it there. Check the sources named by them.`,
      });
  });
  const datumsInUse = new Set(model.referencePotential.map((r) => r.datum));
  if (datumsInUse.has('tt') && datumsInUse.size > 1)
    warnings.push({
      code: 'unlike-reference-potentials',
      path: 'datums',
      message: `datum tt lies ${(W0_TT.value - W0_IHRS.value).toFixed(1)} m²/s² (2.9e-17) above that of the IHRS; used beside other datums it does not cancel in a difference.`,
    });
  return warnings;
}
