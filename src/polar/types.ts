import type { SailingResult } from '../equilibrium/index.js';

/** A polar: for every wind speed the whole angle grid and the two best-VMG states. SI and rad. */
export interface Polar {
  readonly boatName: string;
  readonly tws: readonly number[];
  readonly twa: readonly number[];
  /** Height [m] at which tws is quoted. */
  readonly windHeight: number;
  /** results[i][j] at tws[i], twa[j]: the fastest sail set there. */
  readonly results: readonly (readonly SailingResult[])[];
  /** Best VMG to windward and to leeward for each wind speed, true optima found on the solver. */
  readonly bestUp: readonly SailingResult[];
  readonly bestDown: readonly SailingResult[];
  /** Fastest angle of each wind speed. */
  readonly fastest: readonly SailingResult[];
  /** Every sail set's own speed [m/s] at [i][j]; NaN where it does not balance. */
  readonly sets: readonly { readonly name: string; readonly speed: readonly (readonly number[])[] }[];
  readonly evaluations: number;
}

export interface PolarRequest {
  /** True wind speeds [m/s] and angles [rad]. */
  readonly tws: readonly number[];
  readonly twa: readonly number[];
}
