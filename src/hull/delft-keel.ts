import type { DelftHull } from './delft-1998.js';
import type { KeelVolume } from './types.js';

/**
 * Residuary resistance of a fin keel, over the weight of water it displaces.
 * Source: Keuning & Sonnenberg 1998, 15th International HISWA Symposium, Amsterdam; Keuning & Binkhorst 1997
 * (coefficients from memory).
 */
export const DELFT_KEEL = {
  Fn: [0.2, 0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6],
  A0: [-0.00104, -0.0055, -0.0111, -0.00713, -0.03581, -0.0047, 0.00553, 0.04822, 0.01021],
  A1: [0.00172, 0.00597, 0.01421, 0.02632, 0.08649, 0.11592, 0.07371, 0.0066, 0.14173],
  A2: [0.00117, 0.0039, 0.00069, -0.00232, 0.00999, -0.00064, 0.05991, 0.07048, 0.06409],
  A3: [-0.00008, -0.00009, 0.00021, 0.00039, 0.00017, 0.00035, -0.00114, -0.00035, -0.00192],
} as const;

/** Residuary resistance of the keel over rho g Vk at the table's Froude numbers; not clipped. */
export function keelResiduary(h: DelftHull, k: KeelVolume): number[] {
  const t = DELFT_KEEL;
  // Tc + Zcbk of the formula is the depth of the keel's centre below the waterline.
  const depth = k.centreDepth / Math.cbrt(k.volume);
  return t.Fn.map(
    (_, i) => t.A0[i]! + (t.A1[i]! * k.draft) / h.bwl + t.A2[i]! * depth + (t.A3[i]! * h.volume) / k.volume,
  );
}

/**
 * Coefficient Ch of the keel's heeled resistance, dRrk / (rho g Vk) = Ch Fn^2 heel (same source; the grouping of the
 * third term is uncertain).
 */
export function keelHeelCoefficient(h: DelftHull, draft: number): number {
  const tct = h.canoeDraft / draft;
  const bt = h.bwl / h.canoeDraft;
  return -3.5837 * tct - 0.0518 * bt + 0.5958 * bt * tct + (0.2055 * h.lwl) / Math.cbrt(h.volume);
}
