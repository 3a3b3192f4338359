import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { limitsOf } from '../../../lib/answers/limits.js';
import { linearDensity } from '../../../lib/answers/linear-density.js';
import { predict } from '../../../lib/answers/predict.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { linkUncertainty } from '../../../lib/answers/what-if.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

const text = readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8');

describe('what limits a link', () => {
  test('the largest group and what half its u brings: the file with half its u', () => {
    const { campaign } = readCampaign(text);
    const solved = solveCampaign(campaign);
    const rp = campaign.links.findIndex(({ id }) => id === 'rp');
    const { largest, halvedM, idle } = limitsOf(solved, rp, linkUncertainty(solved, rp)!);
    expect(largest!.parts[0]!.input).toBe('datums.north.W0');
    expect(text).toContain('62636853.4(3) m');
    const better = predict(readCampaign(text.replace('62636853.4(3) m', '62636853.40(15) m')).campaign);
    expectWithin(halvedM!, better.links[rp]!.dH!.u, 1e-9);
    expect(idle).toContain('gravity');
    expect(idle).not.toContain('datums');
  });
});

describe('density of the linear law', () => {
  test('normal: at 0 1/(u·√2π), at u e^−½ of it', () => {
    const density = linearDensity(5, null);
    expectWithin(density(0), 1 / (5 * Math.sqrt(2 * Math.PI)), 1e-15);
    expectWithin(density(5) / density(0), Math.exp(-0.5), 1e-14);
    expect(density(-3)).toBe(density(3));
  });
  test('t on 1 degree of freedom: the Cauchy density 1/(π·u·(1 + (x/u)²))', () => {
    const density = linearDensity(2, 1);
    for (const x of [0, 1, -7]) expectWithin(density(x), 1 / (Math.PI * 2 * (1 + (x / 2) ** 2)), 1e-14);
  });
});
