import type { Fault } from '../campaign/fault.js';
import { RECOMMENDED_FREQUENCIES, recommendedFrequency } from '../clocks/recommended-frequencies.js';
import { closest, degToRad, parseAngle } from '../quantity/index.js';
import {
  FLOORS_MAX_HEIGHT_DIFFERENCE_M,
  type FloorsInput,
  type FloorsTransition,
  GRAVITY_RANGE_MS2,
} from './floors.js';
import { OptionReader, type OptionTexts } from './option-texts.js';

/** Names of the options of the inter-floor check, as on the command line and as attributes of `<plumb-floors>`. */
export const FLOORS_OPTIONS = ['dh', 'g', 'lat', 'height', 'gradient', 'transition', 'measured'] as const;
export type FloorsOption = (typeof FLOORS_OPTIONS)[number];

export type FloorsReading =
  | { readonly ok: true; readonly input: FloorsInput; readonly asGiven: Readonly<Record<string, string>> }
  | { readonly ok: false; readonly faults: readonly Fault[] };

/** Reads the texts of an inter-floor check, all faults at once.
 * @param texts by {@link FLOORS_OPTIONS}
 * @param transitions names of the transitions asked for, if not the one in `texts.transition` */
export function readFloorsOptions(
  texts: OptionTexts,
  transitions: readonly string[] = [texts['transition'] ?? ''],
): FloorsReading {
  const read = new OptionReader(texts);
  const max = FLOORS_MAX_HEIGHT_DIFFERENCE_M;
  const [gLow, gHigh] = GRAVITY_RANGE_MS2;
  const dHM = read.quantity('dh', 'length', [-max, max], `a height difference of at most ${max} m`);
  const gMs2 = read.quantity('g', 'acceleration', GRAVITY_RANGE_MS2, `gravity on Earth, ${gLow} to ${gHigh} m/s²`);
  const latitude = read.value('lat', (text) => parseAngle(text, 'latitude'));
  const heightM = read.quantity('height', 'length', [-12_000, 9_000], 'a height of −12 to 9 km');
  const gradientPerS2 = read.quantity(
    'gradient',
    'gradient',
    [-1e-4, 1e-4],
    'the decrease of g with height, about 3.086e-6 s⁻²',
  );
  const measuredY = read.quantity(
    'measured',
    'fraction',
    [-1e-10, 1e-10],
    'a fractional offset such as 1.3493(8)e-15, of at most 1e-10',
  );
  if (read.text('dh') === null) read.refuse('missing', 'dh', 'a height difference: write 12.348(3) m');
  if (read.text('g') === null) {
    if (read.text('lat') === null && read.text('height') === null)
      read.refuse(
        'missing',
        'g',
        'gravity at the lower floor, or latitude and height in its place: write 9.8125(1) m/s²',
      );
    else if (read.text('lat') === null)
      read.refuse('missing', 'lat', 'the latitude beside the height, for gravity comes from both: write 52.3');
    else if (read.text('height') === null)
      read.refuse('missing', 'height', 'the height beside the latitude, for gravity comes from both: write 80 m');
  }
  const known = transitions.filter((name) => name.trim() !== '').flatMap((name) => readTransition(read, name.trim()));
  if (read.faults.length > 0 || dHM === null) return { ok: false, faults: read.faults };
  return {
    ok: true,
    asGiven: read.asGiven,
    input: {
      dHM,
      gMs2,
      latitudeRad: latitude === null ? null : degToRad(latitude.degrees),
      heightM,
      gradientPerS2,
      transitions: known,
      measuredY,
    },
  };
}

function readTransition(read: OptionReader, name: string): readonly FloorsTransition[] {
  const found = recommendedFrequency(name);
  if (found) {
    const { frequencyHz, relativeStandardUncertainty } = found;
    return [{ id: name, frequencyHz: { value: frequencyHz, u: frequencyHz * relativeStandardUncertainty } }];
  }
  const names = RECOMMENDED_FREQUENCIES.map((frequency) => frequency.transition);
  const near = closest(name, names);
  read.refuse(
    'unknown-transition',
    'transition',
    near === null ? `one of ${names.join(', ')}` : `a transition with a recommended frequency: write ${near}`,
  );
  return [];
}
