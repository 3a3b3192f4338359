/** The public door of Plumbtick's library. */
export type * from './campaign/campaign.js';
export { CampaignError, type Fault, type Warning } from './campaign/fault.js';
export { version } from './constants/version.js';
