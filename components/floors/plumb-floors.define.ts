import { define } from '../define.js';
import { PlumbFloors } from './plumb-floors.js';

define('plumb-floors', PlumbFloors);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-floors': PlumbFloors;
  }
}
