import { describe, expect, it } from 'vitest';
import { expectRelative } from '../expect-relative.js';
import { RESULTS, runEverywhere, SUM_OF_DRAWS, sumOfDraws } from './same-everywhere.js';

describe('the same in every engine (Node here; browsers in test/components/monte-carlo.test.ts)', () => {
  it('draws bit for bit', () => {
    expect(sumOfDraws()).toBe(SUM_OF_DRAWS);
  });

  it('results to 12 digits', () => {
    const found = runEverywhere();
    expect(found.length).toBe(RESULTS.length);
    found.forEach((value, i) => {
      expectRelative(value, RESULTS[i]!, 1e-12);
    });
  });
});
