export { type BoxQp, coordinateDescent, createBoxQp, solveBoxQp, solveFreeBlock } from './box-qp.js';
export { choleskyFactor, choleskySolve } from './cholesky.js';
export { luFactor, luSolve, luSolveTransposed } from './lu.js';
export { boundedMinimum } from './minimum.js';
export { hermite, type Pchip, pchip, pchipSlopes } from './pchip.js';
export { bracketedRoot } from './root.js';
export { createSmallQp, type SmallQp } from './small-qp.js';
export { normalQuantile, SOBOL_DIMENSIONS, sobolPoints } from './sobol.js';
export { type SymmetricSpline, symmetricSpline } from './spline.js';
