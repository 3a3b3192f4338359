import { CampaignError, faultAt } from '../campaign/fault.js';
import { W0_IHRS } from '../constants/defining-constants.js';
import { sizeText } from '../quantity/size.js';
import { ContradictionError } from '../uncertainty/exact-relations.js';
import { type Dependent, gradientOfRow } from '../uncertainty/gradient.js';
import { type LeastSquaresSolution, leastSquares } from '../uncertainty/least-squares.js';
import { zeros } from '../uncertainty/matrix.js';
import type { DeterminationObservation, Model } from './model.js';
import { type SiteGroups, siteGroups } from './site-groups.js';

/** W of every site from all determinations in one solve. */
export interface SitePotentials {
  /** per site W at its marker, campaign's tide system, m²/s², gradient to all inputs at the solution's weights.
   *  In a group without a level the values share an arbitrary constant: only differences within the group mean anything. */
  readonly sites: readonly Dependent[];
  readonly groups: SiteGroups;
  /** the observations in the fit, in file order */
  readonly fitted: readonly DeterminationObservation[];
  /** per site its column in the solution; −1 for one that a group without a level is held at */
  readonly columns: ArrayLike<number>;
  readonly solution: LeastSquaresSolution;
}

export const hasLevel = (p: SitePotentials, site: number): boolean => p.groups.hasLevel[p.groups.groupOfSite[site]!]!;

export const sameGroup = (p: SitePotentials, a: number, b: number): boolean =>
  p.groups.groupOfSite[a] === p.groups.groupOfSite[b];

/** Observations of the fit: neither checks nor candidates. */
export const fittedDeterminations = (model: Model): DeterminationObservation[] =>
  model.determinations.filter((d) => !d.check && !d.candidate);

/** Generalised least squares over all sites with the full covariance of the determinations.
 * @throws {CampaignError} `contradiction` where two exact determinations disagree beyond 1e-6 m²/s² */
export function solveSitePotentials(model: Model): SitePotentials {
  const fitted = fittedDeterminations(model);
  const n = model.campaign.sites.length;
  const groups = siteGroups(n, fitted);
  // a group without a level hangs on its first site, held at an arbitrary potential that cancels in its differences
  const held = groups.sites.filter((_, g) => !groups.hasLevel[g]).map((sites) => sites[0]!);
  const columns: number[] = [];
  const columnOf = new Int32Array(n).fill(-1);
  for (let s = 0; s < n; s++)
    if (!held.includes(s)) {
      columnOf[s] = columns.length;
      columns.push(s);
    }
  const design = zeros(fitted.length, columns.length);
  // potentials are written as W − W0: 1e-9 m²/s² of their rounding would be lost otherwise
  const reference = W0_IHRS.value;
  const observed = new Float64Array(fitted.length);
  fitted.forEach((d, i) => {
    if (columnOf[d.site]! >= 0) design[i]![columnOf[d.site]!]! += 1;
    if (d.from !== null && columnOf[d.from]! >= 0) design[i]![columnOf[d.from]!]! -= 1;
    observed[i] = d.from === null ? d.value - reference : d.value;
  });
  const redundant = fitted.length > columns.length;
  const covariance = redundant ? model.covariance.matrix(fitted.map((d) => d.gradient)) : [];
  let solution: LeastSquaresSolution;
  try {
    solution = leastSquares({ design, observed, covariance, unknowns: columns.length });
  } catch (e) {
    if (e instanceof ContradictionError) throw contradiction(e, fitted);
    throw e;
  }
  const row = new Float64Array(model.inputs.length);
  const sites = model.campaign.sites.map((_, s) => {
    const column = columnOf[s]!;
    if (column < 0) return { value: reference, gradient: { indices: [], values: [] } };
    row.fill(0);
    solution.gain[column]!.forEach((g, i) => {
      if (g === 0) return;
      const { indices, values } = fitted[i]!.gradient;
      for (let k = 0; k < indices.length; k++) row[indices[k]!]! += g * values[k]!;
    });
    return { value: reference + solution.estimate[column]!, gradient: gradientOfRow(row) };
  });
  return { sites, groups, fitted, columns: columnOf, solution };
}

function contradiction(e: ContradictionError, fitted: readonly DeterminationObservation[]): CampaignError {
  const others = e.others.map((i) => fitted[i]!.path);
  return new CampaignError([
    faultAt(
      'contradiction',
      fitted[e.row]!.path,
      `an exact value that contradicts ${others.join(', ') || 'the others'} by ${sizeText(Math.abs(e.misclosure), 3)} m²/s²`,
      'agreement within 1e-6 m²/s², or an uncertainty on one of them',
    ),
  ]);
}
