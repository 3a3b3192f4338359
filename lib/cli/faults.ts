import type { Fault } from '../campaign/fault.js';
import { wrap } from '../report/as-text.js';
import { printable } from '../report/table.js';

/** More than these help nobody; the rest is counted. `--json` gives all of them. */
const MAX_SHOWN = 50;

const place = (name: string, { line, column }: Fault) => {
  const file = name === '-' ? 'standard input' : name;
  return line === null ? file : `${file}:${line}${column === null ? '' : `:${column}`}`;
};

/** One fault for people: where, what was found there, what would be right. */
const faultAsText = (name: string, fault: Fault): string =>
  [
    `${printable(place(name, fault))}: ${printable(fault.path)}${fault.path === '' ? '' : ' '}[${fault.code}]`,
    wrap(`  found     ${printable(fault.found)}`, 96, '            '),
    wrap(`  expected  ${printable(fault.expected)}`, 96, '            '),
  ].join('\n');

export function faultsAsText(name: string, faults: readonly Fault[]): string {
  const count = faults.length === 1 ? 'one fault' : `${faults.length} faults`;
  const shown = faults.slice(0, MAX_SHOWN).map((fault) => faultAsText(name, fault));
  const rest = faults.length - shown.length;
  return [
    `Refused: ${count} in ${name === '-' ? 'standard input' : printable(name)}`,
    ...shown,
    ...(rest > 0 ? [`and ${rest} more; --json lists all of them`] : []),
    '',
  ].join('\n');
}
