export {
  DEGREE,
  degrees,
  FOOT,
  fromKnots,
  INCH,
  KNOT,
  POUND,
  radians,
  STANDARD_GRAVITY,
  toKnots,
} from './constants.js';
export { editDistance, nearest } from './nearest.js';
export {
  KINDS,
  type KindDefinition,
  parseQuantity,
  QuantityError,
  type QuantityKind,
  quickQuantity,
  type UnitEngine,
  writeQuantity,
} from './quantity.js';
export { loadUnitEngine, type MathjsModule, unitEngineFrom } from './unit-engine.js';
