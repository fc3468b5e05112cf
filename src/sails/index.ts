export { priceFor, type SailCoefficients, sailCoefficients } from './coefficients.js';
export { prepareSailSet } from './prepare.js';
export { CARRIAGE, type Carriage, sectionLimits } from './section-limits.js';
export {
  type Gaff,
  type JibDimensions,
  jibShape,
  type MainsailDimensions,
  mainsailShape,
  type OffWindDimensions,
  offWindShape,
  profileAt,
  reefedShape,
  sailArea,
  type Widths,
} from './shapes.js';
export { type CoefficientTable, prepareTableSet } from './table-set.js';
export {
  AERO,
  type SailKind,
  type SailLoading,
  type SailSet,
  type SailSetSpec,
  type SailShape,
  type SectionLimits,
  type WindageBody,
} from './types.js';
