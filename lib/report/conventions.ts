import type { Campaign, TideSystem } from '../campaign/campaign.js';
import { W0_IHRS, W0_TT } from '../constants/defining-constants.js';
import { formatConcise } from '../quantity/index.js';
import { grouped } from './digit-groups.js';

const potentialText = ({ value, u }: { readonly value: number; readonly u: number }) =>
  `${grouped(formatConcise(u > 0 ? value : Number(value.toFixed(4)), u))}\u00a0m²/s²`;

/** What y > 0 means; under every table that shows one. */
export const SIGN_NOTE =
  'Sign: y > 0 when the second clock of a link (to) runs fast: it is the higher one. ΔW = W(from) − W(to).';

/** What the metre column of the three scales is. */
export const LENGTH_NOTE =
  'length is the length equivalent ΔW/ḡ, a scale to read ΔW by. Over distance it is not a height difference: that is the normal height.';

/** In which permanent-tide system what stands. */
export const tideNote = (tide: TideSystem): string =>
  tide === 'mean'
    ? 'Permanent tide: mean, for potentials and for y.'
    : `Permanent tide: ${tide} for W, C and ΔW; y is that of the mean tide, which is what a clock feels on average, so y differs from ΔW/c².`;

/** W0 of every datum that the campaign's determinations name, and of Terrestrial Time. */
export function referencePotentialNote(campaign: Campaign): string {
  const named = new Set(
    campaign.sites.flatMap((site) => site.determinations.flatMap((d) => ('datum' in d ? [d.datum] : []))),
  );
  const own = campaign.datums.filter(({ id }) => named.has(id)).map(({ id, W0 }) => `${id} ${potentialText(W0)}`);
  const builtIn = [W0_IHRS, W0_TT].map(({ value }) => potentialText({ value, u: 0 }));
  return `W₀: ${[...own, `ihrs ${builtIn[0]}`, `Terrestrial Time ${builtIn[1]}`].join('; ')}.`;
}
