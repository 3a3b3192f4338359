import { describe, expect, test } from 'vitest';
import { predict } from '../../../lib/answers/predict.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf } from './campaign-of.js';

const labelled = (tide: string, lat: readonly [number, number]) =>
  predict(
    campaignOf({
      tide,
      sites: lat.map((phi, i) => ({
        id: `s${i}`,
        lat: phi,
        lon: 10,
        g: 9.81,
        determinations: [
          {
            kind: 'gnss-quasigeoid',
            h: { value: '512.3300(50) m', tide: 'free' },
            zeta: { value: '45.100(10) m', tide: 'zero' },
          },
        ],
      })),
      clocks: [0, 1].map((i) => ({ id: `k${i}`, site: `s${i}`, transition: '87Sr' })),
      links: [{ id: 'l', from: 'k0', to: 'k1' }],
    }),
  ).links[0]!;

describe('y is what clocks feel, whatever system the campaign prints', () => {
  test.each([
    [48, 52.3],
    [45, 60],
    [-35, 40],
  ] as const)('%s° to %s°: the same y in mean, zero and free to 5e-20', (a, b) => {
    const [mean, zero, free] = ['mean', 'zero', 'free'].map((t) => labelled(t, [a, b]));
    // what is left is the 1 mm by which IERS eq. (7.14a) and h₂·W_T/γ₀ differ
    expectWithin(zero!.y!.value, mean!.y!.value, 5e-20);
    expectWithin(free!.y!.value, mean!.y!.value, 5e-20);
  });
  test('dW does differ, by the permanent tide between the sites: 4.1e-18 between 45° and 52.3°', () => {
    const [mean, zero] = ['mean', 'zero'].map((t) => labelled(t, [45, 52.3]));
    // mean − zero of W_A − W_B: W_T(45°) − W_T(52.3°) = 0.3662 m²/s² (Mäkinen 2021, eq. 18 on the ellipsoid), and h alike in both
    expectWithin(mean!.dW!.value - zero!.dW!.value, -0.47472 + 0.84097, 2e-4);
    expectWithin(mean!.y!.value, mean!.dW!.value / 299792458 ** 2, 1e-24);
    expect(Math.abs(zero!.y!.value - zero!.dW!.value / 299792458 ** 2)).toBeGreaterThan(4e-18);
  });
});

describe('missing labels', () => {
  const prediction = predict(
    campaignOf({
      sites: [
        {
          id: 'a',
          lat: 60,
          lon: 10,
          g: 9.82,
          determinations: [
            { kind: 'gnss-quasigeoid', h: '100.00(1) m', zeta: '40.00(1) m' },
            { kind: 'normal-height', H: '60.00(1) m' },
          ],
        },
      ],
    }),
  );
  const message = (path: string) =>
    prediction.warnings.find((w) => w.code === 'tide-label-missing' && w.path.endsWith(path))?.message ?? '';
  test('h is taken as free, ζ as zero, H as the campaign’s, each with its size', () => {
    expect(message('.h')).toMatch(/taken as free.*off by 75 mm \(8\.2e-18\)/);
    expect(message('.zeta')).toMatch(/taken as zero.*off by 1[23]\d mm/);
    expect(message('.H')).toMatch(/taken as mean/);
  });
});
