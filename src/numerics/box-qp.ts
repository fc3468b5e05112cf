import { choleskyFactor, choleskySolve } from './cholesky.js';

/**
 * minimise 1/2 x'H x - g'x subject to 0 <= x_i <= upper_i, with H symmetric positive definite.
 *
 * Primal-dual active set (Hintermueller, Ito & Kunisch 2003): guess which variables sit on a bound, solve for the
 * free ones by Cholesky, free those whose multiplier has the wrong sign, bind those outside, repeat. A warm start
 * usually needs one or two rounds. Where the sets cycle, projected coordinate descent takes over and the active set
 * finishes. The minimum is unique, so the warm start changes the time, never the answer (to rounding).
 */
export interface BoxQp {
  readonly n: number;
  /** Row-major n x n, filled by the caller; both triangles are read. */
  readonly h: Float64Array;
  readonly g: Float64Array;
  readonly upper: Float64Array;
  /** The answer, and the warm start's values. */
  readonly x: Float64Array;
  /** Where each variable sits: 0 free, -1 at zero, 1 at its upper bound. The warm start. */
  readonly place: Int8Array;
  /** Rounds used by the last solve, and whether coordinate descent was needed. */
  rounds: number;
  fellBack: boolean;
  readonly work: Float64Array;
  readonly rhs: Float64Array;
  readonly free: Int32Array;
}

export function createBoxQp(n: number): BoxQp {
  return {
    n,
    h: new Float64Array(n * n),
    g: new Float64Array(n),
    upper: new Float64Array(n),
    x: new Float64Array(n),
    place: new Int8Array(n).fill(1),
    rounds: 0,
    fellBack: false,
    work: new Float64Array(n * n),
    rhs: new Float64Array(n),
    free: new Int32Array(n),
  };
}

const MOST_ROUNDS = 25;

/** Solves in place; throws only when H is not positive definite (a caller's mistake). */
export function solveBoxQp(qp: BoxQp): void {
  qp.fellBack = false;
  if (activeSet(qp)) return;
  qp.fellBack = true;
  for (let attempt = 0; attempt < 6; attempt++) {
    coordinateDescent(qp, 200 * (attempt + 1), 1e-15);
    if (activeSet(qp)) return;
  }
  coordinateDescent(qp, 20000, 0);
}

function activeSet(qp: BoxQp): boolean {
  const { n, h, g, upper, x, place, work, rhs, free } = qp;
  for (let round = 1; round <= MOST_ROUNDS; round++) {
    qp.rounds = round;
    let m = 0;
    for (let i = 0; i < n; i++) {
      if (place[i] === 0) free[m++] = i;
      else x[i] = place[i]! < 0 ? 0 : upper[i]!;
    }
    for (let a = 0; a < m; a++) {
      const i = free[a]!;
      const row = i * n;
      let s = g[i]!;
      for (let j = 0; j < n; j++) if (place[j]! > 0) s -= h[row + j]! * upper[j]!;
      rhs[a] = s;
      for (let b = 0; b <= a; b++) work[a * n + b] = h[row + free[b]!]!;
    }
    if (!choleskyFactor(m, n, work)) throw new RangeError('the quadratic programme is not positive definite');
    choleskySolve(m, n, work, rhs);
    for (let a = 0; a < m; a++) x[free[a]!] = rhs[a]!;
    let changed = false;
    for (let a = 0; a < m; a++) {
      const i = free[a]!;
      if (x[i]! < 0) {
        place[i] = -1;
        changed = true;
      } else if (x[i]! > upper[i]!) {
        place[i] = 1;
        changed = true;
      }
    }
    const freed = changed;
    for (let i = 0; i < n; i++) {
      const p = place[i]!;
      if (p === 0) continue;
      // Variables bound in this very round are judged in the next.
      if (freed && (x[i]! < 0 || x[i]! > upper[i]!)) continue;
      const row = i * n;
      let slope = g[i]!;
      for (let j = 0; j < n; j++) slope -= h[row + j]! * x[j]!;
      const small = 1e-14 * (Math.abs(g[i]!) + h[row + i]! * upper[i]!);
      if ((p > 0 && slope < -small) || (p < 0 && slope > small)) {
        place[i] = 0;
        changed = true;
      }
    }
    if (!changed) return true;
  }
  return false;
}

/** Projected coordinate descent from the present x; leaves `place` set by where the variables ended. */
export function coordinateDescent(qp: BoxQp, sweeps: number, tolerance: number): void {
  const { n, h, g, upper, x, place } = qp;
  for (let i = 0; i < n; i++) x[i] = Math.min(upper[i]!, Math.max(0, x[i]!));
  for (let sweep = 0; sweep < sweeps; sweep++) {
    let moved = 0;
    for (let i = 0; i < n; i++) {
      const row = i * n;
      let s = g[i]!;
      for (let j = 0; j < n; j++) s -= h[row + j]! * x[j]!;
      const next = Math.min(upper[i]!, Math.max(0, x[i]! + s / h[row + i]!));
      const scale = upper[i]! > 0 ? upper[i]! : 1;
      moved = Math.max(moved, Math.abs(next - x[i]!) / scale);
      x[i] = next;
    }
    if (moved <= tolerance) break;
  }
  for (let i = 0; i < n; i++) place[i] = x[i]! <= 0 ? -1 : x[i]! >= upper[i]! ? 1 : 0;
}
