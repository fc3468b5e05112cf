import type { DelftHull } from './delft-1998.js';

/**
 * Increase of residuary resistance at 20 deg of heel, and its growth with heel.
 * Source: Keuning & Sonnenberg 1998, 15th International HISWA Symposium, Amsterdam (coefficients from memory). It
 * extrapolates badly to beamy hulls: Bwl/Tc is held at 7, and negative values at 0.
 */
export const DELFT_HEEL = {
  Fn: [0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55],
  u0: [-0.0268, 0.6628, 1.6433, -0.8659, -3.2715, -0.1976, 1.5873],
  u1: [-0.0014, -0.0632, -0.2144, -0.0354, 0.1372, -0.148, -0.3749],
  u2: [-0.0057, -0.0699, -0.164, 0.2226, 0.5547, -0.6593, -0.7105],
  u3: [0.0016, 0.0069, 0.0199, 0.0188, 0.0268, 0.1862, 0.2146],
  u4: [-0.007, 0.0459, -0.054, -0.58, -1.0064, -0.7489, -0.4818],
  u5: [-0.0017, -0.0004, -0.0268, -0.1133, -0.2026, -0.1648, -0.1174],
} as const;

export const HEEL_BEAM_DRAFT_LIMIT = 7;

/** Increase over displacement weight at 20 deg, at the table's Froude numbers; not clipped. */
export function heelResiduary20(h: DelftHull): number[] {
  const t = DELFT_HEEL;
  const bt = Math.min(HEEL_BEAM_DRAFT_LIMIT, h.bwl / h.canoeDraft);
  // In % of Lwl from amidships, aft negative.
  const lcb = 100 * (0.5 - h.lcbFromForward / h.lwl);
  return t.Fn.map(
    (_, i) =>
      1e-3 *
      (t.u0[i]! +
        (t.u1[i]! * h.lwl) / h.bwl +
        t.u2[i]! * bt +
        t.u3[i]! * bt * bt +
        t.u4[i]! * lcb +
        t.u5[i]! * lcb * lcb),
  );
}

/** Factor on the value at 20 deg: 6.0 heel^1.7, heel in rad (same source). */
export function heelFactor(heel: number): number {
  return 6 * Math.abs(heel) ** 1.7;
}

/** Change of wetted area with heel [% of upright], by the regression; a check on the integrated area. */
export const DELFT_HEELED_WETTED = {
  heelDegrees: [5, 10, 15, 20, 25, 30, 35],
  s0: [-4.112, -4.522, -3.291, 1.85, 6.51, 12.334, 14.648],
  s1: [0.054, -0.132, -0.389, -1.2, -2.305, -3.911, -5.182],
  s2: [-0.027, -0.077, -0.118, -0.109, -0.066, 0.024, 0.102],
  s3: [6.329, 8.738, 8.949, 5.364, 3.443, 1.767, 3.497],
} as const;

export function heeledWettedPercent(beamOverDraft: number, cm: number): number[] {
  const t = DELFT_HEELED_WETTED;
  return t.heelDegrees.map(
    (_, i) => t.s0[i]! + t.s1[i]! * beamOverDraft + t.s2[i]! * beamOverDraft ** 2 + t.s3[i]! * cm,
  );
}
