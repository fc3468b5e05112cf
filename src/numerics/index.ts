export { luFactor, luSolve, luSolveTransposed } from './lu.js';
export { boundedMinimum } from './minimum.js';
export { bracketedRoot } from './root.js';
