import type { SailingFlow, WindProfile } from '../environment/index.js';
import { AERO, type WindageBody } from './types.js';

/** Apparent wind at a height [m] along the mast, in the plane square to it: u from ahead, v from windward [m/s]. */
export function flowAtInto(
  wind: WindProfile,
  flow: Readonly<SailingFlow>,
  heel: number,
  height: number,
  out: { u: number; v: number },
): void {
  const cosHeel = Math.cos(heel);
  const w = flow.tws * wind.factor(height * cosHeel);
  const a = flow.twa - flow.leeway;
  out.u = w * Math.cos(a) + flow.speed * Math.cos(flow.leeway);
  out.v = (w * Math.sin(a) - flow.speed * Math.sin(flow.leeway)) * cosHeel;
}

const mean = { u: 0, v: 0 };

/** Adds bluff bodies to the windage places of out, and those to its sums. */
export function addWindageInto(
  bodies: readonly WindageBody[],
  wind: WindProfile,
  density: number,
  flow: Readonly<SailingFlow>,
  heel: number,
  out: Float64Array,
): void {
  for (const body of bodies) {
    flowAtInto(wind, flow, heel, body.z, mean);
    const q = 0.5 * density * Math.sqrt(mean.u * mean.u + mean.v * mean.v);
    const x = -q * body.frontal * mean.u;
    const y = q * body.side * mean.v;
    out[AERO.windageDrive]! += x;
    out[AERO.windageSide]! += y;
    out[AERO.windageMoment]! += y * body.z;
    out[AERO.windageSideX]! += y * body.x;
    out[AERO.windageDriveZ]! += x * body.z;
  }
  out[AERO.drive]! += out[AERO.windageDrive]!;
  out[AERO.side]! += out[AERO.windageSide]!;
  out[AERO.heelMoment]! += out[AERO.windageMoment]!;
  out[AERO.sideX]! += out[AERO.windageSideX]!;
  out[AERO.driveZ]! += out[AERO.windageDriveZ]!;
}
