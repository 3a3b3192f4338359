import type { Campaign } from '../campaign/campaign.js';
import { buildModel } from '../model/build-model.js';
import type { Model } from '../model/model.js';
import { type SitePotentials, solveSitePotentials } from '../model/site-potentials.js';
import type { Dependent } from '../uncertainty/gradient.js';
import { clockPotential, type LinkQuantities, linkQuantities } from './quantities.js';

/** A campaign solved for its potentials: what every answer starts from. */
export interface SolvedCampaign {
  readonly model: Model;
  readonly potentials: SitePotentials;
  /** W at the atoms, per clock */
  readonly clocks: readonly Dependent[];
  /** per link; null where its ends have no common level */
  readonly links: readonly (LinkQuantities | null)[];
}

/** Builds the model and solves it.
 * @throws {CampaignError} */
export function solveCampaign(campaign: Campaign): SolvedCampaign {
  const model = buildModel(campaign);
  const potentials = solveSitePotentials(model);
  const clocks = campaign.clocks.map((_, i) => clockPotential(model, potentials, i));
  const links = campaign.links.map((l) => linkQuantities(model, potentials, clocks, l));
  return { model, potentials, clocks, links };
}
