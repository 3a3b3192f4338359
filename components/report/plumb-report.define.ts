import '../map/plumb-map.define.js';
import '../section/plumb-section.define.js';
import '../tide/plumb-tide.define.js';
import { define } from '../define.js';
import { PlumbReport } from './plumb-report.js';

define('plumb-report', PlumbReport);

declare global {
  interface HTMLElementTagNameMap {
    'plumb-report': PlumbReport;
  }
}
