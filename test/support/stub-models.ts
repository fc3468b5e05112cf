import type { ForceModel } from '../../src/equilibrium/index.js';
import { RES, X } from '../../src/equilibrium/index.js';

function bounds() {
  const lower = new Float64Array(X.count);
  const upper = new Float64Array(X.count);
  const set = (j: number, a: number, b: number) => {
    lower[j] = a;
    upper[j] = b;
  };
  set(X.speed, 0, 1000);
  set(X.leeway, -1, 1);
  set(X.heel, -0.1, 0.5);
  set(X.rudder, -0.5, 0.5);
  set(X.depower, 0, 0.99);
  set(X.arm, -1, 1);
  return { lower, upper };
}

/**
 * A boat whose air and water forces keep fixed angles to the flow: drag angles ea and eh with ea + eh = b.
 * Exact: V / V_T = sin(twa - b) / sin(b). Heel costs a little speed so that upright is best.
 */
export function fixedDragAngles(ea: number, eh: number): ForceModel {
  return {
    bounds: bounds(),
    speedScale: 5,
    sideConditions: 0,
    sideConditionNames: [],
    sideConditionsInto: () => {},
    residualInto(tws, twa, x, out) {
      const v = x[X.speed]!;
      // Apparent wind in course axes: from ahead and from windward.
      const ax = tws * Math.cos(twa) + v;
      const ay = tws * Math.sin(twa);
      const q = Math.hypot(ax, ay);
      // Air: drag along the apparent wind, lift square to it, driving forward; depowering scales both.
      const r = 0.02 * (1 - x[X.depower]!) * q;
      const l = r * Math.cos(ea);
      const d = r * Math.sin(ea);
      const fx = l * ay - d * ax;
      const fy = l * ax + d * ay;
      // Water: side force from leeway, drag at a fixed ratio to it.
      const side = 0.5 * v * v * x[X.leeway]!;
      out[RES.surge] = fx - Math.tan(eh) * side - 0.001 * x[X.heel]! ** 2 * v * v;
      out[RES.sway] = fy - side;
      out[RES.roll] = -x[X.arm]! + 0.1 * x[X.heel]!;
      out[RES.yaw] = -x[X.rudder]!;
    },
  };
}

/** Drag alone on a dead run: V / V_T = k / (1 + k), k = sqrt(rho_a CD A / (rho_w CT S)). */
export function dragOnly(rhoA: number, cdA: number, rhoW: number, ctS: number): ForceModel {
  return {
    bounds: bounds(),
    speedScale: 5,
    sideConditions: 0,
    sideConditionNames: [],
    sideConditionsInto: () => {},
    residualInto(tws, twa, x, out) {
      const v = x[X.speed]!;
      const ax = tws * Math.cos(twa) + v;
      const ay = tws * Math.sin(twa);
      const q = Math.hypot(ax, ay);
      const power = 1 - x[X.depower]!;
      const weight = 1000;
      out[RES.surge] =
        (-0.5 * rhoA * cdA * power * q * ax - 0.5 * rhoW * ctS * v * v * (1 + x[X.heel]! ** 2)) / weight;
      out[RES.sway] = (0.5 * rhoA * cdA * power * q * ay - 0.5 * rhoW * v * v * x[X.leeway]!) / weight;
      out[RES.roll] = -x[X.arm]! + 0.1 * x[X.heel]!;
      out[RES.yaw] = -x[X.rudder]!;
    },
  };
}
