/** All elements of Plumbtick, registered; for one alone take its own `….define.js`. */
import './averaging/plumb-averaging.define.js';
import './break-even/plumb-break-even.define.js';
import './budget/plumb-budget.define.js';
import './campaign/plumb-campaign.define.js';
import './desk/plumb-desk.define.js';
import './floors/plumb-floors.define.js';
import './links/plumb-links.define.js';
import './network/plumb-network.define.js';
import './pair/plumb-pair.define.js';
import './section/plumb-section.define.js';
import './series/plumb-series.define.js';

export { version } from '../lib/constants/version.js';
export { PlumbAveraging } from './averaging/plumb-averaging.js';
export { PlumbBreakEven } from './break-even/plumb-break-even.js';
export { PlumbBudget, type PlumbWhatIf } from './budget/plumb-budget.js';
export { PlumbCampaign } from './campaign/plumb-campaign.js';
export { PlumbDesk } from './desk/plumb-desk.js';
export { PlumbFloors } from './floors/plumb-floors.js';
export { PlumbLinks } from './links/plumb-links.js';
export { PlumbNetwork } from './network/plumb-network.js';
export { PlumbPair } from './pair/plumb-pair.js';
export { PlumbElement } from './plumb-element.js';
export { PlumbSection } from './section/plumb-section.js';
export { PlumbSeries } from './series/plumb-series.js';
export type { PlumbChange } from './shared/article-element.js';
export type { AnsweredCampaign, CampaignState } from './state/campaign-context.js';
export type { PlumbSelect } from './state/in-hand.js';
