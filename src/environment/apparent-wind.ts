import type { SailingFlow } from './types.js';

/** Apparent wind: speed [m/s] and angle [rad] from the heading, positive from windward. */
export interface ApparentWind {
  readonly speed: number;
  readonly angle: number;
}

/** Apparent wind of an upright boat where the true wind is tws times `factor` (the profile's value at a height). */
export function apparentWind(flow: Readonly<SailingFlow>, factor = 1): ApparentWind {
  const u = flow.tws * factor;
  const ahead = u * Math.cos(flow.twa - flow.leeway) + flow.speed * Math.cos(flow.leeway);
  const windward = u * Math.sin(flow.twa - flow.leeway) - flow.speed * Math.sin(flow.leeway);
  return { speed: Math.hypot(ahead, windward), angle: Math.atan2(windward, ahead) };
}

/**
 * The flow in the plane square to a heeled mast: tan(be) = tan(b) cos(heel),
 * Ve^2 = V^2 (cos^2 b + sin^2 b cos^2 heel). Source: Kerwin 1978.
 */
export function heeledWind(wind: ApparentWind, heel: number): ApparentWind {
  const ahead = wind.speed * Math.cos(wind.angle);
  const windward = wind.speed * Math.sin(wind.angle) * Math.cos(heel);
  return { speed: Math.hypot(ahead, windward), angle: Math.atan2(windward, ahead) };
}
