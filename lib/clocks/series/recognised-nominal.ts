import { RECOMMENDED_FREQUENCIES } from '../recommended-frequencies.js';
import { type Nominal, nominal, ratioNominal } from './nominal.js';

export interface NominalChoice {
  readonly nominal: Nominal;
  /** what was recognised, in words; null when it was stated */
  readonly named: string | null;
}

/** How near, as a fraction: far beyond any shift of a clock on Earth (1e-12 for 10 km), far below the distance of any two
 *  transitions. */
const NEAR = 1e-9;

const isNear = (value: number, reference: number): boolean => Math.abs(value / reference - 1) < NEAR;

/** The recommended frequency, ratio of two recommended frequencies, or 1, next to which a value lies; null if none. */
export function recognisedNominal(kind: 'hz' | 'ratio', text: string): NominalChoice | null {
  const value = Number(text);
  if (!(value > 0)) return null;
  if (kind === 'hz') {
    const found = RECOMMENDED_FREQUENCIES.find((f) => isNear(value, f.frequencyHz));
    if (!found) return null;
    return {
      nominal: nominal(found.text, found.text),
      named: `the recommended frequency of ${found.transition}, ${found.text} Hz`,
    };
  }
  if (isNear(value, 1)) return { nominal: nominal('1', '1'), named: '1, the ratio of equal clocks' };
  for (const b of RECOMMENDED_FREQUENCIES) {
    const a = RECOMMENDED_FREQUENCIES.find((f) => isNear(value, b.frequencyHz / f.frequencyHz));
    if (a) {
      return {
        nominal: ratioNominal(b.text, a.text),
        named: `the ratio of the recommended frequencies of ${b.transition} and ${a.transition}`,
      };
    }
  }
  return null;
}
