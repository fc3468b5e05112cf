export { bulbFormFactor, bulbVolume, bulbWetted, chordMeans } from './blade.js';
export { keelDownwash, rudderDownwash } from './downwash.js';
export { prepareFoilSystem } from './prepare.js';
export { foilFormFactor, foilFriction, liftSlopeHelmbold, liftSlopeWhickerFehlner } from './sections.js';
export {
  type Bulb,
  FOIL,
  type FoilKind,
  type FoilSpec,
  type FoilSystem,
  type FoilSystemSpec,
  type TwinFoils,
} from './types.js';
