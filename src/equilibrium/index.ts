export { forceBalance } from './balance.js';
export { type BoatForces, type BoatModel, createBoatModel } from './boat-model.js';
export {
  createSetSolvers,
  describeOutcome,
  describeState,
  type Held,
  otherSide,
  type SetSolver,
  solveAlone,
  solveState,
  stateVector,
} from './boat-solver.js';
export { type Attempt, createOptimiser, finiteDifferenceJacobian, type Optimiser } from './optimise.js';
export {
  createSolver,
  type NoSolution,
  type Outcome,
  type Solution,
  type Solver,
  type Start,
} from './solve.js';
export { createSurvey, type Survey, type SurveyPoint } from './survey.js';
export {
  type Bounds,
  type ForceBalance,
  type ForceModel,
  type ForceRow,
  type LinesOfAction,
  type NoState,
  RES,
  type Regime,
  type SailingResult,
  type SailingState,
  type Unbalance,
  X,
} from './types.js';
