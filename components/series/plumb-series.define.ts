import { define } from '../define.js';
import { PlumbSeries } from './plumb-series.js';

define('plumb-series', PlumbSeries);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-series': PlumbSeries;
  }
}
