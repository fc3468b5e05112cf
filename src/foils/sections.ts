import { frictionCoefficientIttc57 } from '../hull/index.js';

/**
 * Friction of a foil section with the credit of its laminar run: the larger of the laminar line 1.328/sqrt(Re)
 * (Blasius) and the transitional line ITTC-57 - 1050/Re, the corner rounded. Prandtl's transition term uses 1700 for a
 * transition at Re 5e5; 1050 belongs to 3e5 (Schlichting, Boundary-Layer Theory; from memory).
 */
export function foilFriction(reynolds: number): number {
  const re = Math.max(reynolds, 1);
  const laminar = 1.328 / Math.sqrt(re);
  const transitional = frictionCoefficientIttc57(re) - 1050 / re;
  const d = laminar - transitional;
  return 0.5 * (laminar + transitional + Math.sqrt(d * d + 4e-8));
}

/**
 * Ratio of profile drag to friction on both sides of a foil, 1 + 2 t/c + 60 (t/c)^4.
 * Source: Hoerner, Fluid-Dynamic Drag, 1965 (from memory).
 */
export function foilFormFactor(thickness: number): number {
  return 1 + 2 * thickness + 60 * thickness ** 4;
}

/**
 * Closed form of the lift slope [1/rad] of a low-aspect foil, 5.7 A / (1.8 + cos L sqrt(A^2/cos^4 L + 4)).
 * Source: Whicker & Fehlner 1958 (from memory). A check on the lifting line, not used by it.
 */
export function liftSlopeWhickerFehlner(aspect: number, sweep: number): number {
  const c = Math.cos(sweep);
  return (5.7 * aspect) / (1.8 + c * Math.sqrt(aspect ** 2 / c ** 4 + 4));
}

/** Helmbold's lift slope [1/rad] of a straight foil, 2 pi A / (2 + sqrt(A^2 + 4)) (Helmbold 1942). A check. */
export function liftSlopeHelmbold(aspect: number): number {
  return (2 * Math.PI * aspect) / (2 + Math.sqrt(aspect * aspect + 4));
}
