import type { DetectionTest } from '../uncertainty/detection.js';
import { type Call, type OptionSpec, UsageError } from './command.js';
import { exactOption } from './exact-option.js';

/** Options --size and --power of a command that says what a test would show. */
export const detectionOptions = (standard: DetectionTest): Readonly<Record<'size' | 'power', OptionSpec>> => ({
  size: { value: 'P', help: `chance of a false alarm of the test; ${standard.size} if not given` },
  power: {
    value: 'P',
    help: `chance that a mistake or discrepancy of the size given shows; ${standard.power} if not given`,
  },
});

/** @throws {UsageError} a probability outside 0…1, or a power that the false alarms alone would reach */
export function detectionTestOf(command: string, call: Call, standard: DetectionTest): DetectionTest {
  const probability = (name: string) => exactOption(command, call, name, { kind: 'fraction', above: 0, below: 1 });
  const test = { size: probability('size') ?? standard.size, power: probability('power') ?? standard.power };
  if (test.power <= test.size)
    throw new UsageError(`${command}: --power ${test.power} has to be more than --size ${test.size}`);
  return test;
}
