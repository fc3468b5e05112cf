import { rightingCurve } from '../hull/index.js';
import type { Boat } from './types.js';

/** Righting arms of a boat at one heel [rad], in m of the whole displacement. */
export interface RightingArms {
  readonly heel: number;
  /** Crew inboard on the centreline. */
  readonly inboard: number;
  /** Crew at their outboard reach, kept there. */
  readonly out: number;
  /** False where the hull finds no fore-and-aft balance and its trim was held level. */
  readonly freeTrim: boolean;
}

/**
 * Righting arms to any heel, by exact clipping of the hull closed and watertight to its sheer: geometry, and no
 * judgement of stability.
 */
export function rightingArms(boat: Boat, heels: readonly number[]): RightingArms[] {
  const { spec, hull, lines, mass } = boat;
  const share = hull.canoe.mass / mass;
  const crew = (spec.crew.mass * spec.crew.armOut) / mass;
  return rightingCurve(lines, hull.canoe, spec.water.density, heels).map((p) => ({
    heel: p.heel,
    inboard: share * p.arm,
    out: share * p.arm + crew * Math.cos(p.heel),
    freeTrim: p.freeTrim,
  }));
}
