import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { degToRad } from '../../../lib/quantity/radians.js';
import { InputCovariance } from '../../../lib/uncertainty/covariance.js';
import { coverageFactor, expandedUncertainty, jointCoverageFactor } from '../../../lib/uncertainty/coverage.js';
import { effectiveDegreesOfFreedom, varianceBlocks } from '../../../lib/uncertainty/effective-degrees-of-freedom.js';
import { gradientOf } from '../../../lib/uncertainty/gradient.js';
import type { Input } from '../../../lib/uncertainty/inputs.js';
import { expectRelative, expectWithin } from './expect-relative.js';

const place = (key: string, longitude: number | null = null) => ({
  key,
  position: longitude === null ? null : { latitudeRad: degToRad(50), longitudeRad: degToRad(longitude) },
});

const inputs: Input[] = [
  // one height at each of two sites: half of it common to both, half its own; the first rests on 5 degrees of freedom
  {
    path: 'a.h',
    value: 0,
    u: 5,
    parts: [
      { u: 3, source: 'gnss' },
      { u: 4, source: null },
    ],
    place: place('a', 10),
    distribution: 'normal',
    dof: 5,
  },
  {
    path: 'b.h',
    value: 0,
    u: 5,
    parts: [
      { u: 3, source: 'gnss' },
      { u: 4, source: null },
    ],
    place: place('b', 11),
    distribution: 'normal',
    dof: null,
  },
  {
    path: 'c.z',
    value: 0,
    u: 2,
    parts: [{ u: 2, source: 'geoid' }],
    place: place('c', 10.1),
    distribution: 'normal',
    dof: 30,
  },
  {
    path: 'd.z',
    value: 0,
    u: 1,
    parts: [{ u: 1, source: 'geoid' }],
    place: place('d', 10.5),
    distribution: 'normal',
    dof: 12,
  },
  { path: 'e.x', value: 0, u: 0, parts: [], place: place('e'), distribution: 'normal', dof: 2 },
];
const sources = [
  { id: 'gnss', correlation: 0.4, correlationLengthM: null },
  { id: 'geoid', correlation: null, correlationLengthM: 40_000 },
];
const covariance = new InputCovariance(inputs, sources);
const gradient = (...c: number[]) => gradientOf(c.map((v, i) => [i, v] as const));

describe('blocks of a variance', () => {
  it('add up to it, one per source and one per part without', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: 5, maxLength: 5 }), (c) => {
        const blocks = varianceBlocks(covariance, gradient(...c));
        const total = covariance.variance(gradient(...c));
        expectWithin(
          blocks.reduce((s, b) => s + b.variance, 0),
          total,
          1e-12 * (1 + total),
        );
      }),
      { numRuns: 100, seed: 3 },
    );
  });

  it('hold the cancellation inside a source, and the smallest degrees of freedom of its inputs', () => {
    const blocks = varianceBlocks(covariance, gradient(1, -1, 1, -1));
    const of = (source: string) => blocks.find((b) => b.source === source)!;
    expectRelative(of('gnss').variance, 9 + 9 - 2 * 0.4 * 9, 1e-15);
    expect(of('gnss')).toMatchObject({ dof: 5, inputs: [0, 1] });
    expect(of('geoid').dof).toBe(12);
    expect(of('geoid').variance).toBeLessThan(5);
    expect(of('geoid').variance).toBeGreaterThan(1);
    expect(blocks.filter((b) => b.source === null).map((b) => [b.inputs[0], b.variance, b.dof])).toEqual([
      [0, 16, 5],
      [1, 16, Infinity],
    ]);
  });

  it('refuse a source that the covariance does not know', () => {
    const blind = new InputCovariance(inputs, sources);
    const foreign = Object.create(blind, { sourceField: { value: () => null } }) as InputCovariance;
    Object.defineProperty(foreign, 'inputs', { value: inputs });
    expect(() => varianceBlocks(foreign, gradient(1))).toThrow('source = gnss');
  });
});

describe('effective degrees of freedom', () => {
  const block = (variance: number, dof: number) => ({ variance, dof });

  it('of one block are its own; of two equal ones with equal ν, the sum', () => {
    expect(effectiveDegreesOfFreedom([block(3e-38, 7)])).toBe(7);
    expectRelative(effectiveDegreesOfFreedom([block(2e-40, 7), block(2e-40, 7)]), 14, 1e-15);
  });

  it('lie between the smallest ν and the sum of all (GUM G.4.1)', () => {
    fc.assert(
      fc.property(
        fc.array(
          fc.record({
            variance: fc.double({ min: 1e-3, max: 10, noNaN: true }),
            dof: fc.double({ min: 1, max: 100, noNaN: true }),
          }),
          { minLength: 1, maxLength: 6 },
        ),
        (blocks) => {
          const dof = effectiveDegreesOfFreedom(blocks);
          expect(dof).toBeGreaterThanOrEqual(Math.min(...blocks.map((b) => b.dof)) * (1 - 1e-12));
          expect(dof).toBeLessThanOrEqual(blocks.reduce((s, b) => s + b.dof, 0) * (1 + 1e-12));
        },
      ),
      { numRuns: 200, seed: 8 },
    );
  });

  it('are infinite without finite ones, and where those that are finite contribute nothing', () => {
    expect(effectiveDegreesOfFreedom([block(1, Infinity)])).toBe(Infinity);
    expect(effectiveDegreesOfFreedom([block(1, Infinity), block(0, 3)])).toBe(Infinity);
    expect(effectiveDegreesOfFreedom([])).toBe(Infinity);
  });

  it('refuse a negative variance and ν = 0', () => {
    expect(() => effectiveDegreesOfFreedom([block(-1, 3)])).toThrow('variance = -1');
    expect(() => effectiveDegreesOfFreedom([block(1, 0)])).toThrow('dof = 0');
  });
});

describe('coverage', () => {
  it('U = k·u with everything beside it', () => {
    const e = expandedUncertainty(2e-18, 0.95, 16);
    expectWithin(e.coverageFactor, 2.12, 0.005);
    expect(e.expandedUncertainty).toBe(e.coverageFactor * 2e-18);
    expectRelative(coverageFactor(0.95, Infinity), 1.959963984540054, 1e-15);
    expect(() => coverageFactor(1, 5)).toThrow('coverage probability = 1');
  });

  it('k_p of an ellipsoid: 2.45 for two outputs, 2.80 for three at 95 % (JCGM 102:2011, 6.5.2, from memory)', () => {
    expectWithin(jointCoverageFactor(0.95, 2), 2.45, 0.005);
    expectWithin(jointCoverageFactor(0.95, 3), 2.8, 0.005);
    expectRelative(jointCoverageFactor(0.95, 1), 1.959963984540054, 1e-13);
  });
});
