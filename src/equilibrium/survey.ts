import { luFactor, luSolve } from '../numerics/index.js';
import { finiteDifferenceJacobian } from './optimise.js';
import { type ForceModel, RES, X } from './types.js';

/**
 * A look at the whole range of speeds with nothing known beforehand. At fixed heel and depower the boat is
 * towed through a ladder of speeds; at each rung leeway, rudder and crew arm are balanced and the surplus of
 * drive over resistance is noted. Where the surplus falls through zero there is a stable equilibrium.
 */
export interface SurveyPoint {
  /** Start vector for the optimiser. */
  readonly x: Float64Array;
  /** How far crew, rudder and foils are beyond their limits there; 0 when all hold. */
  readonly armExcess: number;
  readonly rudderExcess: number;
  readonly foilExcess: number;
}

export interface Survey {
  readonly points: readonly SurveyPoint[];
  /** True when somewhere in the survey drive exceeded resistance. */
  readonly anyDrive: boolean;
  readonly evaluations: number;
}

const RUNGS = 16;
const LOWEST = 0.01;
const HIGHEST = 2.6;

export type SurveyOf = (tws: number, twa: number, thorough: boolean, eased?: boolean) => Survey;

/** @returns a look that, where asked, keeps to sails that are far eased: heeling moment only falls with easing */
export function createSurvey(model: ForceModel): SurveyOf {
  const nSide = model.sideConditions;
  const { lower, upper } = model.bounds;
  const c = new Float64Array(RES.count);
  const g = new Float64Array(Math.max(1, nSide));
  const jac = new Float64Array(RES.count * X.count);
  const jacSide = new Float64Array(Math.max(1, nSide) * X.count);
  const lu = new Float64Array(9);
  const pivots = new Int32Array(3);
  const rhs = new Float64Array(3);
  const work = {
    x: new Float64Array(X.count),
    c: new Float64Array(RES.count),
    g: new Float64Array(Math.max(1, nSide)),
  };
  const INNER = [X.leeway, X.rudder, X.arm] as const;
  const ROWS = [RES.sway, RES.yaw, RES.roll] as const;
  let evaluations = 0;
  let factored = false;

  /** Balances sway, yaw and roll at fixed speed, heel and depower; x is updated; NaN when it fails. */
  const surplus = (tws: number, twa: number, x: Float64Array): number => {
    for (let it = 0; it < 6; it++) {
      model.residualInto(tws, twa, x, c);
      if (nSide > 0) model.sideConditionsInto(g);
      evaluations++;
      const worst = Math.max(Math.abs(c[RES.sway]!), Math.abs(c[RES.roll]!), Math.abs(c[RES.yaw]!));
      // Far too fast: resistance exceeds drive by more than any balancing of the rest could mend.
      if (c[RES.surge]! < -0.02 && worst < 0.5 * -c[RES.surge]!) return c[RES.surge]!;
      if (worst < 1e-6 + 0.01 * Math.abs(c[RES.surge]!) && it > 0) return c[RES.surge]!;
      // The matrix changes little from rung to rung: kept from the last one, renewed where it serves no longer.
      if (!factored || it === 2 || it === 4) {
        evaluations += model.jacobianInto
          ? model.jacobianInto(tws, twa, x, jac, jacSide)
          : finiteDifferenceJacobian(model, tws, twa, x, c, g, jac, jacSide, work);
        for (let i = 0; i < 3; i++) {
          for (let j = 0; j < 3; j++) lu[i * 3 + j] = jac[ROWS[i]! * X.count + INNER[j]!]!;
        }
        factored = luFactor(3, lu, pivots);
        if (!factored) return Number.NaN;
      }
      for (let i = 0; i < 3; i++) rhs[i] = -c[ROWS[i]!]!;
      luSolve(3, lu, pivots, rhs);
      let scale = 1;
      if (Math.abs(rhs[0]!) > 0.2) scale = 0.2 / Math.abs(rhs[0]!);
      x[X.leeway] = Math.max(-0.6, Math.min(0.8, x[X.leeway]! + scale * rhs[0]!));
      x[X.rudder] = Math.max(-1, Math.min(1, x[X.rudder]! + scale * rhs[1]!));
      x[X.arm]! += scale * rhs[2]!;
    }
    model.residualInto(tws, twa, x, c);
    if (nSide > 0) model.sideConditionsInto(g);
    evaluations++;
    // Side force, roll or helm that cannot be balanced at this speed: the surplus would mean nothing.
    const left = Math.max(Math.abs(c[RES.sway]!), Math.abs(c[RES.roll]!), Math.abs(c[RES.yaw]!));
    return left < 1e-4 + 0.05 * Math.abs(c[RES.surge]!) ? c[RES.surge]! : Number.NaN;
  };

  return (tws, twa, thorough, eased = false) => {
    evaluations = 0;
    model.prepare?.(tws, twa);
    const points: SurveyPoint[] = [];
    let anyDrive = false;
    const heelTop = upper[X.heel]!;
    const heels = thorough
      ? [0.02, 0.15, 0.3].filter((h) => h < heelTop).concat(heelTop)
      : [0.03, 0.2, 0.38].filter((h) => h <= heelTop);
    if (heels.length === 0) heels.push(heelTop);
    const depowers = (
      thorough ? (eased ? [0.8, 0.93, 0.99] : [0, 0.3, 0.6, 0.8, 0.93, 0.99]) : [0, 0.4, 0.75]
    ).filter((t) => t <= upper[X.depower]!);
    const rungs = thorough ? 11 : RUNGS;
    const x = new Float64Array(X.count);
    const previous = new Float64Array(X.count);
    const armScale = upper[X.arm]! - lower[X.arm]!;
    for (const heel of heels) {
      for (const depower of depowers) {
        x.fill(0);
        factored = false;
        x[X.heel] = Math.max(lower[X.heel]!, heel);
        x[X.depower] = depower;
        x[X.hoist] = upper[X.hoist]!;
        let before = Number.NaN;
        let failures = 0;
        // From fast to slow: the fastest stable equilibrium is met first, and leeway grows as speed falls.
        for (let k = rungs; k >= 0; k--) {
          previous.set(x);
          x[X.speed] = Math.min(
            upper[X.speed]!,
            model.speedScale * LOWEST * (HIGHEST / LOWEST) ** (k / rungs),
          );
          const s = surplus(tws, twa, x);
          if (!Number.isFinite(s)) {
            // Slower still, the foils would have to lift even more from less: two failures at a walk end the ladder.
            failures++;
            if (failures >= 2 && x[X.speed]! < 0.3 * model.speedScale) break;
            factored = false;
            before = Number.NaN;
            x[X.leeway] = 0;
            x[X.rudder] = 0;
            x[X.arm] = 0;
            continue;
          }
          failures = 0;
          if (s > 0) anyDrive = true;
          if (s > 0 && before <= 0) {
            const w = s / (s - before);
            const start = new Float64Array(X.count);
            for (let j = 0; j < X.count; j++) start[j] = x[j]! + w * (previous[j]! - x[j]!);
            let foil = 0;
            for (let i = 0; i < nSide; i++) foil = Math.max(foil, g[i]!);
            points.push({
              x: start,
              armExcess: Math.max(0, start[X.arm]! - upper[X.arm]!, lower[X.arm]! - start[X.arm]!) / armScale,
              rudderExcess: Math.max(0, Math.abs(start[X.rudder]!) - upper[X.rudder]!),
              foilExcess: foil,
            });
          }
          before = s;
        }
      }
    }
    return { points, anyDrive, evaluations };
  };
}
