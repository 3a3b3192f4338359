import { describe, expect, it } from 'vitest';
import { breakEven, clocksOverDistanceM } from '../../../lib/answers/break-even.js';
import {
  fromGnssModel,
  gnssUncertaintyM,
  levellingDistanceForUncertaintyM,
  levellingOverDistanceM,
  smallestDistanceM,
} from '../../../lib/answers/classical-methods.js';
import { plan } from '../../../lib/answers/plan.js';
import { predict } from '../../../lib/answers/predict.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf } from '../model/campaign-of.js';

type Loose = { [key: string]: unknown };

const MM_ROOT_KM = 1e-3 / Math.sqrt(1000);
const gnss = (zeta: string, source: string | null = 'geoid'): Loose => ({
  kind: 'gnss-quasigeoid',
  h: { value: '300.000(6) m', tide: 'free' },
  zeta: { value: zeta, tide: 'zero', ...(source ? { source } : {}) },
});
const site = (id: string, lon: number, determinations: Loose[]): Loose => ({
  id,
  lat: 50,
  lon,
  g: 9.81,
  determinations,
});
// 1° of longitude at 50° on GRS80 is 71.70 km along the parallel (Moritz 2000 constants: N·cos φ·π/180)
const campaign = (more: Loose = {}) =>
  campaignOf({
    window: { start: 61528, end: 61548 },
    sources: [{ id: 'geoid', correlationLength: '60 km' }],
    sites: [site('a', 8, [gnss('45.000(15) m')]), site('b', 9, [gnss('45.500(18) m')])],
    clocks: [
      { id: 'ka', site: 'a', transition: '87Sr', systematic: 1.2e-18 },
      { id: 'kb', site: 'b', transition: '87Sr', systematic: 1.6e-18 },
    ],
    links: [{ id: 'ab', from: 'ka', to: 'kb', kind: 'fibre' }],
    ...more,
  });
// u = 2e-18 in y
const CLOCKS = (2e-18 * 299_792_458 ** 2) / 9.81;

describe('levelling', () => {
  it('is as uncertain as the clocks at the distance found', () => {
    const model = { bRootM: 1.5 * MM_ROOT_KM, k: 1e-7, detour: 1 };
    const d = levellingDistanceForUncertaintyM(model, 0.0217)!;
    // 0.01 d² + 2.25 d = 21.7² with d in km: d = −112.5 + √(112.5² + 47 089) = 132.16
    expectWithin(d / 1000, -112.5 + Math.sqrt(112.5 ** 2 + 47_089), 1e-9);
    expectWithin(levellingOverDistanceM(model, d), 0.0217, 1e-12);
    expectWithin(levellingDistanceForUncertaintyM({ ...model, detour: 1.25 }, 0.0217)!, d / 1.25, 1e-6);
  });
  it('of one term alone, and of none', () => {
    expectWithin(levellingDistanceForUncertaintyM({ bRootM: MM_ROOT_KM, k: 0, detour: 1 }, 0.01)!, 100_000, 1e-6);
    expectWithin(levellingDistanceForUncertaintyM({ bRootM: 0, k: 1e-7, detour: 1 }, 0.01)!, 100_000, 1e-6);
    expect(levellingDistanceForUncertaintyM({ bRootM: 0, k: 0, detour: 1 }, 0.01)).toBeNull();
    // 30 000 km are on no Earth
    expect(levellingDistanceForUncertaintyM({ bRootM: 0, k: 1e-7, detour: 1 }, 3)).toBeNull();
  });
});

describe('GNSS and geoid', () => {
  const model = fromGnssModel({ hM: 0.007, geoidM: 0.017, correlation: 0, correlationLengthM: 60_000 }, 'option');
  it('rises from the heights to the whole, and crosses where the closed form says', () => {
    expectWithin(gnssUncertaintyM(model, 0), Math.SQRT2 * 0.007, 1e-12);
    expectWithin(gnssUncertaintyM(model, 1e8), Math.SQRT2 * Math.hypot(0.007, 0.017), 1e-12);
    const d = smallestDistanceM((x) => gnssUncertaintyM(model, x), 0.0217)!;
    expectWithin(d, -60_000 * Math.log(1 - (0.0217 ** 2 / 2 - 0.007 ** 2) / 0.017 ** 2), 1e-4);
  });
  it('has no crossing outside its range', () => {
    const u = (x: number) => gnssUncertaintyM(model, x);
    expect(smallestDistanceM(u, 0.009)).toBe(0);
    expect(smallestDistanceM(u, 0.027)).toBeNull();
  });
});

describe('breakEven', () => {
  it('takes GNSS from the two sites of the link with their correlation, as predict does', () => {
    const answer = breakEven(campaign());
    const [ab] = answer.links;
    expectWithin(ab!.distance, 71_695, 20);
    const u = predict(campaign()).links[0]!.dH!.u;
    // dH adds u(ḡ) = 0 here: g is exact
    expectWithin(ab!.gnss!, u, 1e-9);
    const rho = Math.exp(-ab!.distance / 60_000);
    const expected = Math.sqrt(2 * 0.006 ** 2 + 0.015 ** 2 + 0.018 ** 2 - 2 * rho * 0.015 * 0.018);
    // γ at 255 m is 9.8099 where g is 9.81
    expectWithin(ab!.gnss!, expected, 2e-6);
    expectWithin(ab!.clocks!, CLOCKS, 1e-12);
    expect(ab!.best).toBe('clocks');
    expect(answer.levelling).toBeNull();
    expect(ab!.levelling).toBeNull();
    // at the crossing the model of the link is as uncertain as the clocks
    expectWithin(gnssUncertaintyM(ab!.gnssModel!, ab!.beyond.gnss!), CLOCKS, 1e-9);
    expect(ab!.beyond.gnss!).toBeLessThan(ab!.distance);
  });

  it('takes levelling from lines of the file, from methods, from options: the later stands', () => {
    const line = (b: string, k: string): Loose => ({
      kind: 'levelled-from',
      site: 'a',
      dH: 0.1,
      length: '90 km',
      b,
      k,
    });
    const sites = [
      site('a', 8, [gnss('45.000(15) m')]),
      site('b', 9, [line('3 mm/√km', '0.3 mm/km'), line('4 mm/√km', '0.4 mm/km')]),
    ];
    const inFile = breakEven(campaign({ sites }));
    // root mean square of 3 and 4
    expectWithin(inFile.levelling!.bRootM, Math.sqrt(12.5) * MM_ROOT_KM, 1e-15);
    expectWithin(inFile.levelling!.k, Math.sqrt(12.5) * 1e-7, 1e-18);
    expect(inFile.links[0]!.gnss).toBeNull();
    const methods = {
      levelling: { b: '1.5 mm/√km', k: '0.1 mm/km', detour: 1.2 },
      gnss: { h: '7 mm', geoid: '17 mm' },
    };
    const stated = breakEven(campaign({ sites, methods }));
    const L = (1.2 * stated.links[0]!.distance) / 1000;
    expectWithin(stated.links[0]!.levelling!, 1e-3 * Math.sqrt(2.25 * L + 0.01 * L * L), 1e-12);
    expectWithin(stated.links[0]!.gnss!, Math.SQRT2 * Math.hypot(0.007, 0.017), 1e-12);
    expect([stated.levelling!.origin, stated.gnss!.origin]).toEqual(['methods', 'methods']);
    const given = breakEven(campaign({ sites, methods }), {
      levelling: { bRootM: MM_ROOT_KM, k: 0, detour: 1, origin: 'option' },
    });
    expectWithin(given.links[0]!.levelling!, 1e-3 * Math.sqrt(given.links[0]!.distance / 1000), 1e-12);
  });

  it('puts nothing in for what nobody stated', () => {
    const sites = [site('a', 8, []), site('b', 9, [])];
    const answer = breakEven(campaign({ sites }));
    expect(answer).toMatchObject({ levelling: null, gnss: null });
    expect(answer.links[0]).toMatchObject({
      levelling: null,
      gnss: null,
      best: 'clocks',
      beyond: { levelling: null, gnss: null },
    });
    expect(answer.curve.every((p) => p.levelling === null && p.gnss === null)).toBe(true);
  });

  it('asks for a time where there is no window', () => {
    const without = campaign({ window: undefined });
    expect(() => breakEven(without)).toThrow(CampaignError);
    expect(breakEven(without, { timeS: 86_400 }).time).toBe(86_400);
  });

  it('says what a link would be without what limits it', () => {
    const [ab] = breakEven(campaign()).links;
    expect(ab!.limit).toMatchObject({ kind: 'systematic', of: 'kb' });
    expectWithin(ab!.withoutLimit!, (1.2 / 2) * CLOCKS, 1e-12);
  });

  it('lets the noise of a stated fibre grow with the distance, with the third power in variance', () => {
    const links = [{ id: 'ab', from: 'ka', to: 'kb', length: '100 km', fibre: { noise: 1e6, bandwidth: '1000 Hz' } }];
    const c = campaign({ links });
    const [ab] = breakEven(c, { timeS: 1e4 }).links;
    const at = plan(c).links[0]!.curve.find(({ T }) => T === 1e4)!;
    expectWithin(ab!.clocks!, at.uH, 1e-12);
    expectWithin(ab!.fibreVariance, at.uH ** 2 - CLOCKS ** 2, 1e-12);
    expectWithin(clocksOverDistanceM(ab!, 2 * ab!.distance)!, Math.sqrt(CLOCKS ** 2 + 8 * ab!.fibreVariance), 1e-12);
  });
});
