export { type BoxQp, coordinateDescent, createBoxQp, solveBoxQp } from './box-qp.js';
export { choleskyFactor, choleskySolve } from './cholesky.js';
export { luFactor, luSolve, luSolveTransposed } from './lu.js';
export { boundedMinimum } from './minimum.js';
export { bracketedRoot } from './root.js';
