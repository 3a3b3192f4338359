import { define } from '../define.js';
import { PlumbMap } from './plumb-map.js';

define('plumb-map', PlumbMap);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-map': PlumbMap;
  }
}
