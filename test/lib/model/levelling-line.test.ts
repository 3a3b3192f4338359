import { describe, expect, it } from 'vitest';
import { predict } from '../../../lib/answers/predict.js';
import { levellingUncertaintyM } from '../../../lib/model/levelling-line.js';
import { expectWithin } from '../../expect-within.js';
import { campaignOf, clocksAndLinks, levelled, site } from './campaign-of.js';

const known = [{ kind: 'potential', W: { value: 62636000, tide: 'mean' } }];
const G = 9.809;

const line = (from: string, length: string, more: { [key: string]: unknown } = {}) =>
  levelled(from, '12.3456 m', { length, b: '1.5 mm/√km', k: '0.2 mm/km', g: G, ...more });

describe('levelling by b and k', () => {
  it('u = b·√d ⊕ k·d', () => {
    // 1.5 mm/√km over 25 km: 7.5 mm; 0.2 mm/km: 5 mm
    expectWithin(levellingUncertaintyM(25_000, 1.5e-3 / Math.sqrt(1000), 2e-7), Math.hypot(0.0075, 0.005), 1e-15);
    const c = campaignOf({ sites: [site('a', known), site('b', [line('a', '25 km')])] });
    expectWithin(predict(c).sites[1]!.W!.u, G * Math.hypot(0.0075, 0.005), 1e-9);
  });

  it.each([
    ['at k', (more: object) => ({ k: { value: '0.2 mm/km', source: 'rods' }, ...more })],
    ['at dH, for a k that names none', (more: object) => ({ dH: { value: '12.3456 m', source: 'rods' }, ...more })],
  ])('a source %s makes the systematic errors of two lines one: they add up, the random ones as squares', (_, at) => {
    const sites = [site('a', known), site('b', [line('a', '25 km', at({}))]), site('c', [line('b', '16 km', at({}))])];
    const c = campaignOf({ sources: [{ id: 'rods' }], sites, ...clocksAndLinks('a', 'c') });
    // k·(25 + 16) = 8.2 mm, b·√41 = 9.605 mm
    expectWithin(predict(c).links[0]!.dW!.u, G * Math.hypot(0.0082, 0.0015 * Math.sqrt(41)), 1e-9);
  });

  it('without a source the lines are independent', () => {
    const sites = [site('a', known), site('b', [line('a', '25 km')]), site('c', [line('b', '16 km')])];
    const c = campaignOf({ sites, ...clocksAndLinks('a', 'c') });
    expectWithin(predict(c).links[0]!.dW!.u, G * Math.hypot(0.005, 0.0032, 0.0015 * Math.sqrt(41)), 1e-9);
  });

  it('a line of k alone, and one of neither', () => {
    const alone = (more: object) =>
      predict(campaignOf({ sites: [site('a', known), site('b', [line('a', '25 km', { b: undefined, ...more })])] }))
        .sites[1]!.W!.u;
    expectWithin(alone({}), G * 0.005, 1e-9);
    expect(alone({ k: undefined })).toBe(0);
  });
});
