/** Exact conversion factors, and angle helpers. */

/** Metres in a foot and an inch (international yard and pound agreement, 1959; exact). */
export const FOOT = 0.3048;
export const INCH = 0.0254;
/** m/s in a knot: one international nautical mile of 1852 m an hour (exact). */
export const KNOT = 1852 / 3600;
/** Kilograms in a pound (1959 agreement; exact). */
export const POUND = 0.45359237;
/** Radians in a degree. */
export const DEGREE = Math.PI / 180;
/** Standard acceleration of gravity [m/s2] (3rd General Conference on Weights and Measures, 1901; exact). */
export const STANDARD_GRAVITY = 9.80665;

/** Speed [m/s] in knots. */
export function toKnots(metresPerSecond: number): number {
  return metresPerSecond / KNOT;
}

/** Speed [kn] in m/s. */
export function fromKnots(knots: number): number {
  return knots * KNOT;
}

/** Angle [rad] in degrees. */
export function degrees(radians: number): number {
  return radians / DEGREE;
}

/** Angle [deg] in radians. */
export function radians(deg: number): number {
  return deg * DEGREE;
}
