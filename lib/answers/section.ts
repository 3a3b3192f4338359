import type { Clock, TideSystem } from '../campaign/campaign.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS } from '../constants/defining-constants.js';
import { tieFunction } from '../model/determination-functions.js';
import { siteIndexOfClock } from '../model/model.js';
import { atEstimates } from '../model/model-function.js';
import { hasLevel } from '../model/site-potentials.js';
import { statedDigits } from '../quantity/index.js';
import { combineGradients, type Dependent, ZERO_GRADIENT } from '../uncertainty/gradient.js';
import type { BudgetRow, Estimate } from './prediction.js';
import { difference, estimateOf, normalHeight } from './quantities.js';
import type { SolvedCampaign } from './solve-campaign.js';

/** One value in the three scales: length C/g, potential C, frequency C/c². Each with its own u. */
export interface ThreeScales {
  /** length equivalent, m */
  readonly length: Estimate;
  /** m²/s² */
  readonly potential: Estimate;
  /** fraction of frequency */
  readonly offset: Estimate;
}

/** A site on the section. */
export interface SectionSite {
  readonly id: string;
  readonly name: string;
  /** gravity potential at the marker, campaign's tide system, m²/s² */
  readonly W: Estimate;
  /** C = W₀(IHRS) − W of the marker: the height on the section, whatever datum the campaign uses */
  readonly C: Estimate;
  /** normal height H* with U₀ − U(φ, H*) = W₀(IHRS) − W, m */
  readonly normalHeight: Estimate;
}

/** One rung of the ladder from marker to atoms. */
export interface SectionTieStep {
  readonly name: string;
  /** height of the upper end over the lower, as stated, and what it is in potential and frequency */
  readonly step: ThreeScales;
  /** C of the end of this step minus C of the marker, m²/s² */
  readonly endC: number;
  /** digits of u as the source gave it: none of the three scales claims more */
  readonly digits: 1 | 2;
}

export interface SectionClock {
  readonly id: string;
  readonly site: string;
  /** C = W₀(IHRS) − W of the atoms, m²/s² */
  readonly C: Estimate;
  readonly tie: readonly SectionTieStep[];
  /** from marker to atoms; null without a tie */
  readonly sum: ThreeScales | null;
}

/** Where markers and atoms lie among the levels of the gravity field. */
export interface Section {
  readonly tide: TideSystem;
  /** W₀(IHRS), m²/s²: C = 0 */
  readonly W0: number;
  /** g of the metre scale, m/s²: the mean of the g at the markers on the section */
  readonly scaleGravity: number;
  /** in file order; those that have a level */
  readonly sites: readonly SectionSite[];
  readonly clocks: readonly SectionClock[];
  /** the highest marker and how far the others lie below it, in normal heights, m, nearest first; null without a site */
  readonly highest: {
    readonly id: string;
    readonly above: readonly { readonly id: string; readonly height: Estimate }[];
  } | null;
  /** ids of the sites that only differences are known of: nothing to draw them by */
  readonly withoutLevel: readonly string[];
}

/** C of markers and atoms against W₀(IHRS), and the ladder between them, in three scales. */
export function section(solved: SolvedCampaign): Section {
  const { model, potentials } = solved;
  const { campaign, covariance } = model;
  const estimate = (d: Dependent) => estimateOf(covariance, d);
  const onSection = campaign.sites.flatMap((_, s) => (hasLevel(potentials, s) ? [s] : []));
  const gravity = onSection.map((s) => model.inputs[model.siteInputs[s]!.g]!.value);
  const heights = onSection.map((s) => normalHeight(model, s, potentials.sites[s]!));
  const sites = onSection.map((s, i) => {
    const site = campaign.sites[s]!;
    const W = potentials.sites[s]!;
    return {
      id: site.id,
      name: site.name ?? site.id,
      W: estimate(W),
      C: estimate(geopotentialNumber(W)),
      normalHeight: estimate(heights[i]!),
    };
  });
  const indexOf = new Map(model.inputs.map(({ path }, i) => [path, i]));
  const clocks = campaign.clocks.flatMap((clock, i) => {
    if (!hasLevel(potentials, siteIndexOfClock(model, clock))) return [];
    return [
      {
        id: clock.id,
        site: clock.site,
        C: estimate(geopotentialNumber(solved.clocks[i]!)),
        ...ladder(solved, clock, indexOf),
      },
    ];
  });
  const top = heights.reduce((best, height, i) => (height.value > heights[best]!.value ? i : best), 0);
  const highest =
    sites.length === 0
      ? null
      : {
          id: sites[top]!.id,
          above: sites
            .flatMap(({ id }, i) =>
              i === top ? [] : [{ id, height: estimate(difference(heights[top]!, heights[i]!)) }],
            )
            .sort((a, b) => a.height.value - b.height.value),
        };
  return {
    tide: campaign.tide,
    W0: W0_IHRS.value,
    scaleGravity: gravity.length === 0 ? 9.80665 : gravity.reduce((sum, g) => sum + g, 0) / gravity.length,
    sites,
    clocks,
    highest,
    withoutLevel: campaign.sites.flatMap(({ id }, s) => (onSection.includes(s) ? [] : [id])),
  };
}

/** W₀(IHRS) − W. The reference is exact. */
const geopotentialNumber = (W: Dependent): Dependent =>
  difference({ value: W0_IHRS.value, gradient: ZERO_GRADIENT }, W);

/** The tie step by step. A step's potential is the difference of the tie up to its end and up to its beginning, so that the
 *  steps add up to the whole, gradient included. */
function ladder(
  { model }: SolvedCampaign,
  clock: Clock,
  indexOf: ReadonlyMap<string, number>,
): Pick<SectionClock, 'tie' | 'sum'> {
  const { covariance, inputs } = model;
  const { g, gradient } = model.siteInputs[siteIndexOfClock(model, clock)]!;
  const steps = clock.tie.map((_, k) => indexOf.get(`clocks.${clock.id}.tie.${k}.dH`)!);
  /** C of the end of the first `count` steps minus that of the marker */
  const upTo = (count: number): Dependent => {
    if (count === 0) return { value: 0, gradient: ZERO_GRADIENT };
    const tie = atEstimates(tieFunction(g, gradient, steps.slice(0, count)), (i) => inputs[i]!.value);
    return { value: -tie.value, gradient: combineGradients([[-1, tie.gradient]]) };
  };
  const scales = (C: Dependent, length: Dependent): ThreeScales => {
    const potential = estimateOf(covariance, C);
    return {
      length: estimateOf(covariance, length),
      potential,
      offset: {
        value: potential.value / SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
        u: potential.u / SPEED_OF_LIGHT_SQUARED_M2_PER_S2,
      },
    };
  };
  const height = (indices: readonly number[]): Dependent => ({
    value: indices.reduce((sum, i) => sum + inputs[i]!.value, 0),
    gradient: combineGradients(indices.map((i) => [1, { indices: [i], values: [1] }])),
  });
  const tie = clock.tie.map((step, k) => {
    const end = upTo(k + 1);
    return {
      name: step.name ?? `step ${k + 1}`,
      step: scales(difference(end, upTo(k)), height([steps[k]!])),
      endC: end.value,
      digits: statedDigits(step.dH.text),
    };
  });
  return { tie, sum: steps.length === 0 ? null : scales(upTo(steps.length), height(steps)) };
}

/** Share of a link's variance that comes in through a clock's tie, its covariances included (JCGM 100, 5.2.2). */
export const tieShare = (budget: readonly BudgetRow[], clock: string): number =>
  budget.reduce((sum, { input, share }) => (input.startsWith(`clocks.${clock}.tie.`) ? sum + share : sum), 0);
