import type { Campaign, Link } from '../campaign/campaign.js';
import { CampaignError, type Fault, faultAt } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS } from '../constants/defining-constants.js';
import { statisticalCovariance, systematicGradient } from '../model/frequency-comparison.js';
import {
  determinationInNetwork,
  fittedMeasurements,
  linkInNetwork,
  type NetworkObservation,
  type NetworkUnknowns,
  networkUnknowns,
} from '../model/network-observations.js';
import { plannedCovariance } from '../model/planned-covariance.js';
import { hasLevel } from '../model/site-potentials.js';
import { sizeText } from '../quantity/size.js';
import { NETWORK_TEST } from '../uncertainty/detection.js';
import { chiSquareUpperTail } from '../uncertainty/distributions/index.js';
import { ContradictionError } from '../uncertainty/exact-relations.js';
import { type LeastSquaresSolution, leastSquares, RankDeficiencyError } from '../uncertainty/least-squares.js';
import { type Matrix, zeros } from '../uncertainty/matrix.js';
import { reliability } from '../uncertainty/reliability.js';
import type { Adjustment } from './adjustment.js';
import { allChecks } from './checks.js';
import { estimateOf } from './quantities.js';
import { type SolvedCampaign, solveCampaign } from './solve-campaign.js';

const C4 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2 ** 2;

/** Potentials of all sites from every determination and every measurement.
 * @throws {CampaignError} what is undetermined or contradicts itself */
export const adjust = (campaign: Campaign): Adjustment => adjustmentOf(solveCampaign(campaign), false);

/** The same with every link measured over the whole window: uncertainties only.
 * @throws {CampaignError} also without a window */
export const adjustPlanned = (campaign: Campaign): Adjustment => adjustmentOf(solveCampaign(campaign), true);

/** The network as a least-squares problem, solved. */
export interface SolvedNetwork {
  readonly unknowns: NetworkUnknowns;
  readonly observations: readonly NetworkObservation[];
  readonly covariance: Matrix;
  readonly solution: LeastSquaresSolution;
}

export function solveNetwork(solved: SolvedCampaign, planned: boolean): SolvedNetwork {
  const { model, potentials } = solved;
  const { campaign } = model;
  const unknowns = networkUnknowns(model);
  const measured = fittedMeasurements(model);
  const plannedLinks = planned ? linksWithoutMeasurement(campaign) : [];
  const inNetwork = (link: Link, id: string, yMean: number | null) =>
    linkInNetwork(model, solved.clocks, potentials.sites, link, id, systematicGradient(model, link), yMean);
  const observations: NetworkObservation[] = [
    ...potentials.fitted.map((d) => determinationInNetwork(model, unknowns, d)),
    ...measured.map((m) => inNetwork(m.link, `measurements.${m.index}`, m.yMean)),
    ...plannedLinks.map((l) => inNetwork(l, `links.${l.id}`, null)),
  ];
  const covariance = model.covariance.matrix(observations.map((o) => o.gradient));
  const first = potentials.fitted.length;
  addScaled(covariance, statisticalCovariance(model, measured), first, C4);
  if (plannedLinks.length > 0)
    addScaled(covariance, plannedCovariance(campaign, plannedLinks, windowS(campaign)), first + measured.length, C4);

  const design = zeros(observations.length, unknowns.count);
  const observed = new Float64Array(observations.length);
  observations.forEach((o, i) => {
    for (const [u, c] of o.design) design[i]![u]! += c;
    observed[i] = (o.value ?? 0) - (o.absolute ? W0_IHRS.value : 0);
  });
  try {
    const solution = leastSquares({ design, observed, covariance, unknowns: unknowns.count });
    return { unknowns, observations, covariance, solution };
  } catch (e) {
    if (e instanceof RankDeficiencyError) throw new CampaignError(undetermined(campaign, unknowns, e.unknowns));
    if (e instanceof ContradictionError)
      throw new CampaignError([
        faultAt(
          'contradiction',
          observations[e.row]!.id,
          `an exact value that contradicts ${e.others.map((i) => observations[i]!.id).join(', ')} by ${sizeText(Math.abs(e.misclosure), 3)} m²/s²`,
          'agreement within 1e-6 m²/s², or an uncertainty on one of them',
        ),
      ]);
    throw e;
  }
}

export function adjustmentOf(solved: SolvedCampaign, planned: boolean): Adjustment {
  const { model, potentials } = solved;
  const { campaign, covariance } = model;
  const network = solveNetwork(solved, planned);
  const { unknowns, observations, solution } = network;
  const u = unknownStandardUncertainties(network);
  const tests = reliability(solution, observations.length);
  const { chi2, dof } = solution;
  return {
    sites: campaign.sites.map((site, s) => ({
      id: site.id,
      ...(planned ? {} : { W: W0_IHRS.value + solution.estimate[s]! }),
      uBefore: hasLevel(potentials, s) ? estimateOf(covariance, potentials.sites[s]!).u : null,
      uAfter: u[s]!,
    })),
    datums: unknowns.offsets.map((id, i) => ({
      id,
      offset: {
        ...(planned ? {} : { value: solution.estimate[unknowns.sites + i]! }),
        u: u[unknowns.sites + i]!,
      },
    })),
    observations: observations.map((o, i) => ({
      id: o.id,
      residual: planned ? null : solution.residual[i]!,
      ...tests[i]!,
      ...(planned ? { standardised: null } : {}),
    })),
    test: NETWORK_TEST,
    ...(planned ? {} : { chi2, p: dof > 0 ? chiSquareUpperTail(chi2, dof) : null }),
    dof,
    checks: planned ? [] : allChecks(solved),
    warnings: model.warnings,
  };
}

/** √diag(G·V·Gᵀ). */
function unknownStandardUncertainties({ solution, covariance }: SolvedNetwork): number[] {
  return solution.gain.map((g) => {
    let sum = 0;
    covariance.forEach((row, i) => {
      if (g[i] === 0) return;
      let inner = 0;
      for (let j = 0; j < row.length; j++) inner += row[j]! * g[j]!;
      sum += g[i]! * inner;
    });
    return Math.sqrt(Math.max(0, sum));
  });
}

function addScaled(target: Matrix, block: Matrix, at: number, factor: number): void {
  block.forEach((row, i) => {
    row.forEach((x, j) => {
      target[at + i]![at + j]! += factor * x;
    });
  });
}

function linksWithoutMeasurement(campaign: Campaign): Link[] {
  const measured = new Set(campaign.measurements.map((m) => m.link));
  return campaign.links.filter((l) => !measured.has(l.id) && !l.candidate);
}

function windowS(campaign: Campaign): number {
  if (!campaign.window)
    throw new CampaignError([
      faultAt('missing', 'window', 'no window', '"window": the time over which planned links run, with start and end'),
    ]);
  return (campaign.window.endMs - campaign.window.startMs) / 1000;
}

function undetermined(campaign: Campaign, unknowns: NetworkUnknowns, open: readonly number[]): Fault[] {
  return open.map((i) =>
    i < unknowns.sites
      ? faultAt(
          'undetermined',
          `sites.${campaign.sites[i]!.id}`,
          'nothing that fixes its potential: no determination with a level, no measured link to a site that has one',
          'a determination, or a measurement over a link to it',
        )
      : faultAt(
          'undetermined',
          `datums.${unknowns.offsets[i - unknowns.sites]!}.estimateOffset`,
          'an offset that no site knows in any other way',
          'a site with a determination in this datum and another of known level, or a measured link to one',
        ),
  );
}
