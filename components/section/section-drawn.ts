import { section } from '../../lib/answers/section.js';
import { sectionPlan } from '../charts/section-plan.js';
import { oncePerCampaign, solvedOf } from '../state/answers.js';
import type { AnsweredCampaign } from '../state/campaign-context.js';
import { type Drawn, layoutOf, MARGINS, MOST_ACROSS, MOST_WIDTH_PX, zeroWords } from './section-plate.js';
import { subjectOf } from './section-subject.js';
import * as words from './section-words.js';

export const sectionOf = oncePerCampaign((campaign) => section(solvedOf(campaign)));

export interface DrawOptions {
  /** id of the link in hand */
  readonly inHand: string | null;
  /** id of the clock that the loupe is put on */
  readonly chosen: string | null;
  /** px */
  readonly width: number;
  /** low, for a sheet that holds more than the section */
  readonly bare: boolean;
}

/** Everything that is drawn of a campaign, in px. */
export function drawnOf(
  { campaign, prediction }: AnsweredCampaign,
  { inHand, chosen, width: given, bare }: DrawOptions,
): Drawn {
  const found = sectionOf(campaign);
  const width = Math.min(given, MOST_WIDTH_PX);
  const widest = layoutOf(width);
  const layout = widest === 'wide' && found.sites.length > MOST_ACROSS ? 'middle' : widest;
  const stated = new Map(campaign.links.map((link) => [link.id, link]));
  const plan = sectionPlan({
    section: found,
    inHand,
    width,
    ...MARGINS[layout],
    narrow: layout === 'narrow',
    low: bare,
    underLoupe: (scale) => {
      const subject = subjectOf(found, prediction.links, { inHand, chosen }, scale);
      return layout === 'wide' && subject?.kind === 'tie' ? subject.clock.id : null;
    },
    zeroLabel: `W0 ${zeroWords(found, layout)}`,
    leftOut: (potential) => words.leftOut(potential, found.scaleGravity, layout === 'narrow'),
    siteLines: (site) =>
      layout === 'narrow'
        ? [site.id]
        : [words.shortName(site.name), `W ${words.siteW(site)}`, `C ${words.siteC(site)} m²/s²`],
    links: prediction.links.flatMap((link) => {
      const texts = words.linkTexts(link);
      return texts && link.dW
        ? [
            {
              id: link.id,
              from: link.from,
              to: link.to,
              uPotential: link.dW.u,
              lines: [words.linkHead(stated.get(link.id)!), `y ${texts.offset}e-18`, `${texts.length} m`],
            },
          ]
        : [];
    }),
  });
  const links = prediction.links;
  return {
    campaign,
    section: found,
    links,
    inHand,
    layout,
    plan,
    subject: subjectOf(found, links, { inHand, chosen }, plan.scale),
  };
}
