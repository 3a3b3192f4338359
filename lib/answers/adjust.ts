import type { Campaign } from '../campaign/campaign.js';
import { W0_IHRS } from '../constants/defining-constants.js';
import type { NetworkUnknowns } from '../model/network-unknowns.js';
import { hasLevel } from '../model/site-potentials.js';
import { type DetectionTest, detectionFactor, NETWORK_TEST } from '../uncertainty/detection.js';
import { chiSquareUpperTail } from '../uncertainty/distributions/index.js';
import { reliability } from '../uncertainty/reliability.js';
import type { AdjustedDatum, Adjustment } from './adjustment.js';
import { allChecks } from './checks.js';
import { loopClosures } from './loop-closures.js';
import { covarianceOfUnknowns, networkProblem, solveNetwork } from './network.js';
import { suspectedOutliers } from './outliers.js';
import { estimateOf } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

/** Potentials of all sites from every determination and every measurement.
 * @throws {CampaignError} what is undetermined or contradicts itself */
export const adjust = (campaign: Campaign, test?: DetectionTest): Adjustment =>
  adjustmentOf(solveCampaign(campaign), false, test);

/** The same with every link measured over the whole window: uncertainties only.
 * @throws {CampaignError} also without a window */
export const adjustPlanned = (campaign: Campaign, test?: DetectionTest): Adjustment =>
  adjustmentOf(solveCampaign(campaign), true, test);

/** @param test size and power at which a mistake, an offset or a tilt is said to show */
export function adjustmentOf(solved: SolvedCampaign, planned: boolean, test: DetectionTest = NETWORK_TEST): Adjustment {
  const { model, potentials } = solved;
  const { campaign, covariance } = model;
  const network = solveNetwork(campaign, networkProblem(solved, planned));
  const { unknowns, columns, observations, solution } = network;
  const covarianceM4s4 = covarianceOfUnknowns(network);
  const columnOf = new Map(columns.map((u, c) => [u, c]));
  const u = (unknown: number) =>
    Math.sqrt(Math.max(0, covarianceM4s4[columnOf.get(unknown)!]![columnOf.get(unknown)!]!));
  const estimate = (unknown: number) => ({
    ...(planned ? {} : { value: solution.estimate[columnOf.get(unknown)!]! }),
    u: u(unknown),
    smallestDetectable: detectionFactor(test) * u(unknown),
  });
  const tests = reliability(solution, observations.length, test);
  const { chi2, dof } = solution;
  const tested = observations.map((o, i) => ({
    id: o.id,
    residual: planned ? null : solution.residual[i]!,
    ...tests[i]!,
    ...(planned ? { standardised: null } : {}),
  }));
  const outliers = planned ? [] : suspectedOutliers(tested, test);
  return {
    sites: campaign.sites.flatMap((site, s) =>
      columnOf.has(s)
        ? [
            {
              id: site.id,
              ...(planned ? {} : { W: W0_IHRS.value + solution.estimate[columnOf.get(s)!]! }),
              uBefore: hasLevel(potentials, s) ? estimateOf(covariance, potentials.sites[s]!).u : null,
              uAfter: u(s),
            },
          ]
        : [],
    ),
    datums: unknowns.datums.map(
      ({ id, offset, tilt }): AdjustedDatum => ({
        id,
        ...(offset === null ? {} : { offset: estimate(offset) }),
        ...(tilt === null ? {} : { tilt: { north: estimate(tilt.north), east: estimate(tilt.east) } }),
      }),
    ),
    observations: tested,
    test,
    ...(planned ? {} : { chi2, p: dof > 0 ? chiSquareUpperTail(chi2, dof) : null }),
    dof,
    loops: loopClosures(solved, planned),
    outliers,
    covariance: {
      unknowns: columns.map((c) => nameOfUnknown(campaign, unknowns, c)),
      matrix: covarianceM4s4.map((row) => Array.from(row)),
    },
    checks: planned ? [] : allChecks(solved),
    warnings: [...model.warnings, ...outliers.map((o) => o.warning)],
  };
}

/** `sites.ID.W`, `datums.ID.offset`, `datums.ID.tilt.north`. */
export function nameOfUnknown(campaign: Campaign, unknowns: NetworkUnknowns, unknown: number): string {
  if (unknown < unknowns.sites) return `sites.${campaign.sites[unknown]!.id}.W`;
  const datum = unknowns.datums.find(
    (d) => d.offset === unknown || d.tilt?.north === unknown || d.tilt?.east === unknown,
  )!;
  if (datum.offset === unknown) return `datums.${datum.id}.offset`;
  return `datums.${datum.id}.tilt.${datum.tilt?.north === unknown ? 'north' : 'east'}`;
}
