export { assembleBoat, boatWithFactors, massOf, windageOf, windProfileOf } from './assemble.js';
export { BesideError, type ReadBeside } from './beside.js';
export { type DescriptionRow, describeBoat, effortCentre, lateralCentre, leadOf } from './describe.js';
export { FACTOR_NAMES, type FactorName, type ModelFactors, NO_FACTORS } from './factors.js';
export { BoatFileError, type BoatFileProblem } from './problems.js';
export { readBoatSpec } from './read.js';
export { readBoatFile } from './read-file.js';
export { readWhole as readBoat } from './read-whole.js';
export { boatJsonSchema } from './schema.js';
export { type RightingArms, rightingArms } from './stability.js';
export { type StarterKind, starterBoat } from './starter.js';
export type { Boat, BoatSpec, CrewSpec, Estimate, WeightItem } from './types.js';
export {
  type Change,
  type Difference,
  differencesOf,
  fileDifferences,
  isWholeBoat,
  showPath,
  type Variant,
  valuesOf,
  variantGrid,
  variantsFromFile,
  variantsIn,
} from './variants.js';
