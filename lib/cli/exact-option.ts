import { type QuantityKind, readExact } from '../quantity/index.js';
import { printable } from '../report/table.js';
import { type Call, UsageError } from './command.js';

export interface ExactOption {
  readonly kind: QuantityKind;
  /** the value has to be more than this */
  readonly above?: number;
  /** … or not less than this */
  readonly min?: number;
  readonly below?: number;
}

/** A number without uncertainty from an option, in SI; null if it was not given.
 * @throws {UsageError} it can't be read or is out of range */
export function exactOption(command: string, call: Call, name: string, spec: ExactOption): number | null {
  const text = call.option(name);
  if (text === null) return null;
  const refuse = (expected: string): never => {
    throw new UsageError(`${command}: --${name} ${printable(JSON.stringify(text))}: expected ${printable(expected)}`);
  };
  const read = readExact(text, spec.kind);
  if (!read.ok) return refuse(read.problems[0]!.expected);
  const { above, min, below } = spec;
  if (above !== undefined && !(read.value > above)) return refuse(`more than ${above}`);
  if (min !== undefined && !(read.value >= min)) return refuse(`${min} or more`);
  if (below !== undefined && !(read.value < below)) return refuse(`less than ${below}`);
  return read.value;
}
