export { keelDownwash, rudderDownwash } from './downwash.js';
export { prepareFoilSystem } from './prepare.js';
export { foilFormFactor, foilFriction, liftSlopeHelmbold, liftSlopeWhickerFehlner } from './sections.js';
export { FOIL, type FoilKind, type FoilSpec, type FoilSystem, type FoilSystemSpec } from './types.js';
