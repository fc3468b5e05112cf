import { createSmallQp, luFactor, luSolve, luSolveTransposed } from '../numerics/index.js';
import { type ForceModel, RES, X } from './types.js';

/**
 * The fastest balanced state at one wind speed and angle, by sequential quadratic programming.
 *
 * Unknowns x = (speed, leeway, heel, rudder, depower, arm, hoist); four balances c(x) = 0; heel, depower and how much of
 * a board is down are the free controls p, the other four, s, follow from the balances. Each step linearises c,
 *
 *   ds = -Js^-1 c - Js^-1 Jp dp,
 *
 * so that speed becomes a function of the controls with the gradient (-Js^-1 Jp)[speed], and the limits on arm, rudder
 * and foil loads become planes in the space of the controls. The step is the answer of that small quadratic programme
 * (dual active set, numerics/small-qp.ts) with a damped BFGS matrix, in a trust region, judged by the exact penalty
 * -speed + 2 |adjoint . c| + penalty * violation (Nocedal & Wright, Numerical Optimization, 2006, chapter 18). Where the
 * limits leave no room, one more variable lets all of them give way together at a price.
 */

export interface Attempt {
  readonly converged: boolean;
  /** False when the state balances but the search for a faster one ended without proof. */
  readonly optimal: boolean;
  /** True when surge falls with speed at the state: an equilibrium the boat can stay in. */
  readonly stable: boolean;
  readonly x: Float64Array;
  /** Largest scaled residual. */
  readonly residual: number;
  /** Largest violation of a limit. */
  readonly violation: number;
  readonly evaluations: number;
  readonly iterations: number;
  /** d speed / d twa along the optimum (envelope theorem), m/s per rad. */
  readonly speedSlope: number;
  /** Curvature of speed over the controls at the end, by rows: a good start for a neighbour. */
  readonly curvature: Float64Array;
}

export interface RunOptions {
  /** Lower than usual where a start is a guess among many. */
  readonly mostIterations?: number | undefined;
  /** Curvature of a neighbouring solution. */
  readonly curvature?: Float64Array | undefined;
  /**
   * Once steps are small, finish on the derivatives at hand: the speed is right to about one part in a million, the
   * slope to one in a thousand. For states that only fill a grid.
   */
  readonly quick?: boolean | undefined;
}

export interface Optimiser {
  readonly model: ForceModel;
  run(tws: number, twa: number, start: Float64Array, options?: RunOptions): Attempt;
}

const BASIC = [X.speed, X.leeway, X.rudder, X.arm] as const;
const CONTROLS = [X.heel, X.depower, X.hoist] as const;
/** First guess of the curvature of speed over each control, as a share of speed; longest step; and its small size. */
const CURVATURE = [3, 1, 0.3] as const;
const LONGEST = [0.25, 0.5, 0.4] as const;
const SMALL_STEP = 3e-3;
/** Most curvature a run may build up, and take over from a neighbour, over the first guess. */
const MOST_CURVATURE = 50;
const MOST_INHERITED = 5;
/** Ties are broken towards full power, upright and the board down by this share of speed: far below any shown digit. */
const TIE = 1e-6;
const RESIDUAL_TOLERANCE = 1e-10;
const MAX_ITERATIONS = 40;
/** Gain in speed, as a share, below which a corner of the model may end the search. */
const CORNER_GAIN = 2e-5;

export function finiteDifferenceJacobian(
  model: ForceModel,
  tws: number,
  twa: number,
  x: Float64Array,
  base: Float64Array,
  baseSide: Float64Array,
  jacobian: Float64Array,
  side: Float64Array,
  work: { x: Float64Array; c: Float64Array; g: Float64Array },
): number {
  work.x.set(x);
  for (let j = 0; j < X.count; j++) {
    const size = j === X.speed ? Math.max(Math.abs(x[j]!), 0.02 * model.speedScale) : 1;
    let h = 1e-6 * size;
    if ((j === X.depower || j === X.hoist) && x[j]! + h >= 1) h = -h;
    work.x[j] = x[j]! + h;
    model.residualInto(tws, twa, work.x, work.c);
    for (let i = 0; i < RES.count; i++) jacobian[i * X.count + j] = (work.c[i]! - base[i]!) / h;
    if (model.sideConditions > 0) {
      model.sideConditionsInto(work.g);
      for (let i = 0; i < model.sideConditions; i++) side[i * X.count + j] = (work.g[i]! - baseSide[i]!) / h;
    }
    work.x[j] = x[j]!;
  }
  return X.count;
}

export function createOptimiser(model: ForceModel): Optimiser {
  const { lower, upper } = model.bounds;
  const nSide = model.sideConditions;
  const hoists = upper[X.hoist]! > lower[X.hoist]!;
  const nc = hoists ? 3 : 2;
  const nReal = 2 * nc + 4 + nSide;
  const nCons = nReal + 2 * nc + 1;
  const qp = createSmallQp(nc + 1, nCons);
  const c = new Float64Array(RES.count);
  const cNew = new Float64Array(RES.count);
  const g = new Float64Array(Math.max(1, nSide));
  const gNew = new Float64Array(Math.max(1, nSide));
  const jac = new Float64Array(RES.count * X.count);
  const jacSide = new Float64Array(Math.max(1, nSide) * X.count);
  const lu = new Float64Array(16);
  const pivots = new Int32Array(4);
  const ds0 = new Float64Array(4);
  const tangents = CONTROLS.map(() => new Float64Array(4)); // d s / d control
  const adjoint = new Float64Array(4);
  const xNew = new Float64Array(X.count);
  const gradient = new Float64Array(3);
  const gradientOld = new Float64Array(3);
  const step = new Float64Array(3);
  const dp = new Float64Array(3);
  const ds = new Float64Array(4);
  const y = new Float64Array(3);
  const bs = new Float64Array(3);
  const curvature = new Float64Array(9);
  // Limits of the linearised problem, nc numbers a normal.
  const normals = new Float64Array(nc * nCons);
  const limits = new Float64Array(nCons);
  const oldNormals = new Float64Array(nc * nCons);
  const multipliers = new Float64Array(nCons);
  const oldMultipliers = new Float64Array(nCons);
  const col = new Float64Array(4);
  const work = {
    x: new Float64Array(X.count),
    c: new Float64Array(RES.count),
    g: new Float64Array(Math.max(1, nSide)),
  };

  const violationAt = (x: Float64Array, side: Float64Array): number => {
    let v = 0;
    for (let j = 0; j < X.count; j++) {
      const scale = j === X.arm ? armScale() : j === X.speed ? model.speedScale : 1;
      v += Math.max(0, x[j]! - upper[j]!, lower[j]! - x[j]!) / scale;
    }
    for (let i = 0; i < nSide; i++) v += Math.max(0, side[i]!);
    return v;
  };
  /** The exact penalty by which steps are judged. */
  const merit = (xv: Float64Array, cv: Float64Array, viol: number, tie: number, rho: number): number => {
    let e = 0;
    for (let i = 0; i < 4; i++) e += Math.abs(adjoint[i]! * cv[i]!);
    const up = xv[X.hoist]! - upper[X.hoist]!;
    return (
      -xv[X.speed]! +
      tie * (xv[X.heel]! * xv[X.heel]! + xv[X.depower]! * xv[X.depower]! + up * up) +
      2 * e +
      0.5 * rho * viol
    );
  };
  /** Length of the crew's reach; a held arm still needs a scale. */
  const armScale = (): number => Math.max(1e-3, upper[X.arm]! - lower[X.arm]!);

  /**
   * Keeps the curvature within so many times its first guess. At a kink BFGS sees a wall in a corner; a matrix that grew
   * without bound would stop the search anywhere, and call it the end.
   */
  const capCurvature = (most: number): void => {
    for (let i = 0; i < nc; i++) {
      const top = most * CURVATURE[i]!;
      const own = curvature[4 * i]!;
      if (own <= top) continue;
      const f = Math.sqrt(top / own);
      for (let j = 0; j < nc; j++) {
        curvature[3 * i + j]! *= f;
        curvature[3 * j + i]! *= f;
      }
    }
  };

  /** The small programme for the first m limits, the first `soft` of which may give way when there is no room. */
  const solveStep = (m: number, soft: number, rho: number): void => {
    for (let i = 0; i < nc; i++) {
      qp.g[i] = gradient[i]!;
      for (let j = 0; j < nc; j++) qp.b[i * nc + j] = curvature[3 * i + j]!;
    }
    qp.normals.set(normals.subarray(0, nc * m));
    qp.limits.set(limits.subarray(0, m));
    if (qp.solve(nc, m)) {
      for (let i = 0; i < nc; i++) dp[i] = qp.p[i]!;
      multipliers.set(qp.multipliers.subarray(0, m));
      return;
    }
    const n = nc + 1;
    qp.b.fill(0);
    for (let i = 0; i < nc; i++) {
      qp.g[i] = gradient[i]!;
      for (let j = 0; j < nc; j++) qp.b[i * n + j] = curvature[3 * i + j]!;
    }
    qp.b[n * n - 1] = 1e-3 * rho;
    qp.g[nc] = -rho;
    for (let k = 0; k < m; k++) {
      for (let i = 0; i < nc; i++) qp.normals[k * n + i] = normals[k * nc + i]!;
      qp.normals[k * n + nc] = k < soft ? -1 : 0;
      qp.limits[k] = limits[k]!;
    }
    for (let i = 0; i < n; i++) qp.normals[m * n + i] = i === nc ? -1 : 0;
    qp.limits[m] = 0;
    if (!qp.solve(n, m + 1)) qp.p.fill(0);
    for (let i = 0; i < nc; i++) dp[i] = qp.p[i]!;
    multipliers.set(qp.multipliers.subarray(0, m));
  };

  const run = (tws: number, twa: number, start: Float64Array, options: RunOptions = {}): Attempt => {
    const mostIterations = options.mostIterations ?? MAX_ITERATIONS;
    model.prepare?.(tws, twa);
    const x = new Float64Array(X.count);
    for (let j = 0; j < X.count; j++) {
      x[j] = j === X.arm ? start[j]! : Math.min(upper[j]!, Math.max(lower[j]!, start[j]!));
    }
    const vMin = 1e-4 * model.speedScale;
    if (x[X.speed]! < vMin) x[X.speed] = vMin;
    let evaluations = 1;
    model.residualInto(tws, twa, x, c);
    if (nSide > 0) model.sideConditionsInto(g);
    let radius = 1;
    curvature.fill(0);
    if (options.curvature === undefined) {
      for (let i = 0; i < nc; i++) curvature[4 * i] = CURVATURE[i]! * x[X.speed]!;
    } else {
      curvature.set(options.curvature);
      capCurvature(MOST_INHERITED * x[X.speed]!);
    }
    let haveOld = false;
    let iterations = 0;
    let converged = false;
    let stable = false;
    let speedSlope = 0;
    let needJacobian = true;
    let chords = 0;
    const reach = armScale();

    /** Newton on the balances alone, controls held, with the factors at hand; true when they are met. */
    const polish = (): boolean => {
      for (let k = 0; k < 12; k++) {
        const worst = Math.max(Math.abs(c[0]!), Math.abs(c[1]!), Math.abs(c[2]!), Math.abs(c[3]!));
        if (worst < RESIDUAL_TOLERANCE) return true;
        for (let i = 0; i < 4; i++) col[i] = -c[i]!;
        luSolve(4, lu, pivots, col);
        for (let i = 0; i < 4; i++) x[BASIC[i]!]! += col[i]!;
        if (!(x[X.speed]! > vMin)) return false;
        model.residualInto(tws, twa, x, c);
        if (nSide > 0) model.sideConditionsInto(g);
        evaluations++;
      }
      return false;
    };

    for (; iterations < mostIterations; iterations++) {
      const tie = TIE * x[X.speed]!;
      if (needJacobian) {
        evaluations += model.jacobianInto
          ? model.jacobianInto(tws, twa, x, jac, jacSide)
          : finiteDifferenceJacobian(model, tws, twa, x, c, g, jac, jacSide, work);
        for (let i = 0; i < 4; i++) for (let j = 0; j < 4; j++) lu[i * 4 + j] = jac[i * X.count + BASIC[j]!]!;
        if (!luFactor(4, lu, pivots)) break;
        for (let k = 0; k < nc; k++) {
          const t = tangents[k]!;
          for (let i = 0; i < 4; i++) t[i] = -jac[i * X.count + CONTROLS[k]!]!;
          luSolve(4, lu, pivots, t);
        }
        for (let i = 0; i < 4; i++) adjoint[i] = i === 0 ? 1 : 0;
        luSolveTransposed(4, lu, pivots, adjoint); // d speed = -adjoint . dc
        stable = adjoint[RES.surge]! < 0;
        for (let k = 0; k < nc; k++) {
          const from = k === 2 ? x[X.hoist]! - upper[X.hoist]! : x[CONTROLS[k]!]!;
          gradient[k] = tangents[k]![0]! - 2 * tie * from;
        }
        chords = 0;
      }
      for (let i = 0; i < 4; i++) ds0[i] = -c[i]!;
      luSolve(4, lu, pivots, ds0);
      const speed = x[X.speed]!;

      // Limits as half spaces of control steps: first the real ones, then the trust region.
      let m = 0;
      for (let k = 0; k < nc; k++) {
        const j = CONTROLS[k]!;
        for (const sign of SIGNS) {
          for (let i = 0; i < nc; i++) normals[m * nc + i] = i === k ? sign : 0;
          limits[m++] = sign > 0 ? upper[j]! - x[j]! : x[j]! - lower[j]!;
        }
      }
      for (let k = 2; k < 4; k++) {
        // Rudder (2) and arm (3) follow from the balances.
        const j = BASIC[k]!;
        const scale = j === X.arm ? reach : 1;
        for (const sign of SIGNS) {
          for (let i = 0; i < nc; i++) normals[m * nc + i] = (sign * tangents[i]![k]!) / scale;
          limits[m++] = (sign > 0 ? upper[j]! - x[j]! - ds0[k]! : x[j]! + ds0[k]! - lower[j]!) / scale;
        }
      }
      for (let k = 0; k < nSide; k++) {
        let g0 = g[k]!;
        for (let i = 0; i < nc; i++) normals[m * nc + i] = jacSide[k * X.count + CONTROLS[i]!]!;
        for (let q = 0; q < 4; q++) {
          const d = jacSide[k * X.count + BASIC[q]!]!;
          g0 += d * ds0[q]!;
          for (let i = 0; i < nc; i++) normals[m * nc + i]! += d * tangents[i]![q]!;
        }
        limits[m++] = -g0;
      }
      const real = m;
      for (let k = 0; k < nc; k++) {
        for (const sign of SIGNS) {
          for (let i = 0; i < nc; i++) normals[m * nc + i] = i === k ? sign : 0;
          limits[m++] = LONGEST[k]! * radius;
        }
      }

      if (haveOld && needJacobian) {
        // Damped BFGS on the Lagrangian's gradient.
        let sbs = 0;
        let sy = 0;
        for (let i = 0; i < nc; i++) {
          let l = gradient[i]! - gradientOld[i]!;
          for (let k = 0; k < real; k++) {
            const mu = oldMultipliers[k]!;
            if (mu !== 0) l -= mu * (normals[k * nc + i]! - oldNormals[k * nc + i]!);
          }
          y[i] = -l;
          let s = 0;
          for (let j = 0; j < nc; j++) s += curvature[3 * i + j]! * step[j]!;
          bs[i] = s;
          sbs += step[i]! * s;
          sy += step[i]! * y[i]!;
        }
        if (sbs > 1e-18 * speed) {
          if (sy < 0.2 * sbs) {
            const theta = (0.8 * sbs) / (sbs - sy);
            for (let i = 0; i < nc; i++) y[i] = theta * y[i]! + (1 - theta) * bs[i]!;
            sy = 0.2 * sbs;
          }
          for (let i = 0; i < nc; i++)
            for (let j = 0; j < nc; j++)
              curvature[3 * i + j]! += (y[i]! * y[j]!) / sy - (bs[i]! * bs[j]!) / sbs;
        }
        capCurvature(MOST_CURVATURE * speed);
        const floor = 1e-5 * speed;
        for (let i = 0; i < nc; i++) if (!(curvature[4 * i]! > floor)) curvature[4 * i] = floor;
        for (let i = 0; i < nc; i++)
          for (let j = 0; j < i; j++) {
            // A matrix that is hardly positive definite any more loses its coupling.
            const most = 0.999 * Math.sqrt(curvature[4 * i]! * curvature[4 * j]!);
            const v = Math.min(most, Math.max(-most, curvature[3 * i + j]!));
            curvature[3 * i + j] = v;
            curvature[3 * j + i] = v;
          }
      }
      const rho = 100 * speed;
      solveStep(m, real, rho);
      for (let i = 0; i < 4; i++) {
        let s = ds0[i]!;
        for (let k = 0; k < nc; k++) s += tangents[k]![i]! * dp[k]!;
        ds[i] = s;
      }
      let gain = 0;
      for (let k = 0; k < nc; k++) gain += gradient[k]! * dp[k]!;

      const cMax = Math.max(Math.abs(c[0]!), Math.abs(c[1]!), Math.abs(c[2]!), Math.abs(c[3]!));
      const violation = violationAt(x, g);
      if (
        cMax < RESIDUAL_TOLERANCE &&
        violation < 1e-9 &&
        Math.abs(gain) < 1e-8 * speed &&
        Math.abs(ds[0]!) < 1e-8 * speed
      ) {
        converged = true;
      }
      if (converged) break;

      // Keep the step inside what the linearisation can mean.
      let alpha = 1;
      const speedCap = 0.4 * speed;
      if (Math.abs(ds[0]!) > speedCap) alpha = Math.min(alpha, speedCap / Math.abs(ds[0]!));
      if (Math.abs(ds[1]!) > 0.15) alpha = Math.min(alpha, 0.15 / Math.abs(ds[1]!));
      if (Math.abs(ds[2]!) > 0.4) alpha = Math.min(alpha, 0.4 / Math.abs(ds[2]!));

      const m0 = merit(x, c, violation, tie, rho);
      let accepted = false;
      for (let trial = 0; trial < 3; trial++) {
        xNew.set(x);
        for (let i = 0; i < 4; i++) xNew[BASIC[i]!]! += alpha * ds[i]!;
        if (xNew[X.speed]! < vMin) xNew[X.speed] = vMin;
        for (let k = 0; k < nc; k++) {
          const j = CONTROLS[k]!;
          xNew[j] = Math.min(upper[j]!, Math.max(lower[j]!, x[j]! + alpha * dp[k]!));
        }
        model.residualInto(tws, twa, xNew, cNew);
        if (nSide > 0) model.sideConditionsInto(gNew);
        evaluations++;
        let m1 = merit(xNew, cNew, violationAt(xNew, gNew), tie, rho);
        // Where curvature of the balances spoils a good step, bring the state back onto them with the same factors.
        for (let fix = 0; fix < 2 && m1 >= m0 && alpha > 0.05; fix++) {
          for (let i = 0; i < 4; i++) col[i] = -cNew[i]!;
          luSolve(4, lu, pivots, col);
          if (!(Math.abs(col[0]!) < 0.3 * speed)) break;
          for (let i = 0; i < 4; i++) xNew[BASIC[i]!]! += col[i]!;
          if (xNew[X.speed]! < vMin) xNew[X.speed] = vMin;
          model.residualInto(tws, twa, xNew, cNew);
          if (nSide > 0) model.sideConditionsInto(gNew);
          evaluations++;
          m1 = merit(xNew, cNew, violationAt(xNew, gNew), tie, rho);
        }
        const small = Math.abs(alpha * ds[0]!) < 1e-6 * speed && Math.abs(gain) < 1e-7 * speed;
        if (
          m1 < m0 + 1e-12 * speed ||
          small ||
          (violation < 1e-12 && m1 < m0 + 1e-7 * speed && cMax < 1e-6)
        ) {
          accepted = true;
          break;
        }
        alpha *= 0.3;
      }
      if (!accepted && cMax > 1e-6) accepted = Number.isFinite(cNew[0]!); // keep moving; the region shrinks
      radius = accepted && alpha > 0.5 ? Math.min(1, radius * 2) : Math.max(1e-4, radius * 0.35);
      if (accepted) {
        let largest = Math.abs(ds[0]! / speed);
        for (let k = 0; k < nc; k++) {
          step[k] = xNew[CONTROLS[k]!]! - x[CONTROLS[k]!]!;
          largest = Math.max(largest, Math.abs(step[k]!));
        }
        x.set(xNew);
        c.set(cNew);
        g.set(gNew);
        if (options.quick && alpha === 1 && largest < SMALL_STEP && chords < 3) {
          // On a short step the derivatives hold: the gradient moves by the curvature alone.
          for (let i = 0; i < nc; i++)
            for (let j = 0; j < nc; j++) gradient[i]! -= curvature[3 * i + j]! * step[j]!;
          chords++;
          needJacobian = false;
          haveOld = false;
        } else {
          gradientOld.set(gradient);
          oldNormals.set(normals);
          oldMultipliers.set(multipliers);
          for (let k = real; k < nCons; k++) oldMultipliers[k] = 0;
          haveOld = true;
          needJacobian = true;
        }
      } else if (chords > 0) {
        // A finish on old derivatives that fails gets new ones.
        needJacobian = true;
        haveOld = false;
      } else {
        needJacobian = false;
        if (radius <= 1e-4) {
          // A corner of the model (a section reaching its limit) can leave a gradient that promises what no step
          // keeps. If what it promises is nothing that shows, the state is brought exactly onto its balances and kept.
          if (Math.abs(gain) < CORNER_GAIN * speed && violation < 1e-7) converged = polish();
          break;
        }
      }
      if (iterations === mostIterations - 1 && Math.abs(gain) < CORNER_GAIN * speed && violation < 1e-7) {
        converged = polish();
      }
    }

    const optimal = converged;
    if (!converged && stable && violationAt(x, g) < 1e-7) {
      const worst = Math.max(Math.abs(c[0]!), Math.abs(c[1]!), Math.abs(c[2]!), Math.abs(c[3]!));
      if (worst < 1e-3) converged = polish() && violationAt(x, g) < 1e-7;
    }

    // d V* / d twa from the multipliers: dV = -adjoint . dc/dtwa, less what the active limits take.
    if (converged) {
      const h = 1e-6;
      model.residualInto(tws, twa + h, x, cNew);
      if (nSide > 0) model.sideConditionsInto(gNew);
      evaluations++;
      for (let i = 0; i < 4; i++) col[i] = -(cNew[i]! - c[i]!) / h;
      luSolve(4, lu, pivots, col);
      speedSlope = col[0]!;
      const at = 2 * nc;
      speedSlope -= (multipliers[at]! - multipliers[at + 1]!) * col[2]!;
      speedSlope -= ((multipliers[at + 2]! - multipliers[at + 3]!) * col[3]!) / reach;
      for (let k = 0; k < nSide; k++) {
        const mu = multipliers[at + 4 + k]!;
        if (mu === 0) continue;
        let dg = (gNew[k]! - g[k]!) / h;
        for (let i = 0; i < 4; i++) dg += jacSide[k * X.count + BASIC[i]!]! * col[i]!;
        speedSlope -= mu * dg;
      }
      if (x[X.arm]! > upper[X.arm]!) x[X.arm] = upper[X.arm]!;
      if (x[X.arm]! < lower[X.arm]!) x[X.arm] = lower[X.arm]!;
    }
    const residual = Math.max(Math.abs(c[0]!), Math.abs(c[1]!), Math.abs(c[2]!), Math.abs(c[3]!));
    return {
      converged,
      optimal,
      stable,
      x,
      residual,
      violation: violationAt(x, g),
      evaluations,
      iterations,
      speedSlope,
      curvature: curvature.slice(),
    };
  };

  return { model, run };
}

const SIGNS = [1, -1] as const;
