export { type ApparentWind, apparentWind, heeledWind } from './apparent-wind.js';
export { air, water } from './fluids.js';
export { fetchLimitedSea, type SeaState } from './sea-state.js';
export type { Fluid, SailingFlow, WindProfile } from './types.js';
export {
  charnockRoughness,
  logWindProfile,
  OPEN_WATER_ROUGHNESS,
  powerWindProfile,
  shearExponent,
} from './wind-profile.js';
