import { define } from '../define.js';
import { PlumbBudget } from './plumb-budget.js';

define('plumb-budget', PlumbBudget);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-budget': PlumbBudget;
  }
}
