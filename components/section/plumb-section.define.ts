import { define } from '../define.js';
import { PlumbSection } from './plumb-section.js';

define('plumb-section', PlumbSection);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-section': PlumbSection;
  }
}
