import type { Command } from '../command.js';
import { adjust } from './adjust.js';
import { breakEven } from './break-even.js';
import { budget } from './budget.js';
import { check } from './check.js';
import { cite } from './cite.js';
import { compare } from './compare.js';
import { design } from './design.js';
import { evaluate } from './evaluate.js';
import { floors } from './floors.js';
import { grid } from './grid.js';
import { importTable } from './import.js';
import { newCampaign } from './new.js';
import { pair } from './pair.js';
import { path } from './path.js';
import { plan } from './plan.js';
import { predict } from './predict.js';
import { series } from './series.js';
import { startingValues } from './starting-values.js';
import { tide } from './tide.js';
import { transported } from './transported.js';

/** Every command, in the order of the help. */
export const commands: readonly Command[] = [
  floors,
  pair,
  newCampaign,
  importTable,
  check,
  predict,
  budget,
  plan,
  breakEven,
  transported,
  startingValues,
  evaluate,
  compare,
  cite,
  adjust,
  design,
  series,
  tide,
  path,
  grid,
];
