export { type Angle, type AngleAxis, parseAngle } from './angle.js';
export {
  type ConciseNumber,
  type ConciseOptions,
  concise,
  conciseText,
  digitGroups,
  formatConcise,
  formatPlusMinus,
  formatScaled,
  type TextOptions,
} from './concise.js';
export type { Decimal } from './decimal.js';
export { MAX_TEXT_LENGTH } from './decimal.js';
export {
  conciseInUnit,
  formatDays,
  formatDuration,
  formatEstimate,
  formatLength,
  type SiEstimate,
} from './format-unit.js';
export { formatInstant, mjdToMs, msToMjd, parseInstant, parseMjd } from './instant.js';
export { KINDS, type QuantityKind } from './kinds.js';
export { type DistributionName, MEASURED_KEYS, type MeasuredNumbers, PART_KEYS, readMeasured } from './measured.js';
export { closest } from './near-match.js';
export { type QuantityProblem, type Read, readExact, readStandardUncertainty } from './number-input.js';
export { parseQuantity, type Quantity } from './quantity.js';
export { QuantityError, type QuantityFaultCode } from './quantity-error.js';
export { degToRad, type Radians, radToDeg } from './radians.js';
export { offsetSizeText, sizeText } from './size.js';
export { statedDigits } from './stated-digits.js';
export { readUnit, type Unit } from './units.js';
