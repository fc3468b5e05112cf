/** The public door of the library. */
export * from './boat/index.js';
export {
  type ForceBalance,
  forceBalance,
  type Held,
  type SailingResult,
  type SailingState,
  solveState,
} from './equilibrium/index.js';
export { type Polar, type PolarRequest, predictPolar } from './polar/index.js';
export * from './racecourse/index.js';
