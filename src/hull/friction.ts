/** Reynolds number below which the ITTC-57 line is carried on at its value: the line means nothing there. */
export const ITTC57_LOWEST_REYNOLDS = 2e4;

/**
 * Frictional resistance coefficient CF = 0.075 / (log10 Re - 2)^2.
 * Source: International Towing Tank Conference 1957. Meant for Re above 1e5 or so; below 2e4 the value at 2e4 is kept.
 */
export function frictionCoefficientIttc57(reynolds: number): number {
  const l = Math.log10(Math.max(reynolds, ITTC57_LOWEST_REYNOLDS)) - 2;
  return 0.075 / (l * l);
}

/**
 * Fully rough flat plate, CF = (1.89 + 1.62 log10(L/ks))^-2.5.
 * Source: Schlichting, Boundary-Layer Theory (from memory). Valid for L/ks of 1e2 to 1e6.
 */
export function frictionCoefficientRough(lengthOverRoughness: number): number {
  return (1.89 + 1.62 * Math.log10(lengthOverRoughness)) ** -2.5;
}

/**
 * Schoenherr's line 0.242 / sqrt(CF) = log10(Re CF), by Newton from the ITTC value.
 * Source: Schoenherr 1932, as used by Savitsky 1964.
 */
export function frictionCoefficientSchoenherr(reynolds: number): number {
  let cf = frictionCoefficientIttc57(reynolds);
  for (let i = 0; i < 50; i++) {
    const f = 0.242 / Math.sqrt(cf) - Math.log10(reynolds * cf);
    const slope = -0.121 / cf ** 1.5 - 1 / (cf * Math.LN10);
    const next = cf - f / slope;
    if (Math.abs(next - cf) < 1e-14) return next;
    cf = next > 0 ? next : 0.5 * cf;
  }
  return cf;
}

/**
 * Friction of a hull with roughness: the smooth line until the fully rough plate lies above it, the corner rounded by a
 * twelfth-power mean (judgement; the transition itself depends on the kind of roughness).
 * @param lengthOverRoughness L/ks; infinite for a smooth hull
 */
export function frictionCoefficient(
  reynolds: number,
  lengthOverRoughness = Number.POSITIVE_INFINITY,
): number {
  const smooth = frictionCoefficientIttc57(reynolds);
  if (!Number.isFinite(lengthOverRoughness)) return smooth;
  const rough = frictionCoefficientRough(Math.max(100, lengthOverRoughness));
  return smooth * (1 + (rough / smooth) ** 12) ** (1 / 12);
}
