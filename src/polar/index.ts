export { type BestVmg, bestVmg, type Seed } from './best-vmg.js';
export {
  comparablePoints,
  compareTable,
  type DifferenceSummary,
  summarise,
  type TableDifference,
} from './compare-table.js';
export {
  type CompleteTable,
  type Completion,
  completeTable,
  type FilledCell,
  PLAIN_COMPLETION,
} from './complete-table.js';
export { type CrossoverCell, crossover } from './crossover.js';
export { defaultWindAngles, defaultWindSpeeds, predictPolar } from './predict.js';
export {
  commonAngles,
  type Derating,
  FULL_SPEED,
  type SpeedPoint,
  type SpeedRow,
  type SpeedTable,
  shareAt,
} from './speed-table.js';
export type { Polar, PolarRequest } from './types.js';
export { polarWarnings } from './warnings.js';
