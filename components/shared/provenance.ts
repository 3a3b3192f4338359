import { version } from '../../lib/constants/version.js';

/** Today in the reader's time zone, ISO 8601. Read here and never in lib/, whose answers depend on their inputs alone. */
export function today(): string {
  const now = new Date();
  const two = (n: number) => String(n).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

/** Who computed and when: under every answer and in every copied line. */
export const computedBy = (): string => `computed by Plumbtick ${version} on ${today()}`;
