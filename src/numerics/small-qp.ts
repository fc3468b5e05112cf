/**
 * Convex quadratic programmes of a few variables by the dual active-set method of Goldfarb & Idnani 1983:
 *
 *   minimise 1/2 p'B p - g'p   subject to   a_i'p <= b_i
 *
 * It starts at the free minimum and takes in violated constraints one by one, so a programme that few constraints bind
 * costs little. Nothing is allocated per solve.
 */
export interface SmallQp {
  /** Most variables and constraints. */
  readonly size: number;
  readonly most: number;
  /** B, row-major with `n` columns, symmetric and positive definite; filled by the caller. */
  readonly b: Float64Array;
  readonly g: Float64Array;
  /** Normals, `n` numbers each, and right-hand sides. */
  readonly normals: Float64Array;
  readonly limits: Float64Array;
  /** The answer, and the multiplier (>= 0) of each constraint in it. */
  readonly p: Float64Array;
  readonly multipliers: Float64Array;
  /** Solves for n variables and m constraints; false when no point meets them all. */
  solve(n: number, m: number): boolean;
}

/** Relative length below which a direction counts as none. */
const TINY = 1e-13;

export function createSmallQp(size: number, most: number): SmallQp {
  const b = new Float64Array(size * size);
  const g = new Float64Array(size);
  const normals = new Float64Array(size * most);
  const limits = new Float64Array(most);
  const p = new Float64Array(size);
  const multipliers = new Float64Array(most);
  const inverse = new Float64Array(size * size);
  const work = new Float64Array(size * size);
  const active = new Int32Array(size);
  const u = new Float64Array(size);
  // Columns B^-1 a of the active constraints, their Gram matrix, and the directions.
  const image = new Float64Array(size * size);
  const gram = new Float64Array(size * size);
  const rhs = new Float64Array(size);
  const full = new Float64Array(size);
  const z = new Float64Array(size);
  const r = new Float64Array(size);

  /** Inverse of B by Gauss-Jordan with no pivoting: B is positive definite. */
  const invert = (n: number): boolean => {
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++) {
        work[i * n + j] = b[i * n + j]!;
        inverse[i * n + j] = i === j ? 1 : 0;
      }
    for (let k = 0; k < n; k++) {
      const d = work[k * n + k]!;
      if (!(d > 0)) return false;
      for (let j = 0; j < n; j++) {
        work[k * n + j]! /= d;
        inverse[k * n + j]! /= d;
      }
      for (let i = 0; i < n; i++) {
        if (i === k) continue;
        const f = work[i * n + k]!;
        if (f === 0) continue;
        for (let j = 0; j < n; j++) {
          work[i * n + j]! -= f * work[k * n + j]!;
          inverse[i * n + j]! -= f * inverse[k * n + j]!;
        }
      }
    }
    return true;
  };

  /** Solves the Gram system of k active constraints for r, by elimination; false when they depend on each other. */
  const solveGram = (k: number): boolean => {
    for (let i = 0; i < k; i++) {
      for (let j = 0; j < k; j++) work[i * k + j] = gram[i * size + j]!;
      r[i] = rhs[i]!;
    }
    for (let c = 0; c < k; c++) {
      let row = c;
      for (let i = c + 1; i < k; i++) if (Math.abs(work[i * k + c]!) > Math.abs(work[row * k + c]!)) row = i;
      const d = work[row * k + c]!;
      if (!(Math.abs(d) > 1e-300)) return false;
      if (row !== c) {
        for (let j = 0; j < k; j++) {
          const t = work[row * k + j]!;
          work[row * k + j] = work[c * k + j]!;
          work[c * k + j] = t;
        }
        const t = r[row]!;
        r[row] = r[c]!;
        r[c] = t;
      }
      for (let i = c + 1; i < k; i++) {
        const f = work[i * k + c]! / d;
        if (f === 0) continue;
        for (let j = c; j < k; j++) work[i * k + j]! -= f * work[c * k + j]!;
        r[i]! -= f * r[c]!;
      }
    }
    for (let c = k - 1; c >= 0; c--) {
      let s = r[c]!;
      for (let j = c + 1; j < k; j++) s -= work[c * k + j]! * r[j]!;
      r[c] = s / work[c * k + c]!;
    }
    return true;
  };

  const solve = (n: number, m: number): boolean => {
    multipliers.fill(0, 0, m);
    if (!invert(n)) return false;
    for (let i = 0; i < n; i++) {
      let s = 0;
      for (let j = 0; j < n; j++) s += inverse[i * n + j]! * g[j]!;
      p[i] = s;
    }
    let k = 0;
    for (let round = 0; round < 20 * (m + 1); round++) {
      // The constraint most violated, by its own length.
      let worst = -1;
      let most = 0;
      for (let c = 0; c < m; c++) {
        let s = -limits[c]!;
        let length = 0;
        for (let i = 0; i < n; i++) {
          const a = normals[c * n + i]!;
          s += a * p[i]!;
          length += a * a;
        }
        if (length === 0) {
          if (limits[c]! < -1e-12) return false;
          continue;
        }
        const v = s / Math.sqrt(length);
        if (v > most && v > 1e-14 + 1e-13 * Math.abs(limits[c]!)) {
          let held = false;
          for (let j = 0; j < k; j++) if (active[j] === c) held = true;
          if (held) continue;
          most = v;
          worst = c;
        }
      }
      if (worst < 0) break;
      let added = 0;
      for (let inner = 0; inner < 4 * (size + 2); inner++) {
        let violation = -limits[worst]!;
        for (let i = 0; i < n; i++) violation += normals[worst * n + i]! * p[i]!;
        // Directions: full = B^-1 a; r what the active multipliers give up; z what is left for p.
        for (let i = 0; i < n; i++) {
          let s = 0;
          for (let j = 0; j < n; j++) s += inverse[i * n + j]! * normals[worst * n + j]!;
          full[i] = s;
        }
        for (let c = 0; c < k; c++) {
          let s = 0;
          for (let i = 0; i < n; i++) s += normals[active[c]! * n + i]! * full[i]!;
          rhs[c] = s;
        }
        if (k > 0 && !solveGram(k)) return false;
        let curvature = 0;
        let plain = 0;
        for (let i = 0; i < n; i++) {
          let s = full[i]!;
          for (let c = 0; c < k; c++) s -= r[c]! * image[c * size + i]!;
          z[i] = s;
          curvature += s * normals[worst * n + i]!;
          plain += full[i]! * normals[worst * n + i]!;
        }
        let t1 = Number.POSITIVE_INFINITY;
        let drop = -1;
        for (let c = 0; c < k; c++) {
          if (r[c]! > 0 && u[c]! / r[c]! < t1) {
            t1 = u[c]! / r[c]!;
            drop = c;
          }
        }
        const moves = k < n && curvature > TINY * plain;
        const t2 = moves ? violation / curvature : Number.POSITIVE_INFINITY;
        const t = Math.min(t1, t2);
        if (t === Number.POSITIVE_INFINITY) return false;
        for (let c = 0; c < k; c++) u[c]! -= t * r[c]!;
        added += t;
        if (moves) for (let i = 0; i < n; i++) p[i]! -= t * z[i]!;
        if (t === t2) {
          active[k] = worst;
          u[k] = added;
          for (let i = 0; i < n; i++) image[k * size + i] = full[i]!;
          for (let c = 0; c <= k; c++) {
            let s = 0;
            for (let i = 0; i < n; i++) s += normals[active[c]! * n + i]! * full[i]!;
            gram[c * size + k] = s;
            gram[k * size + c] = s;
          }
          k++;
          break;
        }
        // A multiplier reached nothing: its constraint lets go.
        for (let c = drop; c + 1 < k; c++) {
          active[c] = active[c + 1]!;
          u[c] = u[c + 1]!;
          for (let i = 0; i < n; i++) image[c * size + i] = image[(c + 1) * size + i]!;
        }
        k--;
        for (let c = 0; c < k; c++)
          for (let e = 0; e < k; e++) {
            let s = 0;
            for (let i = 0; i < n; i++) s += normals[active[c]! * n + i]! * image[e * size + i]!;
            gram[c * size + e] = s;
          }
      }
    }
    for (let c = 0; c < k; c++) multipliers[active[c]!] = Math.max(0, u[c]!);
    return true;
  };

  return { size, most, b, g, normals, limits, p, multipliers, solve };
}
