import { unknownNodes, type WakeOptions, wakeEnergyMatrix, wakeLine } from '../../src/lifting-line/index.js';
import { type BoxQp, createBoxQp, solveBoxQp } from '../../src/numerics/index.js';

/**
 * Least induced drag for a given lift (and moment, with a price): minimises 1/2 G'AG - sum w G (1 - price z).
 * Returns lift L = sum w G, drag D = 1/2 G'AG (per rho), moment and the loading.
 */
export function leastDrag(
  foot: number,
  head: number,
  n: number,
  options: WakeOptions & { sealed?: boolean; price?: number },
) {
  const line = wakeLine(foot, head, n, options.sealed ?? false);
  const a = wakeEnergyMatrix([line], options);
  const { z, width: w } = unknownNodes(line, options);
  const qp: BoxQp = createBoxQp(z.length);
  qp.h.set(a);
  for (let i = 0; i < z.length; i++) qp.g[i] = w[i]! * (1 - (options.price ?? 0) * Math.abs(z[i]!));
  qp.upper.fill(1e6);
  qp.place.fill(0);
  solveBoxQp(qp);
  let lift = 0;
  let moment = 0;
  let drag = 0;
  for (let i = 0; i < z.length; i++) {
    lift += w[i]! * qp.x[i]!;
    moment += w[i]! * Math.abs(z[i]!) * qp.x[i]!;
    for (let j = 0; j < z.length; j++) drag += 0.5 * qp.x[i]! * a[i * z.length + j]! * qp.x[j]!;
  }
  return { lift, moment, drag, x: qp.x, z, w, a };
}

/** Span efficiency L^2 / (pi/2 b^2 D) per rho and unit speed: D = L^2 / (1/2 pi e b^2). */
export function spanEfficiency(lift: number, drag: number, span: number): number {
  return (2 * lift * lift) / (Math.PI * span * span * drag);
}
