import { describe, expect, it } from 'vitest';
import type { Fault } from '../../../lib/campaign/fault.js';
import { readCampaign, readCampaignValue } from '../../../lib/campaign/read.js';
import { CASES, file, PARTS, site } from './fault-cases.js';
import { faultsOf, textAt } from './faults-of.js';

describe('readCampaign', () => {
  it('reads the campaign that the cases below break', () => {
    const { campaign, warnings } = readCampaign(file({ sources: PARTS.sources.replace(', { "id": "plain" }', '') }));
    expect(warnings).toEqual([]);
    expect(campaign.clocks.map((c) => c.id)).toEqual(['k', 'l']);
  });

  it.each(CASES.map((c) => [c.code, c.path, c] as const))('%s at %s, once and at its place', (code, path, c) => {
    const text = file(c.change);
    const faults = faultsOf(() => readCampaign(text));
    expect(faults.map((f) => [f.code, f.path])).toEqual([[code, path]]);
    const [fault] = faults as [Fault];
    expect(textAt(text, fault).slice(0, c.at.length)).toBe(c.at);
    if (c.expected !== undefined) expect(fault.expected).toContain(c.expected);
    expect(fault.found).not.toBe('');
    expect(fault.expected).not.toBe('');
  });

  it.each(
    // JSON.parse keeps neither the second of two keys nor the text of a number that is too large
    CASES.filter((c) => c.code !== 'duplicate-key' && !c.at.includes('1e999')).map((c) => [c.code, c.path, c] as const),
  )('from memory: %s at %s, without a line', (code, path, c) => {
    const faults = faultsOf(() => readCampaignValue(JSON.parse(file(c.change))));
    expect(faults.map((f) => [f.code, f.path, f.line, f.column])).toEqual([[code, path, null, null]]);
  });

  it('reports faults of all kinds at once, in the order of the file', () => {
    const several = [
      CASES.find((c) => c.path === 'target' && c.at === '0'),
      ...CASES.filter((c) => ['links.kl.to', 'correlations.0.rho'].includes(c.path)),
    ];
    const change = Object.assign({}, ...several.map((c) => c?.change));
    const faults = faultsOf(() =>
      readCampaign(file({ ...change, k: PARTS.k.replace('0.7', '7'), l: PARTS.l.replace('"b"', '"c"') })),
    );
    expect(faults.map((f) => f.path)).toEqual([
      'target',
      'clocks.k.uptime',
      'clocks.l.site',
      'links.kl.to',
      'correlations.0.rho',
    ]);
    const places = faults.map((f) => (f.line ?? 0) * 1000 + (f.column ?? 0));
    expect(places).toEqual([...places].sort((a, b) => a - b));
  });

  it('gives no second fault for an item whose id or other keys are refused', () => {
    expect(faultsOf(() => readCampaign(file(site('"lat": 95')))).length).toBe(1);
    const renamed = file().replaceAll('"k"', '"k.1"');
    expect(faultsOf(() => readCampaign(renamed)).map((f) => [f.code, f.path])).toEqual([['bad-id', 'clocks.0.id']]);
  });
});
