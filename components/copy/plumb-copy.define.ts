import { define } from '../define.js';
import { PlumbCopy } from './plumb-copy.js';

define('plumb-copy', PlumbCopy);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-copy': PlumbCopy;
  }
}
