import { define } from '../define.js';
import { PlumbBreakEven } from './plumb-break-even.js';

define('plumb-break-even', PlumbBreakEven);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-break-even': PlumbBreakEven;
  }
}
