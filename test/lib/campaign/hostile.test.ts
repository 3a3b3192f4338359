import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CampaignError, type Fault } from '../../../lib/campaign/fault.js';
import { readCampaign, readCampaignValue } from '../../../lib/campaign/read.js';
import { cpuSeconds } from './cpu-seconds.js';
import { file } from './fault-cases.js';
import { faultsOf } from './faults-of.js';

const example = (name: string): string =>
  readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8');

describe('a file that is no campaign', () => {
  it.each([
    ['', 'empty-file'],
    ['\ufeff', 'empty-file'],
    ['null', 'wrong-type'],
    ['[]', 'wrong-type'],
    ['7', 'wrong-type'],
    ['"plumbtick-campaign/1"', 'wrong-type'],
    ['not JSON', 'syntax'],
    ['{"format": "plumbtick-campaign/1", "sites": [{"lat": NaN}]}', 'syntax'],
    ['{"format": "plumbtick-campaign/1", "title": "a\u0001b", "sites": []}', 'control-character'],
    ['['.repeat(100_000), 'too-deep'],
    ['{"sites":'.repeat(100_000), 'too-deep'],
  ])('%.40j: %s', (text, code) => {
    const faults = faultsOf(() => readCampaign(text));
    expect(faults.map((f) => f.code)).toEqual([code]);
    expect(faults[0]?.line).toBe(1);
  });

  it.each([[undefined], [null], [7], ['x'], [[]], [() => 1], [new Date(0)], [Symbol('x')]])(
    'in memory: %s',
    (value) => {
      expect(faultsOf(() => readCampaignValue(value)).map((f) => [f.code, f.line])).toEqual([['wrong-type', null]]);
    },
  );

  it('in memory, containing itself: too deep, not an overflow', () => {
    const value: Record<string, unknown> = { format: 'plumbtick-campaign/1' };
    value['sites'] = [value];
    expect(faultsOf(() => readCampaignValue(value)).map((f) => f.code)).toEqual(['too-deep']);
  });
});

describe('keys that every object carries', () => {
  it.each(['__proto__', 'constructor', 'toString', 'hasOwnProperty'])('%s is an unknown key everywhere', (key) => {
    const text = `{"format": "plumbtick-campaign/1", "${key}": {"x": 1}, "sites": [
      {"id": "a", "lat": 1, "lon": 2, "${key}": 1, "h": {"value": 1, "${key}": 1, "parts": [{"u": 1, "${key}": 1}]},
       "determinations": [{"kind": "${key}"}]}]}`;
    const faults = faultsOf(() => readCampaign(text)).map((f) => [f.code, f.path]);
    expect(faults).toEqual([
      ['unknown-key', key],
      ['unknown-key', `sites.a.${key}`],
      ['unknown-key', `sites.a.h.${key}`],
      ['unknown-key', `sites.a.h.parts.0.${key}`],
      ['not-one-of', 'sites.a.determinations.0.kind'],
    ]);
    expect(Object.hasOwn(Object.prototype, 'x')).toBe(false);
  });

  it('__proto__ of a value in memory is read as JSON.parse leaves it', () => {
    const value = JSON.parse('{"format": "plumbtick-campaign/1", "sites": [], "__proto__": {"title": "x"}}');
    expect(faultsOf(() => readCampaignValue(value)).map((f) => f.path)).toEqual(['__proto__']);
  });
});

describe('large files', () => {
  it('1000 sites: read, and fast', () => {
    const campaign = JSON.parse(example('three-sites'));
    const sites = Array.from({ length: 1000 }, (_, i) => ({ ...campaign.sites[i % 3], id: `s${i}` }));
    const text = JSON.stringify(
      { ...campaign, sites, clocks: [], links: [], measurements: [], correlations: [] },
      null,
      1,
    );
    readCampaign(text);
    expect(readCampaign(text).campaign.sites.map((s) => s.id)).toEqual(sites.map((s) => s.id));
    // 0.2 s here; a quadratic reader takes far longer
    expect(cpuSeconds(() => readCampaign(text))).toBeLessThan(1.5);
  });

  it('10 MB of faults: as many as are of use, and a word that there are more', () => {
    const text = `{"format": "plumbtick-campaign/1", "sites": [${'{"id": "x", "lat": 99, "longitude": 0},'.repeat(260_000)} 0]}`;
    expect(text.length).toBeGreaterThan(10_000_000);
    let faults: readonly Fault[] = [];
    const seconds = cpuSeconds(() => {
      faults = faultsOf(() => readCampaign(text));
    });
    expect(seconds).toBeLessThan(40 * cpuSeconds(() => JSON.parse(text)));
    expect(faults.length).toBe(1000);
    expect(faults.filter((f) => f.code === 'too-many-faults').length).toBe(1);
  });

  it('a key, an id and a text of 10 MB', () => {
    const long = 'x'.repeat(10_000_000);
    for (const text of [`{"${long}": 1}`, `{"format": "${long}"}`, file().replaceAll('"k"', `"${long}"`)]) {
      const faults = faultsOf(() => readCampaign(text));
      expect(faults.length).toBeGreaterThan(0);
      for (const f of faults) expect(f.found.length + f.expected.length + f.path.length).toBeLessThan(1000);
    }
  });
});

describe('whatever the file', () => {
  const valueOrFault = (read: () => unknown): void => {
    try {
      read();
    } catch (error) {
      expect(error).toBeInstanceOf(CampaignError);
      for (const f of (error as CampaignError).faults) {
        expect(f.code).toMatch(/^[a-zA-Z-]+$/);
        expect(f.found).not.toBe('');
        expect(f.expected).not.toBe('');
      }
    }
  };

  it('a character more, less or other is read or refused, never an unexpected error', () => {
    const text = example('other-kinds');
    fc.assert(
      fc.property(
        fc.nat(text.length - 1),
        fc.constantFrom('', '"', '{', ']', ',', '-', '9', 'e', '\\', ' ', '\ud800'),
        (at, c) => {
          valueOrFault(() => readCampaign(text.slice(0, at) + c + text.slice(at + (at % 2))));
        },
      ),
      { numRuns: 150, seed: 7 },
    );
  });

  it('any value at any key is read or refused', () => {
    const base = JSON.parse(file());
    const places: [object, string][] = [];
    const visit = (value: unknown): void => {
      if (typeof value !== 'object' || value === null) return;
      for (const [key, inner] of Object.entries(value)) {
        places.push([value, key]);
        visit(inner);
      }
    };
    visit(base);
    fc.assert(
      fc.property(fc.nat(places.length - 1), fc.jsonValue({ maxDepth: 2 }), (i, value) => {
        const [object, key] = places[i] as [Record<string, unknown>, string];
        const before = object[key];
        object[key] = value;
        try {
          valueOrFault(() => readCampaignValue(base));
        } finally {
          object[key] = before;
        }
      }),
      { numRuns: 400, seed: 3 },
    );
  });
});
