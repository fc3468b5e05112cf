import { luFactor, luSolve } from '../numerics/index.js';

/** A straight-tapered half wing from root to tip: lengths in one unit, sweep [rad] of the quarter chord, aft positive. */
export interface Planform {
  readonly span: number;
  /** Chord at the share s (0 root, 1 tip) of the span. */
  readonly chordAt: (s: number) => number;
  readonly sweep: number;
  /** True: the root stands on a plane that acts as a mirror. False: both tips are free. */
  readonly mirrored: boolean;
}

export interface LiftSlope {
  /** d CL / d alpha [1/rad] on the planform's own area. */
  readonly slope: number;
  /** CL^2 / (pi A CDi) with A = 2 span^2/area mirrored, span^2/area free: the span efficiency of induced drag. */
  readonly efficiency: number;
  readonly area: number;
  readonly aspect: number;
  /** Centre of lift as a share of the span from the root. */
  readonly centre: number;
}

/**
 * Lift slope and induced drag of a swept tapered foil by Weissinger's method: one row of horseshoe vortices on the
 * quarter-chord line, no flow through the plate at three quarters of the chord. Cosine edges and mid-angle control
 * points (Weissinger 1947; Katz & Plotkin, Low-Speed Aerodynamics, 2001, section 12.1). Induced drag in the Trefftz
 * plane from the same circulation.
 * @param panels vortices on one foil, root to tip
 */
export function weissinger(planform: Planform, panels = 24): LiftSlope {
  const { span, chordAt, sweep, mirrored } = planform;
  const m = panels;
  const tan = Math.tan(sweep);
  const y0 = new Float64Array(m + 1);
  const yc = new Float64Array(m);
  for (let i = 0; i <= m; i++) {
    const t = i / m;
    y0[i] = mirrored ? span * Math.sin(0.5 * Math.PI * t) : 0.5 * span * (1 - Math.cos(Math.PI * t));
    if (i < m) {
      const tc = (i + 0.5) / m;
      yc[i] = mirrored ? span * Math.sin(0.5 * Math.PI * tc) : 0.5 * span * (1 - Math.cos(Math.PI * tc));
    }
  }
  // A free foil has its sweep measured from its own root at y = 0, so nothing else changes.
  const lead = (y: number): number => Math.abs(y) * tan;

  /** Downwash at (x, y) of a unit horseshoe whose bound part runs from (xa, ya) to (xb, yb), legs to +infinity. */
  const horseshoe = (x: number, y: number, xa: number, ya: number, xb: number, yb: number): number => {
    const dxa = x - xa;
    const dya = y - ya;
    const dxb = x - xb;
    const dyb = y - yb;
    const ra = Math.hypot(dxa, dya);
    const rb = Math.hypot(dxb, dyb);
    let w = 0;
    const cross = dxa * dyb - dya * dxb;
    if (Math.abs(cross) > 1e-14 * ra * rb) {
      const ex = xb - xa;
      const ey = yb - ya;
      w += ((ex * dxa + ey * dya) / ra - (ex * dxb + ey * dyb) / rb) / cross;
    }
    w += (1 + dxa / ra) / -dya;
    w -= (1 + dxb / rb) / -dyb;
    return w / (4 * Math.PI);
  };

  const a = new Float64Array(m * m);
  const rhs = new Float64Array(m).fill(1);
  for (let i = 0; i < m; i++) {
    const x = lead(yc[i]!) + 0.5 * chordAt(yc[i]! / span);
    for (let j = 0; j < m; j++) {
      const [ya, yb] = [y0[j]!, y0[j + 1]!];
      let w = horseshoe(x, yc[i]!, lead(ya), ya, lead(yb), yb);
      if (mirrored) w += horseshoe(x, yc[i]!, lead(yb), -yb, lead(ya), -ya);
      a[i * m + j] = w;
    }
  }
  // Sign: make the downwash of a positive circulation positive.
  if (a[0]! < 0) for (let k = 0; k < m * m; k++) a[k] = -a[k]!;
  const pivots = new Int32Array(m);
  if (!luFactor(m, a, pivots)) throw new RangeError('the foil has no usable planform');
  luSolve(m, a, pivots, rhs);

  let lift = 0;
  let moment = 0;
  let area = 0;
  for (let j = 0; j < m; j++) {
    const dy = y0[j + 1]! - y0[j]!;
    lift += rhs[j]! * dy;
    moment += rhs[j]! * dy * 0.5 * (y0[j]! + y0[j + 1]!);
    // Simpson on the chord: exact for straight and elliptic enough for curved ones at these widths.
    const [s0, s1] = [y0[j]! / span, y0[j + 1]! / span];
    area += (dy * (chordAt(s0) + 4 * chordAt(0.5 * (s0 + s1)) + chordAt(s1))) / 6;
  }
  let drag = 0;
  for (let i = 0; i < m; i++) {
    let w = 0;
    for (let j = 0; j < m; j++) {
      const leg = (y: number): number => 1 / (2 * Math.PI * (yc[i]! - y));
      w += rhs[j]! * (leg(y0[j]!) - leg(y0[j + 1]!));
      if (mirrored) w += rhs[j]! * (leg(-y0[j + 1]!) - leg(-y0[j]!));
    }
    drag += -rhs[i]! * w * (y0[i + 1]! - y0[i]!);
  }
  // Per half wing: L = rho V sum(G dy), Di = 1/2 rho sum(G w dy), alpha = 1, V = 1.
  const slope = (2 * lift) / area;
  const aspect = ((mirrored ? 2 : 1) * span * span) / area;
  const cdi = Math.abs(drag) / area;
  return {
    slope,
    efficiency: (slope * slope) / (Math.PI * aspect * cdi),
    area,
    aspect,
    centre: moment / (lift * span),
  };
}
