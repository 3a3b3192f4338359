import type { TideSystem } from '../campaign/campaign.js';
import type { Fault } from '../campaign/fault.js';
import { RECOMMENDED_FREQUENCIES, recommendedFrequency } from '../clocks/recommended-frequencies.js';
import { closest, parseAngle, parseQuantity } from '../quantity/index.js';
import { GRAVITY_RANGE_MS2 } from './floors.js';
import { OptionReader, type OptionTexts } from './option-texts.js';
import type { PairInput, PairSite } from './pair.js';

const SITE_OPTIONS = ['name', 'lat', 'lon', 'h', 'zeta', 'n', 'g'] as const;

/** Names of the options of a comparison of two sites, as on the command line and as attributes of `<plumb-pair>`. */
export const PAIR_OPTIONS: readonly string[] = [
  ...SITE_OPTIONS.map((name) => `a-${name}`),
  ...SITE_OPTIONS.map((name) => `b-${name}`),
  'correlation',
  'tide',
  'h-tide',
  'geoid-tide',
  'transition',
];

export type PairReading =
  | { readonly ok: true; readonly input: PairInput; readonly asGiven: Readonly<Record<string, string>> }
  | { readonly ok: false; readonly faults: readonly Fault[] };

/** Reads the texts of a comparison of two sites, all faults at once. @param texts by {@link PAIR_OPTIONS} */
export function readPairOptions(texts: OptionTexts): PairReading {
  const read = new OptionReader(texts);
  const a = readSite(read, 'a', 'A');
  const b = readSite(read, 'b', 'B');
  const correlation = read.value('correlation', (text) => parseQuantity(text, 'fraction').value);
  if (correlation !== null && !(Math.abs(correlation) <= 1))
    read.refuse('out-of-range', 'correlation', 'a correlation coefficient from −1 to 1');
  const tide = readTide(read, 'tide') ?? 'mean';
  const hTide = readTide(read, 'h-tide');
  const geoidTide = readTide(read, 'geoid-tide');
  const transition = readTransition(read);
  if (read.faults.length > 0 || !a || !b) return { ok: false, faults: read.faults };
  return { ok: true, input: { a, b, tide, hTide, geoidTide, correlation, transition }, asGiven: read.asGiven };
}

function readSite(read: OptionReader, id: 'a' | 'b', name: string): PairSite | null {
  const option = (one: (typeof SITE_OPTIONS)[number]) => `${id}-${one}`;
  const need = (one: (typeof SITE_OPTIONS)[number], words: string) => {
    if (read.text(option(one)) === null) read.refuse('missing', option(one), words);
  };
  const metres = (one: 'h' | 'zeta' | 'n', low: number, high: number) =>
    read.quantity(
      option(one),
      'length',
      [low, high],
      `${one === 'h' ? 'a height' : 'a value'} of ${minus(low)} to ${high} m`,
    );
  const latitude = read.value(option('lat'), (text) => parseAngle(text, 'latitude'));
  const longitude = read.value(option('lon'), (text) => parseAngle(text, 'longitude'));
  const hM = metres('h', -12_000, 9_000);
  const zetaM = metres('zeta', -120, 120);
  const nM = metres('n', -120, 120);
  const [low, high] = GRAVITY_RANGE_MS2;
  const gMs2 = read.quantity(
    option('g'),
    'acceleration',
    GRAVITY_RANGE_MS2,
    `gravity on Earth, ${low} to ${high} m/s²`,
  );
  need('lat', `the latitude of ${name}: write 52.2961`);
  need('lon', `the longitude of ${name}: write 10.4598`);
  need('h', `the ellipsoidal height of ${name}: write 143.216(8) m`);
  const zetaGiven = read.text(option('zeta')) !== null;
  const nGiven = read.text(option('n')) !== null;
  if (!zetaGiven && !nGiven)
    read.refuse(
      'missing',
      option('zeta'),
      `the height anomaly of ${name}, or its geoid height in ${option('n')}: write 43.812(19) m`,
    );
  if (zetaGiven && nGiven)
    read.refuse('two-of-one', option('n'), `either ${option('zeta')} (quasigeoid) or ${option('n')} (geoid)`);
  if (!latitude || !longitude || !hM || (zetaM === null) === (nM === null)) return null;
  return {
    name: read.text(option('name'))?.trim() ?? name,
    latitudeDeg: latitude.degrees,
    longitudeDeg: longitude.degrees,
    hM,
    zetaM,
    nM,
    gMs2,
  };
}

const minus = (value: number): string => String(value).replace('-', '\u2212');

const TIDES: readonly TideSystem[] = ['mean', 'zero', 'free'];

function readTide(read: OptionReader, name: string): TideSystem | null {
  const text = read.text(name)?.trim();
  if (text === undefined) return null;
  const tide = TIDES.find((one) => one === text);
  if (tide) return tide;
  const near = closest(text, TIDES);
  return read.refuse('unknown-tide', name, near === null ? 'mean, zero or free' : `mean, zero or free: write ${near}`);
}

function readTransition(read: OptionReader): string | null {
  const name = read.text('transition')?.trim();
  if (name === undefined) return null;
  if (recommendedFrequency(name)) return name;
  const names = RECOMMENDED_FREQUENCIES.map(({ transition }) => transition);
  const near = closest(name, names);
  return read.refuse(
    'unknown-transition',
    'transition',
    near === null ? `one of ${names.join(', ')}` : `a transition with a recommended frequency: write ${near}`,
  );
}
