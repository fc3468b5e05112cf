export {
  CAUTIONS,
  ERROR_BANDS,
  ERROR_BANDS_SOURCE,
  type ErrorBand,
  METHODS,
  type Method,
} from './cautions.js';
export {
  type ComparisonReport,
  comparisonJson,
  comparisonPage,
  comparisonText,
  htmlTable,
} from './comparison.js';
export { csvText, POLAR_COLUMNS, polarCsv } from './csv.js';
export { polarPage } from './html.js';
export { hullPlanPage } from './hull-plan.js';
export { balanceJson, boatJson, polarJson } from './json.js';
export { type LineChart, lineChartSvg } from './line-chart.js';
export { decimalsFor, fixed, rounded, significant } from './numbers.js';
export { fileStem, oneLine, terminalText, wrapped } from './plain-text.js';
export { type BoatFacts, boatFacts, figures, type PolarReport, polarReport } from './report.js';
export { RESISTANCE_PARTS, type ResistanceReport, resistanceCsv, resistanceReport } from './resistance.js';
export {
  type SensitivityReport,
  sensitivityJson,
  sensitivityPage,
  sensitivityText,
} from './sensitivity.js';
export { sweepText } from './sweep.js';
export { balanceText, boatText, cautionText, TEXT_WIDTH, targetTable, warningText } from './text-table.js';
export { OutputError, type OutputFile, writeFiles } from './write-files.js';
