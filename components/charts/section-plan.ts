import type { Section, SectionClock, SectionSite } from '../../lib/answers/section.js';
import type { Box, LineSpot } from './place-labels.js';
import { scaleFor } from './section-extent.js';
import { sectionLabels } from './section-labels.js';
import { sitePlaces } from './section-places.js';
import type { SectionScale } from './section-scale.js';

/** A link as the section draws it. */
export interface SectionLink {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  /** standard uncertainty of ΔW, m²/s² */
  readonly uPotential: number;
  /** lines of the label, the first with the id */
  readonly lines: readonly string[];
}

export interface SectionPlanInput {
  readonly section: Section;
  readonly links: readonly SectionLink[];
  readonly inHand: string | null;
  /** lines of each site's label, the first its name; as many as there is room for */
  readonly siteLines: (site: SectionSite) => readonly string[];
  readonly width: number;
  /** px left and right of the plot that the scales take */
  readonly left: number;
  readonly right: number;
  /** labels of one word only */
  readonly narrow: boolean;
  /** lower, for a sheet that holds more than the section */
  readonly low?: boolean;
  /** id of the clock that the loupe stands on; its level is carried over to the right */
  readonly underLoupe: (scale: SectionScale) => string | null;
  /** what the reference level is called */
  readonly zeroLabel: string;
  /** words that say what a break leaves out */
  readonly leftOut: (potentialM2s2: number) => string;
}

export interface PlacedSite {
  readonly site: SectionSite;
  readonly x: number;
  readonly y: number;
  /** half thickness of its uncertainty as drawn, px */
  readonly half: number;
  readonly groundFrom: number;
  readonly groundTo: number;
  readonly lines: readonly string[];
  /** null: no room, it stands in the list */
  readonly label: Box | null;
}

export interface PlacedClock {
  readonly clock: SectionClock;
  readonly x: number;
  readonly y: number;
  readonly markerY: number;
  /** px of the end of each step of the tie */
  readonly rungs: readonly number[];
  readonly label: Box | null;
}

export interface PlacedLink {
  readonly link: SectionLink;
  readonly a: readonly [x: number, y: number];
  readonly b: readonly [x: number, y: number];
  readonly half: number;
  readonly lines: readonly string[];
  readonly label: LineSpot | null;
}

/** Everything on the section in px. */
export interface SectionPlan {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly scale: SectionScale;
  /** how many times the height scale uncertainties are drawn */
  readonly multiple: number;
  readonly sites: readonly PlacedSite[];
  readonly clocks: readonly PlacedClock[];
  readonly links: readonly PlacedLink[];
  /** words in each break of the scale */
  readonly breakLabels: readonly (Box & { readonly text: string })[];
  /** y of the reference level, if it is on the section */
  readonly zeroY: number | null;
  readonly zeroLabel: Box | null;
}

const MOST_ACROSS = 7;
const GROUND_PX = { wide: 56, narrow: 32 };
const CLOCK_APART_PX = { wide: 30, narrow: 22 };
/** @param input at least one site */
export function sectionPlan(input: SectionPlanInput): SectionPlan {
  const { section, narrow, left, right } = input;
  const size = narrow ? 'narrow' : 'wide';
  const { scale, height, zeroFits, multiple } = scaleFor(input);
  const count = section.sites.length;
  // more than seven sites: the plot grows and is scrolled, the scales stay
  const inView = input.width - left - right;
  const plotWidth = count > MOST_ACROSS ? (inView / MOST_ACROSS) * count : inView;
  const width = left + plotWidth + right;
  const apart = plotWidth / count;

  const places = sitePlaces(input, scale, left, apart);
  const bare = section.sites.map((site, i) => {
    const x = places[i]!;
    const clocks = section.clocks.filter((clock) => clock.site === site.id);
    const last = i === count - 1 && count > 1;
    const side = last ? -1 : 1;
    const across = Math.min(CLOCK_APART_PX[size], (apart - 12) / (clocks.length + 1));
    const ground = Math.min(GROUND_PX[size], apart * 0.42);
    const inner = x + side * across * Math.max(0, clocks.length - 1);
    return {
      site,
      clocks,
      x,
      side,
      across,
      y: scale.toPx(site.C.value),
      half: multiple * site.C.u * scale.pxPerUnit,
      groundFrom: last ? inner : x - ground,
      groundTo: last ? x + ground : inner,
    };
  });
  const clocksBare = bare.flatMap(({ site, clocks, x, side, across, y }) =>
    clocks.map((clock, k) => ({
      clock,
      x: x + side * across * k,
      y: scale.toPx(clock.C.value),
      markerY: y,
      rungs: clock.tie.map(({ endC }) => scale.toPx(site.C.value + endC)),
    })),
  );
  const at = new Map(clocksBare.map(({ clock, x, y }) => [clock.id, [x, y] as const]));
  const linksBare = input.links.flatMap((link) => {
    const a = at.get(link.from);
    const b = at.get(link.to);
    return a && b ? [{ link, a, b, half: multiple * link.uPotential * scale.pxPerUnit }] : [];
  });

  const labels = sectionLabels(input, {
    scale,
    height,
    zeroFits,
    left,
    plotWidth,
    apart,
    sites: bare,
    clocks: clocksBare,
    links: linksBare,
  });
  return {
    width,
    height,
    left,
    right: left + plotWidth,
    scale,
    multiple,
    breakLabels: labels.breaks,
    zeroY: zeroFits ? scale.toPx(0) : null,
    zeroLabel: labels.placed.get('zero') ?? null,
    sites: bare.map(({ site, x, y, half, groundFrom, groundTo }, i) => ({
      site,
      x,
      y,
      half,
      groundFrom,
      groundTo,
      lines: labels.siteLines[i]!,
      label: labels.placed.get(`site ${site.id}`) ?? null,
    })),
    clocks: clocksBare.map((clock) => ({ ...clock, label: labels.placed.get(`clock ${clock.clock.id}`) ?? null })),
    links: linksBare.map((link) => ({
      ...link,
      lines: labels.linkLines(link.link),
      label: labels.placed.get(`link ${link.link.id}`) ?? null,
    })),
  };
}
