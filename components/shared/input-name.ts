import type { Campaign } from '../../lib/campaign/campaign.js';
import { inputWords } from '../../lib/report/input-words.js';
import type { RichText } from './rich-text.js';

/** An input of a campaign in words: `sites.ridge.determinations.0.zeta` → *Ridge, ζ*; what has no words keeps its path. */
export const inputName = (campaign: Campaign, path: string): RichText => inputWords(campaign, path);
