export type { Decimal } from './decimal.js';
export { MAX_TEXT_LENGTH } from './decimal.js';
export { KINDS, type QuantityKind } from './kinds.js';
export {
  type DistributionName,
  MEASURED_KEYS,
  type MeasuredNumbers,
  PART_KEYS,
  type QuantityProblem,
  type Read,
  readExact,
  readMeasured,
  readStandardUncertainty,
} from './measured.js';
export { closest } from './near-match.js';
export { parseQuantity, type Quantity } from './quantity.js';
export { QuantityError, type QuantityFaultCode } from './quantity-error.js';
export { degToRad, type Radians, radToDeg } from './radians.js';
export { readUnit, type Unit } from './units.js';
