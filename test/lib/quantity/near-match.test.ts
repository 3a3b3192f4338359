import { describe, expect, it } from 'vitest';
import { closest } from '../../../lib/quantity/index.js';

const KEYS = ['zeta', 'H', 'h', 'W0', 'gradient', 'determinations', 'source', 'sources', 'datum', 'uptime'];

describe('closest', () => {
  it.each([
    ['gradeint', 'gradient'], // two neighbours swapped: one edit
    ['detrminatons', 'determinations'], // two left out
    ['detreminaitons', 'determinations'], // two swaps, which would be four substitutions
    ['Zeta', 'zeta'],
    ['GRADIENT', 'gradient'],
    ['w0', 'W0'],
    ['datums', 'datum'],
    ['sorce', 'source'],
    ['surces', 'sources'],
    ['uptimee', 'uptime'],
    ['h', 'h'],
    ['H', 'H'],
  ])('%s is near %s', (word, key) => {
    expect(closest(word, KEYS)).toBe(key);
  });

  it.each(['', 'elephant', 'x', 'gr', 'g', 'detrminatns', 'abcd', 'z'.repeat(1e6), 'datum'.repeat(50)])(
    '%s is near nothing',
    (word) => {
      expect(closest(word, KEYS)).toBeNull();
    },
  );

  it('a single letter is near its other case only', () => {
    expect(closest('H', ['h', 'g'])).toBe('h');
    expect(closest('H', ['g'])).toBeNull();
  });

  it('an emptied list', () => {
    expect(closest('zeta', [])).toBeNull();
  });
});
