import { expect, test } from 'vitest';
import { adjust } from '../../lib/answers/adjust.js';
import { readCampaignValue } from '../../lib/campaign/read.js';
import { expectWithin } from '../expect-within.js';

// Differential levelling between two benchmarks with three new points and seven lines: Ghilani & Wolf, Adjustment
// Computations, 4th ed. (2006), the worked example of chapter 12 (data and results from memory; the four printed sets of
// numbers below only come out together if the data are remembered rightly).
const LINES = [
  ['A', 'X', 5.1, 4],
  ['Y', 'A', 2.34, 3],
  ['C', 'Y', -1.25, 2],
  ['X', 'C', -6.13, 3],
  ['B', 'A', -0.68, 2],
  ['B', 'Y', -3.0, 2],
  ['C', 'B', 1.7, 2],
] as const;
const ELEVATION = { X: 100, Y: 107.5 };
/** Gravity of this small world, so that heights are potentials over ten. */
const G = 10;

const network = (uOfLine: (length: number) => number) => {
  const ids = ['X', 'Y', 'A', 'B', 'C'] as const;
  return adjust(
    readCampaignValue({
      format: 'plumbtick-campaign/1',
      sites: ids.map((id) => ({
        id,
        lat: 45,
        lon: 8,
        g: 9.8,
        determinations: [
          ...(id === 'X' || id === 'Y'
            ? [{ kind: 'potential', W: { value: 62636853.4 - G * ELEVATION[id], tide: 'mean' } }]
            : []),
          ...LINES.filter(([to]) => to === id).map(([, from, dH, length]) => ({
            kind: 'levelled-from',
            site: from,
            g: G,
            dH: { value: dH, u: uOfLine(length) },
          })),
        ],
      })),
    }).campaign,
  );
};

const elevation = (a: ReturnType<typeof network>, id: string) =>
  (62636853.4 - a.sites.find((s) => s.id === id)!.W!) / G;

test('equal weights: A 105.141, B 104.483, C 106.188 m, reference standard deviation 0.05', () => {
  const a = network(() => 0.01);
  expectWithin(elevation(a, 'A'), 105.141, 5e-4);
  expectWithin(elevation(a, 'B'), 104.483, 5e-4);
  expectWithin(elevation(a, 'C'), 106.188, 5e-4);
  expect(a.dof).toBe(4);
  expectWithin(0.01 * Math.sqrt(a.chi2! / a.dof), 0.05, 5e-3);
});

test('weights 12/length: A 105.150, B 104.489, C 106.197 m, reference standard deviation 0.107', () => {
  const a = network((length) => 0.01 * Math.sqrt(length / 12));
  expectWithin(elevation(a, 'A'), 105.15, 5e-4);
  expectWithin(elevation(a, 'B'), 104.489, 5e-4);
  expectWithin(elevation(a, 'C'), 106.197, 5e-4);
  expectWithin(0.01 * Math.sqrt(a.chi2! / a.dof), 0.107, 5e-4);
});
