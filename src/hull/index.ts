export { type ResistanceCurve, resistanceCurve } from './curve.js';
export {
  DELFT_1998,
  type DelftHull,
  residuaryDelft1998,
  wettedAreaDelft,
} from './delft-1998.js';
export { DELFT_2008, residuaryDelft2008 } from './delft-2008.js';
export { DELFT_HEEL, heeledWettedPercent, heelFactor, heelResiduary20 } from './delft-heel.js';
export { DELFT_KEEL, keelHeelCoefficient, keelResiduary } from './delft-keel.js';
export { effectiveSpans, sideForceSlopes } from './delft-side-force.js';
export {
  frictionCoefficientIttc57,
  frictionCoefficientRough,
  frictionCoefficientSchoenherr,
} from './friction.js';
export {
  type FloatRequest,
  type Flotation,
  floatAt,
  type Immersed,
  immerse,
  type PreparedLines,
  prepareLines,
  resampled,
  rightingArmOf,
  stationWeights,
  wettedArea,
} from './hydrostatics.js';
export {
  linesFromMesh,
  type MeshAxis,
  type MeshPlacement,
  readObj,
  readStl,
  type Triangles,
} from './mesh.js';
export { planingShare, prepareHull } from './prepare.js';
export { type RightingPoint, rightingCurve } from './righting-curve.js';
export { generateRoundBilge } from './round-bilge.js';
export {
  deadriseLift,
  flatPlateLift,
  leastPlaningDrag,
  type PlaningConditions,
  type PlaningState,
  planingAt,
  planingEquilibrium,
  ROUND_BILGE_FACTOR,
} from './savitsky.js';
export {
  type FairedLines,
  linesFromStations,
  OffsetsError,
  readOffsets,
  type WrittenStation,
} from './stations.js';
export * from './types.js';
