import { html, nothing, type SVGTemplateResult, svg, type TemplateResult } from 'lit';
import type { LinkPrediction } from '../../lib/answers/prediction.js';
import type { Section } from '../../lib/answers/section.js';
import type { Campaign } from '../../lib/campaign/campaign.js';
import { formatConcise } from '../../lib/quantity/index.js';
import type { SectionPlan } from '../charts/section-plan.js';
import { plainText } from '../shared/rich-text.js';
import type { FigureOptions } from './section-figure.js';
import * as figure from './section-figure.js';
import { LOUPE_RADIUS_PX, type Loupe, type LoupeSubject } from './section-loupe.js';
import * as words from './section-words.js';

/** Layouts of the plate, by its width in px. */
export type Layout = 'wide' | 'middle' | 'narrow';
export const layoutOf = (width: number): Layout => (width >= 1120 ? 'wide' : width >= 656 ? 'middle' : 'narrow');
export const MOST_WIDTH_PX = 1280;
export const MARGINS = {
  wide: { left: 214, right: 300 },
  middle: { left: 186, right: 6 },
  narrow: { left: 46, right: 56 },
};
/** More sites than this are scrolled; the loupe then stands below. */
export const MOST_ACROSS = 7;
/** All that is drawn of a campaign. */
export interface Drawn {
  readonly campaign: Campaign;
  readonly section: Section;
  readonly links: readonly LinkPrediction[];
  readonly inHand: string | null;
  readonly layout: Layout;
  readonly plan: SectionPlan;
  readonly subject: LoupeSubject | null;
}

/** What the reference level is called beside its symbol; in a narrow plate the symbol is enough. */
export const zeroWords = ({ W0 }: Section, layout: Layout): string =>
  layout === 'narrow' ? '' : `${formatConcise(W0, null)} m²/s² (IHRS)`;

/** What the plate tells the element of the reader. */
export interface PlateHandlers {
  readonly point: (event: Event) => void;
  readonly leave: () => void;
  readonly choose: (event: Event) => void;
  readonly key: (event: KeyboardEvent) => void;
}

/** The drawing: scales at the left, the plot, the loupe beside it in a wide plate. */
export function sectionPlate(
  drawn: Drawn,
  glass: Loupe | null,
  options: FigureOptions,
  on: PlateHandlers,
): TemplateResult {
  const { plan, section: found, layout, inHand, subject } = drawn;
  const held = plan.links.filter(({ link }) => link.id === inHand);
  const others = plan.links.filter(({ link }) => link.id !== inHand);
  const heldEnds = held.flatMap(({ link }) => [link.from, link.to]);
  const under = subject?.kind === 'tie' ? plan.clocks.find(({ clock }) => clock.id === subject.clock.id) : undefined;
  const right =
    layout === 'wide' ? plan.right + MARGINS.wide.right : plan.right + (layout === 'narrow' ? MARGINS.narrow.right : 6);
  const scrolled = plan.sites.length > MOST_ACROSS;
  const positions =
    layout === 'narrow'
      ? { length: plan.left - 4, potential: null, offset: null }
      : layout === 'middle'
        ? { length: 42, potential: 106, offset: plan.left - 10 }
        : { length: 48, potential: 122, offset: plan.left - 10 };
  const height = plan.height + 16;
  return html`<div
      class="fig"
      part="figure"
      @pointerover=${on.point}
      @pointerleave=${on.leave}
      @focusin=${on.point}
      @focusout=${on.leave}
      @click=${on.choose}
      @keydown=${on.key}
    >
      <svg class="scales" width=${plan.left} height=${height} viewBox="0 0 ${plan.left} ${height}" aria-hidden="true">
        ${figure.sectionScales(plan, found.scaleGravity, positions)}
      </svg>
      <div class="scroll ${scrolled ? 'wide' : ''}">
        <svg
          width=${right - plan.left}
          height=${height}
          viewBox="${plan.left} 0 ${right - plan.left} ${height}"
          role="group"
          aria-label=${`Potential section: ${plainText(words.sentence(found, null))}`}
        >
          ${figure.sectionLevels(plan)}
          ${layout === 'narrow' ? figure.rightScale(plan) : nothing}
          ${figure.knockOuts(plan)} ${layout === 'wide' && glass && under ? leader(under, glass, plan) : nothing}
          ${others.map((link) => figure.linkBand(link, false))} ${held.map((link) => figure.linkBand(link, true))}
          ${plan.sites.map((site) => figure.siteMark(site, options))}
          ${others.map((link) => figure.linkMark(link, plan.scale, options))} ${plan.clocks.map(figure.ladder)}
          ${held.map((link) => figure.linkMark(link, plan.scale, options))}
          ${under ? svg`<circle cx=${under.x} cy=${glassOn(under).y} r=${glassOn(under).r} class="s-glass"/>` : nothing}
          ${plan.clocks.map((clock) => figure.clockMark(clock, heldEnds.includes(clock.clock.id), options))}
          ${figure.breakWords(plan)} ${figure.zeroName(plan, zeroWords(found, layout))}
          ${plan.sites.map((site) => figure.siteLabelOf(site, options))}
          ${plan.links.map((link) => figure.linkLabelOf(link, options))}
          ${layout === 'wide' && glass ? glassBeside(glass, under?.markerY ?? plan.height / 2, plan) : nothing}
        </svg>
      </div>
    </div>`;
}

function loupeCentre(
  { leaderY }: Loupe,
  markerY: number,
  { right, height }: SectionPlan,
): readonly [x: number, y: number] {
  const y = Math.min(height - LOUPE_RADIUS_PX - 66, Math.max(LOUPE_RADIUS_PX + 2, markerY - leaderY));
  return [right + MARGINS.wide.right - LOUPE_RADIUS_PX - 4, y];
}

/** The level of the marker, carried over to the loupe. */
function leader(under: SectionPlan['clocks'][number], glass: Loupe, plan: SectionPlan): SVGTemplateResult {
  const [x, y] = loupeCentre(glass, under.markerY, plan);
  const at = y + glass.leaderY;
  const edge = x - Math.sqrt(LOUPE_RADIUS_PX ** 2 - glass.leaderY ** 2);
  const bend = x - LOUPE_RADIUS_PX - 6;
  return svg`<path d="M${under.x} ${under.markerY}H${bend}V${at}H${edge}" class="s-leader"/>`;
}

function glassBeside(glass: Loupe, markerY: number, plan: SectionPlan): SVGTemplateResult {
  const [x, y] = loupeCentre(glass, markerY, plan);
  return svg`<g transform="translate(${x} ${y})" aria-hidden="true">${glass.drawing}
      <text y=${LOUPE_RADIUS_PX + 26} text-anchor="middle" class="sn">${glass.title}</text>
      <text y=${LOUPE_RADIUS_PX + 44} text-anchor="middle" class="l2">${glass.magnification}</text></g>`;
}

/** The loupe as a drawing of its own, below the plate. */
export function glassBelow(glass: Loupe): TemplateResult {
  const size = 2 * LOUPE_RADIUS_PX + 4;
  return html`<svg width=${size} height=${size} viewBox="${-size / 2} ${-size / 2} ${size} ${size}" aria-hidden="true">
      ${glass.drawing}
    </svg>`;
}

/** The ring round what the loupe shows; round the atoms alone where the tie is long. */
function glassOn({ y, markerY, rungs }: SectionPlan['clocks'][number]): { readonly y: number; readonly r: number } {
  const levels = [y, markerY, ...rungs];
  const [low, high] = [Math.min(...levels), Math.max(...levels)];
  const r = (high - low) / 2 + 14;
  return r > 36 ? { y, r: 20 } : { y: (low + high) / 2, r };
}
