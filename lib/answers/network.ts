import type { Campaign, Link } from '../campaign/campaign.js';
import { CampaignError, type Fault, faultAt } from '../campaign/fault.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS } from '../constants/defining-constants.js';
import { type Availability, availability } from '../model/candidates.js';
import { statisticalCovariance, systematicGradient } from '../model/frequency-comparison.js';
import {
  determinationInNetwork,
  fittedMeasurements,
  linkInNetwork,
  type NetworkObservation,
} from '../model/network-observations.js';
import { type NetworkUnknowns, networkUnknowns } from '../model/network-unknowns.js';
import { plannedCovariance } from '../model/planned-covariance.js';
import { sizeText } from '../quantity/size.js';
import { ContradictionError } from '../uncertainty/exact-relations.js';
import { type LeastSquaresSolution, leastSquares, RankDeficiencyError } from '../uncertainty/least-squares.js';
import { type Matrix, zeros } from '../uncertainty/matrix.js';
import type { SolvedCampaign } from './solve-campaign.js';

const C4 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2 ** 2;

/** Everything the network could observe, candidates included, with its covariance. */
export interface NetworkProblem {
  readonly unknowns: NetworkUnknowns;
  readonly observations: readonly (NetworkObservation & {
    /** whether the observation is there with these candidates at hand */
    readonly present: (at: Availability) => boolean;
    /** not there as the campaign stands */
    readonly candidate: boolean;
  })[];
  readonly covariance: Matrix;
}

/** The part of it that is there, solved. */
export interface SolvedNetwork {
  readonly unknowns: NetworkUnknowns;
  /** indices of the unknowns in the solution, in its order */
  readonly columns: readonly number[];
  readonly observations: readonly NetworkObservation[];
  readonly covariance: Matrix;
  readonly solution: LeastSquaresSolution;
}

/** @param planned links without a measurement join as if they ran through the window  @throws {CampaignError} */
export function networkProblem(solved: SolvedCampaign, planned: boolean): NetworkProblem {
  const { model, potentials } = solved;
  const { campaign } = model;
  const unknowns = networkUnknowns(model);
  const determinations = model.determinations.filter((d) => !d.check);
  const measured = fittedMeasurements(model);
  const plannedLinks = planned ? linksWithoutMeasurement(campaign) : [];
  const overLink = (link: Link, id: string, yMean: number | null) => ({
    ...linkInNetwork(model, solved.clocks, potentials.sites, link, id, systematicGradient(model, link), yMean),
    present: (at: Availability) => at.link(link.id),
  });
  const now = availability(campaign, new Set());
  const observations = [
    ...determinations.map((d) => ({
      ...determinationInNetwork(model, unknowns, d),
      present: (at: Availability) => at.determination(d.site, d.position),
    })),
    ...measured.map((m) => overLink(m.link, `measurements.${m.index}`, m.yMean)),
    ...plannedLinks.map((l) => overLink(l, `links.${l.id}`, null)),
  ].map((o) => ({ ...o, candidate: !o.present(now) }));
  const covariance = model.covariance.matrix(observations.map((o) => o.gradient));
  const first = determinations.length;
  addScaled(covariance, statisticalCovariance(model, measured), first, C4);
  if (plannedLinks.length > 0)
    addScaled(covariance, plannedCovariance(campaign, plannedLinks, windowS(campaign)), first + measured.length, C4);
  return { unknowns, observations, covariance };
}

/** Solves what is there of the network with these candidates added, less the observations left out.
 * @throws {CampaignError} what is undetermined or contradicts itself */
export function solveNetwork(
  campaign: Campaign,
  problem: NetworkProblem,
  added: ReadonlySet<string> = new Set(),
  leftOut: ReadonlySet<string> = new Set(),
): SolvedNetwork {
  const { unknowns } = problem;
  const at = availability(campaign, added);
  const rows = problem.observations.flatMap((o, i) => (o.present(at) && !leftOut.has(o.id) ? [i] : []));
  const columns = [...Array(unknowns.count).keys()].filter((u) => u >= unknowns.sites || at.site(u));
  const columnOf = new Map(columns.map((u, c) => [u, c]));
  const observations = rows.map((i) => problem.observations[i]!);
  const covariance = rows.map((i) => Float64Array.from(rows, (j) => problem.covariance[i]![j]!));
  const design = zeros(rows.length, columns.length);
  const observed = new Float64Array(rows.length);
  observations.forEach((o, i) => {
    for (const [u, c] of o.design) design[i]![columnOf.get(u)!]! += c;
    observed[i] = (o.value ?? 0) - (o.absolute ? W0_IHRS.value : 0);
  });
  try {
    const solution = leastSquares({ design, observed, covariance, unknowns: columns.length });
    return { unknowns, columns, observations, covariance, solution };
  } catch (e) {
    if (e instanceof RankDeficiencyError)
      throw new CampaignError(
        undetermined(
          campaign,
          unknowns,
          e.unknowns.map((c) => columns[c]!),
        ),
      );
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

/** Covariance of the unknowns, G·V·Gᵀ, in the order of `columns`. */
export function covarianceOfUnknowns({ solution, covariance }: SolvedNetwork): Matrix {
  const gv = solution.gain.map((g) => {
    const out = new Float64Array(covariance.length);
    covariance.forEach((row, i) => {
      if (g[i] !== 0) for (let j = 0; j < row.length; j++) out[j]! += g[i]! * row[j]!;
    });
    return out;
  });
  return gv.map((row) =>
    Float64Array.from(solution.gain, (g) => {
      let sum = 0;
      for (let j = 0; j < g.length; j++) sum += row[j]! * g[j]!;
      return sum;
    }),
  );
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
  return campaign.links.filter((l) => !measured.has(l.id));
}

function windowS(campaign: Campaign): number {
  if (!campaign.window)
    throw new CampaignError([
      faultAt('missing', 'window', 'no window', '"window": the time over which planned links run, with start and end'),
    ]);
  return (campaign.window.endMs - campaign.window.startMs) / 1000;
}

/** One fault for each unknown that the observations leave open; sites that float together name each other. */
function undetermined(campaign: Campaign, unknowns: NetworkUnknowns, open: readonly number[]): Fault[] {
  const sites = open.filter((u) => u < unknowns.sites).map((u) => campaign.sites[u]!.id);
  return open.map((u) => {
    if (u < unknowns.sites) {
      const { id } = campaign.sites[u]!;
      const others = sites.filter((s) => s !== id);
      return faultAt(
        'undetermined',
        `sites.${id}`,
        `nothing that fixes its potential${others.length > 0 ? `; open together with it: ${others.join(', ')}` : ''}`,
        'a determination, or a measured link to a site whose potential is known',
      );
    }
    const datum = unknowns.datums.find((d) => d.offset === u || d.tilt?.north === u || d.tilt?.east === u)!;
    return datum.offset === u
      ? faultAt(
          'undetermined',
          `datums.${datum.id}.estimateOffset`,
          'an offset that no site knows in any other way',
          'a site with a determination in this datum and another of known level, or a measured link to one',
        )
      : faultAt(
          'undetermined',
          `datums.${datum.id}.estimateTilt`,
          `a tilt to the ${datum.tilt?.north === u ? 'north' : 'east'} that these sites cannot show`,
          'sites in this datum that are spread in that direction, each of known level by another way or a measured link: three not in a line for an offset and both tilts',
        );
  });
}
