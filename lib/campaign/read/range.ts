import type { Range } from '../schema/descriptor.js';

const shown = (value: number): string =>
  value !== 0 && (Math.abs(value) >= 1e5 || Math.abs(value) < 1e-3)
    ? value.toExponential().replace('e+', 'e')
    : String(value);

/** A range in words, "9 to 10.5 (…)"; null where nothing limits the value. */
export function rangeInWords({ min, max, above, because }: Range): string | null {
  const reason = because === undefined ? '' : ` (${because})`;
  if (min !== undefined && max !== undefined) return `${shown(min)} to ${shown(max)}${reason}`;
  if (min !== undefined) return `${shown(min)} or more${reason}`;
  if (above !== undefined) return `more than ${shown(above)}${reason}`;
  if (max !== undefined) return `at most ${shown(max)}${reason}`;
  return null;
}

/** Whether a value in SI lies in the range. */
export const isInRange = (value: number, { min, max, above }: Range): boolean =>
  !(min !== undefined && value < min) &&
  !(max !== undefined && value > max) &&
  !(above !== undefined && value <= above);
