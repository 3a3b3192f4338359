import type { Campaign, Site } from '../campaign/campaign.js';
import { FeltTide } from '../earth/earth-tide/felt-tide.js';
import { statedHeightM } from './first-determination.js';

/** The tide felt at sites of a campaign, with its Love numbers and pole, and their ocean loading where stated. */
export const feltTideAtSites = (campaign: Campaign, sites: readonly Site[] = campaign.sites): FeltTide =>
  new FeltTide(
    sites.map((site) => ({
      ...site,
      heightM: site.h?.value ?? statedHeightM(campaign, site),
      oceanLoading: site.oceanLoading ?? [],
    })),
    campaign.love,
    campaign.pole ?? [],
  );
