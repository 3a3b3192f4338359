export { reportAsCsv, tableAsCsv } from './as-csv.js';
export { reportAsHtml, tableAsHtml } from './as-html.js';
export { reportAsLatex, tableAsLatex } from './as-latex.js';
export { reportAsMarkdown, tableAsMarkdown } from './as-markdown.js';
export { reportAsMediaWiki, tableAsMediaWiki } from './as-mediawiki.js';
export { reportAsText, tableAsText } from './as-text.js';
export { type BudgetExport, budgetCsv, budgetReport } from './budget-export.js';
export { budgetSvg } from './budget-export-svg.js';
export { floorsReport } from './floors-report.js';
export {
  decimalCell,
  estimateCell,
  HERTZ,
  METRES,
  OFFSET,
  POTENTIAL,
  type Scale,
  sizeCell,
  statedCell,
} from './numbers.js';
export { pairReport } from './pair-report.js';
export { type PredictionReportOptions, predictionReport } from './prediction-report.js';
export {
  type Cell,
  type Column,
  estimateColumn,
  headText,
  none,
  notComputed,
  numberColumn,
  type Report,
  type Table,
  textCell,
  textColumn,
} from './table.js';
