import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { predict } from '../../../lib/answers/predict.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight, normalGravity } from '../../../lib/earth/normal-field.js';
import { readNormalHeightField } from '../../../lib/earth/normal-height-field.js';
import type { ModelFunction } from '../../../lib/model/model-function.js';
import { withMotion } from '../../../lib/model/moved-height.js';
import { degToRad } from '../../../lib/quantity/radians.js';

const within = (actual: number, expected: number, tolerance: number, what = '') =>
  expect(Math.abs(actual - expected), `${what} ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance);

const LAT = 52.2961;
const LON = 10.4598;
const W0 = 62_636_853.4;
const C = (H: number, lat = LAT) => geopotentialOfNormalHeight(GRS80, degToRad(lat), H).geopotentialM2s2;

interface Extra {
  readonly h?: object;
  readonly zeta?: object;
  readonly datum?: object;
  readonly campaign?: object;
  readonly kinds?: readonly object[];
}

/** One site with h = 143.216 m and ζ = 43.812 m, all labels given, so that only what a case adds can warn. */
const campaignOf = ({ h, zeta, datum, campaign, kinds }: Extra = {}) =>
  readCampaignValue({
    format: 'plumbtick-campaign/1',
    datums: [{ id: 'd', W0, ...datum }],
    sites: [
      {
        id: 's',
        lat: LAT,
        lon: LON,
        g: 9.8125,
        h: { value: '143.216(8) m', tide: 'free', ...h },
        determinations: kinds ?? [
          { kind: 'gnss-quasigeoid', datum: 'd', zeta: { value: '43.812(19) m', tide: 'zero', ...zeta } },
        ],
      },
    ],
    clocks: [{ id: 'c', site: 's', transition: '87Sr' }],
    ...campaign,
  }).campaign;
const answer = (extra: Extra = {}) => predict(campaignOf(extra));
const W = (extra: Extra = {}) => answer(extra).sites[0]!.W!.value;
const codes = (extra: Extra) => answer(extra).warnings.map((w) => w.code);
const gamma = normalGravity(GRS80, degToRad(LAT), 100);

type Row = [string, string, number, number, number, number, number, number, number];
const proj = (
  JSON.parse(readFileSync(new URL('../../data/frames/proj.json', import.meta.url), 'utf8')) as { cases: Row[] }
).cases;
/** change of h from one frame to another at this very site, by PROJ */
const dhByProj = (from: string, to: string, epoch: number) => {
  const row = proj.find((c) => c[0] === from && c[1] === to && c[3] === LAT && c[5] === epoch)!;
  return row[8] - row[4];
};

describe('frame and epoch of a GNSS height', () => {
  const plain = W();

  it('leave W alone where nothing is stated, or the frame is the same', () => {
    expect(codes({})).toEqual([]);
    within(W({ h: { frame: 'ITRF2014' }, datum: { frame: 'ITRF2014' } }), plain, 1e-9);
    expect(codes({ h: { frame: 'IGS14' }, datum: { frame: 'ITRF2014' } })).toEqual([]);
  });

  it.each([
    ['ITRF2020', 'ETRF2000', 2027.36],
    ['ETRF2000', 'ITRF2008', 2010.35],
    ['ITRF2000', 'ITRF2020', 1997.5],
  ])('%s to %s at %d moves h as PROJ does, and a warning gives the millimetres', (from, to, epoch) => {
    const extra = { h: { frame: from, epoch }, datum: { frame: to } };
    const dh = dhByProj(from, to, epoch);
    within(W(extra), plain - gamma * dh, 1e-5);
    const warning = answer(extra).warnings.find((w) => w.code === 'frame-converted')!;
    expect(warning.path).toBe('sites.s.h');
    expect(warning.message).toContain(`${dh < 0 ? '−' : '+'}${Math.abs(dh * 1000).toFixed(1)} mm`);
  });

  it('take the frame of ζ before that of its datum', () => {
    const own = W({
      h: { frame: 'ITRF2020', epoch: 2027.36 },
      zeta: { frame: 'ETRF2000' },
      datum: { frame: 'ITRF2020' },
    });
    within(own, plain - gamma * dhByProj('ITRF2020', 'ETRF2000', 2027.36), 1e-5);
  });

  it('moves h by its rate to the epoch of the datum, then changes the frame there', () => {
    const extra = {
      h: { frame: 'ITRF2020', epoch: 2017.36, rate: '8.0(5) mm/a' },
      datum: { frame: 'ETRF2000', epoch: 2027.36 },
    };
    const dh = 0.08 + dhByProj('ITRF2020', 'ETRF2000', 2027.36);
    within(W(extra), plain - gamma * dh, 1e-5);
    expect(codes(extra)).toEqual(['epoch-converted', 'frame-converted']);
    // u of the rate: 0.5 mm/a over ten years is 5 mm, beside 8 mm of h and 19 mm of ζ
    within(answer(extra).sites[0]!.W!.u, gamma * Math.hypot(0.008, 0.019, 0.005), 1e-4);
  });

  it('wants the campaign’s epoch before the datum’s, and the middle of the window where neither is stated', () => {
    const h = { epoch: 2017.36, rate: '8 mm/a' };
    const window = { start: '2027-05-03T00:00:00Z', end: '2027-05-17T00:00:00Z' };
    within(W({ h, datum: { epoch: 2000 }, campaign: { epoch: 2027.36 } }), plain - gamma * 0.08, 1e-5);
    within(W({ h, datum: { epoch: 2007.36 } }), plain + gamma * 0.08, 1e-5);
    // 10 May 2027 is 2027.353
    within(W({ h, campaign: { window } }), plain - gamma * 0.008 * 9.993, 2e-4);
    within(W({ h }), plain, 1e-9);
    const late = answer({ h, datum: { epoch: 2007.36 }, campaign: { window } }).warnings;
    expect(late.map((w) => w.code)).toEqual(['epoch-converted', 'epoch-not-of-window']);
    expect(late[1]!.message).toMatch(/\+159\.9 mm more.*"epoch": 2027\.35/);
  });

  it('moves ζ by its own rate too', () => {
    const extra = { h: { epoch: 2017, rate: 0 }, zeta: { epoch: 2017, rate: '1 mm/a' }, campaign: { epoch: 2027 } };
    within(W(extra), plain + gamma * 0.01, 1e-5);
  });

  it('says so where only one of them states its frame, with the worst it may cost', () => {
    const h = answer({ h: { frame: 'ITRF2020', epoch: 2027.36 } }).warnings;
    expect(h.map((w) => w.code)).toEqual(['geoid-frame-missing']);
    expect(h[0]!.message).toMatch(/If it is \w+, h is off by \d+ mm/);
    expect(codes({ datum: { frame: 'ETRF2000' } })).toEqual(['height-frame-missing']);
  });

  it('says so where an epoch is stated, another is wanted and no rate is known', () => {
    const extra = { h: { frame: 'ETRF2000', epoch: 2020 }, datum: { frame: 'ETRF2000', epoch: 2000 } };
    expect(codes(extra)).toEqual(['epoch-without-rate']);
    within(W(extra), plain, 1e-9);
    expect(answer(extra).warnings[0]!.message).toMatch(/Each 1 mm\/a would be 20 mm/);
  });

  it('refuses a change of frame and a rate without an epoch', () => {
    const fault = (extra: Extra) => {
      try {
        answer(extra);
      } catch (error) {
        if (error instanceof CampaignError) return error.faults[0]!;
      }
      throw new Error('not refused');
    };
    expect(fault({ h: { frame: 'ITRF2020' }, datum: { frame: 'ETRF2000' } })).toMatchObject({
      code: 'missing',
      path: 'sites.s.h.epoch',
    });
    expect(fault({ h: { rate: '1 mm/a' } })).toMatchObject({ code: 'missing', path: 'sites.s.h.epoch' });
  });
});

describe('levelled heights', () => {
  const H = (value: object | string, more: object = {}) => ({
    kinds: [
      { kind: 'normal-height', datum: 'd', H: typeof value === 'string' ? { value, tide: 'mean' } : value, ...more },
    ],
  });

  it.each([
    ['normal-height', (h: number) => W0 - C(h)],
    ['dynamic-height', (h: number) => W0 - normalGravity(GRS80, degToRad(45), 0) * h],
    ['orthometric-height', (h: number) => W0 - (9.8125 + 4.24e-7 * h) * h],
  ])('%s moves by its rate to the epoch of the datum', (kind, expected) => {
    const at = (rate: object) => ({
      datum: { epoch: 2020 },
      kinds: [{ kind, datum: 'd', H: { value: 341.207, tide: 'mean', epoch: 2000, ...rate } }],
    });
    within(W(at({ rate: '-3 mm/a' })), expected(341.207 - 0.06), 1e-6);
    within(W(at({ rate: 0 })), expected(341.207), 1e-6);
  });

  it('of another normal field are turned into potential by that field', () => {
    for (const field of ['GRS67', 'International1930', 'Helmert1901-potsdam', 'WGS84']) {
      const c = readNormalHeightField(field)!.geopotential(degToRad(LAT), 1200).geopotentialM2s2;
      within(W(H('1200 m', { field })), W0 - c, 1e-6, field);
    }
    within(W(H('1200 m', { field: 'GRS80' })), W0 - C(1200), 1e-6);
    within(W(H('1200 m', { field: 'GRS80' })), W(H('1200 m')), 0);
    // 14 mGal at 1200 m
    within(W(H('1200 m', { field: 'Helmert1901-potsdam' })) - W(H('1200 m', { field: 'Helmert1901' })), 0.168, 1e-6);
  });

  it('without gravity in them are taken as normal heights, with a warning of the size of (g − γ)·H', () => {
    const extra = { kinds: [{ kind: 'normal-orthometric-height', datum: 'd', H: { value: 600, tide: 'mean' } }] };
    within(W(extra), W0 - C(600), 1e-6);
    const { warnings } = answer(extra);
    expect(warnings.map((w) => w.code)).toEqual(['normal-orthometric']);
    const size = Math.abs(9.8125 - normalGravity(GRS80, degToRad(LAT), 600)) * 600;
    expect(warnings[0]!.message).toContain(`${Number(size.toPrecision(2))} m²/s²`);
  });
});

describe('a position in another system', () => {
  it('is the same site as by latitude and longitude, and what was done is said', () => {
    const at = (place: object) =>
      readCampaignValue({
        format: 'plumbtick-campaign/1',
        sites: [{ id: 's', ...place, determinations: [{ kind: 'normal-height', H: { value: 800, tide: 'mean' } }] }],
      });
    // proj.json of test/data/positions: EPSG:31467
    const cases = (
      JSON.parse(readFileSync(new URL('../../data/positions/proj.json', import.meta.url), 'utf8')) as {
        cases: [number, number, number, number, number][];
      }
    ).cases;
    const [, x, y, lat, lon] = cases.find((c) => c[0] === 31467)!;
    const grid = at({ position: { crs: 'EPSG:31467', x, y } });
    const plain = at({ lat, lon });
    within(predict(grid.campaign).sites[0]!.W!.value, predict(plain.campaign).sites[0]!.W!.value, 1e-6);
    expect(grid.warnings).toContainEqual(
      expect.objectContaining({ code: 'position-converted', path: 'sites.s.position' }),
    );
    expect(grid.warnings[0]!.message).toMatch(/seven-parameter shift/);
  });

  it('in geocentric coordinates brings h along, exact, with a warning; a stated h stays', () => {
    const at = (more: object) =>
      readCampaignValue({
        format: 'plumbtick-campaign/1',
        sites: [
          {
            id: 's',
            position: { crs: 'geocentric', x: 2e6, y: 3e6, z: 5.244e6 },
            ...more,
            determinations: [{ kind: 'gnss-quasigeoid', zeta: { value: 30, tide: 'zero' } }],
          },
        ],
      });
    const xyz = at({});
    // ERFA t_gc2gd: 331.41731754844348 m on GRS80
    within(xyz.campaign.sites[0]!.h!.value, 331.41731754844348, 1e-7);
    expect(xyz.warnings[0]!.message).toMatch(/taken as exact/);
    expect(at({ h: 331 }).campaign.sites[0]!.h!.value).toBe(331);
  });
});

describe('a moving height as an argument', () => {
  it('has the derivatives of the function it moves', () => {
    const f: ModelFunction = {
      inputs: [7, 8],
      evaluate: (x) => x[0]! * x[0]! * x[1]!,
      partials: (x) => [2 * x[0]! * x[1]!, x[0]! * x[0]!],
    };
    const moved = withMotion(f, [
      { argument: 0, rate: 3, seconds: 2 },
      { argument: 1, rate: 4, seconds: -5 },
    ]);
    expect(moved.inputs).toEqual([7, 8, 3, 4]);
    const x = [1.3, 0.7, 0.2, 0.1];
    within(moved.evaluate(x), (1.3 + 0.4) ** 2 * (0.7 - 0.5), 1e-14);
    for (const k of [0, 1, 2, 3]) {
      const at = (d: number) => moved.evaluate(x.map((v, i) => (i === k ? v + d : v)));
      within(moved.partials(x)[k]!, (at(1e-6) - at(-1e-6)) / 2e-6, 1e-8);
    }
    expect(withMotion(f, [])).toBe(f);
  });
});
