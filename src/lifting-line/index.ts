export {
  createLoadingSolver,
  inducedInto,
  type LineSpec,
  type LoadingProblem,
  linearisedLoading,
  prepareLoading,
  solveLoading,
} from './loading.js';
export {
  unknownNodes,
  unknownsOf,
  type WakeLine,
  type WakeOptions,
  wakeEnergyMatrix,
  wakeLine,
} from './wake.js';
export { type LiftSlope, type Planform, weissinger } from './weissinger.js';
