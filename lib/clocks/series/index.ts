export { type Certainty, COLUMN_WORDS, type ColumnGuess, type ColumnWord, readColumnWords } from './columns.js';
export { type FrequencySeries, instantOf, lengthOfSampleS, type TimeGap } from './frequency-series.js';
export { type Nominal, nominal, ratioNominal } from './nominal.js';
export { FrequencySeriesParser, readFrequencySeries, type SeriesOptions } from './series-parser.js';
