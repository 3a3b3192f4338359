/** Permanent-tide system: what of the time-independent tide is in a height, a geoid or a potential (Mäkinen 2021;
 *  IERS Conventions 2010, section 1.1). */
export type TideSystem = 'mean' | 'zero' | 'free';
