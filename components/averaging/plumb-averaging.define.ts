import { define } from '../define.js';
import { PlumbAveraging } from './plumb-averaging.js';

define('plumb-averaging', PlumbAveraging);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-averaging': PlumbAveraging;
  }
}
