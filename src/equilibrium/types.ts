/** Places in the unknown vector x of the equilibrium. SI and rad. */
export const X = {
  /** Boat speed through the water [m/s]. */
  speed: 0,
  leeway: 1,
  heel: 2,
  rudder: 3,
  /**
   * Depowering 0 <= t < 1: the price on heeling moment is t / (1 - t) / (reference height). 0 is full power.
   * It is the solver's own parameter; reports give `ease` = 1 - M / M_full.
   */
  depower: 4,
  /** Crew's arm [m], positive to windward. */
  arm: 5,
  /** Share of a board that is lowered, 0 to 1; held at 1 where there is a fixed keel. */
  hoist: 6,
  count: 7,
} as const;

/** Places in the residual vector: force along the course, across it, roll and yaw moment, each scaled. */
export const RES = { surge: 0, sway: 1, roll: 2, yaw: 3, count: 4 } as const;

/** Lower and upper bounds of x. */
export interface Bounds {
  readonly lower: Float64Array;
  readonly upper: Float64Array;
}

/**
 * The force model seen by the solver: state and controls in, force and moment sums out.
 * A stub can stand in for a real boat.
 */
export interface ForceModel {
  readonly bounds: Bounds;
  /** A speed typical of the boat [m/s], such as sqrt(g Lwl): sets the solver's scales. */
  readonly speedScale: number;
  /** Called before a wind and angle are solved; a model may narrow its bounds by them. */
  prepare?(tws: number, twa: number): void;
  /**
   * Residual of the balance at x for wind tws [m/s] and twa [rad, from the course]:
   * surge and sway divided by the displacement weight, roll and yaw by weight * length.
   * surge > 0 speeds the boat up; sway > 0 pushes to leeward; roll > 0 heels to leeward; yaw > 0 turns to windward.
   */
  residualInto(tws: number, twa: number, x: Float64Array, out: Float64Array): void;
  /**
   * Side conditions that must be <= 0 (foil stall margins and the like), written to out; returns how many.
   * Called after residualInto at the same x.
   */
  readonly sideConditions: number;
  sideConditionsInto(out: Float64Array): void;
  /**
   * Optional bounds that no heel, trim, leeway or easing can beat, at a speed [m/s]: most drive and least resistance, over
   * weight. They prove "no drive" cheaply where even the bounds leave none.
   */
  boundsAt?(tws: number, twa: number, speed: number): { readonly drive: number; readonly resistance: number };
  /** Names of the side conditions, for reports. */
  readonly sideConditionNames: readonly string[];
  /**
   * Optional faster derivatives at x, where residualInto has just been called: jacobian of the residual
   * (RES.count rows of X.count) and of the side conditions, row-major. Without it the solver differences.
   * Returns the number of force evaluations it cost.
   */
  jacobianInto?(
    tws: number,
    twa: number,
    x: Float64Array,
    jacobian: Float64Array,
    side: Float64Array,
  ): number;
}

export type Regime =
  | 'crew inboard'
  | 'crew part out'
  | 'crew full out'
  | 'easing'
  | 'reefed'
  | 'heel limited';

/** Why no state is reported. */
export type Unbalance = 'no drive' | 'overpowered' | 'foil stalled' | 'rudder at its limit' | 'not converged';

/** A state that balances. SI and rad. */
export interface SailingState {
  readonly status: 'balanced';
  readonly tws: number;
  readonly twa: number;
  /** True wind angle from the heading: twa - leeway. */
  readonly twaHeading: number;
  /** Apparent wind at the wind's reference height, upright: speed, and angle from the heading. */
  readonly aws: number;
  readonly awa: number;
  readonly speed: number;
  /** speed * cos(twa): positive upwind, negative downwind. */
  readonly vmg: number;
  readonly leeway: number;
  readonly heel: number;
  readonly rudder: number;
  /** Share of the full heeling moment given up, 0 to 1. */
  readonly ease: number;
  readonly depower: number;
  readonly crewArm: number;
  /** Crew arm over its limit on that side, -1 to 1. */
  readonly crewShare: number;
  /** Share of the board lowered, 1 for a fixed keel. */
  readonly boardDown: number;
  readonly sailSet: string;
  readonly regime: Regime;
  /** Largest scaled residual. */
  readonly residual: number;
  readonly evaluations: number;
  readonly notes: readonly string[];
  /**
   * Speed [m/s] of a slower state in which the same boat also stays at this wind and angle: she can stay planing, but may
   * not get there by herself. Left out where none is known.
   */
  readonly slowerSpeed?: number | undefined;
}

export interface NoState {
  readonly status: 'unbalanced';
  readonly tws: number;
  readonly twa: number;
  readonly why: Unbalance;
  readonly reason: string;
  readonly evaluations: number;
}

export type SailingResult = SailingState | NoState;

/** One line of a force table: N and N m, in heading axes, horizontal plane. */
export interface ForceRow {
  readonly group: 'air' | 'water' | 'weight';
  readonly name: string;
  /** Along the course, forward positive. */
  readonly forward: number;
  /** Across the course, to leeward positive. */
  readonly leeward: number;
  /** Heeling to leeward positive. */
  readonly roll: number;
  /** Bow to windward positive. */
  readonly yaw: number;
}

/** Resultants of air and water and where they act. Lengths m, forces N; x forward of amidships, z above the waterline. */
export interface LinesOfAction {
  readonly air: {
    readonly forward: number;
    readonly leeward: number;
    /** Height along the mast of the side force. */
    readonly z: number;
    readonly x: number;
    /** Distance to leeward in plan, by heel. */
    readonly planOffset: number;
  };
  readonly water: {
    readonly forward: number;
    readonly leeward: number;
    readonly depth: number;
    readonly x: number;
    readonly planOffset: number;
  };
  /** Distance [m] by which the two pass each other in plan: without the rudder's share they would turn the boat. */
  readonly lead: number;
  readonly crewWeight: number;
  readonly crewHeight: number;
  readonly boatWeight: number;
  readonly massHeight: number;
  readonly length: number;
  readonly beam: number;
  readonly freeboard: number;
  readonly canoeDraft: number;
  readonly draft: number;
  readonly mastTop: number;
}

export interface ForceBalance {
  readonly state: SailingState;
  readonly rows: readonly ForceRow[];
  readonly sum: {
    readonly forward: number;
    readonly leeward: number;
    readonly roll: number;
    readonly yaw: number;
  };
  /** Where the resultants act, for a sketch. */
  readonly lines: LinesOfAction;
  /** Facts beside the table: stall margins, centre of effort, GZ and so on. */
  readonly facts: readonly { readonly name: string; readonly value: number; readonly unit: string }[];
}
