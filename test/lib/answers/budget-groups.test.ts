import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { groupedBudget } from '../../../lib/answers/budget-groups.js';
import { predict } from '../../../lib/answers/predict.js';
import { solveCampaign } from '../../../lib/answers/solve-campaign.js';
import { readCampaign } from '../../../lib/campaign/read.js';
import { InputCovariance } from '../../../lib/uncertainty/covariance.js';
import { gradientOf } from '../../../lib/uncertainty/gradient.js';
import type { Input } from '../../../lib/uncertainty/inputs.js';
import { expectWithin } from '../../expect-within.js';

const example = (name: string) =>
  readCampaign(readFileSync(new URL(`../../data/examples/${name}.json`, import.meta.url), 'utf8')).campaign;

const input = (path: string, place: string, parts: Input['parts']): Input => ({
  path,
  value: 1,
  u: Math.hypot(...parts.map(({ u }) => u)),
  parts,
  place: { key: place, position: null },
  distribution: 'normal',
  dof: null,
});

describe('by hand', () => {
  // y = 2·a − 3·b + c with u(a) = 3 ⊕ 1 (source s ⊕ own), u(b) = 4 (s), u(c) = 2 (own); correlation of s between places 0.25
  const covariance = new InputCovariance(
    [
      input('a', 'p', [
        { u: 3, source: 's' },
        { u: 1, source: null },
      ]),
      input('b', 'q', [{ u: 4, source: 's' }]),
      input('c', 'p', [{ u: 2, source: null }]),
    ],
    [{ id: 's', correlation: 0.25, correlationLengthM: null }],
  );
  const { u, groups } = groupedBudget(
    covariance,
    gradientOf([
      [0, 2],
      [1, -3],
      [2, 1],
    ]),
  );
  // source: S = (6, −12): 36 + 144 − 2·0.25·72 = 144; own of a: (2·1)² = 4; c: 2² = 4
  const variance = 144 + 4 + 4;

  test('u²(y) is the sum of the groups', () => {
    expectWithin(u, Math.sqrt(variance), 1e-12);
    expect(groups.map(({ source, parts }) => [source, parts.map((p) => p.input)])).toEqual([
      ['s', ['b', 'a']],
      [null, ['a']],
      [null, ['c']],
    ]);
    expectWithin(groups[0]!.share, 144 / variance, 1e-12);
    expectWithin(groups[0]!.uy, 12, 1e-12);
    expectWithin(groups[1]!.share, 4 / variance, 1e-12);
  });

  test('inside a source: signed effects, shares with the correlation in them, what independence and what full correlation would give', () => {
    const [b, a] = groups[0]!.parts;
    expectWithin(b!.effect, -12, 1e-12);
    expectWithin(a!.effect, 6, 1e-12);
    // −12·(−12 + 0.25·6) = 126; 6·(6 − 0.25·12) = 18
    expectWithin(b!.share, 126 / variance, 1e-12);
    expectWithin(a!.share, 18 / variance, 1e-12);
    expectWithin(groups[0]!.independentUy, Math.sqrt(180), 1e-12);
    expectWithin(groups[0]!.commonUy, 6, 1e-12);
    expect(b!.isWhole).toBe(true);
    expect(a!.isWhole).toBe(false);
    expect(a!.u).toBe(3);
  });

  test('a negative share stays negative', () => {
    // y = a − 0.1·b wholly correlated at 3 and 4: −0.4·(−0.4 + 3) < 0
    const shared = new InputCovariance(
      [input('a', 'p', [{ u: 3, source: 's' }]), input('b', 'q', [{ u: 4, source: 's' }])],
      [{ id: 's', correlation: null, correlationLengthM: null }],
    );
    const [group] = groupedBudget(
      shared,
      gradientOf([
        [0, 1],
        [1, -0.1],
      ]),
    ).groups;
    expectWithin(group!.parts[1]!.share, (-0.4 * 2.6) / 2.6 ** 2, 1e-12);
    expectWithin(group!.commonUy, group!.uy, 1e-12);
  });

  test('what cancels wholly leaves no group', () => {
    const shared = new InputCovariance(
      [input('a', 'p', [{ u: 3, source: 's' }]), input('b', 'q', [{ u: 3, source: 's' }])],
      [{ id: 's', correlation: null, correlationLengthM: null }],
    );
    expect(
      groupedBudget(
        shared,
        gradientOf([
          [0, 1],
          [1, -1],
        ]),
      ),
    ).toEqual({ u: 0, groups: [] });
  });
});

// predict's budgets are compared with an independent program in examples.test.ts
describe.each(['three-sites', 'other-kinds', 'triangle'])('%s', (name) => {
  const solved = solveCampaign(example(name));
  const { links } = predict(example(name));

  test('the parts of each input add up to its share, and the groups to 1', () => {
    links.forEach((link, l) => {
      const q = solved.links[l];
      if (!q || !link.y || link.y.u === 0) return;
      const { u, groups } = groupedBudget(solved.model.covariance, q.y.gradient);
      expectWithin(u, link.y.u, 1e-9 * link.y.u, 'u');
      expectWithin(
        groups.reduce((s, g) => s + g.share, 0),
        1,
        1e-9,
        'sum',
      );
      const parts = groups.flatMap((g) => g.parts);
      for (const row of link.budget) {
        const own = parts.filter((p) => p.input === row.input);
        expectWithin(
          own.reduce((s, p) => s + p.share, 0),
          row.share,
          1e-9,
          `${link.id} ${row.input}`,
        );
        expectWithin(Math.hypot(...own.map((p) => p.effect)), row.uy, 1e-9 * row.uy, `${link.id} ${row.input} uy`);
      }
      for (const group of groups)
        expectWithin(
          group.parts.reduce((s, p) => s + p.share, 0),
          group.share,
          1e-9,
          `${link.id} ${group.source}`,
        );
    });
  });
});
