import { define } from '../define.js';
import { PlumbTide } from './plumb-tide.js';

define('plumb-tide', PlumbTide);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-tide': PlumbTide;
  }
}
