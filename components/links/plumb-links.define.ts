import { define } from '../define.js';
import { PlumbLinks } from './plumb-links.js';

define('plumb-links', PlumbLinks);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-links': PlumbLinks;
  }
}
