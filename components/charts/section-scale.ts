import { roundStep } from './round-step.js';

/** What must be seen on the section: a site with its clocks, or the reference level. m²/s² above W₀. */
export interface SectionContent {
  readonly from: number;
  readonly to: number;
}

/** An unbroken part of the scale. */
export interface ScalePiece {
  /** C at its lower and upper edge, m²/s² */
  readonly from: number;
  readonly to: number;
  /** px of the lower and upper edge; y grows downward */
  readonly bottom: number;
  readonly top: number;
}

export interface ScaleBreak {
  /** px: its upper and lower edge */
  readonly top: number;
  readonly bottom: number;
  /** m²/s² that are left out */
  readonly leftOut: number;
}

/** C to px, one scale in all pieces. */
export interface SectionScale {
  /** px per m²/s² */
  readonly pxPerUnit: number;
  /** from the lowest to the highest */
  readonly pieces: readonly ScalePiece[];
  readonly breaks: readonly ScaleBreak[];
  /** m²/s² between two equipotential lines */
  readonly levelStep: number;
  toPx(C: number): number;
}

export interface SectionScaleOptions {
  /** px of the figure's upper and lower edge */
  readonly top: number;
  readonly bottom: number;
  /** px kept free over and under what a piece holds */
  readonly padding: number;
  /** px kept free under the lowest */
  readonly paddingBelow: number;
  /** height in px of a break */
  readonly breakHeight: number;
  /** size that must stay visible, as a tie or a drawn uncertainty, m²/s²; 0: none */
  readonly detail: number;
  /** the largest half thickness, as drawn, m²/s² */
  readonly largestBand: number;
}

/** What the detail must at least come out as, px. */
const DETAIL_PX = 9;
/** A break pays where what it leaves out is this many times what is left. */
const WORTH = 2;
const MAX_BREAKS = 6;
/** Where neither ties nor uncertainties set a size: 20 px per m²/s², 2 m to a plate. */
const MOST_PX_PER_UNIT = 20;
const MOST_BAND_PX = 44;
const MOST_LEVELS = 9;

interface Run {
  from: number;
  to: number;
}

/** Levels to px. Kilometres between sites are broken out of the scale where ties and uncertainties would else not be seen;
 *  all pieces keep one scale. @param contents in any order, at least one */
export function sectionScale(contents: readonly SectionContent[], options: SectionScaleOptions): SectionScale {
  let runs = joined(contents, 0);
  const cuts = gapsOf(runs).sort((a, b) => b - a);
  let pxPerUnit = 0;
  // all in one piece first; then with the widest gap cut out, then the next
  for (let count = 0; ; count++) {
    const least = count === 0 ? Number.POSITIVE_INFINITY : cuts[count - 1]!;
    const pieces = joined(contents, least);
    runs = pieces;
    pxPerUnit = scaleOf(pieces, options);
    const next = cuts[count];
    const extent = pieces.reduce((sum, { from, to }) => sum + to - from, 0);
    const visible = options.detail * pxPerUnit >= DETAIL_PX;
    if (visible || next === undefined || count >= MAX_BREAKS || next < WORTH * Math.max(extent - next, 0)) break;
  }
  return laidOut(runs, pxPerUnit, options);
}

/** Overlapping contents as one; gaps smaller than `least` closed. */
function joined(contents: readonly SectionContent[], least: number): Run[] {
  const sorted = [...contents].sort((a, b) => a.from - b.from);
  const runs: Run[] = [];
  for (const { from, to } of sorted) {
    const last = runs.at(-1);
    if (last && (from <= last.to || from - last.to < least)) last.to = Math.max(last.to, to);
    else runs.push({ from, to });
  }
  return runs;
}

const gapsOf = (runs: readonly Run[]): number[] => runs.slice(1).map(({ from }, i) => from - runs[i]!.to);

function scaleOf(
  runs: readonly Run[],
  { top, bottom, padding, paddingBelow, breakHeight, largestBand }: SectionScaleOptions,
): number {
  const room = bottom - top - (2 * runs.length - 1) * padding - paddingBelow - (runs.length - 1) * breakHeight;
  const extent = runs.reduce((sum, { from, to }) => sum + to - from, 0);
  const most = largestBand > 0 ? Math.min(MOST_PX_PER_UNIT, MOST_BAND_PX / largestBand) : MOST_PX_PER_UNIT;
  return extent > 0 ? Math.min(Math.max(room, 40) / extent, most) : most;
}

function laidOut(runs: readonly Run[], pxPerUnit: number, options: SectionScaleOptions): SectionScale {
  const { top, bottom, padding, paddingBelow, breakHeight } = options;
  const used =
    runs.reduce((sum, { from, to }) => sum + (to - from) * pxPerUnit, 0) +
    (2 * runs.length - 1) * padding +
    paddingBelow +
    (runs.length - 1) * breakHeight;
  const spare = Math.max(0, bottom - top - used) / runs.length / 2;
  const pieces: ScalePiece[] = [];
  const breaks: ScaleBreak[] = [];
  let at = bottom;
  for (const { from, to } of runs) {
    const over = padding + spare;
    const under = (pieces.length === 0 ? paddingBelow : padding) + spare;
    const height = (to - from) * pxPerUnit + over + under;
    const piece = { from: from - under / pxPerUnit, to: to + over / pxPerUnit, bottom: at, top: at - height };
    const below = pieces.at(-1);
    if (below) breaks.push({ top: piece.bottom, bottom: piece.bottom + breakHeight, leftOut: piece.from - below.to });
    pieces.push(piece);
    at = piece.top - breakHeight;
  }
  const shown = pieces.reduce((sum, piece) => sum + piece.to - piece.from, 0);
  const toPx = (C: number): number => {
    const piece = pieces.find(({ to }) => C <= to) ?? pieces.at(-1)!;
    return piece.bottom - (C - piece.from) * pxPerUnit;
  };
  return { pxPerUnit, pieces, breaks, levelStep: roundStep(shown / MOST_LEVELS), toPx };
}
