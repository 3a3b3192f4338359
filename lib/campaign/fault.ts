/** What is wrong with a file, where, what was found there and what would be right.
 *  `path` uses ids for sites, clocks, datums, transitions, links and positions elsewhere (`sites.cellar.determinations.0.zeta`);
 *  `line` and `column` count from 1 and point at the text at fault; both are null where no text stands behind the value. */
export interface Fault {
  readonly code: string;
  readonly path: string;
  readonly line: number | null;
  readonly column: number | null;
  readonly found: string;
  readonly expected: string;
}

/** Computed, but the reader has to know something: a default, an assumption with its size, a doubtful agreement. */
export interface Warning {
  readonly code: string;
  readonly path: string;
  readonly message: string;
}

/** Thrown where a campaign cannot be answered; carries every fault at once. */
export class CampaignError extends Error {
  override readonly name = 'CampaignError';
  readonly faults: readonly Fault[];
  constructor(faults: readonly Fault[]) {
    super(faults.map((f) => `${f.path || 'file'}: ${f.code}: found ${f.found}; expected ${f.expected}`).join('\n'));
    this.faults = faults;
  }
}

/** A fault without a place in a text: the reader of the file adds line and column from the path. */
export const faultAt = (code: string, path: string, found: string, expected: string): Fault => ({
  code,
  path,
  line: null,
  column: null,
  found,
  expected,
});
