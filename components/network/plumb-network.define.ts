import { define } from '../define.js';
import { PlumbNetwork } from './plumb-network.js';

define('plumb-network', PlumbNetwork);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-network': PlumbNetwork;
  }
}
