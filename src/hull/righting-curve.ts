import { floatAt, immerse, prepareLines, resampled, rightingArmOf } from './hydrostatics.js';
import type { HullLoad, Lines } from './types.js';

export interface RightingPoint {
  /** Heel [rad]. */
  readonly heel: number;
  /** Righting arm [m] of the hull about the load's centre. */
  readonly arm: number;
  /** False where no fore-and-aft balance was found and the trim was held level. */
  readonly freeTrim: boolean;
}

/**
 * Righting arm at any heel to 180 deg, by exact clipping, deck closed and watertight, sinkage free and trim free as
 * far as it balances. A geometric curve, no judgement of stability.
 * @param carried volume [m3] the hull carries (the whole displacement less what a fin keel floats of itself)
 */
export function rightingCurve(
  lines: Lines,
  load: HullLoad,
  waterDensity: number,
  heels: readonly number[],
): RightingPoint[] {
  const p = prepareLines(resampled(lines));
  const volume = load.mass / waterDensity;
  let start = { height: 0, trim: 0 };
  return heels.map((heel): RightingPoint => {
    try {
      const { flotation, immersed } = floatAt(p, { volume, x: load.x, z: load.z }, heel, start);
      start = { height: flotation.height, trim: flotation.trim };
      return { heel, arm: rightingArmOf(immersed, heel, load.z), freeTrim: true };
    } catch {
      // Level trim: the volume alone, by bisection on the height of the water.
      let lo = -10 * Math.cbrt(volume);
      let hi = 10 * Math.cbrt(volume);
      for (let i = 0; i < 80; i++) {
        const mid = 0.5 * (lo + hi);
        if (immerse(p, { heel, height: mid, trim: 0 }).volume < volume) lo = mid;
        else hi = mid;
      }
      const immersed = immerse(p, { heel, height: hi, trim: 0 });
      start = { height: hi, trim: 0 };
      return { heel, arm: rightingArmOf(immersed, heel, load.z), freeTrim: false };
    }
  });
}
