/**
 * Resistance of an immersed transom, R = 1/2 rho V^2 At c6 with c6 = 0.2 (1 - 0.2 FnT) below FnT = 5 and 0 above,
 * FnT = V / sqrt(2 g At / (B + B Cwp)), B the waterline beam: at low speed the water closes slowly behind it, at high
 * speed it runs clear. Source: Holtrop & Mennen 1982, International Shipbuilding Progress 29 (from memory).
 * @returns N (in the unit of density, gravity and lengths given)
 */
export function transomResistance(
  speed: number,
  area: number,
  beam: number,
  waterplaneCoefficient: number,
  density: number,
  gravity: number,
): number {
  if (!(area > 0)) return 0;
  const fn = speed / Math.sqrt((2 * gravity * area) / (beam * (1 + waterplaneCoefficient)));
  return 0.5 * density * speed * speed * area * 0.2 * Math.max(0, 1 - 0.2 * fn);
}
