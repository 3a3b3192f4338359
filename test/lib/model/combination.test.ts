import { describe, expect, test } from 'vitest';
import { adjust } from '../../../lib/answers/adjust.js';
import { predict } from '../../../lib/answers/predict.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../../../lib/earth/normal-field.js';
import { degToRad } from '../../../lib/quantity/radians.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf, clocksAndLinks, levelled, normal, site } from './campaign-of.js';

const wOfHeight = (H: number, lat = 48) =>
  62636853.4 - geopotentialOfNormalHeight(GRS80, degToRad(lat), H).geopotentialM2s2;

const faultsOf = (run: () => unknown) => {
  try {
    run();
  } catch (e) {
    if (e instanceof CampaignError) return e.faults;
    throw e;
  }
  throw new Error('not refused');
};

describe('redundant determinations', () => {
  test('two independent heights: weighted mean, χ² and u by hand', () => {
    const p = predict(campaignOf({ sites: [site('a', [normal('100.000(10) m'), normal('100.030(20) m')])] }));
    // weights 1 : 1/4 and equal slopes to 1e-9
    expectWithin(p.sites[0]!.W!.value, wOfHeight(100.006), 1e-6);
    const gamma = geopotentialOfNormalHeight(GRS80, degToRad(48), 100).perHeightMs2;
    expectWithin(p.sites[0]!.W!.u, gamma * Math.sqrt(1 / (1 / 1e-4 + 1 / 4e-4)), 1e-8);
    expectWithin(p.combination!.chi2, 0.03 ** 2 / (1e-4 + 4e-4), 1e-6);
    expect(p.combination!.dof).toBe(1);
  });
  test('a determination added at one site changes u at the others through the shared source', () => {
    const shared = { sources: [{ id: 's' }] };
    const h = (H: string) => normal(H, 'ihrs', { source: 's' });
    const one = predict(
      campaignOf({ ...shared, sites: [site('a', [h('100.00(2) m')]), site('b', [h('200.00(2) m')])] }),
    );
    const two = predict(
      campaignOf({
        ...shared,
        sites: [site('a', [h('100.00(2) m'), normal('100.000(1) m')]), site('b', [h('200.00(2) m')])],
      }),
    );
    expectWithin(one.sites[1]!.W!.u, 0.02 * 9.81, 1e-3);
    expect(two.sites[1]!.W!.u).toBeLessThan(0.06 * one.sites[1]!.W!.u);
  });
  test('a determination far from the others: p < 0.01 is said, u is not scaled', () => {
    const p = predict(campaignOf({ sites: [site('a', [normal('100.000(10) m'), normal('100.100(10) m')])] }));
    expect(p.warnings.map((w) => w.code)).toContain('determinations-disagree');
    expectWithin(p.sites[0]!.W!.u, (0.01 * 9.81) / Math.SQRT2, 1e-4);
  });
});

describe('exact determinations are constraints', () => {
  test('an exact height beats an uncertain one, whose residual counts in χ²', () => {
    const p = predict(campaignOf({ sites: [site('a', [normal('100.01(2) m'), normal('100 m')])] }));
    expectWithin(p.sites[0]!.W!.value, wOfHeight(100), 1e-7);
    expect(p.sites[0]!.W!.u).toBe(0);
    expectWithin(p.combination!.chi2, 0.25, 1e-6);
    expect(p.combination!.dof).toBe(1);
  });
  test('adjust: residual 0 and the other columns null for the exact one, for whichever comes first', () => {
    for (const determinations of [
      [normal('100 m'), normal('100.01(2) m')],
      [normal('100.01(2) m'), normal('100 m')],
    ]) {
      const { observations, sites } = adjust(campaignOf({ sites: [site('a', determinations)] }));
      const exact = observations.find((o) => o.control === null)!;
      expectWithin(exact.residual!, 0, 1e-7);
      expect([exact.standardised, exact.redundancy, exact.smallestDetectable]).toEqual([null, null, null]);
      expectWithin(sites[0]!.W!, wOfHeight(100), 1e-7);
      const other = observations.find((o) => o.control !== null)!;
      expectWithin(Math.abs(other.standardised!), 0.5, 1e-6);
    }
  });
  test('a chain of exact levelling carries an exact level', () => {
    const p = predict(
      campaignOf({
        sites: [
          site('a', [normal('100 m')], { g: 9.81 }),
          site('b', [levelled('a', '10 m'), normal('109.5(1) m')], { g: 9.81 }),
        ],
        ...clocksAndLinks('a', 'b'),
      }),
    );
    expectWithin(p.links[0]!.dW!.value, 98.1, 1e-6);
    expect(p.links[0]!.dW!.u).toBe(0);
    expect(p.links[0]!.budget).toEqual([]);
  });
  test('two that agree are one', () => {
    const p = predict(campaignOf({ sites: [site('a', [normal('100 m'), normal('100 m')])] }));
    expect(p.combination).toBeNull();
    expectWithin(p.sites[0]!.W!.value, wOfHeight(100), 1e-7);
  });
  test('two that contradict are refused with both paths', () => {
    const faults = faultsOf(() => predict(campaignOf({ sites: [site('a', [normal('100 m'), normal('100.001 m')])] })));
    expect(faults[0]!.code).toBe('contradiction');
    expect(faults[0]!.path + faults[0]!.found).toMatch(/determinations\.1.*determinations\.0/);
  });
  test('so are two exact heights on one uncertain datum: their difference is exact', () => {
    const datums = [{ id: 'd', W0: '62636853.4(5) m²/s²' }];
    const faults = faultsOf(() =>
      predict(campaignOf({ datums, sites: [site('a', [normal('100 m', 'd'), normal('100.001 m', 'd')])] })),
    );
    expect(faults[0]!.path + faults[0]!.found).toMatch(/determinations\.1.*determinations\.0/);
    const agree = predict(campaignOf({ datums, sites: [site('a', [normal('100 m', 'd'), normal('100 m', 'd')])] }));
    expectWithin(agree.sites[0]!.W!.u, 0.5, 1e-9);
  });
});

describe('levelling', () => {
  test('a loop counts its misclosure: 3 mm over three lines of 1 mm is χ² = 3', () => {
    const p = predict(
      campaignOf({
        sites: [
          site('a', [normal('100.00(1) m'), levelled('c', '-3.003(1) m', { g: 9.81 })]),
          site('b', [levelled('a', '1.000(1) m', { g: 9.81 })]),
          site('c', [levelled('b', '2.000(1) m', { g: 9.81 })]),
        ],
        ...clocksAndLinks('a', 'b', 'c'),
      }),
    );
    expectWithin(p.combination!.chi2, 3, 1e-6);
    expect(p.combination!.dof).toBe(1);
    // each line takes a third of the misclosure: a→b becomes 1.001 m
    expectWithin(p.links[0]!.dW!.value, 9.81 * 1.001, 1e-6);
    expectWithin(p.links[0]!.dW!.u, 9.81 * 0.001 * Math.sqrt(2 / 3), 1e-7);
  });
  test('g by default is the mean of the two sites', () => {
    const p = predict(
      campaignOf({
        sites: [site('a', [normal('100 m')], { g: 9.8 }), site('b', [levelled('a', '50 m')], { g: 9.82 })],
        ...clocksAndLinks('a', 'b'),
      }),
    );
    expectWithin(p.links[0]!.dW!.value, 9.81 * 50, 1e-7);
    expect(p.links[0]!.y!.value).toBeGreaterThan(0);
  });
});

describe('groups without a level', () => {
  const floating = campaignOf({
    sites: [site('a', [normal('100.00(1) m')]), site('b', [], {}), site('c', [levelled('b', '12.000(2) m')])],
    ...clocksAndLinks('a', 'b', 'c'),
  });
  test('links inside are right, links out are null, and the warning says what to do', () => {
    const p = predict(floating);
    expect(p.sites[1]!.W).toBeNull();
    expect(p.sites[2]!.C).toBeNull();
    expect(p.clocks[1]!.redshift).toBeNull();
    expect(p.links[0]!).toMatchObject({ dW: null, y: null, dH: null, dHNormal: null, offsetHz: null, budget: [] });
    expectWithin(p.links[1]!.dW!.value, 9.809 * 12, 1e-7);
    expectWithin(p.links[1]!.dW!.u, Math.hypot(9.809 * 0.002, (12 * 3e-6) / Math.SQRT2), 1e-9);
    expect(p.links[1]!.dHNormal).toBeNull();
    expect(p.correlations.links).toEqual(['b-c']);
    const warning = p.warnings.find((w) => w.code === 'no-level')!;
    expect(warning.message).toMatch(/b, c.*gnss-quasigeoid/);
  });
  test('adjust refuses what nothing determines, by path', () => {
    expect(faultsOf(() => adjust(floating)).map((f) => f.path)).toEqual(['sites.b', 'sites.c']);
  });
  test('adjust determines them through a measured link', () => {
    const measured = campaignOf({
      sites: [site('a', [normal('100.00(1) m')]), site('b', [])],
      ...clocksAndLinks('a', 'b'),
      measurements: [{ link: 'a-b', y: '1.00(1)e-15' }],
    });
    const { sites } = adjust(measured);
    expect(sites[1]!.uBefore).toBeNull();
    expectWithin(sites[0]!.W! - sites[1]!.W!, 1e-15 * 299792458 ** 2, 1e-6);
    expectWithin(sites[1]!.uAfter, Math.hypot(0.01 * 9.8086, 1e-17 * 299792458 ** 2), 1e-4);
  });
});

describe('"use": "check"', () => {
  test('is compared, not fitted', () => {
    const base = [normal('100.00(1) m')];
    const p = predict(campaignOf({ sites: [site('a', [...base, { ...normal('100.03(2) m'), use: 'check' }])] }));
    const alone = predict(campaignOf({ sites: [site('a', base)] }));
    expect(p.sites[0]!.W).toEqual(alone.sites[0]!.W);
    expect(p.combination).toBeNull();
    expectWithin(p.checks[0]!.residual.value, wOfHeight(100.03) - wOfHeight(100), 1e-6);
    expectWithin(p.checks[0]!.residual.u, 9.81 * Math.hypot(0.01, 0.02), 1e-3);
    expectWithin(p.checks[0]!.z!, -0.03 / Math.hypot(0.01, 0.02), 1e-5);
  });
});

test('potentials 8 km of height apart do not cost the small one its digits', () => {
  const p = predict(
    campaignOf({
      sites: [site('a', [normal('0.00(1) m')]), site('b', [normal('8000.00(1) m'), normal('8000.02(1) m')])],
      ...clocksAndLinks('a', 'b'),
    }),
  );
  expectWithin(p.links[0]!.dW!.value, wOfHeight(0) - wOfHeight(8000.01), 1e-6);
});
