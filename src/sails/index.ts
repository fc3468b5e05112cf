export { prepareSailSet } from './prepare.js';
export { sectionLimits } from './section-limits.js';
export {
  type JibDimensions,
  jibShape,
  type MainsailDimensions,
  mainsailShape,
  profileAt,
  sailArea,
} from './shapes.js';
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
