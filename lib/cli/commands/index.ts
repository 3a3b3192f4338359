import type { Command } from '../command.js';
import { check } from './check.js';
import { floors } from './floors.js';
import { newCampaign } from './new.js';
import { pair } from './pair.js';
import { predict } from './predict.js';
import { tide } from './tide.js';

/** Every command, in the order of the help. */
export const commands: readonly Command[] = [floors, pair, newCampaign, check, predict, tide];
