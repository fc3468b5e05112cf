import type { SailingFlow, WindProfile } from '../environment/index.js';

/** A mizzen is a second mainsail; spinnaker: symmetric, on a pole; gennaker: asymmetric; reacher: flat, on a tight luff. */
export type SailKind = 'mainsail' | 'mizzen' | 'jib' | 'spinnaker' | 'gennaker' | 'reacher';

/** Section behaviour of a sail. Every number has a source or says "judgement" in the defaults table. */
export interface SectionLimits {
  readonly clMax: number;
  readonly cd0: number;
  readonly k: number;
  readonly cl0: number;
  /** Normal-force coefficient square to the wind, separated branch. */
  readonly cd90: number;
}

/** A sail as seen from the side: chords at heights. Axes as in the hull room; lengths m. */
export interface SailShape {
  readonly name: string;
  readonly kind: SailKind;
  /** Heights [m] above the waterline rising from foot to head; at least two. */
  readonly z: readonly number[];
  /** Chord [m] at each height. */
  readonly chord: readonly number[];
  /** x [m] of the leading edge at each height. */
  readonly xLead: readonly number[];
  readonly section: SectionLimits;
  /** A jib that is set to windward on a pole before the wind. */
  readonly gooseWinged?: boolean | undefined;
  /** Number of the reef taken in; 0 or left out: none. */
  readonly reef?: number | undefined;
  /** Cloth area [m2] where the chords are projected ones. */
  readonly cloth?: number | undefined;
}

/** Bluff bodies in the air. */
export interface WindageBody {
  readonly name: string;
  /** Drag area Cd*A [m2] seen from ahead and from the side. */
  readonly frontal: number;
  readonly side: number;
  readonly x: number;
  /** Height [m] of its centre above the waterline. */
  readonly z: number;
}

export interface SailSetSpec {
  readonly name: string;
  readonly sails: readonly SailShape[];
  readonly windage: readonly WindageBody[];
  /** Largest angle [rad] of the boom from the centreline. */
  readonly boomLimit: number;
  readonly wind: WindProfile;
  readonly airDensity: number;
  /** Top of the mast above the waterline, for the mast's own height in the wind. */
  readonly mastTop: number;
}

/**
 * Places in the output of `evaluateInto`. Forces in N in body axes: `drive` forward along the heading, `side`
 * normal to the mast plane positive to leeward (horizontal part: side cos(heel)). Moments N m about the origin.
 */
export const AERO = {
  drive: 0,
  side: 1,
  /** Integral of side * z: the heeling moment, positive to leeward. */
  heelMoment: 2,
  /** Integral of side * x. */
  sideX: 3,
  /** Integral of drive * z: the pitching moment; times sin(heel) it turns the bow to windward. */
  driveZ: 4,
  /** The windage's share of drive and side (already inside the sums above). */
  windageDrive: 5,
  windageSide: 6,
  windageMoment: 7,
  windageSideX: 8,
  windageDriveZ: 9,
  count: 10,
} as const;

/** A group of sails set together, prepared; a workspace with warm starts, allocates nothing per call. */
export interface SailSet {
  readonly spec: SailSetSpec;
  readonly name: string;
  readonly area: number;
  /** Geometric centre of the sail area: x, z [m]. */
  readonly centre: readonly [number, number];
  /**
   * Forces at a flow and heel [rad] with a price [1/m, >= 0] on heeling moment: the loading maximises
   * drive - price * heelMoment (sails only). price 0 is full power. Output as AERO.
   * The answer depends on the arguments alone, to rounding (warm starts change speed, never the result).
   */
  evaluateInto(flow: Readonly<SailingFlow>, heel: number, price: number, out: Float64Array): void;
  /**
   * The same to first order about the last `evaluateInto` (sections at their limit stay there): for derivatives by small
   * differences, at a third of the cost.
   */
  nearInto(flow: Readonly<SailingFlow>, heel: number, price: number, out: Float64Array): void;
  /** Heeling moment of the sails (without windage) at full power at the same flow: M_full. */
  fullMoment(flow: Readonly<SailingFlow>, heel: number): number;
  /** Loading along the height at a state, for plots and `explain`: one entry per sail. */
  loading(flow: Readonly<SailingFlow>, heel: number, price: number): readonly SailLoading[];
}

export interface SailLoading {
  readonly sail: string;
  readonly z: Float64Array;
  /** Circulation [m2/s], section lift coefficient and its limit at each node. */
  readonly circulation: Float64Array;
  readonly cl: Float64Array;
  readonly clLimit: Float64Array;
  /** Apparent wind angle [rad] from the centreline at each node, square to the mast. */
  readonly inflow: Float64Array;
  /**
   * Angle [rad] of the chord from the centreline that gives the section its lift: inflow less downwash less incidence,
   * for sections that lift CAMBER_LIFT at no incidence. Its change from foot to head is the twist the sail needs.
   */
  readonly trim: Float64Array;
  readonly drive: number;
  readonly side: number;
  readonly centreHeight: number;
}
