/**
 * LU factorisation with partial pivoting of a small dense matrix, in place.
 * @param n order
 * @param a row-major n x n, overwritten by L and U
 * @param pivots length n, filled
 * @returns false when a pivot is exactly zero or not finite (a singular matrix)
 */
export function luFactor(n: number, a: Float64Array, pivots: Int32Array): boolean {
  for (let k = 0; k < n; k++) {
    let p = k;
    let best = Math.abs(a[k * n + k]!);
    for (let i = k + 1; i < n; i++) {
      const v = Math.abs(a[i * n + k]!);
      if (v > best) {
        best = v;
        p = i;
      }
    }
    pivots[k] = p;
    if (!(best > 0) || best === Number.POSITIVE_INFINITY) return false;
    if (p !== k) {
      for (let j = 0; j < n; j++) {
        const t = a[k * n + j]!;
        a[k * n + j] = a[p * n + j]!;
        a[p * n + j] = t;
      }
    }
    const inverse = 1 / a[k * n + k]!;
    for (let i = k + 1; i < n; i++) {
      const f = a[i * n + k]! * inverse;
      a[i * n + k] = f;
      if (f !== 0) for (let j = k + 1; j < n; j++) a[i * n + j]! -= f * a[k * n + j]!;
    }
  }
  return true;
}

/** Solves A x = b with the factors of `luFactor`; b is overwritten by x. */
export function luSolve(n: number, lu: Float64Array, pivots: Int32Array, b: Float64Array): void {
  for (let k = 0; k < n; k++) {
    const p = pivots[k]!;
    if (p !== k) {
      const t = b[k]!;
      b[k] = b[p]!;
      b[p] = t;
    }
  }
  for (let i = 1; i < n; i++) {
    let s = b[i]!;
    for (let j = 0; j < i; j++) s -= lu[i * n + j]! * b[j]!;
    b[i] = s;
  }
  for (let i = n - 1; i >= 0; i--) {
    let s = b[i]!;
    for (let j = i + 1; j < n; j++) s -= lu[i * n + j]! * b[j]!;
    b[i] = s / lu[i * n + i]!;
  }
}

/** Solves A' x = b with the factors of `luFactor`; b is overwritten by x. */
export function luSolveTransposed(n: number, lu: Float64Array, pivots: Int32Array, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let s = b[i]!;
    for (let j = 0; j < i; j++) s -= lu[j * n + i]! * b[j]!;
    b[i] = s / lu[i * n + i]!;
  }
  for (let i = n - 2; i >= 0; i--) {
    let s = b[i]!;
    for (let j = i + 1; j < n; j++) s -= lu[j * n + i]! * b[j]!;
    b[i] = s;
  }
  for (let k = n - 1; k >= 0; k--) {
    const p = pivots[k]!;
    if (p !== k) {
      const t = b[k]!;
      b[k] = b[p]!;
      b[p] = t;
    }
  }
}
