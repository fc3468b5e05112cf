import type { Fluid } from '../environment/index.js';

/**
 * Body axes of every room: origin amidships of the design waterline, on the centreline, at the design
 * waterline. x forward, z up. Lengths in m. Leeward is positive for side forces, heel and crew-to-leeward
 * moments; windward is positive for the crew's arm.
 */

/** One half section: points from the keel up to the sheer, y the half-breadth. */
export interface Station {
  readonly x: number;
  readonly y: readonly number[];
  readonly z: readonly number[];
}

export interface Lines {
  readonly stations: readonly Station[];
}

/** Main dimensions from which a round-bilge hull is generated. Fractions are of Lwl or plain ratios. */
export interface MainDimensions {
  readonly lwl: number;
  readonly bwl: number;
  /** Canoe-body draft Tc [m]. */
  readonly canoeDraft: number;
  readonly cp: number;
  readonly cm: number;
  readonly cwp: number;
  /** Centre of buoyancy abaft amidships, as a fraction of Lwl (0.035 = 3.5 % aft). */
  readonly lcbAft: number;
  readonly freeboard: number;
  readonly beamMax: number;
}

/** What is put into the hull: total mass [kg] and its centre with the crew sitting inboard on the centreline. */
export interface HullLoad {
  readonly mass: number;
  readonly x: number;
  readonly z: number;
}

export type ResiduaryMethod = 'delft-1998' | 'delft-2008';

export interface KeelVolume {
  /** Volume [m3] of the ballasted fin; leave the whole object out for a centreboard. */
  readonly volume: number;
  /** Depth [m] of the fin's centre of volume below the design waterline, and total draft [m]. */
  readonly centreDepth: number;
  readonly draft: number;
  /** x of that centre; left out: under the load's centre. */
  readonly x?: number | undefined;
}

export interface HullOptions {
  readonly water: Fluid;
  readonly gravity: number;
  readonly residuary: ResiduaryMethod;
  readonly keel?: KeelVolume | undefined;
  /** Add the planing blend (Savitsky); false for hulls that never plane. */
  readonly planing: boolean;
  /** Fore-and-aft reach [m] of the centre of gravity by moving the crew, x of the aft-most and foremost position. */
  readonly centreReach?: readonly [number, number] | undefined;
  /** Height of sand grains ks [m] on the hull; 0 or left out is smooth. */
  readonly roughness?: number | undefined;
  /** A measured upright resistance curve in place of the regressions. Speeds m/s rising, forces N. */
  readonly measured?: { readonly speed: readonly number[]; readonly force: readonly number[] } | undefined;
}

/** Form parameters of the hull floating upright at its load. */
export interface HullForm {
  readonly lwl: number;
  readonly bwl: number;
  readonly canoeDraft: number;
  readonly volume: number;
  readonly waterplane: number;
  readonly wetted: number;
  readonly cp: number;
  readonly cm: number;
  readonly cwp: number;
  /** Distance [m] of the centre of buoyancy and of flotation abaft the forward end of the waterline. */
  readonly lcbFromForward: number;
  readonly lcfFromForward: number;
  readonly kb: number;
  readonly bm: number;
  readonly gm: number;
  readonly trim: number;
  /** Immersed area [m2] of the after end, and its breadth at the water. */
  readonly transom: number;
  readonly transomBreadth: number;
  /** Integral of pi/2 T(x)^2 along the hull [m3]: the water that moves with it when it goes sideways. */
  readonly sidewaysVolume: number;
}

/** A value outside the range of a published regression. */
export interface RangeWarning {
  readonly method: string;
  readonly parameter: string;
  readonly value: number;
  readonly range: readonly [number, number];
  readonly treatment: string;
}

/** Places of the parts in the output of `resistanceInto`, all in N. */
export const HULL = {
  friction: 0,
  residuary: 1,
  heel: 2,
  keelResiduary: 3,
  keelHeel: 4,
  planing: 5,
  transom: 6,
  count: 7,
} as const;

/** A hull prepared for many evaluations: it keeps tables, and allocates nothing per call. */
export interface Hull {
  readonly form: HullForm;
  /** What the canoe body floats: the load less what a ballasted fin floats of itself, and the centre that leaves. */
  readonly canoe: HullLoad;
  readonly warnings: readonly RangeWarning[];
  /** Largest heel [rad] the tables cover; beyond it the righting arm goes on from the last slope and is flagged by the caller. */
  readonly heelMax: number;
  /** Righting arm GZ [m] about the load's centre, at heel [rad]; odd in heel, smooth (C2). */
  rightingArm(heel: number): number;
  /** Wetted area [m2] of the canoe body at heel, even in heel. */
  wetted(heel: number): number;
  /**
   * Resistance parts [N] (see HULL) at speed [m/s] >= 0 and heel [rad]; returns the sum. Continuous in value
   * and slope. Friction acts on the heeled wetted area; `planing` is what the planing blend and the running
   * maximum add to (or take from) the displacement resistance, so that the parts add up to the total.
   */
  resistanceInto(speed: number, heel: number, out: Float64Array): number;
}
