export {
  type GeoidGrid,
  type GeoidSurface,
  type GridFormat,
  latitudeOfRowDeg,
  longitudeOfColumnDeg,
  type Registration,
} from './geoid-grid.js';
export {
  type GridExcerpt,
  type GridNode,
  gridExcerpt,
  type InterpolatedValue,
  type InterpolationMethod,
  interpolate,
  nodesToKeep,
} from './interpolation.js';
export { openGeoidGrid } from './open-geoid-grid.js';
export { type GridSurvey, surveyGrid } from './survey.js';
