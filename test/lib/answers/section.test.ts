import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { predictionOf } from '../../../lib/answers/predict.js';
import { section, tieShare } from '../../../lib/answers/section.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { SPEED_OF_LIGHT_SQUARED_M2_PER_S2 } from '../../../lib/constants/defining-constants.js';
import { expectWithin } from '../../expect-within.js';

const solvedText = (text: string) => solveCampaign(readCampaign(text).campaign);
const example = (name: string) =>
  solvedText(readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8'));

describe('section', () => {
  const solved = example('three-sites');
  const prediction = predictionOf(solved);
  const found = section(solved);

  it('C is W0 of the IHRS minus W, whatever datum the determinations name, with the u of W', () => {
    // IAG 2015 Resolution 1
    for (const site of found.sites) {
      const W = prediction.sites.find(({ id }) => id === site.id)!.W!;
      expectWithin(site.C.value, 62_636_853.4 - W.value, 1e-7);
      expectWithin(site.C.u, W.u, 1e-12);
    }
    expect(found.sites.map(({ id }) => id)).toEqual(prediction.sites.map(({ id }) => id));
  });

  it('the highest marker, and how far above the others it is with what they have in common taken out', () => {
    expect(found.highest!.id).toBe('ridge');
    expect(found.highest!.above.map(({ id }) => id)).toEqual(['plain', 'harbour']);
    const H = new Map(found.sites.map(({ id, normalHeight }) => [id, normalHeight]));
    for (const { id, height } of found.highest!.above) {
      expectWithin(height.value, H.get('ridge')!.value - H.get(id)!.value, 1e-9);
      // errors of quasigeoid and GNSS are shared, so the difference is surer than two independent heights
      expect(height.u).toBeLessThan(Math.hypot(H.get('ridge')!.u, H.get(id)!.u));
      expect(height.u).toBeGreaterThan(0);
    }
  });

  it('the steps of every ladder add up to the way from marker to atoms', () => {
    for (const clock of found.clocks) {
      const site = found.sites.find(({ id }) => id === clock.site)!;
      const along = clock.tie.reduce((sum, { step }) => sum + step.potential.value, 0);
      expectWithin(along, clock.C.value - site.C.value, 1e-7);
      expectWithin(clock.tie.at(-1)?.endC ?? 0, along, 1e-12);
      if (clock.sum) {
        expectWithin(clock.sum.potential.value, along, 1e-12);
        expectWithin(clock.sum.offset.value * SPEED_OF_LIGHT_SQUARED_M2_PER_S2, along, 1e-9);
      }
    }
  });

  it('one step by hand: C = g·Δ − ½·Γ·Δ², u from the step, g and Γ; the second step begins where the first ends', () => {
    const W = '"determinations": [{ "kind": "potential", "W": 62630000 }]';
    const text = `{ "format": "plumbtick-campaign/1",
      "sites": [{ "id": "a", "lat": 50, "lon": 8, "g": "9.8(1) m/s²", "gradient": "3e-6(1)e-6 s⁻²", ${W} }],
      "clocks": [{ "id": "c", "site": "a", "transition": "87Sr",
        "tie": [{ "name": "up", "dH": "100(2) m" }, { "name": "down", "dH": "-40(1) m" }] }], "links": [] }`.replace(
      '3e-6(1)e-6 s⁻²',
      '3.0(1.0)e-6 s⁻²',
    );
    const { clocks, sites, scaleGravity } = section(solvedText(text));
    const [up, down] = clocks[0]!.tie;
    // 9.8·100 − ½·3e-6·100² ; u² = ((9.8 − 3e-6·100)·2)² + (100·0.1)² + (½·100²·1e-6)²
    expectWithin(up!.step.potential.value, 980 - 0.015, 1e-9);
    expectWithin(up!.step.potential.u, Math.sqrt((9.7997 * 2) ** 2 + 10 ** 2 + 0.005 ** 2), 1e-9);
    // from 100 m to 60 m: −9.8·40 + ½·3e-6·(100² − 60²)
    expectWithin(down!.step.potential.value, -392 + 0.0096, 1e-9);
    // ∂/∂d₁ = −Γ·d₂ = 1.2e-4, ∂/∂d₂ = g − Γ·60, ∂/∂g = −40, ∂/∂Γ = −½(60² − 100²)
    expectWithin(
      down!.step.potential.u,
      Math.sqrt((1.2e-4 * 2) ** 2 + (9.8 - 1.8e-4) ** 2 + 4 ** 2 + 0.0032 ** 2),
      1e-9,
    );
    expect(down!.step.length).toEqual({ value: -40, u: 1 });
    expectWithin(clocks[0]!.sum!.length.u, Math.sqrt(5), 1e-12);
    expectWithin(scaleGravity, 9.8, 1e-12);
    expectWithin(sites[0]!.C.value, 6853.4, 1e-7);
    // normal height at 50°: C over the mean normal gravity 9.81070 − 3.086e-6·350 ≈ 9.8096 m/s²
    expectWithin(sites[0]!.normalHeight.value, 6853.4 / 9.8096, 0.05);
  });

  it('the share of a tie is that of all its steps in the budget', () => {
    // nothing is correlated with the tie, so its share is (u_tie/u)²
    const link = prediction.links.find(({ id }) => id === 'rp')!;
    const rows = link.budget.filter(({ input }) => input.startsWith('clocks.r1.tie.'));
    expect(rows.length).toBeGreaterThan(1);
    const share = rows.reduce((sum, { uy }) => sum + (uy / link.y!.u) ** 2, 0);
    expectWithin(tieShare(link.budget, 'r1'), share, 1e-12);
    expectWithin(tieShare(link.budget, 'r'), 0, 0);
  });

  it('a site that only differences are known of is not drawn, but named', () => {
    const text = `{ "format": "plumbtick-campaign/1",
      "sites": [{ "id": "a", "lat": 50, "lon": 8, "g": 9.8, "determinations": [{ "kind": "potential", "W": 62630000 }] },
                { "id": "b", "lat": 50, "lon": 9, "g": 9.8, "determinations": [] }],
      "clocks": [{ "id": "c", "site": "b", "transition": "87Sr" }], "links": [] }`;
    const { sites, clocks, withoutLevel } = section(solvedText(text));
    expect(sites.map(({ id }) => id)).toEqual(['a']);
    expect(clocks).toEqual([]);
    expect(withoutLevel).toEqual(['b']);
  });
});
