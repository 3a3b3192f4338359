import { describe, expect, it, test } from 'vitest';
import { adjustPlanned } from '../../../lib/answers/adjust.js';
import { plan } from '../../../lib/answers/plan.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf } from '../model/campaign-of.js';

type Loose = { [key: string]: unknown };

// c² (SI Brochure, 9th ed., 2019) over g of both sites
const METRES = 299_792_458 ** 2 / 9.81;
const DAY = 86_400;

const at = (id: string, W: string): Loose => ({
  id,
  lat: 50,
  lon: id === 'a' ? 8 : 10,
  g: 9.81,
  determinations: [{ kind: 'potential', W: { value: W, tide: 'mean' } }],
});

/** Two clocks of one kind over a fibre, 20 days. u(dW) of the prediction is 0.3 m²/s². */
const two = (more: { a?: Loose; b?: Loose; link?: Loose; top?: Loose } = {}) =>
  campaignOf({
    window: { start: '2027-06-01T00:00:00Z', end: '2027-06-21T00:00:00Z' },
    target: '3 cm',
    sources: [{ id: 'sr' }],
    sites: [at('a', '62636000.0(2) m²/s²'), at('b', '62635000.0000(2236) m²/s²')],
    clocks: [
      {
        id: 'ka',
        site: 'a',
        transition: '87Sr',
        stability: { white: 3e-16 },
        systematic: 1e-18,
        uptime: 0.8,
        ...more.a,
      },
      { id: 'kb', site: 'b', transition: '87Sr', stability: { white: 4e-16, flicker: 5e-19 }, uptime: 0.5, ...more.b },
    ],
    links: [{ id: 'ab', from: 'ka', to: 'kb', stability: { phase: 1e-15 }, systematic: 4e-19, ...more.link }],
    ...more.top,
  });

const linkOf = (more: Parameters<typeof two>[0] = {}, test?: Parameters<typeof plan>[1]) =>
  plan(two(more), test).links[0]!;

describe('what limits', () => {
  it('shares of uY² add up to 1 and name the largest part', () => {
    const { curve, window } = linkOf();
    for (const p of curve) {
      const sum = Object.values(p.shares!).reduce((a, b) => a + b, 0);
      expectWithin(sum, 1, 1e-12);
    }
    // at 1e5 s: T_eff = 4e4 s; variances 9e-32, 16e-32 over it, 2.5e-37, phase 1e-30/1.6e9, systematics 1e-36 and 1.6e-37
    const p = curve.find(({ T }) => T === 1e5)!;
    const variance = 25e-32 / 4e4 + 2.5e-37 + 1e-30 / 1.6e9 + 1e-36 + 1.6e-37;
    expectWithin(p.uY, Math.sqrt(variance), 1e-12 * p.uY);
    expectWithin(p.shares!.statisticsFrom, 9e-32 / 4e4 / variance, 1e-12);
    expectWithin(p.shares!.statisticsTo, (16e-32 / 4e4 + 2.5e-37) / variance, 1e-12);
    expectWithin(p.shares!.statisticsLink, 1e-30 / 1.6e9 / variance, 1e-12);
    expectWithin(p.shares!.systematicFrom, 1e-36 / variance, 1e-12);
    expectWithin(p.shares!.systematicTo, 0, 0);
    expectWithin(p.shares!.systematicLink, 1.6e-37 / variance, 1e-12);
    expect(p.limit).toMatchObject({ kind: 'white', of: 'kb' });
    expect(curve.at(-1)!.limit).toMatchObject({ kind: 'systematic', of: 'ka' });
    expect(window!.T).toBe(20 * DAY);
    expectWithin(window!.data, 8 * DAY, 1e-6);
    // geodesy: 0.3 m²/s² over c² = 3.3e-18, above every part of uY after 20 days
    expect(window!.comparisonLimit).toMatchObject({ kind: 'geodesy', of: 'ab' });
  });

  it('phase noise limits where the link is the worst', () => {
    expect(linkOf({ link: { stability: { phase: 1e-12 } } }).curve[0]!.limit).toMatchObject({
      kind: 'phase',
      of: 'ab',
    });
  });

  it('a source that both clocks share cancels, and can leave a negative share', () => {
    const a = { systematic: [{ u: 3e-18, source: 'sr' }] };
    const b = { systematic: [{ u: 1e-18, source: 'sr' }] };
    const link = linkOf({ a, b, link: { systematic: 0 } });
    // B − A = 1e-18·z − 3e-18·z
    expectWithin(link.uSystematic, 2e-18, 1e-30);
    const { shares, uY } = link.curve.at(-1)!;
    // cov(y, −x_A) = 3·(3 − 1)e-36, cov(y, x_B) = 1·(1 − 3)e-36
    expectWithin(shares!.systematicFrom, 6e-36 / uY ** 2, 1e-12);
    expectWithin(shares!.systematicTo, -2e-36 / uY ** 2, 1e-12);
  });

  it('the offset of the less certain transition limits unlike clocks', () => {
    const b = { transition: '171Yb' };
    const top = {
      transitions: [
        { id: '87Sr', offset: 0 },
        { id: '171Yb', offset: '0(7)e-18' },
      ],
    };
    const { curve, floor } = linkOf({ b, top });
    expect(curve.at(-1)!.limit).toMatchObject({ kind: 'ratio', of: '171Yb' });
    expectWithin(curve.at(-1)!.shares!.ratio, 49e-36 / curve.at(-1)!.uY ** 2, 1e-12);
    expectWithin(floor, Math.sqrt(49e-36 + 1e-36 + 1.6e-37 + 2.5e-37) * METRES, 1e-12);
  });

  it('has neither shares nor a limit where nothing is uncertain', () => {
    const quiet = { stability: {}, systematic: 0 };
    const link = linkOf({ a: quiet, b: quiet, link: quiet });
    expect(link.curve[0]).toMatchObject({ uY: 0, shares: null, limit: null });
    expect(link.timeToTarget).toBe(0);
    // the prediction alone, over g
    expectWithin(link.smallestDetectable!, (2.801585 * Math.hypot(0.2, 0.2236)) / 9.81, 1e-7);
  });
});

describe('detectability', () => {
  it('at other sizes and powers', () => {
    const usual = linkOf();
    const strict = linkOf({}, { size: 0.01, power: 0.95 });
    // z(0.995) + z(0.95) = 2.575829 + 1.644854, z(0.975) + z(0.8) = 1.959964 + 0.841621 (any table of the normal distribution)
    expectWithin(strict.smallestDetectable! / usual.smallestDetectable!, 4.220683 / 2.801585, 1e-6);
    expect(plan(two(), { size: 0.01, power: 0.95 }).test).toEqual({ size: 0.01, power: 0.95 });
  });

  it('says after how long the effect would show: then the curve meets it', () => {
    const top = { effect: '20 cm' };
    const { timeToEffect, uGeodesy } = linkOf({ top });
    const effective = timeToEffect! * 0.4;
    const uY2 = 25e-32 / effective + 2.5e-37 + 1e-30 / effective ** 2 + 1.16e-36;
    expectWithin(2.8015852 * Math.hypot(Math.sqrt(uY2) * METRES, uGeodesy!), 0.2, 1e-6);
    // geodesy alone, 2.8 × 31 mm, hides 5 cm for ever
    expect(linkOf({ top: { effect: '5 cm' } }).timeToEffect).toBeNull();
    expect(plan(two()).effect).toBe(0.3);
    expect(plan(two({ top })).effect).toBe(0.2);
  });
});

describe('calendar', () => {
  it('counts from the start of the window, and says whether it holds it', () => {
    const { timeToTarget, targetMet } = linkOf();
    const days = timeToTarget! / DAY;
    expect(days).toBeGreaterThan(0.7);
    expect(days).toBeLessThan(1);
    const ms = Date.UTC(2027, 5, 1) + 1000 * Math.ceil(timeToTarget!);
    expect(targetMet).toEqual({ at: new Date(ms).toISOString().replace('.000', ''), inWindow: true });
    const late = linkOf({ top: { target: '1.15 cm' } });
    expect(late.targetMet!.inWindow).toBe(false);
    expect(linkOf({ top: { target: '1 mm' } }).targetMet).toBeNull();
    expect(linkOf({ top: { window: undefined, target: '3 cm' } }).targetMet).toBeNull();
  });

  it('gathers measured intervals as they lie: ISO 8601 and MJD, of clock, clock and link', () => {
    // A runs in June 3–7 and 9–11, B from June 4 noon (MJD 61560.5), the link always: common 2.5 d, then 2 d
    const a = {
      uptime: undefined,
      available: [
        { start: '2027-06-03T00:00:00Z', end: '2027-06-07T00:00:00Z' },
        { start: '2027-06-09T00:00:00+00:00', end: 61567 },
      ],
    };
    const b = { uptime: undefined, available: [{ start: 61560.5, end: '2027-06-20T00:00:00Z' }] };
    const link = linkOf({ a, b });
    expectWithin(link.uptime, 4.5 / 20, 1e-12);
    expectWithin(link.window!.data, 4.5 * DAY, 1e-6);
    // noise 25e-32/T_eff + …: effective time for 3 cm is the one of the plan with uptimes
    const effective = linkOf().timeToTarget! * 0.4;
    expectWithin(link.timeToTarget! * link.uptime, effective, 1e-6 * effective);
    expect(effective).toBeLessThan(2.5 * DAY);
    const ms = Date.UTC(2027, 5, 4, 12) + 1000 * Math.ceil(effective);
    expect(link.targetMet).toEqual({ at: new Date(ms).toISOString().replace('.000', ''), inWindow: true });
    // a tighter target needs more than the first 2.5 d: the second stretch, on June 9 or 10
    const tight = linkOf({ a, b, top: { target: '13.6 mm' } });
    expect(tight.timeToTarget! * tight.uptime).toBeGreaterThan(2.5 * DAY);
    expect(tight.targetMet!.at.slice(0, 10)).toBe('2027-06-10');
  });

  it('warns of stretches that the phase noise does not know of', () => {
    const a = {
      uptime: undefined,
      available: [1, 3, 5].map((d) => ({ start: `2027-06-0${d}T00:00:00Z`, end: `2027-06-0${d + 1}T00:00:00Z` })),
    };
    const codes = (link: Loose) => plan(two({ a, link })).warnings.map((w) => `${w.code} ${w.path}`);
    expect(codes({})).toContain('segments links.ab.segments');
    expect(codes({ segments: 3 })).not.toContain('segments links.ab.segments');
    expect(codes({ stability: {} })).not.toContain('segments links.ab.segments');
  });

  it('a link without common time has no plan, in words', () => {
    const answer = plan(two({ b: { uptime: 0 } }));
    expect(answer.links[0]).toMatchObject({ curve: [], window: null, timeToTarget: null, smallestDetectable: null });
    expect(answer.warnings.map((w) => w.code)).toContain('never-runs');
  });
});

describe('flywheel', () => {
  const flywheel = (stability: Loose, more: Loose = {}) => ({ flywheel: { stability, cycle: '1 d', ...more } });

  it('one without noise lets every part average over its own time', () => {
    // A runs 0.8 of 20 d beside its flywheel; the link compares while B runs, 0.5
    const { bridged, window } = linkOf({ a: flywheel({}) });
    const variance = 9e-32 / (16 * DAY) + 16e-32 / (10 * DAY) + 2.5e-37 + 1e-30 / (10 * DAY) ** 2;
    expectWithin(bridged!.window!.uStat, Math.sqrt(variance), 1e-12 * bridged!.window!.uStat);
    expect(bridged!.window!.uDeadTime).toBe(0);
    expect(bridged!.clocks).toEqual(['ka']);
    expect(bridged!.window!.uStat).toBeLessThan(window!.uStat);
    expect(bridged!.timeToTarget!).toBeLessThan(linkOf().timeToTarget!);
    expect(bridged!.targetMet!.inWindow).toBe(true);
    const sum = Object.values(bridged!.window!.shares!).reduce((a, b) => a + b, 0);
    expectWithin(sum, 1, 1e-12);
  });

  it('both clocks bridged: the link counts alone', () => {
    const { bridged } = linkOf({ a: flywheel({}), b: flywheel({}), link: { uptime: 0.25 } });
    const variance = 9e-32 / (16 * DAY) + 16e-32 / (10 * DAY) + 2.5e-37 + 1e-30 / (5 * DAY) ** 2;
    expectWithin(bridged!.window!.uStat, Math.sqrt(variance), 1e-12 * bridged!.window!.uStat);
  });

  it('leaves the plan of the common time as it is, and warns where it loses', () => {
    const a = flywheel({ flicker: 2e-15 });
    const { bridged, curve, timeToTarget } = linkOf({ a });
    expect(curve).toEqual(linkOf().curve);
    expect(timeToTarget).toBe(linkOf().timeToTarget);
    expect(bridged!.window!.limit).toMatchObject({ kind: 'dead-time', of: 'ka' });
    expect(plan(two({ a })).warnings.map((w) => w.code)).toContain('flywheel-loses');
    expect(linkOf().bridged).toBeNull();
  });

  it('with stated intervals: no curve before there is data of all, and none beyond the window', () => {
    const days = (d: number) => `2027-06-${String(d).padStart(2, '0')}T00:00:00Z`;
    const a = {
      uptime: undefined,
      available: [{ start: days(4), end: days(6) }],
      flywheel: { stability: { flicker: 1e-18 } },
    };
    const { bridged } = linkOf({ a });
    // data of A from 3 d on; 5e5 s and 1e6 s lie between that and the window's 20 d
    expect(bridged!.curve.map(({ T }) => T)).toEqual([5e5, 1e6]);
    expectWithin(bridged!.window!.T, 20 * DAY, 0);
    expect(bridged!.timeToTarget!).toBeGreaterThan(3 * DAY);
  });
});

test('fibre noise enters plan and planned adjustment alike as phase noise', () => {
  // τ = 1.468·2e5/c, a = 1/3: σ_y(1 s) = τ·√(f_h·h·L)/ν
  const phase = ((1.468 * 2e5) / 299_792_458) * (Math.sqrt(20 * 10 * 200) / 194.4e12);
  const stated = two({ link: { stability: { phase } } });
  const fibre = two({ link: { stability: {}, length: '200 km', fibre: { noise: 10, bandwidth: '20 Hz' } } });
  expectWithin(plan(fibre).links[0]!.window!.uStat, plan(stated).links[0]!.window!.uStat, 1e-30);
  expectWithin(plan(fibre).links[0]!.curve[0]!.uStat, plan(stated).links[0]!.curve[0]!.uStat, 1e-28);
  const uAfter = (c: typeof stated) => adjustPlanned(c).sites[1]!.uAfter!;
  expectWithin(uAfter(fibre), uAfter(stated), 1e-12);
});
