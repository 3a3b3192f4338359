import { describe, expect, it } from 'vitest';
import { transportedClocks } from '../../../lib/answers/transported-clock.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf } from '../model/campaign-of.js';

type Loose = { [key: string]: unknown };
const C2 = 299_792_458 ** 2;
const G = 9.81;
const GAMMA = 3e-6;

const site = (id: string, W: string, lon: number): Loose => ({
  id,
  lat: 50,
  lon,
  g: G,
  gradient: GAMMA,
  determinations: [{ kind: 'potential', W: { value: W, tide: 'mean' } }],
});

/** A clock that stays in a at 2 m over its marker, one that travels to b; the link measured 2.0e-13 with u = 4e-18. */
const campaign = (transported: Loose, more: { travels?: Loose; stays?: Loose; top?: Loose; link?: Loose } = {}) =>
  campaignOf({
    sources: [{ id: 'coefficients' }, { id: 'trailer' }, { id: 'weather', correlation: 0.5 }],
    sites: [site('a', '62636000 m²/s²', 8), site('b', '62618000.0(3) m²/s²', 10)],
    clocks: [
      { id: 'ref', site: 'a', transition: '171Yb', tie: [{ dH: 2 }], systematic: 1.5e-18, ...more.stays },
      {
        id: 'van',
        site: 'b',
        transition: '87Sr',
        systematic: [
          { u: 3e-18, source: 'coefficients' },
          { u: 2e-18, name: 'BBR' },
        ],
        ...more.travels,
      },
    ],
    links: [
      {
        id: 'rv',
        from: 'ref',
        to: 'van',
        systematic: 4e-19,
        transported: { clock: 'van', ...transported },
        ...more.link,
      },
    ],
    measurements: [{ id: 'm', link: 'rv', y: '2.000000(40)e-13' }],
    ...more.top,
  });

const answer = (...args: Parameters<typeof campaign>) => transportedClocks(campaign(...args)).links[0]!;
const leaving = (more: Loose = {}): Loose => ({ when: 'before', y: '1.300(3)e-15', dH: '0.50(1) m', ...more });
const returned = (more: Loose = {}): Loose => ({ when: 'after', y: '1.316(4)e-15', dH: '-0.30(1) m', ...more });

// W(from) − W(to) of clocks dH apart, z = 2 m over the marker
const local = (dH: number) => G * dH - GAMMA * (2 * dH + 0.5 * dH * dH);

describe('a transported clock', () => {
  it('ΔW = c²·(R_remote/R_local − 1) + ΔW_local, whatever the ratio of the two species', () => {
    const { results, sideBySide } = answer({ sideBySide: [leaving()] });
    expectWithin(sideBySide[0]!.dW.value, local(0.5), 1e-9);
    const expected = C2 * ((1 + 2e-13) / (1 + 1.3e-15) - 1) + local(0.5);
    // doubles keep 1e-16 of R − 1 in the expected value: 10 m²/s² · 1e-16; ΔW_local enters divided by 1 + 5e-17
    expectWithin(results[0]!.dW.value!, C2 * (2e-13 - 1.3e-15) + local(0.5), 1e-9);
    expectWithin(results[0]!.dW.value!, expected, 2 * C2 * 1.2e-16);
    // an offset of the recommended frequencies is in both: it leaves ΔW alone
    const far = answer(
      { sideBySide: [leaving({ y: '-7.00000(3)e-13' })] },
      { top: { measurements: [{ id: 'm', link: 'rv', y: '-5.01300(4)e-13' }] } },
    );
    expectWithin(far.results[0]!.dW.value!, results[0]!.dW.value!, 1e-4);
    expectWithin(results[0]!.residual!.value, results[0]!.dW.value! - (18000 - G * 2 + GAMMA * 2), 1e-5);
  });

  it('keeps what does not cancel: statistics, pieces without a source twice, reproducibility twice, the link, the height', () => {
    const { results, sideBySide } = answer({ reproducibility: '1e-18', sideBySide: [leaving()] });
    // the clock's own bias of 3e-18 is the same in both places, the clock that stays is one error
    const y2 = 4e-18 ** 2 + 3e-18 ** 2 + 2 * 2e-18 ** 2 + 2 * 1e-18 ** 2 + 4e-19 ** 2;
    const dW = Math.hypot(Math.sqrt(y2) * C2, 0.01 * (G - GAMMA * 2.5));
    expectWithin(results[0]!.dW.u, dW, 1e-9);
    expectWithin(results[0]!.residual!.u, Math.hypot(dW, 0.3), 1e-9);
    // alone, the comparison side by side has every piece in it
    const alone = Math.hypot(3e-18, 3e-18, 2e-18, 1e-18, 1.5e-18, (0.01 * (G - GAMMA * 2.5)) / C2);
    expectWithin(sideBySide[0]!.difference.u, alone, 1e-26);
    expectWithin(sideBySide[0]!.difference.value!, 1.3e-15 - local(0.5) / C2, 1e-27);
  });

  it('cancels piece by piece: by the source, its own size in each place', () => {
    const systematic = [
      { u: 1e-18, source: 'coefficients' },
      { u: 5e-19, name: 'BBR' },
    ];
    const { results } = answer({ sideBySide: [leaving({ systematic })] });
    const byName = new Map(results[0]!.components.map((c) => [`${c.of} ${c.name}`, c]));
    expectWithin(byName.get('van coefficients')!.uLeft, 2e-18, 1e-30);
    expectWithin(byName.get('van BBR')!.uLeft, Math.hypot(2e-18, 5e-19), 1e-30);
    expectWithin(byName.get('ref the clock that stays')!.uLeft, 0, 0);
    expectWithin(byName.get('rv the link')!.uLeft, 4e-19, 1e-30);
    const left = [...byName.values()].reduce((s, c) => s + c.uLeft ** 2, 4e-18 ** 2 + 3e-18 ** 2);
    expectWithin(results[0]!.dW.u, Math.hypot(Math.sqrt(left) * C2, 0.01 * (G - GAMMA * 2.5)), 1e-9);
  });

  it('a source that is only half the same between sites cancels by half', () => {
    const travels = { systematic: [{ u: 2e-18, source: 'weather' }] };
    const { results } = answer({ sideBySide: [leaving()] }, { travels });
    // u² + u² − 2·½·u²
    expectWithin(results[0]!.components[0]!.uLeft, 2e-18, 1e-30);
  });

  it('sets before against after before it averages, and warns where they differ', () => {
    const both = { reproducibility: '2e-18', sideBySide: [leaving(), returned()] };
    const link = answer(both);
    const difference = 1.3e-15 - local(0.5) / C2 - (1.316e-15 - local(-0.3) / C2);
    expectWithin(link.beforeAfter[0]!.difference.value, difference, 1e-26);
    // each has its own statistics, BBR, reproducibility and height; coefficients and the clock that stays are one error
    const heights = 0.01 * Math.hypot(G - GAMMA * 2.5, G - GAMMA * 1.7);
    const u = Math.hypot(3e-18, 4e-18, Math.SQRT2 * 2e-18, Math.SQRT2 * 2e-18, heights / C2);
    expectWithin(link.beforeAfter[0]!.difference.u, u, 1e-26);
    expectWithin(link.beforeAfter[0]!.z!, difference / u, 1e-9);
    expect(Math.abs(link.beforeAfter[0]!.z!)).toBeGreaterThan(2);
    expect(transportedClocks(campaign(both)).warnings.map((w) => w.code)).toContain('side-by-side-differ');
    expect(
      transportedClocks(campaign({ ...both, reproducibility: '1e-16' })).warnings.map((w) => w.code),
    ).not.toContain('side-by-side-differ');
    // weights by what each has of its own
    const own = (stat: number, lever: number) => stat ** 2 + 2e-18 ** 2 + 2e-18 ** 2 + ((0.01 * lever) / C2) ** 2;
    const [a, b] = [own(3e-18, G - GAMMA * 2.5), own(4e-18, G - GAMMA * 1.7)];
    expectWithin(link.results[0]!.weights[0]!, b / (a + b), 1e-6);
    expectWithin(
      link.results[0]!.weights.reduce((s, w) => s + w, 0),
      1,
      1e-12,
    );
  });

  it('works the other way round: the clock that travels is `from`', () => {
    const flipped = campaignOf({
      sources: [{ id: 'coefficients' }],
      sites: [site('a', '62636000 m²/s²', 8), site('b', '62618000.0(3) m²/s²', 10)],
      clocks: [
        { id: 'ref', site: 'a', transition: '171Yb', tie: [{ dH: 2 }], systematic: 1.5e-18 },
        { id: 'van', site: 'b', transition: '87Sr', systematic: [{ u: 3e-18, source: 'coefficients' }, { u: 2e-18 }] },
      ],
      links: [
        {
          id: 'vr',
          from: 'van',
          to: 'ref',
          systematic: 4e-19,
          transported: { clock: 'van', sideBySide: [{ when: 'before', y: '-1.300(3)e-15', dH: '-0.50(1) m' }] },
        },
      ],
      measurements: [{ id: 'm', link: 'vr', y: '-2.000000(40)e-13' }],
    });
    const one = answer({ sideBySide: [leaving()] }).results[0]!;
    const other = transportedClocks(flipped).links[0]!.results[0]!;
    expectWithin(other.dW.value!, -one.dW.value!, 1e-7);
    expectWithin(other.dW.u, one.dW.u, 1e-9);
    expectWithin(other.z!, -one.z!, 1e-6);
  });

  it('is planned where nothing is measured: statistics from the window and from the time side by side', () => {
    const top = { measurements: [], window: { start: 61528, end: 61538 } };
    const stability = { white: 4e-16 };
    const { results } = answer(
      { sideBySide: [{ when: 'before', time: '2 d', dH: 0.5 }] },
      { top, travels: { stability, systematic: [] }, stays: { stability, systematic: [] }, link: { systematic: 0 } },
    );
    const y2 = (2 * 16e-32) / (10 * 86_400) + (2 * 16e-32) / (2 * 86_400);
    expectWithin(results[0]!.dW.u, Math.sqrt(y2) * C2, 1e-9);
    expect(results[0]).toMatchObject({ measurement: null, dW: { value: null }, dH: { value: null }, residual: null });
    expectWithin(results[0]!.dH.u, (Math.sqrt(y2) * C2) / G, 1e-9);
  });

  it('has no value while its comparisons side by side are only planned', () => {
    const { results, beforeAfter } = answer({ sideBySide: [{ when: 'before', time: '2 d', dH: 0.5 }] });
    expect(results[0]).toMatchObject({ measurement: 'm', dW: { value: null }, z: null });
    expect(beforeAfter).toEqual([]);
  });

  it('refuses a comparison that is neither there nor planned', () => {
    expect(() => answer({ sideBySide: [{ when: 'before', dH: 0.5 }] })).toThrow(CampaignError);
  });
});
