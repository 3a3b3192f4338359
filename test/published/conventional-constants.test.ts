import { expect, test } from 'vitest';
import { predict } from '../../lib/answers/predict.js';
import { readCampaignValue } from '../../lib/campaign/read.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2, W0_IHRS, W0_TT } from '../../lib/constants/defining-constants.js';
import { expectWithin } from '../expect-within.js';

const C2 = SPEED_OF_LIGHT_SQUARED_M2_PER_S2;

test('L_G·c² = 62 636 856.0 m²/s² (CGPM 2018 Resolution 2, as printed)', () => {
  expectWithin(W0_TT.value, 62636856.0, 0.05);
  expectWithin(W0_TT.value, 62636856.0005, 5e-5, 'to the digits of L_G');
});
test('IHRS and TT reference potentials: 2.6 m²/s² = 2.893e-17 (IAG 2015 Resolution 1; CGPM 2018 Resolution 2)', () => {
  expectWithin((62636856.0 - W0_IHRS.value) / C2, 2.893e-17, 5e-21);
});

/** Two clocks whose potentials are stated outright. */
const stated = (WA: string, WB: string) =>
  predict(
    readCampaignValue({
      format: 'plumbtick-campaign/1',
      sites: [
        { id: 'a', lat: 50, lon: 8, g: 9.81, determinations: [{ kind: 'potential', W: { value: WA, tide: 'mean' } }] },
        { id: 'b', lat: 50, lon: 9, g: 9.81, determinations: [{ kind: 'potential', W: { value: WB, tide: 'mean' } }] },
      ],
      clocks: [
        { id: 'ka', site: 'a', transition: '87Sr' },
        { id: 'kb', site: 'b', transition: '87Sr' },
      ],
      links: [{ id: 'ab', from: 'ka', to: 'kb' }],
    }).campaign,
  );

test('457 km comparison (Phys. Rev. Applied 2024, arXiv:2309.14953): 3915.88(30) m²/s² is 4.3570e-14, 3.3e-18', () => {
  const link = stated('62630000(0.30) m²/s²', '62626084.12 m²/s²').links[0]!;
  expectWithin(link.dW!.value, 3915.88, 1e-6);
  expectWithin(link.y!.value, 4.357e-14, 5e-19);
  expectWithin(link.y!.u, 3.338e-18, 5e-22);
  expect(link.y!.value).toBeGreaterThan(0);
  // × 87Sr recommended frequency: 18.70 Hz
  expectWithin(link.offsetHz!.value, 18.7, 5e-3);
});

test('75.15(4) m above the TT level at g = 9.7985 m/s²: redshift 8.193(4)e-15 (KRISS evaluation, abstract)', () => {
  const W = W0_TT.value - 9.7985 * 75.15;
  const clock = stated(`${W.toFixed(4)} ± ${(9.7985 * 0.04).toFixed(4)} m²/s²`, '62626084.12 m²/s²').clocks[0]!;
  expectWithin(clock.redshift!.value, 8.193e-15, 5e-19);
  expectWithin(clock.redshift!.u, 4e-18, 5e-19);
});

test('NIST Boulder fountain (Pavlis & Weiss 2000): correction −1798.91e-16, so the clock runs fast by +1798.91e-16', () => {
  // the paper's own reference potential differs from L_G·c² by less than the printed digits of C = 16 167.8 m²/s²
  const clock = stated(`${(W0_TT.value - 16167.8).toFixed(4)} m²/s²`, '62626084.12 m²/s²').clocks[0]!;
  expectWithin(clock.redshift!.value, 1798.91e-16, 0.06e-16);
});
