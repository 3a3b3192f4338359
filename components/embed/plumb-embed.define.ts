import '../campaign/plumb-campaign.define.js';
import { define } from '../define.js';
import { PlumbEmbed } from './plumb-embed.js';

define('plumb-embed', PlumbEmbed);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-embed': PlumbEmbed;
  }
}
