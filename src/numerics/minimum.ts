const GOLDEN = (3 - Math.sqrt(5)) / 2;

/**
 * Minimum of a function on an interval by Brent's method (golden section with parabolic steps; Brent 1973,
 * chapter 5). Finds a local minimum; the whole minimum when f has only one.
 * @param tolerance largest error of the place, in the unit of a and b
 */
export function boundedMinimum(
  f: (x: number) => number,
  a: number,
  b: number,
  tolerance: number,
): { x: number; value: number } {
  let x = a + GOLDEN * (b - a);
  let w = x;
  let v = x;
  let fx = f(x);
  let fw = fx;
  let fv = fx;
  let d = 0;
  let e = 0;
  for (let i = 0; i < 100; i++) {
    const m = 0.5 * (a + b);
    const tol = 1e-9 * Math.abs(x) + tolerance / 3;
    if (Math.abs(x - m) <= 2 * tol - 0.5 * (b - a)) break;
    let golden = true;
    if (Math.abs(e) > tol) {
      const r = (x - w) * (fx - fv);
      let q = (x - v) * (fx - fw);
      let p = (x - v) * q - (x - w) * r;
      q = 2 * (q - r);
      if (q > 0) p = -p;
      else q = -q;
      if (Math.abs(p) < Math.abs(0.5 * q * e) && p > q * (a - x) && p < q * (b - x)) {
        e = d;
        d = p / q;
        const u = x + d;
        if (u - a < 2 * tol || b - u < 2 * tol) d = x < m ? tol : -tol;
        golden = false;
      }
    }
    if (golden) {
      e = (x < m ? b : a) - x;
      d = GOLDEN * e;
    }
    const u = x + (Math.abs(d) >= tol ? d : d > 0 ? tol : -tol);
    const fu = f(u);
    if (fu <= fx) {
      if (u < x) b = x;
      else a = x;
      v = w;
      fv = fw;
      w = x;
      fw = fx;
      x = u;
      fx = fu;
    } else {
      if (u < x) a = u;
      else b = u;
      if (fu <= fw || w === x) {
        v = w;
        fv = fw;
        w = u;
        fw = fu;
      } else if (fu <= fv || v === x || v === w) {
        v = u;
        fv = fu;
      }
    }
  }
  return { x, value: fx };
}
