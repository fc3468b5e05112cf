/**
 * Cholesky factorisation A = L L' of a symmetric positive definite matrix, in place in the lower triangle.
 * @param n order
 * @param stride row length of the row-major storage
 * @returns false when a pivot is not positive
 */
export function choleskyFactor(n: number, stride: number, a: Float64Array): boolean {
  for (let i = 0; i < n; i++) {
    const ri = i * stride;
    for (let j = 0; j <= i; j++) {
      const rj = j * stride;
      let s = a[ri + j]!;
      for (let k = 0; k < j; k++) s -= a[ri + k]! * a[rj + k]!;
      if (i === j) {
        if (!(s > 0)) return false;
        a[ri + i] = Math.sqrt(s);
      } else {
        a[ri + j] = s / a[rj + j]!;
      }
    }
  }
  return true;
}

/** Solves L L' x = b with the factor of `choleskyFactor`; b is overwritten by x. */
export function choleskySolve(n: number, stride: number, l: Float64Array, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let s = b[i]!;
    const ri = i * stride;
    for (let k = 0; k < i; k++) s -= l[ri + k]! * b[k]!;
    b[i] = s / l[ri + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    let s = b[i]!;
    for (let k = i + 1; k < n; k++) s -= l[k * stride + i]! * b[k]!;
    b[i] = s / l[i * stride + i]!;
  }
}
