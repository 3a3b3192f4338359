import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { predict } from '../../../lib/answers/predict.js';
import { CampaignError } from '../../../lib/campaign/fault.js';
import { degToRad } from '../../../lib/quantity/radians.js';
import { InputCovariance } from '../../../lib/uncertainty/covariance.js';
import type { Input } from '../../../lib/uncertainty/inputs.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf, clocksAndLinks, normal, site } from '../model/campaign-of.js';

const input = (path: string, place: string, lon: number, parts: Input['parts']): Input => ({
  path,
  value: 0,
  u: Math.hypot(...parts.map((p) => p.u)),
  parts,
  place: { key: place, position: { latitudeRad: degToRad(0), longitudeRad: degToRad(lon) } },
  distribution: 'normal',
  dof: null,
});
const all = (c: readonly number[]) => ({ indices: c.map((_, i) => i), values: c });

describe('correlation by source', () => {
  // one degree on the GRS80 equator is 111 319.4908 m (a·π/180, Moritz 2000)
  const L = 111319.4908;
  const inputs = [
    input('x', 'A', 0, [
      { u: 2, source: 's' },
      { u: 1, source: null },
    ]),
    input('y', 'A', 0, [{ u: 3, source: 's' }]),
    input('z', 'B', 1, [{ u: 5, source: 's' }]),
  ];
  test.each([
    ['plain', null, null, 1],
    ['correlation', -0.3, null, -0.3],
    ['correlation length', null, L, Math.exp(-1)],
  ] as const)('%s: ρ = 1 at one place, as stated between places', (_, correlation, correlationLengthM, rho) => {
    const v = new InputCovariance(inputs, [{ id: 's', correlation, correlationLengthM }]);
    expect(v.between(0, 1)).toBe(6);
    expectWithin(v.between(0, 2), rho * 10, 1e-8);
    expect(v.between(0, 0)).toBe(5);
    const c = [1, -2, 0.5];
    const byHand = 5 + 4 * 9 + 0.25 * 25 + 2 * (1 * -2 * 6 + 1 * 0.5 * rho * 10 + -2 * 0.5 * rho * 15);
    expectWithin(v.variance(all(c)), byHand, 1e-8);
    const withInputs = v.withInputs(all(c));
    expectWithin(
      c.reduce((s, x, i) => s + x * withInputs[i]!, 0),
      byHand,
      1e-8,
    );
    expectWithin(v.matrix([all(c), all([0, 0, 1])])[0]![1]!, 1 * rho * 10 - 2 * rho * 15 + 0.5 * 25, 1e-8);
  });
  test('the shape does not depend on the order of the inputs', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 3, maxLength: 3 }), (c) => {
        const source = [{ id: 's', correlation: null, correlationLengthM: L }];
        const forward = new InputCovariance(inputs, source).variance(all(c));
        const backward = new InputCovariance([...inputs].reverse(), source).variance(all([...c].reverse()));
        return Math.abs(forward - backward) <= 1e-12 * (1 + forward);
      }),
    );
  });
});

describe('in a campaign', () => {
  const shared = (rho: object, sites = 2) =>
    campaignOf({
      sources: [{ id: 's', ...rho }],
      sites: ['a', 'b', 'c']
        .slice(0, sites)
        .map((id, i) => site(id, [normal(`${100 * i}.00(2) m`, 'ihrs', { source: 's' })], { lon: 9 + i, g: 9.81 })),
      ...clocksAndLinks(...['a', 'b', 'c'].slice(0, sites)),
    });
  test('an equal error shared in full cancels in y; 2 cm each with ρ = 0.9 leave 9 mm, independent 28 mm', () => {
    const uH = (rho: object) => predict(shared(rho)).links[0]!.dHNormal!.u;
    expectWithin(uH({}), 0, 1e-6);
    expectWithin(uH({ correlation: 0.9 }), 0.02 * Math.sqrt(0.2), 1e-6);
    expectWithin(uH({ correlation: 0 }), 0.02 * Math.SQRT2, 1e-6);
  });
  test('ρ = −0.5 between three sites passes, −0.6 is refused and names the source', () => {
    expect(predict(shared({ correlation: -0.5 }, 3)).links).toHaveLength(2);
    expect(() => predict(shared({ correlation: -0.6 }, 3))).toThrow(CampaignError);
    try {
      predict(shared({ correlation: -0.6 }, 3));
    } catch (e) {
      expect((e as CampaignError).faults[0]).toMatchObject({
        code: 'correlation-impossible',
        path: 'sources.s.correlation',
      });
      expect((e as CampaignError).faults[0]!.expected).toMatch(/-0\.5/);
    }
  });
  test('what the source lacks, independent parts of the same inputs may make up for', () => {
    const campaign = campaignOf({
      sources: [{ id: 's', correlation: -0.6 }],
      sites: ['a', 'b', 'c'].map((id) =>
        site(id, [
          {
            kind: 'normal-height',
            H: { value: 100, tide: 'mean', parts: [{ u: '1 cm', source: 's' }, { u: '2 cm' }] },
          },
        ]),
      ),
      ...clocksAndLinks('a', 'b'),
    });
    expectWithin(predict(campaign).links[0]!.dHNormal!.u, Math.sqrt(2 * 5e-4 + 2 * 0.6 * 1e-4), 1e-6);
  });
  test('all u scaled by s scale u(y) by s', () => {
    const u = (mm: number) =>
      predict(
        campaignOf({
          sites: [
            site('a', [normal(`100.000 ± ${mm / 1000} m`)], { g: 9.81 }),
            site('b', [normal(`50.000 ± ${mm / 1000} m`)], { g: 9.81 }),
          ],
          ...clocksAndLinks('a', 'b'),
        }),
      ).links[0]!.y!.u;
    expectWithin(u(30) / u(10), 3, 1e-9);
  });
});
