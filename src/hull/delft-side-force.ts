/**
 * Side force and effective span of a keelboat, as cross-checks on the lifting line.
 * Source: Keuning & Sonnenberg 1998, 15th International HISWA Symposium, Amsterdam (coefficients from memory). Meant
 * for ballasted keels with Tc/T of 0.15 to 0.5; they mean nothing for a bare board.
 */
export const DELFT_SIDE_FORCE = {
  heelDegrees: [0, 10, 20, 30],
  b1: [2.025, 1.989, 1.98, 1.762],
  b2: [9.551, 6.729, 0.633, -4.957],
  b3: [0.631, 0.494, 0.194, -0.087],
  b4: [-6.575, -4.745, -0.792, 2.766],
} as const;

export const DELFT_EFFECTIVE_SPAN = {
  heelDegrees: [0, 10, 20, 30],
  A1: [3.7455, 4.4892, 3.9592, 3.4891],
  A2: [-3.6246, -4.8454, -3.9804, -2.9577],
  A3: [0.0589, 0.0294, 0.0283, 0.025],
  A4: [-0.0296, -0.0176, -0.0075, -0.0272],
  B0: [1.2306, 1.4231, 1.545, 1.4744],
  B1: [-0.7256, -1.2971, -1.5622, -1.3499],
} as const;

/** Side force per leeway over 1/2 rho V^2 Sc [1/rad], times cos(heel), at the table's heels. */
export function sideForceSlopes(draft: number, canoeDraft: number, wetted: number): number[] {
  const t = DELFT_SIDE_FORCE;
  const a = (draft * draft) / wetted;
  const c = canoeDraft / draft;
  return t.heelDegrees.map((_, i) => t.b1[i]! * a + t.b2[i]! * a * a + t.b3[i]! * c + t.b4[i]! * c * a);
}

/** Effective span over draft Te/T at the table's heels: induced drag is Fh^2 / (pi Te^2 1/2 rho V^2). */
export function effectiveSpans(
  draft: number,
  canoeDraft: number,
  bwl: number,
  taper: number,
  froude: number,
): number[] {
  const t = DELFT_EFFECTIVE_SPAN;
  const c = canoeDraft / draft;
  return t.heelDegrees.map(
    (_, i) =>
      (t.A1[i]! * c + t.A2[i]! * c * c + (t.A3[i]! * bwl) / canoeDraft + t.A4[i]! * taper) *
      (t.B0[i]! + t.B1[i]! * froude),
  );
}
