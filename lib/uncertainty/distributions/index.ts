export {
  chiSquareCdf,
  chiSquareDensity,
  chiSquareQuantile,
  chiSquareUpperQuantile,
  chiSquareUpperTail,
} from './chi-square.js';
export { DomainError } from './domain-error.js';
export { normalCdf, normalDensity, normalQuantile } from './normal.js';
export { studentTCdf, studentTDensity, studentTQuantile } from './student-t.js';
