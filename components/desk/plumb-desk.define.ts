import { define } from '../define.js';
import { PlumbDesk } from './plumb-desk.js';

define('plumb-desk', PlumbDesk);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-desk': PlumbDesk;
  }
}
