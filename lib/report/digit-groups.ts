import { digitGroups } from '../quantity/index.js';

/** In plain text the gap between groups of digits has to be a character: one that is no line break and is read back as none. */
const GAP = '\u00a0';

/** A printed number with its digits in groups of three, from five digits up, on both sides of the point. */
export const grouped = (text: string): string =>
  text.replace(/^([+\u2212]?)(\d+)(?:\.(\d+))?/, (_, sign: string, whole: string, fraction: string | undefined) => {
    const point = fraction === undefined ? '' : `.${digitGroups(fraction, 'fraction').join(GAP)}`;
    return sign + digitGroups(whole, 'integer').join(GAP) + point;
  });
