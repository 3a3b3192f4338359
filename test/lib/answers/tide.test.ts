import { describe, expect, it } from 'vitest';
import { meanOverIntervals } from '../../../lib/answers/mean-over-intervals.js';
import { tide } from '../../../lib/answers/tide.js';
import { tideCautions } from '../../../lib/answers/tide-cautions.js';
import type { Campaign } from '../../../lib/campaign/campaign.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../lib/constants/defining-constants.js';
import { solidEarthTideM2s2, tideSite } from '../../../lib/earth/earth-tide/solid-earth-tide.js';
import { sunAndMoon } from '../../../lib/earth/earth-tide/sun-and-moon.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;
const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const base = {
  format: 'plumbtick-campaign/1',
  window: { start: '2027-05-03T00:00:00Z', end: '2027-05-17T00:00:00Z' },
  target: '1 cm',
  sites: [
    { id: 'north', lat: 52.2961, lon: 10.4598, h: { value: 143.216, tide: 'free' } },
    { id: 'south', lat: -33.77, lon: 151.11, h: { value: 60, tide: 'free' } },
  ],
  clocks: [
    { id: 'n', site: 'north', transition: '87Sr' },
    { id: 'n2', site: 'north', transition: '87Sr' },
    { id: 's', site: 'south', transition: '171Yb' },
  ],
  links: [
    { id: 'ns', from: 'n', to: 's' },
    { id: 'sn', from: 's', to: 'n' },
    { id: 'house', from: 'n', to: 'n2' },
  ],
};
const campaignOf = (changes: object = {}): Campaign => readCampaignValue({ ...base, ...changes }).campaign;
const linkOf = (answer: ReturnType<typeof tide>, id: string) => answer.links.find((l) => l.id === id)!;
const faultOf = (run: () => unknown) => {
  try {
    run();
  } catch (error) {
    if (error instanceof CampaignError) return error.faults[0]!;
    throw error;
  }
  throw new Error('not refused');
};

describe('tide of a campaign', () => {
  const answer = tide(campaignOf());

  it('is (δW_A − δW_B)/c², the site at its own height', () => {
    const places = [
      tideSite(degToRad(52.2961), degToRad(10.4598), 143.216),
      tideSite(degToRad(-33.77), degToRad(151.11), 60),
    ];
    for (const i of [0, 1, 777, 2016]) {
      const at = sunAndMoon(Date.parse(answer.series.times[i]!));
      const expected = (solidEarthTideM2s2(places[0]!, at) - solidEarthTideM2s2(places[1]!, at)) / C2;
      within(answer.series.links[0]!.y[i]!, expected, 1e-25);
    }
  });

  it('samples both ends of the window, the last step shorter if it must be', () => {
    expect(answer.series.times).toHaveLength(14 * 144 + 1);
    expect(answer.series.times[0]).toBe('2027-05-03T00:00:00Z');
    expect(answer.series.times.at(-1)).toBe('2027-05-17T00:00:00Z');
    const odd = tide(campaignOf({ window: { start: '2027-05-03T00:00:00Z', end: '2027-05-03T01:15:00Z' } }), 1800);
    expect(odd.series.times).toEqual([
      '2027-05-03T00:00:00Z',
      '2027-05-03T00:30:00Z',
      '2027-05-03T01:00:00Z',
      '2027-05-03T01:15:00Z',
    ]);
  });

  it('has min, max, mean and rms about zero of the series', () => {
    const y = answer.series.links[0]!.y;
    const link = linkOf(answer, 'ns');
    within(link.min, Math.min(...y), 0);
    within(link.max, Math.max(...y), 0);
    within(link.mean, y.reduce((s, v) => s + v, 0) / y.length, 1e-30);
    within(link.rms ** 2, y.reduce((s, v) => s + v * v, 0) / y.length, 1e-40);
    // between hemispheres the tide is some 1e-17: that is what the command is for
    expect(link.max).toBeGreaterThan(1e-17);
  });

  it('is opposite in the opposite direction and nothing inside a house', () => {
    for (const [i, v] of answer.series.links[0]!.y.entries()) expect(answer.series.links[1]!.y[i]).toBe(-v);
    expect(linkOf(answer, 'house')).toMatchObject({ min: 0, max: 0, rms: 0, omitted: 0, needsCorrecting: false });
  });

  it('bounds what is left out: 0.4 m²/s² of ocean at the coast, none inland', () => {
    const sin2 = (lat: number) => Math.abs(Math.sin(2 * degToRad(lat)));
    const expected = 0.17 * sin2(52.2961) + 0.1 + 0.17 * sin2(-33.77) + 0.1 + 0.4;
    within(linkOf(answer, 'ns').omitted, expected / C2, 1e-30);
    expect(answer.warnings.map((w) => w.code)).toContain('tide-model-limit');
  });

  it('says by integration what the average over the window leaves, and whether that matters for the target', () => {
    const link = linkOf(answer, 'ns');
    // trapezoidal rule over ten-minute samples: the half-daily wave to 1e-3 of itself
    const y = answer.series.links[0]!.y;
    const trapezoid = (y.reduce((s, v) => s + v, 0) - (y[0]! + y.at(-1)!) / 2) / (y.length - 1);
    within(link.left!.mean, trapezoid, 2e-22);
    expect(link.left).toMatchObject({ over: 'window', seconds: 14 * 86_400 });
    within(link.target!, (0.01 * 9.805) / C2, 2e-21);
    expect(link.needsCorrecting).toBe(Math.abs(link.left!.mean) > link.target! / 3);
    expect(linkOf(tide(campaignOf({ target: '1 µm' })), 'ns').needsCorrecting).toBe(true);
    expect(linkOf(tide(campaignOf({ target: '10 m' })), 'ns').needsCorrecting).toBe(false);
    const { target, ...without } = base;
    expect(linkOf(tide(readCampaignValue(without).campaign), 'ns')).toMatchObject({
      target: null,
      needsCorrecting: null,
    });
    expect(target).toBe('1 cm');
  });

  it('aliases the solar tides into the mean when the clocks run by day only', () => {
    const days = Array.from({ length: 14 }, (_, d) => {
      const day = String(3 + d).padStart(2, '0');
      return { start: `2027-05-${day}T08:00:00Z`, end: `2027-05-${day}T16:00:00Z` };
    });
    const clocks = base.clocks.map((c) => (c.id === 'n' ? { ...c, available: days } : c));
    const link = linkOf(tide(campaignOf({ clocks })), 'ns');
    expect(link.left).toMatchObject({ over: 'availability', seconds: 14 * 8 * 3600 });
    // the same by brute force on a fine grid
    const places = [
      tideSite(degToRad(52.2961), degToRad(10.4598), 143.216),
      tideSite(degToRad(-33.77), degToRad(151.11), 60),
    ];
    let sum = 0;
    let n = 0;
    for (const { start, end } of days)
      for (let ms = Date.parse(start) + 300_000; ms < Date.parse(end); ms += 600_000) {
        const at = sunAndMoon(ms);
        sum += (solidEarthTideM2s2(places[0]!, at) - solidEarthTideM2s2(places[1]!, at)) / C2;
        n++;
      }
    within(link.left!.mean, sum / n, 5e-22);
    // ten times what the whole window leaves would be
    expect(Math.abs(link.left!.mean)).toBeGreaterThan(1e-18);
  });

  it('says so when clocks and link never run together', () => {
    const at = (day: string) => [{ start: `2027-05-${day}T00:00:00Z`, end: `2027-05-${day}T12:00:00Z` }];
    const clocks = base.clocks.map((c) =>
      c.id === 'n' ? { ...c, available: at('04') } : c.id === 's' ? { ...c, available: at('06') } : c,
    );
    const never = tide(campaignOf({ clocks }));
    expect(linkOf(never, 'ns')).toMatchObject({ left: null, needsCorrecting: null });
    expect(never.warnings).toContainEqual(expect.objectContaining({ code: 'never-available', path: 'links.ns' }));
  });

  it('adds the ocean’s load and the pole tide where they are given', () => {
    const plain = campaignOf();
    const m2 = { constituent: 'M2', amplitudeM2s2: 0.5, phaseLagRad: 0.3 } as const;
    const loaded: Campaign = {
      ...plain,
      sites: plain.sites.map((s) => (s.id === 'south' ? { ...s, oceanLoading: [m2] } : s)),
      pole: [{ timeMs: null, xRad: 1e-6, yRad: 3e-6 }],
    };
    const more = tide(loaded);
    const change = more.series.links[0]!.y.map((v, i) => v - answer.series.links[0]!.y[i]!);
    const size = (Math.max(...change) - Math.min(...change)) / 2;
    within(size, 0.5 / C2, 0.05 * (0.5 / C2), 'M2 of half a m²/s²');
    const offset = (Math.max(...change) + Math.min(...change)) / 2;
    expect(Math.abs(offset)).toBeGreaterThan(5e-20);
    expect(linkOf(more, 'ns').omitted).toBeLessThan(linkOf(answer, 'ns').omitted - 0.4 / C2);
  });

  it('takes the height of the first determination where the site has none, else 0', () => {
    const heightless = (determinations: object[]) =>
      tide(
        campaignOf({
          sites: [{ id: 'north', lat: 52.2961, lon: 10.4598, determinations }, base.sites[1]],
        }),
      ).series.links[0]!.y[5]!;
    const at = sunAndMoon(Date.parse(answer.series.times[5]!));
    const south = solidEarthTideM2s2(tideSite(degToRad(-33.77), degToRad(151.11), 60), at);
    const north = (h: number) => solidEarthTideM2s2(tideSite(degToRad(52.2961), degToRad(10.4598), h), at);
    within(heightless([{ kind: 'normal-height', H: 2000 }]), (north(2000) - south) / C2, 1e-24);
    within(heightless([]), (north(0) - south) / C2, 1e-24);
    expect(Math.abs(north(2000) - north(0)) / C2).toBeGreaterThan(1e-22);
  });

  it('refuses in words: no window, a window outside the ephemeris, a step that is none, pole coordinates that end early', () => {
    const { window, ...windowless } = base;
    expect(faultOf(() => tide(readCampaignValue(windowless).campaign))).toMatchObject({
      code: 'missing',
      path: 'window',
    });
    expect(window).toBeDefined();
    expect(
      faultOf(() => tide(campaignOf({ window: { start: '1940-01-01T00:00:00Z', end: '1940-02-01T00:00:00Z' } }))),
    ).toMatchObject({ code: 'out-of-range', path: 'window' });
    for (const step of [0, -5, Number.NaN]) expect(faultOf(() => tide(campaignOf(), step)).path).toBe('step');
    expect(faultOf(() => tide(campaignOf(), 0.1)).code).toBe('too-many-samples');
    const early = {
      ...campaignOf(),
      pole: [
        { timeMs: 0, xRad: 0, yRad: 0 },
        { timeMs: Date.UTC(2027, 4, 10), xRad: 0, yRad: 0 },
      ],
    };
    expect(faultOf(() => tide(early))).toMatchObject({ code: 'pole-outside-window', path: 'pole' });
  });
});

describe('a word on the tide beside a prediction', () => {
  it('names the links on which averaging leaves more than a third of the target', () => {
    const short = { window: { start: '2027-05-03T00:00:00Z', end: '2027-05-03T05:00:00Z' }, target: '1 cm' };
    const cautions = tideCautions(campaignOf(short));
    expect(cautions.map((w) => [w.code, w.path])).toEqual([
      ['tide-needs-correcting', 'links.ns'],
      ['tide-needs-correcting', 'links.sn'],
    ]);
    const left = linkOf(tide(campaignOf(short)), 'ns').left!.mean;
    expect(cautions[0]!.message).toContain(`${(left * 1e18).toFixed(2)}e-18`);
    expect(tideCautions(campaignOf({ target: '10 m' }))).toEqual([]);
    expect(tideCautions(campaignOf({ ...short, links: [] }))).toEqual([]);
    const { window, ...windowless } = base;
    expect(tideCautions(readCampaignValue(windowless).campaign)).toEqual([]);
    expect(window).toBeDefined();
  });
});

describe('mean over intervals', () => {
  it('integrates a half-daily wave to 1e-10 and a line exactly, over pieces of any length', () => {
    const wave = (ms: number) => Math.cos((2 * Math.PI * ms) / (12.42 * 3_600_000) + 1);
    const integral = (ms: number) =>
      (Math.sin((2 * Math.PI * ms) / (12.42 * 3_600_000) + 1) * 12.42 * 3_600_000) / (2 * Math.PI);
    const intervals = [
      { startMs: 0, endMs: 5_000_000 },
      { startMs: 20_000_000, endMs: 97_000_000 },
    ];
    const total = 82_000_000;
    const mean = meanOverIntervals(intervals, 2, (ms, into) => {
      into[0] = wave(ms);
      into[1] = ms;
    })!;
    within(mean.values[0]!, (integral(5e6) - integral(0) + integral(97e6) - integral(20e6)) / total, 1e-10);
    within(mean.values[1]!, (0.5 * (5e6 ** 2 + 97e6 ** 2 - 20e6 ** 2)) / total, 1e-6);
    within(mean.seconds, 82_000, 0);
    expect(meanOverIntervals([], 1, () => {})).toBeNull();
  });
});
