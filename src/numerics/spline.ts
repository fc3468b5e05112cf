/** A function of one variable with continuous second derivative on 0 .. n*step, odd or even about 0, linear beyond. */
export interface SymmetricSpline {
  readonly step: number;
  readonly values: Float64Array;
  value(x: number): number;
}

/**
 * Cubic spline on a uniform grid from 0, continued below 0 by symmetry with continuous second derivative there:
 * 'odd' (value and curvature vanish at 0) or 'even' (slope vanishes at 0). The far end is free (no curvature) and
 * continues on its tangent.
 * @param values values at 0, step, 2 step, ...; at least three
 */
export function symmetricSpline(
  symmetry: 'odd' | 'even',
  step: number,
  values: readonly number[],
): SymmetricSpline {
  const n = values.length;
  if (n < 3) throw new RangeError('a spline needs three or more values');
  const y = Float64Array.from(values);
  if (symmetry === 'odd') y[0] = 0;
  // Second derivatives m by the tridiagonal system (m[i-1] + 4 m[i] + m[i+1]) = 6 second differences / h^2.
  const m = new Float64Array(n);
  const diag = new Float64Array(n).fill(4);
  const upper = new Float64Array(n).fill(1);
  const rhs = new Float64Array(n);
  for (let i = 1; i < n - 1; i++) rhs[i] = (6 * (y[i + 1]! - 2 * y[i]! + y[i - 1]!)) / (step * step);
  if (symmetry === 'odd') {
    diag[0] = 1;
    upper[0] = 0;
    rhs[0] = 0;
  } else {
    diag[0] = 2;
    upper[0] = 1;
    rhs[0] = (6 * (y[1]! - y[0]!)) / (step * step);
  }
  for (let i = 1; i < n - 1; i++) {
    const f = 1 / diag[i - 1]!;
    diag[i]! -= f * upper[i - 1]!;
    rhs[i]! -= f * rhs[i - 1]!;
  }
  for (let i = n - 2; i >= 0; i--) m[i] = (rhs[i]! - upper[i]! * m[i + 1]!) / diag[i]!;
  const last = n - 1;
  const endSlope = (y[last]! - y[last - 1]!) / step + (step * (2 * m[last]! + m[last - 1]!)) / 6;
  const inverse = 1 / step;
  return {
    step,
    values: y,
    value: (x) => {
      const a = Math.abs(x);
      const sign = symmetry === 'odd' && x < 0 ? -1 : 1;
      const p = a * inverse;
      if (p >= last) return sign * (y[last]! + endSlope * (a - last * step));
      const i = Math.floor(p);
      const t = p - i;
      const u = 1 - t;
      return (
        sign *
        (u * y[i]! +
          t * y[i + 1]! +
          ((step * step) / 6) * ((u * u * u - u) * m[i]! + (t * t * t - t) * m[i + 1]!))
      );
    },
  };
}
