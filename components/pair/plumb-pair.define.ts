import { define } from '../define.js';
import { PlumbPair } from './plumb-pair.js';

define('plumb-pair', PlumbPair);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-pair': PlumbPair;
  }
}
