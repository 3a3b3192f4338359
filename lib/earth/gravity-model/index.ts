export {
  type CoefficientErrors,
  coefficientCount,
  coefficientIndex,
  type GravityModel,
  MAX_SYNTHESIS_DEGREE,
} from './gravity-model.js';
export { type GravityPotential, gravityPotential, modelTideSystem } from './gravity-potential.js';
export { heightAnomaly } from './height-anomaly.js';
export { type IcgemOptions, IcgemReader, parseIcgem, readIcgem } from './icgem.js';
export { commissionCovariance, kaulaOmission } from './model-uncertainty.js';
export { GravitySynthesis, type ParallelSynthesis } from './synthesis.js';
