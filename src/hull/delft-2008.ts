import type { DelftHull } from './delft-1998.js';

/**
 * Bare-hull residuary resistance of the Delft Systematic Yacht Hull Series, 2008 regression.
 * Source: Keuning & Katgert 2008, Innovation in High Performance Sailing Yachts, Lorient (coefficients from memory,
 * checked against the 1998 edition). Rows above Fn 0.60 have internal checks only and 0.75 is rough: the hull uses the
 * table to 0.60 and holds the ratio above it.
 */
export const DELFT_2008 = {
  Fn: [0.15, 0.2, 0.25, 0.3, 0.35, 0.4, 0.45, 0.5, 0.55, 0.6, 0.65, 0.7, 0.75],
  a0: [
    -0.0005, -0.0003, -0.0002, -0.0009, -0.0026, -0.0064, -0.0218, -0.0388, -0.0347, -0.0361, 0.0008, 0.0108,
    0.1023,
  ],
  a1: [
    0.0023, 0.0059, -0.0156, 0.0016, -0.0567, -0.4034, -0.5261, -0.5986, -0.4764, 0.0037, 0.3728, -0.1238,
    0.7726,
  ],
  a2: [
    -0.0086, -0.0064, 0.0031, 0.0337, 0.0446, -0.125, -0.2945, -0.3038, -0.2361, -0.296, -0.3667, -0.2026,
    0.504,
  ],
  a3: [
    -0.0015, 0.007, -0.0021, -0.0285, -0.1091, 0.0273, 0.2485, 0.6033, 0.8726, 0.9661, 1.3957, 1.1282, 1.7867,
  ],
  a4: [
    0.0061, 0.0014, -0.007, -0.0367, -0.0707, -0.1341, -0.2428, -0.043, 0.4219, 0.6123, 1.0343, 1.1836,
    2.1934,
  ],
  a5: [0.001, 0.0013, 0.0148, 0.0218, 0.0914, 0.3578, 0.6293, 0.8332, 0.899, 0.7534, 0.323, 0.4973, -1.5479],
  a6: [0.0001, 0.0005, 0.001, 0.0015, 0.0021, 0.0045, 0.0081, 0.0106, 0.0096, 0.01, 0.0072, 0.0038, -0.0115],
  a7: [
    0.0052, -0.002, -0.0043, -0.0172, -0.0078, 0.1115, 0.2086, 0.1336, -0.2272, -0.3352, -0.4632, -0.4477,
    -0.0977,
  ],
} as const;

/** Residuary resistance over displacement weight at the table's Froude numbers; not clipped. */
export function residuaryDelft2008(h: DelftHull): number[] {
  const t = DELFT_2008;
  const v13 = Math.cbrt(h.volume);
  const slender = v13 / h.lwl;
  const lcb = h.lcbFromForward / h.lwl;
  const lcbLcf = h.lcbFromForward / h.lcfFromForward;
  const vAw = (v13 * v13) / h.waterplane;
  return t.Fn.map(
    (_, i) =>
      t.a0[i]! +
      (t.a1[i]! * lcb +
        t.a2[i]! * h.cp +
        t.a3[i]! * vAw +
        (t.a4[i]! * h.bwl) / h.lwl +
        t.a5[i]! * lcbLcf +
        (t.a6[i]! * h.bwl) / h.canoeDraft +
        t.a7[i]! * h.cm) *
        slender,
  );
}
