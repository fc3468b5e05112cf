/** A fluid: density [kg/m3] and kinematic viscosity [m2/s]. */
export interface Fluid {
  readonly density: number;
  readonly kinematicViscosity: number;
}

/** How the true wind grows with height above the water. */
export interface WindProfile {
  readonly kind: 'log' | 'power';
  /** Height [m] at which the true wind speed is quoted. */
  readonly referenceHeight: number;
  /** U(z) / U(referenceHeight); z [m] above the water; the lowest heights are taken at a floor (see wind-profile.ts). */
  factor(z: number): number;
}

/**
 * The flow a sailing state meets. Angles in rad, speeds in m/s.
 * `twa` is measured from the course (the direction of travel through the water), `leeway` from heading to
 * course, positive to leeward. The air moves past the boat, in heading axes, with
 *   from ahead:    tws f(z) cos(twa - leeway) + speed cos(leeway)
 *   from windward: tws f(z) sin(twa - leeway) - speed sin(leeway)
 */
export interface SailingFlow {
  tws: number;
  twa: number;
  speed: number;
  leeway: number;
}
