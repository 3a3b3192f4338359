export { CONFIDENCE, deviationInterval } from './confidence-interval.js';
export {
  DEVIATION_KINDS,
  type Deviation,
  type DeviationKind,
  deviationsAt,
  octaveFactors,
} from './deviation-table.js';
export { allanVariance, hadamardVariance, type VarianceEstimate } from './difference-variance.js';
export {
  equivalentDegreesOfFreedom,
  type NoiseExponent,
  pooledDegreesOfFreedom,
  totalVarianceDegreesOfFreedom,
} from './equivalent-degrees-of-freedom.js';
export { modifiedAllanVariance } from './modified-allan-variance.js';
export { compensatedSum, meanOf, type PhaseRecord, phaseRecordOf, type Run } from './phase-record.js';
export { totalVariance } from './total-variance.js';
