import { luFactor, luSolve, luSolveTransposed } from '../numerics/index.js';
import { createPlaneQp, solvePlaneQp } from './plane-qp.js';
import { type ForceModel, RES, X } from './types.js';

/**
 * The fastest balanced state at one wind speed and angle, by sequential quadratic programming.
 *
 * Unknowns x = (speed, leeway, heel, rudder, depower, arm, hoist); four balances c(x) = 0; heel and depower are the
 * free controls p, four others, s, follow from the balances. How much of a board is down, where that can be chosen,
 * moves beside them by Newton steps of its own on the reduced gradient. Each step linearises c,
 *
 *   ds = -Js^-1 c - Js^-1 Jp dp,
 *
 * so that speed becomes a function of the two controls with the gradient (-Js^-1 Jp)[speed], and the limits on
 * arm, rudder and foil loads become lines in the plane of the controls. The step is the answer of that small
 * quadratic programme (plane-qp.ts) with a damped BFGS matrix, in a trust region, judged by the exact penalty
 * -speed + 2 |adjoint . c| + penalty * violation (Nocedal & Wright, Numerical Optimization, 2006, chapter 18).
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
}

export interface Optimiser {
  readonly model: ForceModel;
  /** @param mostIterations lower than usual where a start is a guess among many */
  run(tws: number, twa: number, start: Float64Array, mostIterations?: number): Attempt;
}

const BASIC = [X.speed, X.leeway, X.rudder, X.arm] as const;
/** Ties are broken towards full power and upright by this share of speed: far below any shown digit. */
const TIE = 1e-6;
const RESIDUAL_TOLERANCE = 1e-10;
const MAX_ITERATIONS = 40;
/** First guess of the curvature of speed over the share of a board that is down, as a share of speed. */
const HOIST_CURVATURE = 0.3;
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
  const nCons = 8 + 4 + nSide;
  const qp = createPlaneQp(nCons);
  const c = new Float64Array(RES.count);
  const cNew = new Float64Array(RES.count);
  const g = new Float64Array(Math.max(1, nSide));
  const gNew = new Float64Array(Math.max(1, nSide));
  const jac = new Float64Array(RES.count * X.count);
  const jacSide = new Float64Array(Math.max(1, nSide) * X.count);
  const lu = new Float64Array(16);
  const pivots = new Int32Array(4);
  const ds0 = new Float64Array(4);
  const ds1 = new Float64Array(4); // with the board's step
  const th = new Float64Array(4); // d s / d heel
  const td = new Float64Array(4); // d s / d depower
  const tb = new Float64Array(4); // d s / d hoist
  const hoists = upper[X.hoist]! > lower[X.hoist]!;
  const adjoint = new Float64Array(4);
  const xNew = new Float64Array(X.count);
  const oldNormals = new Float64Array(2 * nCons);
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
      const scale = j === X.arm ? upper[X.arm]! - lower[X.arm]! : j === X.speed ? model.speedScale : 1;
      v += Math.max(0, x[j]! - upper[j]!, lower[j]! - x[j]!) / scale;
    }
    for (let i = 0; i < nSide; i++) v += Math.max(0, side[i]!);
    return v;
  };

  const run = (tws: number, twa: number, start: Float64Array, mostIterations = MAX_ITERATIONS): Attempt => {
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
    let b11 = 3 * x[X.speed]!;
    let b12 = 0;
    let b22 = x[X.speed]!;
    let gradOld1 = 0;
    let gradOld2 = 0;
    let haveOld = false;
    let stepHeel = 0;
    let stepDepower = 0;
    let iterations = 0;
    let converged = false;
    let stable = false;
    let speedSlope = 0;
    let needJacobian = true;
    // The board: curvature of speed over hoist, last step, and the gradient before it.
    let b33 = HOIST_CURVATURE * x[X.speed]!;
    let dHoist = 0;
    let stepHoist = 0;
    let gradHoist = 0;
    let gradHoistOld = 0;
    const armScale = upper[X.arm]! - lower[X.arm]!;

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
      if (needJacobian) {
        evaluations += model.jacobianInto
          ? model.jacobianInto(tws, twa, x, jac, jacSide)
          : finiteDifferenceJacobian(model, tws, twa, x, c, g, jac, jacSide, work);
        for (let i = 0; i < 4; i++) for (let j = 0; j < 4; j++) lu[i * 4 + j] = jac[i * X.count + BASIC[j]!]!;
        if (!luFactor(4, lu, pivots)) break;
        for (let i = 0; i < 4; i++) {
          ds0[i] = -c[i]!;
          th[i] = -jac[i * X.count + X.heel]!;
          td[i] = -jac[i * X.count + X.depower]!;
          tb[i] = hoists ? -jac[i * X.count + X.hoist]! : 0;
          adjoint[i] = i === 0 ? 1 : 0;
        }
        luSolve(4, lu, pivots, ds0);
        luSolve(4, lu, pivots, th);
        luSolve(4, lu, pivots, td);
        if (hoists) luSolve(4, lu, pivots, tb);
        luSolveTransposed(4, lu, pivots, adjoint); // d speed = -adjoint . dc
        stable = adjoint[RES.surge]! < 0;
      }
      const speed = x[X.speed]!;
      const tie = TIE * speed;
      const grad1 = th[0]! - 2 * tie * x[X.heel]!;
      const grad2 = td[0]! - 2 * tie * x[X.depower]!;

      let gainHoist = 0;
      if (hoists) {
        // What lowering the board gains, less what it costs at the limits that hold.
        const mu = oldMultipliers;
        let grad = tb[0]! + 2 * tie * (upper[X.hoist]! - x[X.hoist]!);
        if (haveOld) {
          grad -= ((mu[4]! - mu[5]!) * tb[3]!) / armScale + (mu[6]! - mu[7]!) * tb[2]!;
          for (let k = 0; k < nSide; k++) {
            if (mu[8 + k] === 0) continue;
            let d = jacSide[k * X.count + X.hoist]!;
            for (let i = 0; i < 4; i++) d += jacSide[k * X.count + BASIC[i]!]! * tb[i]!;
            grad -= mu[8 + k]! * d;
          }
        }
        if (needJacobian && Math.abs(stepHoist) > 1e-5) {
          const curvature = (gradHoistOld - grad) / stepHoist;
          b33 = Math.min(
            20 * speed,
            Math.max(0.5 * b33, curvature > 0 ? Math.min(curvature, 4 * b33) : 0, 0.02 * speed),
          );
        }
        const most = 0.25 * radius;
        dHoist = Math.min(most, Math.max(-most, grad / b33));
        dHoist = Math.min(upper[X.hoist]! - x[X.hoist]!, Math.max(lower[X.hoist]! - x[X.hoist]!, dHoist));
        gainHoist = grad * dHoist;
        gradHoist = grad;
      }

      // Lines in the plane of (heel, depower) steps.
      const { normals, limits } = qp;
      let m = 0;
      const line = (a1: number, a2: number, b: number): void => {
        normals[2 * m] = a1;
        normals[2 * m + 1] = a2;
        limits[m] = b;
        m++;
      };
      line(1, 0, upper[X.heel]! - x[X.heel]!);
      line(-1, 0, x[X.heel]! - lower[X.heel]!);
      line(0, 1, upper[X.depower]! - x[X.depower]!);
      line(0, -1, x[X.depower]! - lower[X.depower]!);
      for (let i = 0; i < 4; i++) ds1[i] = ds0[i]! + tb[i]! * dHoist;
      line(th[3]! / armScale, td[3]! / armScale, (upper[X.arm]! - x[X.arm]! - ds1[3]!) / armScale);
      line(-th[3]! / armScale, -td[3]! / armScale, (x[X.arm]! + ds1[3]! - lower[X.arm]!) / armScale);
      line(th[2]!, td[2]!, upper[X.rudder]! - x[X.rudder]! - ds1[2]!);
      line(-th[2]!, -td[2]!, x[X.rudder]! + ds1[2]! - lower[X.rudder]!);
      for (let k = 0; k < nSide; k++) {
        let g0 = g[k]! + jacSide[k * X.count + X.hoist]! * dHoist;
        let a1 = jacSide[k * X.count + X.heel]!;
        let a2 = jacSide[k * X.count + X.depower]!;
        for (let i = 0; i < 4; i++) {
          const d = jacSide[k * X.count + BASIC[i]!]!;
          g0 += d * ds1[i]!;
          a1 += d * th[i]!;
          a2 += d * td[i]!;
        }
        line(a1, a2, -g0);
      }
      const real = m;
      line(1, 0, 0.25 * radius);
      line(-1, 0, 0.25 * radius);
      line(0, 1, 0.5 * radius);
      line(0, -1, 0.5 * radius);

      if (haveOld && needJacobian) {
        // Damped BFGS on the Lagrangian's gradient.
        let l1 = grad1 - gradOld1;
        let l2 = grad2 - gradOld2;
        for (let k = 0; k < real; k++) {
          const mu = oldMultipliers[k]!;
          if (mu === 0) continue;
          l1 -= mu * (normals[2 * k]! - oldNormals[2 * k]!);
          l2 -= mu * (normals[2 * k + 1]! - oldNormals[2 * k + 1]!);
        }
        let y1 = -l1;
        let y2 = -l2;
        const bs1 = b11 * stepHeel + b12 * stepDepower;
        const bs2 = b12 * stepHeel + b22 * stepDepower;
        const sbs = stepHeel * bs1 + stepDepower * bs2;
        if (sbs > 1e-18 * speed) {
          let sy = stepHeel * y1 + stepDepower * y2;
          if (sy < 0.2 * sbs) {
            const theta = (0.8 * sbs) / (sbs - sy);
            y1 = theta * y1 + (1 - theta) * bs1;
            y2 = theta * y2 + (1 - theta) * bs2;
            sy = 0.2 * sbs;
          }
          b11 += (y1 * y1) / sy - (bs1 * bs1) / sbs;
          b12 += (y1 * y2) / sy - (bs1 * bs2) / sbs;
          b22 += (y2 * y2) / sy - (bs2 * bs2) / sbs;
        }
        const floor = 1e-5 * speed;
        if (b11 < floor) b11 = floor;
        if (b22 < floor) b22 = floor;
        if (b11 * b22 - b12 * b12 < 1e-8 * b11 * b22) b12 = 0;
      }
      const rho = 100 * speed;
      solvePlaneQp(qp, m, b11, b12, b22, grad1, grad2, rho);
      const dHeel = qp.p[0]!;
      const dDepower = qp.p[1]!;
      const dSpeed = ds1[0]! + th[0]! * dHeel + td[0]! * dDepower;
      const dLeeway = ds1[1]! + th[1]! * dHeel + td[1]! * dDepower;
      const dRudder = ds1[2]! + th[2]! * dHeel + td[2]! * dDepower;
      const dArm = ds1[3]! + th[3]! * dHeel + td[3]! * dDepower;

      const cMax = Math.max(Math.abs(c[0]!), Math.abs(c[1]!), Math.abs(c[2]!), Math.abs(c[3]!));
      const gain = Math.abs(grad1 * dHeel + grad2 * dDepower) + Math.abs(gainHoist);
      const violation = violationAt(x, g);
      if (
        cMax < RESIDUAL_TOLERANCE &&
        violation < 1e-9 &&
        Math.abs(gain) < 1e-8 * speed &&
        Math.abs(dSpeed) < 1e-8 * speed
      ) {
        converged = true;
      }
      if (converged) break;

      // Keep the step inside what the linearisation can mean.
      let alpha = 1;
      const speedCap = 0.4 * speed;
      if (Math.abs(dSpeed) > speedCap) alpha = Math.min(alpha, speedCap / Math.abs(dSpeed));
      if (Math.abs(dLeeway) > 0.15) alpha = Math.min(alpha, 0.15 / Math.abs(dLeeway));
      if (Math.abs(dRudder) > 0.4) alpha = Math.min(alpha, 0.4 / Math.abs(dRudder));

      const merit = (xv: Float64Array, cv: Float64Array, viol: number): number => {
        let e = 0;
        for (let i = 0; i < 4; i++) e += Math.abs(adjoint[i]! * cv[i]!);
        return (
          -xv[X.speed]! +
          tie * (xv[X.heel]! * xv[X.heel]! + xv[X.depower]! * xv[X.depower]!) +
          2 * e +
          0.5 * rho * viol
        );
      };
      const m0 = merit(x, c, violation);
      let accepted = false;
      for (let trial = 0; trial < 3; trial++) {
        xNew[X.heel] = x[X.heel]! + alpha * dHeel;
        xNew[X.depower] = x[X.depower]! + alpha * dDepower;
        xNew[X.speed] = Math.max(vMin, x[X.speed]! + alpha * dSpeed);
        xNew[X.leeway] = x[X.leeway]! + alpha * dLeeway;
        xNew[X.rudder] = x[X.rudder]! + alpha * dRudder;
        xNew[X.arm] = x[X.arm]! + alpha * dArm;
        xNew[X.hoist] = x[X.hoist]! + alpha * dHoist;
        xNew[X.depower] = Math.min(upper[X.depower]!, Math.max(lower[X.depower]!, xNew[X.depower]!));
        xNew[X.heel] = Math.min(upper[X.heel]!, Math.max(lower[X.heel]!, xNew[X.heel]!));
        model.residualInto(tws, twa, xNew, cNew);
        if (nSide > 0) model.sideConditionsInto(gNew);
        evaluations++;
        let m1 = merit(xNew, cNew, violationAt(xNew, gNew));
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
          m1 = merit(xNew, cNew, violationAt(xNew, gNew));
        }
        const small = Math.abs(alpha * dSpeed) < 1e-6 * speed && Math.abs(gain) < 1e-7 * speed;
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
        stepHeel = xNew[X.heel]! - x[X.heel]!;
        stepDepower = xNew[X.depower]! - x[X.depower]!;
        stepHoist = xNew[X.hoist]! - x[X.hoist]!;
        gradHoistOld = gradHoist;
        gradOld1 = grad1;
        gradOld2 = grad2;
        oldNormals.set(normals);
        oldMultipliers.set(qp.multipliers);
        for (let k = real; k < nCons; k++) oldMultipliers[k] = 0;
        haveOld = true;
        x.set(xNew);
        c.set(cNew);
        g.set(gNew);
        needJacobian = true;
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
      const mu = qp.multipliers;
      speedSlope -= (mu[4]! * col[3]!) / armScale;
      speedSlope += (mu[5]! * col[3]!) / armScale;
      speedSlope -= mu[6]! * col[2]!;
      speedSlope += mu[7]! * col[2]!;
      for (let k = 0; k < nSide; k++) {
        if (mu[8 + k] === 0) continue;
        let dg = (gNew[k]! - g[k]!) / h;
        for (let i = 0; i < 4; i++) dg += jacSide[k * X.count + BASIC[i]!]! * col[i]!;
        speedSlope -= mu[8 + k]! * dg;
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
    };
  };

  return { model, run };
}
