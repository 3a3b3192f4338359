import { describe, expect, it } from 'vitest';
import { type PairInput, type PairSite, pair } from '../../../lib/answers/pair.js';
import { readPairOptions } from '../../../lib/answers/pair-options.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { GRS80 } from '../../../lib/earth/level-ellipsoid.js';
import { geopotentialOfNormalHeight } from '../../../lib/earth/normal-field.js';
import { degToRad } from '../../../lib/quantity/radians.js';
import example from '../../data/examples/three-sites.predict.json' with { type: 'json' };

const C2 = 299_792_458 ** 2;
const within = (found: number, wanted: number, tolerance: number) =>
  expect(Math.abs(found - wanted), `${found} against ${wanted}`).toBeLessThanOrEqual(tolerance);

const harbour: PairSite = {
  name: 'Harbour',
  latitudeDeg: 58.9712,
  longitudeDeg: 5.7305,
  hM: { value: 51.337, u: 0.006 },
  zetaM: { value: 45.12, u: 0.015 },
  nM: null,
  gMs2: { value: 9.818611, u: 3e-6 },
};
const ridge: PairSite = {
  name: 'Ridge',
  latitudeDeg: 58.8102,
  longitudeDeg: 6.4421,
  hM: { value: 912.4402, u: 0.007 },
  zetaM: { value: 45.377, u: 0.018 },
  nM: null,
  gMs2: { value: 9.816602, u: 4e-6 },
};
const input: PairInput = {
  a: harbour,
  b: ridge,
  tide: 'mean',
  hTide: 'free',
  geoidTide: 'zero',
  correlation: 0.48,
  transition: null,
};

describe('pair: value', () => {
  // test/data/examples: an independent solver on the same heights; W of a gnss-quasigeoid determination by its own
  it('agrees with an independent solver', () => {
    const W = (site: string) => example.sites.find(({ id }) => id === site)!.determinations[0]!.W.value;
    const { dW, y } = pair(input);
    // that campaign's datum has another u(W0) but the same value, which cancels
    within(dW.value, W('harbour') - W('ridge'), 1e-5);
    within(y.value, (W('harbour') - W('ridge')) / C2, 1e-21);
  });

  it('is the normal field at h − ζ where nothing has to be converted', () => {
    const { dW, sites } = pair({ ...input, tide: 'zero', hTide: 'mean', geoidTide: 'zero' });
    const C = (site: PairSite) =>
      geopotentialOfNormalHeight(GRS80, degToRad(site.latitudeDeg), site.hM.value - site.zetaM!.value).geopotentialM2s2;
    within(dW.value, C(ridge) - C(harbour), 1e-6);
    expect(sites.map(({ id, name }) => [id, name])).toEqual([
      ['a', 'Harbour'],
      ['b', 'Ridge'],
    ]);
  });

  it('turns its sign with the order of the sites', () => {
    const there = pair(input);
    const back = pair({ ...input, a: ridge, b: harbour });
    expect(there.y.value).toBeGreaterThan(0);
    within(back.y.value, -there.y.value, 1e-28);
    within(back.y.u, there.y.u, 1e-28);
    within(back.dHNormal.value, -there.dHNormal.value, 1e-9);
  });

  it('is length equivalent over mean gravity, and says normal height beside it', () => {
    const { dW, dH, dHNormal, distanceM } = pair(input);
    within(dH.value, dW.value / ((9.818611 + 9.816602) / 2), 1e-9);
    within(dHNormal.value, 860.846, 0.001); // h − ζ of both, each with its tide conversion: 0.2 mm of difference at most
    within(distanceM, 44_600, 200);
  });

  it('uses N with mean gravity along the plumb line', () => {
    const geoid = (site: PairSite): PairSite => ({ ...site, nM: site.zetaM, zetaM: null });
    const { dW } = pair({ ...input, a: geoid(harbour), b: geoid(ridge), tide: 'zero', hTide: 'mean' });
    // W0 − W = (g + 4.24e-7·H)·H with H = h − N
    const C = (site: PairSite) => {
      const H = site.hM.value - site.zetaM!.value;
      return (site.gMs2!.value + 4.24e-7 * H) * H;
    };
    within(dW.value, C(ridge) - C(harbour), 1e-6);
  });

  it('gives hertz for the transition asked for only', () => {
    expect(pair(input).offsetHz).toEqual({});
    const { offsetHz, y } = pair({ ...input, transition: '171Yb' });
    expect(Object.keys(offsetHz)).toEqual(['171Yb']);
    within(offsetHz['171Yb']!.value, y.value * 518_295_836_590_863.63, 1e-9);
  });
});

describe('pair: uncertainty', () => {
  const exact = { hM: { value: 100, u: 0 }, gMs2: { value: 9.81, u: 0 }, zetaM: { value: 40, u: 0.02 }, nM: null };
  const near = (correlation: number | null): PairInput => ({
    ...input,
    a: { ...harbour, ...exact },
    b: { ...harbour, ...exact, longitudeDeg: 5.8, hM: { value: 130, u: 0 } },
    correlation,
  });
  /** u(y) as length, g 9.8148 m/s² there */
  const mm = (answer: ReturnType<typeof pair>) => (1000 * answer.y.u * C2) / 9.8175;

  // u² = 2·u₁²·(1 − ρ): 28.3 mm for 2 cm each, 8.9 mm with ρ = 0.9
  it('cancels what the two ζ share', () => {
    within(mm(pair(near(0))), 28.28, 0.02);
    within(mm(pair(near(0.9))), 8.94, 0.02);
    within(mm(pair(near(1))), 0, 0.01);
    within(mm(pair(near(-0.5))), 34.64, 0.02);
  });

  it('puts the two ζ into one group whose share is the sum', () => {
    const { groups, budget, y } = pair(input);
    expect(budget.map((row) => row.input)).toEqual(['b-zeta', 'a-zeta', 'b-h', 'a-h']);
    const [geoid, ...others] = groups;
    expect(geoid).toMatchObject({ source: 'geoid', correlation: 0.48 });
    expect(geoid!.rows.map((row) => row.input)).toEqual(['b-zeta', 'a-zeta']);
    expect(others.map(({ source }) => source)).toEqual([null, null]);
    within(
      groups.reduce((sum, group) => sum + group.share, 0),
      1,
      1e-12,
    );
    // u² of the group: u_A² + u_B² − 2ρ·u_A·u_B, sensitivities nearly 1
    const group = Math.sqrt(0.015 ** 2 + 0.018 ** 2 - 2 * 0.48 * 0.015 * 0.018);
    within(geoid!.uy! / y.u, group / Math.sqrt(group ** 2 + 0.006 ** 2 + 0.007 ** 2), 1e-3);
    expect(pair({ ...input, correlation: 0 }).groups.every(({ source }) => source === null)).toBe(true);
  });
});

describe('pair: warnings', () => {
  const codes = (change: Partial<PairInput>) =>
    pair({ ...input, ...change }).warnings.map(({ code, path }) => `${code} ${path}`);

  it('is silent when everything is stated', () => expect(codes({})).toEqual([]));

  it('says what an unknown correlation costs', () => {
    expect(codes({ correlation: null })).toEqual(['correlation-missing correlation']);
    const { message } = pair({ ...input, correlation: null }).warnings[0]!;
    // √(15² + 18² + 6² + 7²) and with ρ = 0.9 √(6² + 7² + 15² + 18² − 0.9·2·15·18) mm
    expect(message).toContain('instead of 25 mm');
    expect(message).toContain('12 mm');
    const without = { ...input, correlation: null };
    const zero = pair({ ...without, correlation: 0 }).y;
    expect(pair(without).y.value).toBe(zero.value);
    within(pair(without).y.u, zero.u, 1e-30);
  });

  it('sizes a missing tide label as the same mistake at both sites', () => {
    expect(codes({ hTide: null })).toEqual(['tide-label-missing h-tide']);
    expect(codes({ geoidTide: null })).toEqual(['tide-label-missing geoid-tide']);
    const alike = pair({ ...input, hTide: null, b: { ...harbour, longitudeDeg: 5.8 } });
    expect(alike.warnings[0]!.message).toContain('it cancels');
    const far = { ...input, hTide: null, b: { ...ridge, latitudeDeg: 10 } };
    const stated = (hTide: 'free' | 'mean') => pair({ ...far, hTide }).y.value;
    // zero and mean are one for h: the error of taking mean for free is their difference
    const error = Math.abs(stated('mean') - stated('free'));
    expect(pair(far).warnings[0]!.message).toContain(`(${error.toExponential(1)})`);
    expect(pair(far).y.value).toBe(stated('free'));
  });

  it('names default gravity by its option', () => {
    expect(codes({ a: { ...harbour, gMs2: null } })).toEqual(['default-gravity a-g']);
  });
});

describe('pair: options', () => {
  const texts = {
    'a-name': 'Harbour',
    'a-lat': '58.9712',
    'a-lon': '5.7305',
    'a-h': '51.3370(60) m',
    'a-zeta': '45.120(15) m',
    'b-lat': '58°48\'36.72"N',
    'b-lon': '6.4421 E',
    'b-h': '912.4402 m ± 7 mm',
    'b-zeta': '45.377(18)',
    correlation: '0.48',
    tide: 'zero',
    'h-tide': 'free',
    transition: '87Sr',
  };
  const faults = (change: Record<string, string | null>) => {
    const reading = readPairOptions({ ...texts, ...change });
    return reading.ok ? [] : reading.faults.map(({ path, code }) => `${path} ${code}`);
  };

  it('reads what a page holds', () => {
    const reading = readPairOptions(texts);
    expect(reading).toMatchObject({
      ok: true,
      input: {
        a: { ...harbour, gMs2: null },
        b: { ...ridge, name: 'B', gMs2: null },
        tide: 'zero',
        hTide: 'free',
        geoidTide: null,
        correlation: 0.48,
        transition: '87Sr',
      },
      asGiven: { 'b-zeta': '45.377(18) m', 'b-h': '912.4402 m ± 7 mm' },
    });
  });

  it('refuses everything at once, each by its name', () => {
    expect(
      faults({
        'a-lat': '95',
        'a-lon': '5,73',
        'a-h': '51.337(60) kg',
        'b-lat': null,
        'b-n': '45.4 m',
        correlation: '1.2',
        tide: 'men',
        'geoid-tide': 'none',
        transition: '87St',
      }).sort(),
    ).toEqual([
      'a-h unknown-unit',
      'a-lat out-of-range',
      'a-lon decimal-comma',
      'b-lat missing',
      'b-n two-of-one',
      'correlation out-of-range',
      'geoid-tide unknown-tide',
      'tide unknown-tide',
      'transition unknown-transition',
    ]);
    expect(faults({ 'a-zeta': null })).toEqual(['a-zeta missing']);
    expect(faults({ 'a-zeta': '4512 m' })).toEqual(['a-zeta out-of-range']);
  });

  it('says which character and what to write', () => {
    const reading = readPairOptions({ ...texts, 'a-h': '51,337(6) m' });
    expect(reading.ok ? null : reading.faults[0]).toMatchObject({
      path: 'a-h',
      column: 3,
      found: '51,337(6) m',
      expected: expect.stringContaining('write 51.337(6) m'),
    });
  });

  it('passes on faults of the campaign under option names', () => {
    const impossible = { ...input, a: { ...harbour, latitudeDeg: 95 } };
    try {
      pair(impossible);
      expect.unreachable();
    } catch (error) {
      expect(error).toBeInstanceOf(CampaignError);
      expect((error as CampaignError).faults.map(({ path }) => path)).toEqual(['a-lat']);
    }
  });
});
