import { expect } from 'vitest';

/** The found value lies within `tolerance` of the expected one; no default tolerance, on purpose. */
export function expectWithin(found: number, expected: number, tolerance: number, what = ''): void {
  const off = Math.abs(found - expected);
  expect(off <= tolerance, `${what} found ${found}, expected ${expected} ± ${tolerance}, off by ${off}`).toBe(true);
}
