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
  readonly bound: Int32Array;
  /** Numbers of free and upper-bound variables in the last round; `free`, `bound` and `work` belong to it. */
  freeCount: number;
  boundCount: number;
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
    bound: new Int32Array(n),
    freeCount: 0,
    boundCount: 0,
  };
}

const MOST_ROUNDS = 25;

/** Solves in place. False when H turns out not to be positive definite; x is then of no use. */
export function solveBoxQp(qp: BoxQp): boolean {
  qp.fellBack = false;
  let end = activeSet(qp);
  if (end === 'solved') return true;
  qp.fellBack = true;
  for (let attempt = 0; attempt < 6 && end === 'cycling'; attempt++) {
    coordinateDescent(qp, 200 * (attempt + 1), 1e-15);
    end = activeSet(qp);
    if (end === 'solved') return true;
  }
  if (end === 'indefinite') return false;
  coordinateDescent(qp, 20000, 0);
  return true;
}

function activeSet(qp: BoxQp): 'solved' | 'cycling' | 'indefinite' {
  const { n, h, g, upper, x, place, work, rhs, free, bound } = qp;
  for (let round = 1; round <= MOST_ROUNDS; round++) {
    qp.rounds = round;
    let m = 0;
    let k = 0; // variables at their upper bounds
    for (let i = 0; i < n; i++) {
      const p = place[i]!;
      if (p === 0) free[m++] = i;
      else if (p > 0) {
        bound[k++] = i;
        x[i] = upper[i]!;
      } else x[i] = 0;
    }
    // Free block, factorised as it is copied (Cholesky row by row), and the forward substitution with it.
    for (let a = 0; a < m; a++) {
      const i = free[a]!;
      const row = i * n;
      const ra = a * n;
      let s = g[i]!;
      for (let b = 0; b < k; b++) {
        const j = bound[b]!;
        s -= h[row + j]! * x[j]!;
      }
      let pivot = h[row + i]!;
      for (let b = 0; b < a; b++) {
        const rb = b * n;
        let v = h[row + free[b]!]!;
        for (let c = 0; c < b; c++) v -= work[ra + c]! * work[rb + c]!;
        v *= work[rb + b]!; // the diagonal holds reciprocals
        work[ra + b] = v;
        pivot -= v * v;
        s -= v * rhs[b]!;
      }
      if (!(pivot > 0)) return 'indefinite';
      const inverse = 1 / Math.sqrt(pivot);
      work[ra + a] = inverse;
      rhs[a] = s * inverse;
    }
    for (let a = m - 1; a >= 0; a--) {
      const v = rhs[a]! * work[a * n + a]!;
      rhs[a] = v;
      const ra = a * n;
      for (let b = 0; b < a; b++) rhs[b]! -= work[ra + b]! * v;
    }
    let changed = false;
    for (let a = 0; a < m; a++) {
      const i = free[a]!;
      const v = rhs[a]!;
      x[i] = v;
      if (v < 0) {
        place[i] = -1;
        changed = true;
      } else if (v > upper[i]!) {
        place[i] = 1;
        changed = true;
      }
    }
    // Multipliers of the variables that were bound in this round.
    const check = (i: number, atUpper: boolean): void => {
      const row = i * n;
      let slope = g[i]!;
      for (let a = 0; a < m; a++) slope -= h[row + free[a]!]! * rhs[a]!;
      for (let b = 0; b < k; b++) slope -= h[row + bound[b]!]! * x[bound[b]!]!;
      const small = 1e-14 * (Math.abs(g[i]!) + h[row + i]! * upper[i]!);
      if (atUpper ? slope < -small : slope > small) {
        place[i] = 0;
        changed = true;
      }
    };
    for (let b = 0; b < k; b++) check(bound[b]!, true);
    let f = 0;
    for (let i = 0; i < n; i++) {
      // Zero-bound variables: those neither free nor at their upper bound when the round began.
      if (f < m && free[f] === i) {
        f++;
        continue;
      }
      if (place[i]! < 0) check(i, false);
    }
    qp.freeCount = m;
    qp.boundCount = k;
    if (!changed) return 'solved';
  }
  return 'cycling';
}

/**
 * Solves H_FF y = r for the free variables of the last solve, with its factor; r (by free variable, in the order of
 * `free`) is overwritten by y.
 */
export function solveFreeBlock(qp: BoxQp, r: Float64Array): void {
  const { n, work, freeCount: m } = qp;
  for (let a = 0; a < m; a++) {
    const ra = a * n;
    let s = r[a]!;
    for (let b = 0; b < a; b++) s -= work[ra + b]! * r[b]!;
    r[a] = s * work[ra + a]!;
  }
  for (let a = m - 1; a >= 0; a--) {
    const ra = a * n;
    const v = r[a]! * work[ra + a]!;
    r[a] = v;
    for (let b = 0; b < a; b++) r[b]! -= work[ra + b]! * v;
  }
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
