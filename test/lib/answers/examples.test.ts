import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { adjust, adjustPlanned } from '../../../lib/answers/adjust.js';
import { evaluate } from '../../../lib/answers/evaluate.js';
import { plan } from '../../../lib/answers/plan.js';
import { predict } from '../../../lib/answers/predict.js';
import { readCampaign } from '../../../lib/campaign/read.js';

// The independent program's answers (test/data/examples/README.md).
const read = (name: string) => readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8');
const campaign = (name: string) => readCampaign(read(name)).campaign;

type Json = null | string | number | boolean | Json[] | { [key: string]: Json };

/** Tolerance of a number by the key it stands under: absolute for values, relative for uncertainties and statistics. */
function tolerance(path: string, expected: number): number {
  const key = path.replace(/\.\d+/g, '');
  if (/\.u[A-Z]?\w*$|\.uBefore$/.test(path)) return 1e-6 * Math.abs(expected) + 1e-30;
  if (/(y|redshift|measured|predicted|residual)\.value$/.test(key)) return 1e-21;
  if (/(W|C|dW)\.value$|\.W$|offset\.value$|observations\.residual$/.test(key)) return 1e-5;
  if (/(dH|dHNormal)\.value$/.test(key)) return 1e-6;
  if (/share$/.test(key)) return 1e-6;
  if (/offsetHz\.value$/.test(key)) return 1e-6;
  // two roundings of the same statistic of 6e7-sized potentials
  if (/(z|p|standardised|chi2|redundancy|control)$/.test(key)) return 1e-6;
  return 1e-6 * Math.abs(expected);
}

function differences(expected: Json, found: unknown, path = ''): string[] {
  if (typeof expected === 'number') {
    if (typeof found !== 'number') return [`${path}: ${String(found)} instead of ${expected}`];
    const off = Math.abs(found - expected);
    return off <= tolerance(path, expected) ? [] : [`${path}: ${found} instead of ${expected}, off by ${off}`];
  }
  if (Array.isArray(expected)) {
    if (!Array.isArray(found) || found.length !== expected.length)
      return [`${path}: ${Array.isArray(found) ? found.length : String(found)} entries instead of ${expected.length}`];
    return expected.flatMap((e, i) => differences(e, found[i], `${path}.${i}`));
  }
  if (expected !== null && typeof expected === 'object') {
    if (found === null || typeof found !== 'object') return [`${path}: ${String(found)} instead of an object`];
    return Object.entries(expected).flatMap(([k, e]) =>
      differences(e, (found as { [key: string]: unknown })[k], `${path}.${k}`),
    );
  }
  return Object.is(expected, found) ? [] : [`${path}: ${String(found)} instead of ${String(expected)}`];
}

/** Budget rows whose shares are equal to rounding may swap places: compare them by input. */
function byInput(prediction: Json): Json {
  const copy = structuredClone(prediction) as { links: { budget: { input: string }[] }[] };
  for (const link of copy.links) link.budget.sort((a, b) => (a.input < b.input ? -1 : 1));
  return copy as unknown as Json;
}

describe.each(['three-sites', 'other-kinds', 'triangle'])('%s', (name) => {
  const json = (command: string) => JSON.parse(read(`${name}.${command}`)) as Json;
  test('predict', () => {
    const found = predict(campaign(name));
    expect(differences(byInput(json('predict')), byInput(found as unknown as Json))).toEqual([]);
    for (const link of found.links) {
      const shares = link.budget.map((r) => Math.abs(r.share));
      expect(shares).toEqual([...shares].sort((a, b) => b - a));
      expect(Math.abs(link.budget.reduce((s, r) => s + r.share, 0) - 1)).toBeLessThan(1e-9);
    }
  });
  test('plan', () => {
    expect(differences(json('plan'), plan(campaign(name)))).toEqual([]);
  });
  test('adjust --planned', () => {
    expect(differences(json('planned'), adjustPlanned(campaign(name)))).toEqual([]);
  });
});

// the triangle has no measurements
describe.each(['three-sites', 'other-kinds'])('%s, measured', (name) => {
  const json = (command: string) => JSON.parse(read(`${name}.${command}`)) as Json;
  test('evaluate', () => {
    expect(differences(json('evaluate'), evaluate(campaign(name)))).toEqual([]);
  });
  test('adjust', () => {
    expect(differences(json('adjust'), adjust(campaign(name)))).toEqual([]);
  });
});
