import { expect } from 'vitest';
import { QuantityError } from '../../../lib/quantity/index.js';

/** Runs `read`, which has to refuse, and gives what the refusal says. */
export const refusal = (read: () => unknown): QuantityError => {
  let result: unknown;
  try {
    result = read();
  } catch (error) {
    if (error instanceof QuantityError) return error;
    throw error;
  }
  return expect.unreachable(`not refused, read as ${JSON.stringify(result)}`);
};
