import { LINK_STARTING_VALUES } from '../clocks/link-types.js';
import type { StartingValue } from '../constants/starting-value.js';
import { METHOD_STARTING_VALUES } from '../model/levelling-classes.js';

/** Every starting value, in the order of the list. */
export const STARTING_VALUES: readonly StartingValue[] = [...LINK_STARTING_VALUES, ...METHOD_STARTING_VALUES];

/** What there are starting values of. */
export const STARTING_SUBJECTS: readonly string[] = [...new Set(STARTING_VALUES.map(({ of }) => of))];

export const startingValue = (id: string): StartingValue | null => STARTING_VALUES.find((v) => v.id === id) ?? null;
