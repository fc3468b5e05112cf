export { type BestVmg, bestVmg, type Seed } from './best-vmg.js';
export { type CrossoverCell, crossover } from './crossover.js';
export { defaultWindAngles, defaultWindSpeeds, predictPolar } from './predict.js';
export type { Polar, PolarRequest } from './types.js';
export { polarWarnings } from './warnings.js';
