import type { Campaign, Link, TimeInterval } from '../campaign/campaign.js';
import { CampaignError, faultAt, type Warning } from '../campaign/fault.js';
import { intersectionOfIntervals } from '../clocks/intervals.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../constants/defining-constants.js';
import { omittedTide, totalOmittedM2s2 } from '../earth/earth-tide/omitted-tide.js';
import { TIDE_FIRST_MS, TIDE_LAST_MS } from '../earth/earth-tide/sun-and-moon.js';
import { GRS80 } from '../earth/level-ellipsoid.js';
import { normalGravity } from '../earth/normal-field.js';
import { feltTideAtSites } from '../model/felt-tide-at-sites.js';
import { statedHeightM } from '../model/first-determination.js';
import { meanOverIntervals } from './mean-over-intervals.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

/** Seconds between the samples of a series where none are asked for. */
export const TIDE_STEP_S = 600;
/** More samples than this per link are refused: a year at ten seconds has 3.2 million. */
const MAX_SAMPLES = 4_000_000;
/** What is left over counts as harmless below a third of the target: it adds 5 % to a standard uncertainty of that size. */
const HARMLESS_SHARE = 1 / 3;

/** What averaging leaves of a link's tide. */
export interface TideLeft {
  /** mean of y over the time meant, by integration */
  readonly mean: number;
  /** `window`: the whole window; `availability`: the stretches in which both clocks and the link are stated to run */
  readonly over: 'window' | 'availability';
  /** length of that time, s */
  readonly seconds: number;
}

export interface LinkTide {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  /** of the series */
  readonly min: number;
  readonly max: number;
  readonly mean: number;
  /** root mean square about zero */
  readonly rms: number;
  /** bound on y of what the model leaves out */
  readonly omitted: number;
  /** c²/ḡ, m: what turns the numbers above into length equivalents */
  readonly lengthPerOffset: number;
  /** null where the stated availability has no instant in the window */
  readonly left: TideLeft | null;
  /** the target as a frequency offset; null without a target */
  readonly target: number | null;
  /** whether a measured average needs the tide taken off to reach the target; null without a target or `left` */
  readonly needsCorrecting: boolean | null;
}

/** The answer of `tide`. */
export interface TideAnswer {
  readonly format: 'plumbtick-tide/1';
  readonly title?: string;
  /** s between samples; the last may be nearer, on the end of the window */
  readonly step: number;
  readonly series: {
    /** UTC, ISO 8601 */
    readonly times: readonly string[];
    /** what to add to y */
    readonly links: readonly { readonly id: string; readonly y: readonly number[] }[];
  };
  readonly links: readonly LinkTide[];
  readonly warnings: readonly Warning[];
}

/** What the Earth tide adds to each link's y through the window: (δW_A − δW_B)/c² with δW the potential felt at the site.
 *  See solid-earth-tide.ts for how good it is: about 1e-18, `omitted` says how far it may be off.
 * @param stepS seconds between samples, > 0; both ends of the window are sampled
 * @throws {CampaignError} no window, a window outside 1950…2100 or beyond the pole coordinates given, too many samples */
export function tide(campaign: Campaign, stepS: number = TIDE_STEP_S): TideAnswer {
  const window = checkedWindow(campaign, stepS);
  const siteIndex = new Map(campaign.sites.map((s, i) => [s.id, i]));
  const siteOfClock = new Map(campaign.clocks.map((c) => [c.id, siteIndex.get(c.site)!]));
  const ends = campaign.links.map((l) => ({ a: siteOfClock.get(l.from)!, b: siteOfClock.get(l.to)! }));
  const felt = feltTideAtSites(campaign);

  const times = sampleTimes(window, stepS);
  const series = campaign.links.map(() => new Array<number>(times.length));
  const atSites = new Float64Array(campaign.sites.length);
  for (let t = 0; t < times.length; t++) {
    felt.at(times[t]!, atSites);
    for (let l = 0; l < ends.length; l++) series[l]![t] = (atSites[ends[l]!.a]! - atSites[ends[l]!.b]!) / C2;
  }
  const meanAtSites = (intervals: readonly TimeInterval[]) =>
    meanOverIntervals(intervals, campaign.sites.length, (ms, into) => felt.at(ms, into));
  const overWindow = meanAtSites([window])!;

  const links = campaign.links.map((link, l): LinkTide => {
    const { a, b } = ends[l]!;
    const stated = statedAvailability(campaign, link);
    const common = stated === null ? [window] : intersectionOfIntervals([...stated, [window]]);
    const means = stated === null ? overWindow : meanAtSites(common);
    const left: TideLeft | null = means && {
      mean: (means.values[a]! - means.values[b]!) / C2,
      over: stated === null ? 'window' : 'availability',
      seconds: means.seconds,
    };
    const lengthPerOffset = C2 / meanGravity(campaign, a, b);
    const target = campaign.targetM === null ? null : campaign.targetM / lengthPerOffset;
    return {
      id: link.id,
      from: link.from,
      to: link.to,
      ...statistics(series[l]!),
      // clocks on one piece of crust feel one tide, and whatever the model leaves out of it
      omitted: a === b ? 0 : (omittedAt(campaign, a) + omittedAt(campaign, b)) / C2,
      lengthPerOffset,
      left,
      target,
      needsCorrecting: target === null || left === null ? null : Math.abs(left.mean) > HARMLESS_SHARE * target,
    };
  });
  return {
    format: 'plumbtick-tide/1',
    ...(campaign.title === undefined ? {} : { title: campaign.title }),
    step: stepS,
    series: {
      times: times.map((ms) => new Date(ms).toISOString().replace('.000Z', 'Z')),
      links: campaign.links.map((link, l) => ({ id: link.id, y: series[l]! })),
    },
    links,
    warnings: tideWarnings(campaign, links),
  };
}

function checkedWindow(campaign: Campaign, stepS: number): TimeInterval {
  const { window, pole } = campaign;
  const refuse = (code: string, path: string, found: string, expected: string): never => {
    throw new CampaignError([faultAt(code, path, found, expected)]);
  };
  if (!window)
    return refuse('missing', 'window', 'no window', '"window": the time for which the tide is wanted, start and end');
  const iso = (ms: number) => new Date(ms).toISOString();
  if (window.startMs < TIDE_FIRST_MS || window.endMs > TIDE_LAST_MS)
    refuse('out-of-range', 'window', `${iso(window.startMs)} to ${iso(window.endMs)}`, 'a window within 1950 to 2100');
  if (!(stepS > 0)) refuse('out-of-range', 'step', `${stepS} s`, 'a step of more than 0 s, such as 10 min');
  const samples = (window.endMs - window.startMs) / 1000 / stepS + 1;
  if (samples > MAX_SAMPLES)
    refuse(
      'too-many-samples',
      'step',
      `${stepS} s, ${Math.ceil(samples)} samples`,
      `at most ${MAX_SAMPLES} samples: a step of ${Math.ceil((window.endMs - window.startMs) / 1000 / MAX_SAMPLES)} s or more`,
    );
  const first = pole?.[0]?.timeMs;
  const last = pole?.at(-1)?.timeMs;
  if (first != null && last != null && (first > window.startMs || last < window.endMs))
    refuse(
      'pole-outside-window',
      'pole',
      `coordinates from ${iso(first)} to ${iso(last)}`,
      `coordinates that reach over the window, ${iso(window.startMs)} to ${iso(window.endMs)}; or one position without a time`,
    );
  return window;
}

function sampleTimes({ startMs, endMs }: TimeInterval, stepS: number): number[] {
  const times: number[] = [];
  for (let i = 0; ; i++) {
    const ms = startMs + i * stepS * 1000;
    // a rounding of a nanosecond must not make a sample of its own beside the end
    if (ms >= endMs - 1e-6 * stepS * 1000) break;
    times.push(ms);
  }
  times.push(endMs);
  return times;
}

function statistics(y: readonly number[]): Pick<LinkTide, 'min' | 'max' | 'mean' | 'rms'> {
  let min = Number.POSITIVE_INFINITY;
  let max = Number.NEGATIVE_INFINITY;
  let sum = 0;
  let squares = 0;
  for (const v of y) {
    if (v < min) min = v;
    if (v > max) max = v;
    sum += v;
    squares += v * v;
  }
  return { min, max, mean: sum / y.length, rms: Math.sqrt(squares / y.length) };
}

/** The stated availabilities of a link's two clocks and of itself; null where none of them states any. */
function statedAvailability(campaign: Campaign, link: Link): (readonly TimeInterval[])[] | null {
  const parts = [link, ...campaign.clocks.filter((c) => c.id === link.from || c.id === link.to)];
  const stated = parts.flatMap((p) => (p.available ? [p.available] : []));
  return stated.length > 0 ? stated : null;
}

function meanGravity(campaign: Campaign, a: number, b: number): number {
  const at = (s: number) => {
    const site = campaign.sites[s]!;
    return site.g?.value ?? normalGravity(GRS80, site.latitudeRad, statedHeightM(campaign, site));
  };
  return (at(a) + at(b)) / 2;
}

const omittedAt = (campaign: Campaign, s: number): number => {
  const site = campaign.sites[s]!;
  return totalOmittedM2s2(
    omittedTide(site.latitudeRad, site.longitudeRad, {
      oceanLoading: site.oceanLoading !== undefined,
      pole: (campaign.pole ?? []).length > 0,
    }),
  );
};

function tideWarnings(campaign: Campaign, links: readonly LinkTide[]): Warning[] {
  const units = (y: number) => `${(y * 1e18).toPrecision(2)}e-18`;
  const warnings: Warning[] = links
    .filter((link) => link.left === null)
    .map((link) => ({
      code: 'never-available',
      path: `links.${link.id}`,
      message: 'the two clocks and the link have no common time inside the window; nothing is averaged.',
    }));
  const limited = links.filter((link) => link.target !== null && link.omitted > HARMLESS_SHARE * link.target);
  const worst = limited.reduce<LinkTide | null>((a, b) => (a && a.omitted >= b.omitted ? a : b), null);
  if (worst?.target != null)
    warnings.push({
      code: 'tide-model-limit',
      path: 'links',
      message: `the tide left out may reach ${units(worst.omitted)} (${worst.id}), more than a third of the target ${units(worst.target)}${limited.length > 1 ? `, and likewise on ${limited.length - 1} more` : ''}: diurnal core resonance, ${(campaign.pole ?? []).length > 0 ? '' : 'pole tide, '}ocean loading where it is not stated, air and water. Most of it averages out over weeks. State oceanLoading of the sites and pole of the campaign to narrow it.`,
    });
  return warnings;
}
