/** Downwash angle [rad] behind a keel, 0.136 sqrt(CL / A). Source: Keuning, Katgert & Vermeulen 2006 (from memory). */
export function keelDownwash(cl: number, aspect: number): number {
  return 0.136 * Math.sqrt(cl / aspect);
}

/**
 * The smaller of the measured law above and the far wake of an elliptic loading, 2 CL / (pi A), which the measured law
 * exceeds at small lift; odd in CL, and joined smoothly (an eighth-power mean).
 */
export function rudderDownwash(cl: number, aspect: number): number {
  const x = cl / aspect;
  const linear = (2 / Math.PI) * x;
  const ratio2 = (2 / Math.PI / 0.136) ** 2 * Math.abs(x); // (linear / law)^2
  return linear / (1 + ratio2 ** 4) ** 0.125;
}
