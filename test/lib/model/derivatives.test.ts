import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { clockPotential, linkQuantities } from '../../../lib/answers/quantities.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { buildModel } from '../../../lib/model/build-model.js';
import type { ModelFunction } from '../../../lib/model/model-function.js';
import { solveSitePotentials } from '../../../lib/model/site-potentials.js';

const campaign = (name: string) =>
  readCampaign(readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8')).campaign;

/** Analytic derivatives against central differences: every determination kind and tie of the example campaigns. */
function worstRelativeError(f: ModelFunction, x: readonly number[]): number {
  const partials = f.partials(x);
  return Math.max(
    ...partials.map((analytic, k) => {
      // a step at which the potential changes by some 10 m²/s²: rounding of 6e7 (1e-8) then costs 1e-9
      const step = 10 / Math.abs(analytic);
      const shifted = (s: number) => f.evaluate(x.map((v, i) => (i === k ? v + s : v)));
      const numeric = (shifted(step) - shifted(-step)) / (2 * step);
      return Math.abs(numeric / analytic - 1);
    }),
  );
}

describe.each(['three-sites', 'other-kinds', 'triangle'])('%s', (name) => {
  const model = buildModel(campaign(name));
  const estimates = (f: ModelFunction) => f.inputs.map((i) => model.inputs[i]!.value);
  test('determinations', () => {
    for (const d of model.determinations) expect(worstRelativeError(d.f, estimates(d.f)), d.path).toBeLessThan(2e-8);
  });
  test('ties, where the tie is not zero', () => {
    for (const tie of model.tieFunctions)
      if (tie) {
        const x = estimates(tie);
        expect(worstRelativeError(tie, x)).toBeLessThan(2e-8);
      }
  });
});

test('the kinds covered above are all there are, but for the ones tested with their files', () => {
  const kinds = new Set(
    ['three-sites', 'other-kinds'].flatMap((n) =>
      campaign(n).sites.flatMap((s) => s.determinations.map((d) => d.kind)),
    ),
  );
  expect([...kinds].sort()).toEqual([
    'dynamic-height',
    'geopotential-number',
    'gnss-geoid',
    'gnss-quasigeoid',
    'levelled-from',
    'normal-height',
    'orthometric-height',
    'potential',
  ]);
});

test('whole chain: y of a link moves with each input as its sensitivity says', () => {
  const base = campaign('three-sites');
  const solve = (c: typeof base) => {
    const model = buildModel(c);
    const potentials = solveSitePotentials(model);
    const clocks = c.clocks.map((_, i) => clockPotential(model, potentials, i));
    return { model, y: linkQuantities(model, potentials, clocks, c.links[0]!)!.y };
  };
  const { model, y } = solve(base);
  const slope = (path: string) => {
    const i = model.inputs.findIndex((x) => x.path === path);
    return y.gradient.values[y.gradient.indices.indexOf(i)]!;
  };
  const withH = (metres: number) => ({
    ...base,
    sites: base.sites.map((s) => (s.id === 'harbour' ? { ...s, h: { ...s.h!, value: s.h!.value + metres } } : s)),
  });
  const numeric = (solve(withH(0.5)).y.value - solve(withH(-0.5)).y.value) / 1;
  expect(Math.abs(numeric / slope('sites.harbour.h') - 1)).toBeLessThan(1e-6);
});
