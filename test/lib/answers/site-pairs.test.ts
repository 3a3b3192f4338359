import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { sitePairs, sourcesBetweenSites } from '../../../lib/answers/site-pairs.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { expectWithin } from '../../expect-within.js';

const solved = (text: string) => solveCampaign(readCampaign(text).campaign);

describe('sites two by two', () => {
  const example = solved(readFileSync(new URL('../../data/examples/three-sites.json', import.meta.url), 'utf8'));

  it('nearest first, with the links between them', () => {
    const pairs = sitePairs(example, null);
    expect(pairs.map(({ sites, links }) => [...sites, ...links])).toEqual([
      ['harbour', 'ridge', 'hr'],
      ['ridge', 'plain', 'rp'],
      ['harbour', 'plain', 'ph'],
    ]);
    expect(pairs.map(({ shared }) => shared)).toEqual([null, null, null]);
    for (const [i, { distanceM }] of pairs.entries()) expect(distanceM).toBeGreaterThan(pairs[i - 1]?.distanceM ?? 0);
  });

  it('what two ζ share: u² = u₁² + u₂² − 2ρ·s₁·s₂ with s the parts that name the source, ρ = exp(−d/L)', () => {
    const zeta = (parts: string) => `{ "value": "45.0 m", "tide": "zero", "parts": [${parts}] }`;
    const site = (id: string, lon: number, parts: string) => `{ "id": "${id}", "lat": 0, "lon": ${lon}, "g": 9.78,
      "determinations": [{ "kind": "gnss-quasigeoid", "h": { "value": "100.000(5) m", "tide": "free" }, "zeta": ${zeta(parts)} }] }`;
    const { 0: pair } = sitePairs(
      solved(`{ "format": "plumbtick-campaign/1", "sources": [{ "id": "s", "correlationLength": "100 km" }],
        "sites": [${site('a', 0, '{ "u": "20 mm", "source": "s" }, { "u": "6 mm" }')}, ${site('b', 1, '{ "u": "15 mm", "source": "s" }')}],
        "clocks": [], "links": [] }`),
      's',
    );
    // one degree of the equator of GRS80: 6378137·π/180 m
    const d = (6_378_137 * Math.PI) / 180;
    expectWithin(pair!.distanceM, d, 1e-6);
    const rho = Math.exp(-d / 100_000);
    expectWithin(pair!.shared!.correlation, rho, 1e-12);
    expectWithin(pair!.shared!.uIfApart, Math.sqrt(0.02 ** 2 + 0.006 ** 2 + 0.015 ** 2), 1e-12);
    expectWithin(
      pair!.shared!.uDifference,
      Math.sqrt(0.02 ** 2 + 0.006 ** 2 + 0.015 ** 2 - 2 * rho * 0.02 * 0.015),
      1e-12,
    );
  });

  it('a source with one correlation for all, a plain source, and sites that do not name it', () => {
    const site = (id: string, lon: number, h: string) => `{ "id": "${id}", "lat": 50, "lon": ${lon}, "g": 9.81,
      "determinations": [{ "kind": "gnss-quasigeoid", "h": ${h}, "zeta": { "value": "45.00(1) m", "tide": "zero" } }] }`;
    const h = (source: string) => `{ "value": "100.000(5) m", "tide": "free", "source": "${source}" }`;
    const file =
      solved(`{ "format": "plumbtick-campaign/1", "sources": [{ "id": "g", "correlation": 0.4 }, { "id": "p" }],
      "sites": [${site('a', 0, h('g'))}, ${site('b', 1, h('g'))}, ${site('c', 3, h('p'))}, ${site('d', 6, h('p'))}],
      "clocks": [], "links": [] }`);
    const shared = (source: string, ...sites: string[]) =>
      sitePairs(file, source).find((pair) => pair.sites.join() === sites.join())!.shared;
    expectWithin(shared('g', 'a', 'b')!.correlation, 0.4, 0);
    expectWithin(shared('g', 'a', 'b')!.uDifference, 0.005 * Math.sqrt(2 * 0.6), 1e-15);
    expect(shared('g', 'a', 'c')).toBe(null);
    expect(shared('g', 'a', 'b')!.quantity).toBe('h');
    expect(sourcesBetweenSites(file)).toEqual(['g', 'p']);
    expectWithin(shared('p', 'c', 'd')!.correlation, 1, 0);
    expectWithin(shared('p', 'c', 'd')!.uDifference, 0, 1e-12);
    const { sources, ...rest } = file.model.campaign;
    expect(sources).toHaveLength(2);
    const alone = { ...rest, sources: [...sources, { id: 'unused' }] };
    expect(sourcesBetweenSites(solveCampaign(alone))).toEqual(['g', 'p']);
  });
});
