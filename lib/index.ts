/** The public door of Plumbtick's library. */
export { type BreakEven, type BreakEvenOptions, breakEven, type LinkBreakEven } from './answers/break-even.js';
export { type FloorsAnswer, type FloorsInput, floors } from './answers/floors.js';
export { type GridAnswer, type GridQuestion, grid } from './answers/grid.js';
export {
  type LinkMonteCarlo,
  type MonteCarloPrediction,
  type MonteCarloRequest,
  predictMonteCarlo,
  predictMonteCarloSteps,
} from './answers/monte-carlo.js';
export { type PairAnswer, type PairInput, pair } from './answers/pair.js';
export { type LinkPath, type PathAnswer, path } from './answers/path.js';
export { type BridgedPlan, type LinkPlan, type Plan, type PlanPart, type PlanPoint, plan } from './answers/plan.js';
export { predict } from './answers/predict.js';
export type * from './answers/prediction.js';
export { analyseSeries, type SeriesAnswer, type SeriesDeviation, type SeriesQuestion } from './answers/series.js';
export { STARTING_VALUES } from './answers/starting-values.js';
export { type LinkTide, TIDE_STEP_S, type TideAnswer, type TideLeft, tide } from './answers/tide.js';
export { tideCautions } from './answers/tide-cautions.js';
export {
  type TransportedClocks,
  type TransportedLink,
  type TransportedResult,
  transportedClocks,
} from './answers/transported-clock.js';
export type * from './campaign/campaign.js';
export { CampaignError, type Fault, type Warning } from './campaign/fault.js';
export { type ImportOptions, importLinks, importSites } from './campaign/import/import-table.js';
export { type ReadCampaign, readCampaign, readCampaignValue } from './campaign/read.js';
export { campaignJsonSchema, type JsonSchema } from './campaign/schema/index.js';
export {
  DEVIATION_KINDS,
  type Deviation,
  type DeviationKind,
  deviationsAt,
  octaveFactors,
  phaseRecordOf,
} from './clocks/deviations/index.js';
export { type MeanUncertainty, meanUncertainty } from './clocks/mean-uncertainty.js';
export { identifyNoise, type NoiseIdentification } from './clocks/noise-identification.js';
export { type Reduction, type ReductionOptions, reduceSeries } from './clocks/reduction.js';
export * from './clocks/series/index.js';
export { version } from './constants/version.js';
export { type ByteSource, bytesSource } from './earth/file-bytes/byte-source.js';
export { FRAME_NAMES, type FrameName, readFrameName } from './earth/frames/frame-name.js';
export { transformPosition } from './earth/frames/frame-transformation.js';
export { frameChangeOfHeight, type HeightInFrame, heightInFrame } from './earth/frames/height-in-frame.js';
export { type GeocentricPosition, geocentricToGeodetic, geodeticToGeocentric } from './earth/geocentric.js';
export * from './earth/geoid-grid/index.js';
export * from './earth/gravity-model/index.js';
export {
  type PositionReading,
  type ResolvedPosition,
  resolvePosition,
  type StatedPosition,
} from './earth/projected-position/resolve-position.js';
export * from './report/index.js';
export {
  type MonteCarloOptions,
  type MonteCarloOutput,
  type MonteCarloProgress,
  type MonteCarloResult,
  monteCarloSteps,
  runMonteCarlo,
} from './uncertainty/monte-carlo/index.js';
