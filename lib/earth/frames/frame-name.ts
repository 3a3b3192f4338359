/** Terrestrial reference frames between which published parameters are built in. */
export const FRAME_NAMES = [
  'ITRF2020',
  'ITRF2014',
  'ITRF2008',
  'ITRF2005',
  'ITRF2000',
  'ETRF2014',
  'ETRF2000',
] as const;

export type FrameName = (typeof FRAME_NAMES)[number];

/** The IGS realisations in which GNSS products are given: aligned to the ITRF beside them without shift, rotation or scale
 *  (as the IGS announced with each; from memory). */
const ALIASES: Readonly<Record<string, FrameName>> = {
  IGS20: 'ITRF2020',
  IGB20: 'ITRF2020',
  IGS14: 'ITRF2014',
  IGB14: 'ITRF2014',
  IGS08: 'ITRF2008',
  IGB08: 'ITRF2008',
  IGS05: 'ITRF2005',
  IGS00: 'ITRF2000',
  IGB00: 'ITRF2000',
};

/** Names that stand for several frames, with what to write instead. */
const AMBIGUOUS: Readonly<Record<string, string>> = {
  ETRS89: 'ETRS89 is a system with several realisations: name the one of your heights, ETRF2000 or ETRF2014',
  WGS84:
    'the realisations of WGS 84 follow the ITRF of their time: name that ITRF (G2139 and G2296: ITRF2014, ITRF2020)',
  ITRS: 'name the realisation, such as ITRF2020',
  ITRF: 'name the realisation with its year, such as ITRF2020',
  ITRF88: 'older than ITRF2000: convert to ITRF2000 or later first',
  ITRF97: 'older than ITRF2000: convert to ITRF2000 or later first',
};

const tidy = (text: string): string => text.toUpperCase().replace(/[\s_-]+/g, '');

/** The frame a text names, or what would be right. */
export type FrameReading =
  | { readonly ok: true; readonly frame: FrameName }
  | { readonly ok: false; readonly expected: string };

/** Reads `ITRF2020`, `itrf 2020`, `IGb20`, `ETRF2000`; never guesses a realisation. */
export function readFrameName(text: string): FrameReading {
  const name = tidy(text);
  const exact = FRAME_NAMES.find((frame) => frame === name) ?? ALIASES[name];
  if (exact !== undefined) return { ok: true, frame: exact };
  const base = name.replace(/\(.*\)$/, '');
  const why = AMBIGUOUS[base];
  return {
    ok: false,
    expected: `one of ${FRAME_NAMES.join(', ')} (or IGS00 … IGS20)${why === undefined ? '' : `; ${why}`}`,
  };
}
