import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { ID_PATTERN, idFault } from '../../../lib/campaign/read/identifier.js';
import { readCampaignValue } from '../../../lib/campaign/read.js';
import { campaignJsonSchema, campaignSchema, type Descriptor, type Keys } from '../../../lib/campaign/schema/index.js';
import { unbuiltEntries } from '../../../lib/campaign/schema/unbuilt.js';
import { CASES, file } from './fault-cases.js';
import { faultsOf } from './faults-of.js';
import { type Schema, violations } from './json-schema-validator.js';

const schema = campaignJsonSchema() as Schema;
const example = (name: string): unknown =>
  JSON.parse(readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8'));

/** Faults that a schema of keys, forms and limits sees; the rest is the reader's: references, texts, relations. */
const SEEN = new Set([
  'unknown-key',
  'missing-key',
  'wrong-type',
  'wrong-length',
  'not-built',
  'tide-not-here',
  'phase-on-clock',
]);
/** Keys that are missing only in view of others. */
const READERS = new Set([
  'sites.a.determinations.0.h',
  'transitions.87sr.frequency',
  'pole.1.time',
  'links.kl.route.via.0.time',
]);
const isSeen = (code: string, path: string, at: string): boolean =>
  (SEEN.has(code) && !READERS.has(path)) ||
  code === 'not-one-of' ||
  code === 'newer-format' ||
  code === 'wrong-format' ||
  (code === 'out-of-range' && !at.startsWith('"')) ||
  (code === 'exclusive-keys' && path !== 'measurements.0.tide') ||
  code === 'negative-u';

describe('campaignJsonSchema', () => {
  it.each(['three-sites', 'other-kinds', 'triangle'])('takes the example %s', (name) => {
    expect(violations(example(name), schema)).toEqual([]);
  });

  it('takes the campaign that the cases break', () => {
    expect(violations(JSON.parse(file()), schema)).toEqual([]);
  });

  const seen = CASES.filter((c) => !c.at.includes('1e999') && isSeen(c.code, c.path, c.at));
  it.each(seen.map((c) => [c.code, c.path, c] as const))(
    'refuses what the reader refuses: %s at %s',
    (_code, _path, c) => {
      expect(violations(JSON.parse(file(c.change)), schema)).not.toEqual([]);
    },
  );

  it('leaves those cases out that need the reader, and no more', () => {
    expect(seen.length).toBeGreaterThan(45);
  });

  it('knows a title and a description of every key', () => {
    let keys = 0;
    const visit = (node: unknown): void => {
      if (typeof node !== 'object' || node === null) return;
      const properties = (node as Schema)['properties'] as Record<string, Schema> | undefined;
      for (const [key, property] of Object.entries(properties ?? {})) {
        if (key === 'kind' && 'const' in property) continue;
        keys++;
        expect(property['title'], key).toMatch(/\S/);
        expect(property['description'], key).toMatch(/\S/);
      }
      for (const inner of Object.values(node)) visit(inner);
    };
    visit(schema);
    expect(keys).toBeGreaterThan(150);
  });

  it('has the keys of the reader: each is read, and refused when its name is changed', () => {
    const walk = (descriptor: Descriptor, visit: (keys: Keys) => void): void => {
      if (descriptor.type === 'list') walk(descriptor.item, visit);
      if (descriptor.type === 'variant') for (const o of Object.values<Descriptor>(descriptor.variants)) walk(o, visit);
      if (descriptor.type !== 'object') return;
      visit(descriptor.keys);
      for (const key of Object.values<Keys[string]>(descriptor.keys)) walk(key.descriptor, visit);
    };
    const readable = new Set<string>();
    walk(campaignSchema, (keys) => {
      for (const key of Object.keys(keys)) readable.add(key);
    });
    for (const name of ['three-sites', 'other-kinds', 'triangle']) {
      const text = JSON.stringify(example(name));
      for (const key of new Set([...text.matchAll(/"(\w+)":/g)].map((m) => m[1] as string))) {
        if (!['value', 'u', 'source', 'parts'].includes(key)) expect(readable, key).toContain(key);
        const faults = faultsOf(() => readCampaignValue(JSON.parse(text.replace(`"${key}":`, `"${key}x":`))));
        expect(
          faults.map((f) => f.code),
          key,
        ).toContain(key === 'kind' ? 'missing-key' : 'unknown-key');
      }
    }
  });
});

describe('keys that are not built', () => {
  it('stand each for something that can be refused', () => {
    const names = new Set<string>();
    const visit = (d: Descriptor): void => {
      if (d.type === 'list') visit(d.item);
      if (d.type === 'variant') {
        names.add(d.name);
        for (const o of Object.values<Descriptor>(d.variants)) visit(o);
      }
      if (d.type !== 'object') return;
      names.add(d.name);
      for (const [k, { descriptor }] of Object.entries<Keys[string]>(d.keys)) {
        if (descriptor.type === 'quantity') names.add(k);
        visit(descriptor);
      }
    };
    visit(campaignSchema);
    expect(names).toContain('measurement');
    for (const entry of unbuiltEntries()) {
      expect(entry).toMatch(/^[\w-]+[.=][\w-]+$/);
      // a name that nothing in the schema has would let the key pass
      expect(names).toContain(entry.split(/[.=]/)[0]);
    }
  });
});

describe('ids', () => {
  it.each(['cellar', '87Sr', '171Yb+ E3', '27Al+', 'München/1', 'a-b_c', 'Ωμέγα', '時計 1', '(x)'])(
    '%s is one',
    (id) => {
      expect(idFault(id)).toBeNull();
      expect(id).toMatch(new RegExp(ID_PATTERN, 'u'));
    },
  );

  it.each([
    '',
    ' a',
    'a ',
    'a  b',
    'a.b',
    'a"b',
    'a\\b',
    'a\tb',
    'a\nb',
    'a\u00a0b',
    'a\u202eb',
    '\ud800',
    'constructor',
    'x'.repeat(101),
  ])('%j is none', (id) => {
    expect(idFault(id)).not.toBeNull();
  });
});
