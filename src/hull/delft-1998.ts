/**
 * Bare-hull residuary resistance of the Delft Systematic Yacht Hull Series, 1998 regression.
 * Source: Keuning & Sonnenberg 1998, 15th International HISWA Symposium, Amsterdam (coefficients from memory, checked
 * against towing-tank data and the 2008 edition, see test/outside/delft.ts).
 */
export const DELFT_1998 = {
  Fn: [0.1, 0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6],
  a0: [-0.0014, 0.0004, 0.0014, 0.0027, 0.0056, 0.0032, -0.0064, -0.0171, -0.0201, 0.0495, 0.0808],
  a1: [0.0403, -0.1808, -0.1071, 0.0463, -0.8005, -0.1011, 2.3095, 3.4017, 7.1576, 1.5618, -5.3233],
  a2: [0.047, 0.1793, 0.0637, -0.1263, 0.4891, -0.0813, -1.5152, -1.9862, -6.3304, -6.0661, -1.1513],
  a3: [-0.0227, -0.0004, 0.009, 0.015, 0.0269, -0.0382, 0.0751, 0.3242, 0.5829, 0.8641, 0.9663],
  a4: [-0.0119, 0.0097, 0.0153, 0.0274, 0.0519, 0.032, -0.0858, -0.145, 0.163, 1.1702, 1.6084],
  a5: [0.0061, 0.0118, 0.0011, -0.0299, -0.0313, -0.1481, -0.5349, -0.8043, -0.3966, 1.761, 2.7459],
  a6: [-0.0086, -0.0055, 0.0012, 0.011, 0.0292, 0.0837, 0.1715, 0.2952, 0.5023, 0.9176, 0.8491],
  a7: [-0.0307, 0.1721, 0.1021, -0.0595, 0.7314, 0.0223, -2.455, -3.5284, -7.1579, -2.1191, 4.7129],
  a8: [-0.0553, -0.1728, -0.0648, 0.122, -0.3619, 0.1587, 1.1865, 1.3575, 5.2534, 5.4281, 1.1089],
} as const;

/** What the Delft regressions need to know of a hull; lengths m. */
export interface DelftHull {
  readonly lwl: number;
  readonly bwl: number;
  readonly canoeDraft: number;
  readonly volume: number;
  readonly waterplane: number;
  readonly wetted: number;
  /** Centres of buoyancy and flotation abaft the forward end of the waterline. */
  readonly lcbFromForward: number;
  readonly lcfFromForward: number;
  readonly cp: number;
  readonly cm: number;
}

/** Residuary resistance over displacement weight at the table's Froude numbers; not clipped. */
export function residuaryDelft1998(h: DelftHull): number[] {
  const t = DELFT_1998;
  const v13 = Math.cbrt(h.volume);
  const slender = v13 / h.lwl;
  const lcb = h.lcbFromForward / h.lwl;
  const lcbLcf = h.lcbFromForward / h.lcfFromForward;
  const vAw = (v13 * v13) / h.waterplane;
  const vSc = (v13 * v13) / h.wetted;
  return t.Fn.map(
    (_, i) =>
      t.a0[i]! +
      (t.a1[i]! * lcb + t.a2[i]! * h.cp + t.a3[i]! * vAw + (t.a4[i]! * h.bwl) / h.lwl) * slender +
      (t.a5[i]! * vSc + t.a6[i]! * lcbLcf + t.a7[i]! * lcb * lcb + t.a8[i]! * h.cp * h.cp) * slender,
  );
}

/** Wetted area [m2] of a canoe body, (1.97 + 0.171 B/T) (0.65/Cm)^(1/3) sqrt(V L) (same source). */
export function wettedAreaDelft(h: Pick<DelftHull, 'bwl' | 'canoeDraft' | 'cm' | 'volume' | 'lwl'>): number {
  return (1.97 + (0.171 * h.bwl) / h.canoeDraft) * Math.cbrt(0.65 / h.cm) * Math.sqrt(h.volume * h.lwl);
}
