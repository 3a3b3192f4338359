import type { BudgetGroup } from './budget-groups.js';
import { type Effort, idleEfforts } from './questions.js';
import type { SolvedCampaign } from './solve-campaign.js';
import { type LinkUncertainty, lengthUncertaintyIf, type WhatIfChange } from './what-if.js';

/** What a reader has to know of a budget in ten seconds. */
export interface Limits {
  /** the largest group; null where nothing is uncertain */
  readonly largest: BudgetGroup | null;
  /** u of the length equivalent with half its u, m */
  readonly halvedM: number | null;
  /** work that would change u by less than 1 % even if it made all its inputs exact */
  readonly idle: readonly Effort[];
}

/** What limits a link, what halving that would bring, and what would not help. */
export function limitsOf(
  solved: Pick<SolvedCampaign, 'model' | 'potentials'>,
  link: number,
  { budget }: LinkUncertainty,
): Limits {
  const [largest] = budget.groups;
  if (!largest) return { largest: null, halvedM: null, idle: [] };
  return {
    largest,
    halvedM: lengthUncertaintyIf(solved, link, [halved(largest)]),
    idle: idleEfforts(solved, link, budget),
  };
}

/** Half the u of a group: of a source everywhere, of a single part there. */
export const halved = ({ source, parts }: BudgetGroup): WhatIfChange =>
  source === null || parts.length === 1
    ? { kind: 'part', input: parts[0]!.input, source, amount: { factor: 0.5 } }
    : { kind: 'source', source, amount: { factor: 0.5 } };
