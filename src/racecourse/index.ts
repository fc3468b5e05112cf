export { type SpeedBand, speedBands } from './bands.js';
export {
  linearShares,
  type PairCertainty,
  pairCertainty,
  quantile,
} from './certainty.js';
export {
  type Comparison,
  type Crossover,
  comparison,
  crossoversOf,
  type Entrant,
  POINTS_OF_SAIL,
  type Standing,
} from './comparison.js';
export {
  COURSE_NAMES,
  type Course,
  type CourseName,
  courseOf,
  type Leg,
  legName,
  type Manoeuvres,
  NO_COST,
  namedCourse,
} from './course.js';
export {
  type Altered,
  DESIGN_QUANTITIES,
  type DesignQuantity,
  legTimes,
  SENSITIVITY_LEGS,
  type Sensitivity,
  sensitivityPlan,
} from './sensitivity.js';
export { factorDraws, SPREADS, type Spread } from './spreads.js';
export {
  type CourseTime,
  courseTime,
  type ExpectedTime,
  expectedTime,
  type LegManner,
  type LegPart,
  type LegTime,
  legTime,
  NAUTICAL_MILE,
  type NoTime,
  type SailedPoint,
  sailedPoints,
} from './times.js';
export {
  type Anchor,
  anglesFor,
  COMPARISON_ANGLES,
  doVariantTask,
  sweepTimes,
  timesUnderFactors,
  type VariantTask,
  type VariantTimes,
  variantTimes,
} from './variant-times.js';
export {
  observedWind,
  steadyWind,
  type WeibullWind,
  type WindTable,
  weibullScale,
  weibullWind,
  windTable,
} from './wind.js';
