import type { Fault } from './fault.js';

/** A fault inside a file, at the place in the campaign that names the file. */
export function faultInFile(fault: Fault, path: string, file: string): Fault {
  const where = [fault.path, fault.line === null ? '' : `line ${fault.line}`].filter((s) => s !== '').join(', ');
  return {
    ...fault,
    path,
    line: null,
    column: null,
    found: `in ${file}${where === '' ? '' : ` (${where})`}: ${fault.found}`,
  };
}
