import { expect } from 'vitest';

/** Fails unless |actual − expected| ≤ tolerance·|expected| (tolerance itself where 0 is expected). */
export const expectRelative = (actual: number, expected: number, tolerance: number, what = ''): void => {
  const error = expected === 0 ? Math.abs(actual) : Math.abs((actual - expected) / expected);
  expect(error, `${what} found ${actual}, expected ${expected}`).toBeLessThanOrEqual(tolerance);
};

/** Fails unless |actual − expected| ≤ tolerance. */
export const expectWithin = (actual: number, expected: number, tolerance: number, what = ''): void => {
  expect(Math.abs(actual - expected), `${what} found ${actual}, expected ${expected}`).toBeLessThanOrEqual(tolerance);
};
