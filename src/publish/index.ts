export { balancePage } from './balance-html.js';
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
export { crossoverCsv, crossoverHtml } from './crossover.js';
export { csvText, POLAR_COLUMNS, polarCsv } from './csv.js';
export { delimitedTable } from './delimited.js';
export { heldText } from './held-text.js';
export { polarPage } from './html.js';
export { hullPlanPage } from './hull-plan.js';
export { balanceJson, boatJson, polarJson, sailReportJson } from './json.js';
export { type LineChart, lineChartSvg } from './line-chart.js';
export { makeFolder } from './make-folder.js';
export { decimalsFor, fixed, rounded, significant } from './numbers.js';
export { fileStem, oneLine, terminalText, wrapped } from './plain-text.js';
export { TableFileError } from './read-cells.js';
export { type ReadingNote, readDelimitedTable, type TableHints, type TableReading } from './read-table.js';
export { type BoatFacts, boatFacts, figures, type PolarReport, polarReport } from './report.js';
export { RESISTANCE_PARTS, type ResistanceReport, resistanceCsv, resistanceReport } from './resistance.js';
export { type SailReport, sailReport } from './sail-report.js';
export { sailChartsHtml, sailCsv, sailPage, sailText } from './sail-view.js';
export {
  type SensitivityReport,
  sensitivityJson,
  sensitivityPage,
  sensitivityText,
} from './sensitivity.js';
export { looksLikeJson, readSignalKPolar, SIGNAL_K_VERSION, signalKPolar } from './signal-k.js';
export { sweepText } from './sweep.js';
export * from './table-format.js';
export {
  deratingText,
  differencesCsv,
  differencesText,
  fillingRules,
  readingText,
  tableDescription,
  tablePage,
} from './table-text.js';
export { type PercentTable, percentTable, type TargetCard, targetCard } from './targets.js';
export { CARD_PAPERS, type CardPaper, targetsCardPage } from './targets-card.js';
export { percentCsv, type TargetStyle, targetsCsv, targetsJson, targetsText } from './targets-text.js';
export {
  balanceText,
  boatText,
  cautionText,
  TEXT_WIDTH,
  targetTable,
  textTable,
  warningText,
} from './text-table.js';
export { OutputError, type OutputFile, writeFiles } from './write-files.js';
