export { type Attempt, createOptimiser, finiteDifferenceJacobian, type Optimiser } from './optimise.js';
export { createSolver, type NoSolution, type Outcome, type Solution, type Solver } from './solve.js';
export { createSurvey, type Survey, type SurveyPoint } from './survey.js';
export {
  type Bounds,
  type ForceBalance,
  type ForceModel,
  type ForceRow,
  type NoState,
  type Regime,
  RES,
  type SailingResult,
  type SailingState,
  type Unbalance,
  X,
} from './types.js';
