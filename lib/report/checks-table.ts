import type { CheckResult } from '../answers/prediction.js';
import { decimalCell, estimateText, OFFSET, POTENTIAL } from './numbers.js';
import { none, numberColumn, type Table, textCell, textColumn } from './table.js';

/** Determinations (m²/s²) and measurements (1e-18) that are compared, not fitted. */
export function checksTable(checks: readonly CheckResult[]): Table {
  const scale = (path: string) => (path.startsWith('measurements.') ? OFFSET : POTENTIAL);
  return {
    id: 'checks',
    title: 'Checks: compared with the result, not used for it',
    columns: [textColumn('what'), textColumn('residual'), textColumn('unit'), numberColumn('z', null)],
    rows: checks.map(({ path, residual, z }) => [
      textCell(path),
      textCell(estimateText(residual, scale(path), 'signed')),
      textCell(scale(path).unit),
      z === null ? none : decimalCell(z, 2, 'signed'),
    ]),
    notes: ['residual = what is compared minus the result; z = residual/u.'],
  };
}
