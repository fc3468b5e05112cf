/**
 * The small quadratic programme of each step of the solver, in two variables p:
 *
 *   minimise 1/2 p'B p - g'p + rho * sum of max(0, a_i'p - b_i)
 *
 * with B symmetric and positive definite. With so few variables the answer is found by listing: the free
 * minimum, the minimum on each line a_i'p = b_i and every crossing of two lines; the one of least merit wins.
 * With a large rho this is the constrained minimum where one exists and the least violation elsewhere.
 */
export interface PlaneQp {
  /** Constraint normals, two numbers each, and right-hand sides. */
  readonly normals: Float64Array;
  readonly limits: Float64Array;
  /** Multiplier (>= 0) of each constraint in the answer. */
  readonly multipliers: Float64Array;
  /** The answer. */
  readonly p: Float64Array;
}

export function createPlaneQp(most: number): PlaneQp {
  return {
    normals: new Float64Array(2 * most),
    limits: new Float64Array(most),
    multipliers: new Float64Array(most),
    p: new Float64Array(2),
  };
}

/** Solves the programme for the first m constraints; returns the sum of violations at the answer. */
export function solvePlaneQp(
  qp: PlaneQp,
  m: number,
  b11: number,
  b12: number,
  b22: number,
  g1: number,
  g2: number,
  rho: number,
): number {
  const { normals, limits, multipliers, p } = qp;
  const det = b11 * b22 - b12 * b12;
  const i11 = b22 / det;
  const i12 = -b12 / det;
  const i22 = b11 / det;
  const f1 = i11 * g1 + i12 * g2;
  const f2 = i12 * g1 + i22 * g2;
  let bestMerit = Number.POSITIVE_INFINITY;
  let bestViolation = 0;
  let first = -1;
  let second = -1;
  const consider = (x: number, y: number, i: number, j: number): void => {
    let violation = 0;
    for (let k = 0; k < m; k++) {
      if (k === i || k === j) continue;
      const v = normals[2 * k]! * x + normals[2 * k + 1]! * y - limits[k]!;
      if (v > 0) violation += v;
    }
    const merit =
      0.5 * (b11 * x * x + 2 * b12 * x * y + b22 * y * y) -
      g1 * x -
      g2 * y +
      rho * Math.max(0, violation - 1e-13);
    if (merit < bestMerit) {
      bestMerit = merit;
      bestViolation = violation;
      first = i;
      second = j;
      p[0] = x;
      p[1] = y;
    }
  };
  consider(f1, f2, -1, -1);
  if (bestViolation > 0) {
    for (let i = 0; i < m; i++) {
      const a1 = normals[2 * i]!;
      const a2 = normals[2 * i + 1]!;
      const u1 = i11 * a1 + i12 * a2;
      const u2 = i12 * a1 + i22 * a2;
      const aa = a1 * u1 + a2 * u2;
      if (!(aa > 1e-300)) continue;
      const step = (a1 * f1 + a2 * f2 - limits[i]!) / aa;
      consider(f1 - step * u1, f2 - step * u2, i, -1);
      for (let j = 0; j < i; j++) {
        const c1 = normals[2 * j]!;
        const c2 = normals[2 * j + 1]!;
        const cross = a1 * c2 - a2 * c1;
        if (Math.abs(cross) < 1e-12 * (Math.abs(a1) + Math.abs(a2)) * (Math.abs(c1) + Math.abs(c2))) continue;
        consider(
          (limits[i]! * c2 - a2 * limits[j]!) / cross,
          (a1 * limits[j]! - limits[i]! * c1) / cross,
          i,
          j,
        );
      }
    }
  }
  multipliers.fill(0, 0, m);
  // Stationarity: g - B p = sum of multipliers * a.
  const r1 = g1 - b11 * p[0]! - b12 * p[1]!;
  const r2 = g2 - b12 * p[0]! - b22 * p[1]!;
  if (first >= 0 && second < 0) {
    const a1 = normals[2 * first]!;
    const a2 = normals[2 * first + 1]!;
    multipliers[first] = Math.max(0, (a1 * r1 + a2 * r2) / (a1 * a1 + a2 * a2));
  } else if (first >= 0) {
    const a1 = normals[2 * first]!;
    const a2 = normals[2 * first + 1]!;
    const c1 = normals[2 * second]!;
    const c2 = normals[2 * second + 1]!;
    const cross = a1 * c2 - a2 * c1;
    multipliers[first] = Math.max(0, (r1 * c2 - r2 * c1) / cross);
    multipliers[second] = Math.max(0, (a1 * r2 - a2 * r1) / cross);
  }
  return bestViolation;
}
