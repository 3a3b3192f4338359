import type { Campaign, Clock, Link, Site } from '../campaign/campaign.js';
import type { Warning } from '../campaign/fault.js';
import type { InputCovariance } from '../uncertainty/covariance.js';
import type { Dependent } from '../uncertainty/gradient.js';
import type { Input } from '../uncertainty/inputs.js';
import type { ModelFunction } from './model-function.js';

/** One determination as an observation equation: f(x) = W(site), or W(site) − W(other) for levelling. */
export interface DeterminationObservation extends Dependent {
  /** path `sites.ID.determinations.N` */
  readonly path: string;
  /** index into campaign.sites */
  readonly site: number;
  /** position among the site's determinations */
  readonly position: number;
  /** index of the site it was levelled from; null for an absolute determination */
  readonly from: number | null;
  /** compared with the result, not fitted */
  readonly check: boolean;
  /** left out of the fit until it is added */
  readonly candidate: boolean;
  readonly datum: string | null;
  readonly f: ModelFunction;
}

/** Register indices of a site's own inputs. */
export interface SiteInputs {
  readonly g: number;
  readonly gradient: number;
}

/** Indices of the frequency inputs. All are fractions; systematics have value 0. */
export interface FrequencyInputs {
  /** per clock, its systematic */
  readonly clock: readonly number[];
  /** per link, its systematic */
  readonly link: readonly number[];
  /** per transition id, true over recommended frequency − 1 */
  readonly transition: ReadonlyMap<string, number>;
}

/** A campaign as named inputs x with covariance Σ and functions of them with their derivatives. */
export interface Model {
  readonly campaign: Campaign;
  readonly inputs: readonly Input[];
  readonly covariance: InputCovariance;
  readonly determinations: readonly DeterminationObservation[];
  readonly siteInputs: readonly SiteInputs[];
  readonly frequencyInputs: FrequencyInputs;
  /** per clock: what tie and `variable` add to its site's W, m²/s² */
  readonly tieFunctions: readonly (ModelFunction | null)[];
  /** per clock: index of its site's `variable`, or null */
  readonly variableInputs: readonly (number | null)[];
  /** per site: W₀ of the datum to which its printed C refers, in the campaign's tide system */
  readonly referencePotential: readonly (Dependent & { readonly datum: string })[];
  readonly siteIndex: ReadonlyMap<string, number>;
  readonly clockIndex: ReadonlyMap<string, number>;
  /** per site: W in mean tide minus W in the campaign's system, m²/s² */
  readonly toMeanTideM2s2: readonly number[];
  readonly warnings: readonly Warning[];
}

export const siteOfClock = (model: Model, clock: Clock): Site => model.campaign.sites[siteIndexOfClock(model, clock)]!;

export const siteIndexOfClock = (model: Model, clock: Clock): number => model.siteIndex.get(clock.site)!;

export const clocksOfLink = (model: Model, link: Link): { readonly from: Clock; readonly to: Clock } => ({
  from: model.campaign.clocks[model.clockIndex.get(link.from)!]!,
  to: model.campaign.clocks[model.clockIndex.get(link.to)!]!,
});
