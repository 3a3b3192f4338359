import type { Fault } from '../campaign/fault.js';
import { printable } from '../report/table.js';
import { UsageError } from './command.js';

/** Options whose texts can't be read: all at once, with a mark under the character at fault.
 * @param names option names that differ from the path of a fault
 * @throws {UsageError} always */
export function refuseOptions(
  command: string,
  faults: readonly Fault[],
  names: Readonly<Record<string, string>> = {},
): never {
  const lines = faults.map(({ code, path, found, expected, column }) => {
    const option = `  --${names[path] ?? path} `;
    const shown = printable(found);
    const mark = column === null || shown !== found ? [] : [`${' '.repeat(option.length + column - 1)}^`];
    return [`${option}${shown}`, ...mark, `    ${code}; expected ${printable(expected)}`].join('\n');
  });
  throw new UsageError(
    `${command}: ${faults.length === 1 ? 'one option is' : `${faults.length} options are`} missing or can't be used\n${lines.join('\n')}`,
  );
}
