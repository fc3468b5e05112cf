/** A monotone cubic through given points, with constant continuation beyond the ends. */
export interface Pchip {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly slope: Float64Array;
  value(x: number): number;
  derivative(x: number): number;
}

/**
 * Slopes of the monotone piecewise cubic of Fritsch & Butland 1984 (SIAM J. Sci. Stat. Comput. 5, 300-304): weighted
 * harmonic means, zero at local extrema, one-sided at the ends.
 */
export function pchipSlopes(x: ArrayLike<number>, y: ArrayLike<number>): Float64Array {
  const n = x.length;
  const d = new Float64Array(n);
  if (n === 2) {
    d.fill((y[1]! - y[0]!) / (x[1]! - x[0]!));
    return d;
  }
  const h = (i: number): number => x[i + 1]! - x[i]!;
  const s = (i: number): number => (y[i + 1]! - y[i]!) / h(i);
  for (let i = 1; i < n - 1; i++) {
    const a = s(i - 1);
    const b = s(i);
    if (a * b > 0) {
      const w1 = 2 * h(i) + h(i - 1);
      const w2 = h(i) + 2 * h(i - 1);
      d[i] = (w1 + w2) / (w1 / a + w2 / b);
    }
  }
  const end = (h0: number, h1: number, s0: number, s1: number): number => {
    let v = ((2 * h0 + h1) * s0 - h0 * s1) / (h0 + h1);
    if (v * s0 <= 0) v = 0;
    else if (s0 * s1 <= 0 && Math.abs(v) > 3 * Math.abs(s0)) v = 3 * s0;
    return v;
  };
  d[0] = end(h(0), h(1), s(0), s(1));
  d[n - 1] = end(h(n - 2), h(n - 3), s(n - 2), s(n - 3));
  return d;
}

/**
 * @param x strictly rising abscissas, at least two
 * @throws RangeError when x does not rise or lengths differ
 */
export function pchip(xs: readonly number[], ys: readonly number[]): Pchip {
  if (xs.length !== ys.length || xs.length < 2)
    throw new RangeError('interpolation needs two or more points');
  for (let i = 1; i < xs.length; i++) {
    if (!(xs[i]! > xs[i - 1]!))
      throw new RangeError(`interpolation points must rise: ${xs[i - 1]} then ${xs[i]}`);
  }
  const x = Float64Array.from(xs);
  const y = Float64Array.from(ys);
  const slope = pchipSlopes(x, y);
  const n = x.length;
  const find = (v: number): number => {
    let lo = 0;
    let hi = n - 1;
    while (hi - lo > 1) {
      const mid = (lo + hi) >> 1;
      if (x[mid]! <= v) lo = mid;
      else hi = mid;
    }
    return lo;
  };
  return {
    x,
    y,
    slope,
    value: (v) => {
      if (v <= x[0]!) return y[0]!;
      if (v >= x[n - 1]!) return y[n - 1]!;
      const i = find(v);
      const h = x[i + 1]! - x[i]!;
      return hermite((v - x[i]!) / h, h, y[i]!, y[i + 1]!, slope[i]!, slope[i + 1]!);
    },
    derivative: (v) => {
      if (v < x[0]! || v > x[n - 1]!) return 0;
      const i = find(v);
      const h = x[i + 1]! - x[i]!;
      const t = (v - x[i]!) / h;
      return (
        ((6 * t * t - 6 * t) / h) * (y[i]! - y[i + 1]!) +
        (3 * t * t - 4 * t + 1) * slope[i]! +
        (3 * t * t - 2 * t) * slope[i + 1]!
      );
    },
  };
}

/** Cubic on one cell: t from 0 to 1, cell width h, end values and end slopes. */
export function hermite(t: number, h: number, y0: number, y1: number, d0: number, d1: number): number {
  const t2 = t * t;
  const t3 = t2 * t;
  return (2 * t3 - 3 * t2 + 1) * y0 + (3 * t2 - 2 * t3) * y1 + h * ((t3 - 2 * t2 + t) * d0 + (t3 - t2) * d1);
}
