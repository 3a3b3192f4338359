import { define } from '../define.js';
import { PlumbCampaign } from './plumb-campaign.js';

define('plumb-campaign', PlumbCampaign);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-campaign': PlumbCampaign;
  }
}
