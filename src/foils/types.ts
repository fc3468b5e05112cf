import type { Fluid } from '../environment/index.js';

export type FoilKind = 'keel' | 'centreboard' | 'rudder';

/** Two blades side by side, each leaning outwards. */
export interface TwinFoils {
  /** Distance [m] of each root from the centreline. */
  readonly offset: number;
  /** Lean [rad] of each blade, its tip outwards. */
  readonly cant: number;
  /** Both blades are down, or the leeward one only. */
  readonly lowered: 'both' | 'leeward';
}

/** A body of revolution at the tip. Lengths m. */
export interface Bulb {
  readonly length: number;
  readonly diameter: number;
}

/** A foil under (or behind) the hull. Lengths m, angles rad. Axes as in the hull room. */
export interface FoilSpec {
  readonly kind: FoilKind;
  /** Span of the exposed part, from root to tip. */
  readonly span: number;
  /** Chords at even steps from root to tip, straight between them; two or more. */
  readonly chords: readonly number[];
  /** Sweep of the quarter-chord line, aft positive. */
  readonly sweep: number;
  /** Angle by which the blade is swung aft about its root: a kicked-up rudder or pivoting board. Left out: 0. */
  readonly swung?: number | undefined;
  /** Thickness / chord. */
  readonly thickness: number;
  /** x of the root's quarter chord and z of the root (negative below the waterline). */
  readonly x: number;
  readonly z: number;
  /** True for a foil whose root cuts the surface (a transom-hung rudder): no end plate, ventilates. */
  readonly surfacePiercing: boolean;
  /** Largest lift coefficient before the foil stalls (or ventilates). */
  readonly clMax: number;
  /** Left out: one blade on the centreline. */
  readonly twin?: TwinFoils | undefined;
  readonly bulb?: Bulb | undefined;
}

export interface FoilSystemSpec {
  readonly keel: FoilSpec;
  readonly rudder: FoilSpec;
  readonly canoeDraft: number;
  /**
   * Apparent volume [m3] of the hull moving sideways: the integral of pi/2 T(x)^2 along it. Sets the turning moment of
   * a hull that makes leeway; 0 leaves it out.
   */
  readonly sidewaysVolume: number;
  readonly water: Fluid;
}

/**
 * Places in the output of `evaluateInto`. Forces N, moments N m.
 * `lift` is normal to the boat's centre plane (leeward-to-windward positive); its horizontal part is lift cos(heel).
 */
export const FOIL = {
  /** Sum of hull, keel and rudder lift normal to the centre plane, positive to windward. */
  lift: 0,
  /** Heeling moment of that lift about the origin: lift times depth, positive to leeward. */
  heelMoment: 1,
  /** Yaw moment about the origin, positive turning the bow to windward. */
  yawMoment: 2,
  keelInduced: 3,
  keelProfile: 4,
  rudderInduced: 5,
  rudderProfile: 6,
  keelLift: 7,
  rudderLift: 8,
  /** |cl| / clMax of keel and rudder, of the worse blade: above 1 the state is no solution. */
  keelStall: 9,
  rudderStall: 10,
  /** The rudder's share of heelMoment and yawMoment (already inside the sums). */
  rudderHeelMoment: 11,
  rudderYawMoment: 12,
  count: 13,
} as const;

/** Keel (with the hull's share of side force) and rudder, prepared; allocates nothing per call. */
export interface FoilSystem {
  readonly spec: FoilSystemSpec;
  readonly keelSlope: number;
  readonly rudderSlope: number;
  readonly keelAspect: number;
  readonly rudderAspect: number;
  /** Area [m2] of all blades down. */
  readonly keelArea: number;
  readonly rudderArea: number;
  /**
   * speed m/s, leeway rad (positive: course to leeward of heading), rudder rad (positive: tiller pulled to
   * windward, bow turns to leeward, rudder lifts to windward), heel rad, hoist 0 to 1 lowered. Returns the total
   * drag along the course [N] (sum of the four drag parts). With blades on the centreline drag is even and lift odd
   * under a change of sign of (leeway, rudder). Smooth in every argument.
   */
  evaluateInto(
    speed: number,
    leeway: number,
    rudder: number,
    heel: number,
    hoist: number,
    out: Float64Array,
  ): number;
}
