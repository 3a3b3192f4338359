import type { Section } from '../../lib/answers/section.js';
import type { SectionPlanInput } from './section-plan.js';
import { type SectionScale, sectionScale } from './section-scale.js';

const HIGH_PX = { wide: 440, narrow: 300, low: 304 };
const PER_BREAK_PX = { wide: 70, narrow: 50, low: 26 };
/** Above the highest and below the lowest there is room for a label of three lines. */
const PADDING_PX = { wide: 40, narrow: 24, low: 27 };
/** Under the lowest site its label; under the reference level nothing. */
const BELOW_PX = { wide: 66, narrow: 40 };
const UNDER_ZERO_PX = 22;
const BREAK_PX = { wide: 36, narrow: 28 };
/** Uncertainties are drawn 30 times the height scale, or where that would not be seen or cover the plate, at another round multiple. */
const USUAL_MULTIPLE = 30;
const SMALLER = [10, 3, 1];
const LARGER = [100, 300, 1000, 3000, 10_000];
const MOST_HALF_PX = 46;
const LEAST_HALF_PX = 1.5;
const median = (values: readonly number[]): number => {
  const sorted = values.filter((v) => v > 0).sort((a, b) => a - b);
  return sorted[Math.floor(sorted.length / 2)] ?? 0;
};

/** What is fixed before anything is placed. */
export interface SectionExtent {
  readonly scale: SectionScale;
  /** px */
  readonly height: number;
  /** the reference level is on the section */
  readonly zeroFits: boolean;
  readonly multiple: number;
}

/** What each site holds, from the lowest of marker, rungs and atoms to the highest. */
function contentOf(section: Section) {
  return section.sites.map(({ id, C }) => {
    const levels = [C.value];
    for (const clock of section.clocks)
      if (clock.site === id) levels.push(clock.C.value, ...clock.tie.map(({ endC }) => C.value + endC));
    return { from: Math.min(...levels), to: Math.max(...levels) };
  });
}

/** The scale of a section, its height, and how thick uncertainties are drawn on it. */
export function scaleFor({ section, links, narrow, low }: SectionPlanInput): SectionExtent {
  const size = narrow ? 'narrow' : 'wide';
  const uncertainties = [...section.sites.map(({ C }) => C.u), ...links.map(({ uPotential }) => uPotential)];
  const typical = median(uncertainties);
  const largestU = Math.max(0, ...uncertainties);
  const content = contentOf(section);
  const ties = content.map(({ from, to }) => to - from).filter((extent) => extent > 0);
  const details = [median(ties), USUAL_MULTIPLE * typical].filter((detail) => detail > 0);
  const high = low && !narrow ? 'low' : size;
  const of = (contents: readonly { from: number; to: number }[], height: number) =>
    sectionScale(contents, {
      paddingBelow:
        contents.some(({ to }) => to === 0) && content.every(({ from }) => from >= 0) ? UNDER_ZERO_PX : BELOW_PX[size],
      top: 30,
      bottom: height,
      padding: high === 'low' ? PADDING_PX.low : PADDING_PX[size],
      breakHeight: BREAK_PX[size],
      detail: details.length === 0 ? 0 : Math.min(...details),
      largestBand: USUAL_MULTIPLE * (largestU < 3 * typical ? largestU : typical),
    });
  const heightFor = (breaks: number) => HIGH_PX[high] + PER_BREAK_PX[high] * Math.max(0, breaks - 1);
  const withZero = [...content, { from: 0, to: 0 }];
  const first = of(content, heightFor(1));
  // the reference level belongs on the section unless it would cost a break of its own
  const zeroFits = of(withZero, heightFor(1)).breaks.length === first.breaks.length;
  const contents = zeroFits ? withZero : content;
  const height = heightFor(first.breaks.length);
  const scale = of(contents, height);
  const largest = largestU * scale.pxPerUnit;
  const usual = typical * scale.pxPerUnit;
  let multiple = USUAL_MULTIPLE;
  for (const larger of LARGER)
    if (usual > 0 && usual * multiple < LEAST_HALF_PX && largest * larger <= MOST_HALF_PX) multiple = larger;
  for (const smaller of SMALLER) if (largest * multiple > MOST_HALF_PX) multiple = smaller;
  return { scale, height, zeroFits, multiple };
}
