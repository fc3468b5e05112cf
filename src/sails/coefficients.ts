import { AERO, type SailSet } from './types.js';

/** Coefficients of a sail set on its area at one apparent wind angle, boat upright and still, full power. */
export interface SailCoefficients {
  /** Apparent wind angle [rad] at the centre of area. */
  readonly awa: number;
  /** Across and along the apparent wind, sails alone and with everything that stands in the wind. */
  readonly lift: number;
  readonly drag: number;
  readonly dragWithWindage: number;
  readonly drive: number;
  readonly side: number;
  /** Centre of effort of the sails [m]: height of the side force, or of the drive where there is hardly any. */
  readonly height: number;
  readonly x: number;
}

/** Wind [m/s] in which coefficients are taken: they do not depend on it. */
const WIND = 6;

/**
 * Coefficients over apparent wind angle, referred to the dynamic pressure at the height of the centre of area.
 * @param price on heeling moment [1/m]; 0 is full power
 */
export function sailCoefficients(set: SailSet, awa: readonly number[], price = 0): SailCoefficients[] {
  const out = new Float64Array(AERO.count);
  const v = WIND * set.spec.wind.factor(set.centre[1]);
  const q = 0.5 * set.spec.airDensity * v * v * set.area;
  return awa.map((angle) => {
    set.evaluateInto({ tws: WIND, twa: angle, speed: 0, leeway: 0 }, 0, price, out);
    const drive = (out[AERO.drive]! - out[AERO.windageDrive]!) / q;
    const side = (out[AERO.side]! - out[AERO.windageSide]!) / q;
    const [sin, cos] = [Math.sin(angle), Math.cos(angle)];
    const [bodyDrive, bodySide] = [out[AERO.windageDrive]! / q, out[AERO.windageSide]! / q];
    const sides = Math.abs(side) > 0.3 * Math.abs(drive);
    return {
      awa: angle,
      lift: drive * sin + side * cos,
      drag: -drive * cos + side * sin,
      dragWithWindage: -(drive + bodyDrive) * cos + (side + bodySide) * sin,
      drive,
      side,
      height: sides
        ? (out[AERO.heelMoment]! - out[AERO.windageMoment]!) / (side * q)
        : (out[AERO.driveZ]! - out[AERO.windageDriveZ]!) / (drive * q),
      x: Math.abs(side) > 1e-6 ? (out[AERO.sideX]! - out[AERO.windageSideX]!) / (side * q) : set.centre[0],
    };
  });
}

/** The price on heeling moment [1/m] at which a share of the full moment is kept, by bisection. */
export function priceFor(
  set: SailSet,
  flow: Parameters<SailSet['evaluateInto']>[0],
  heel: number,
  kept: number,
): number {
  if (!(kept < 1)) return 0;
  const out = new Float64Array(AERO.count);
  const full = set.fullMoment(flow, heel);
  const share = (price: number): number => {
    set.evaluateInto(flow, heel, price, out);
    return (out[AERO.heelMoment]! - out[AERO.windageMoment]!) / full;
  };
  let lo = 0;
  let hi = 1 / Math.max(0.1, set.centre[1]);
  for (let i = 0; i < 40 && share(hi) > kept; i++) hi *= 2;
  for (let i = 0; i < 50; i++) {
    const mid = 0.5 * (lo + hi);
    if (share(mid) > kept) lo = mid;
    else hi = mid;
  }
  return 0.5 * (lo + hi);
}
