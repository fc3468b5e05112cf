import type { SailKind, SectionLimits } from './types.js';

/**
 * What a section of each kind of sail can do. Two-dimensional values on the sail's own chord:
 * drag cd0 + k (cl - cl0)^2 between cl = 0 and clMax; cd90 is the normal-force coefficient square to the wind.
 */
const MAINSAIL: SectionLimits = {
  // clMax 1.45, cd0 0.015, k 0.02, cl0 0.6: judgement, within the spread of published section tests of thin cambered
  // sections behind a mast. cd90 1.22: flat plate of aspect 3 by Viterna & Corrigan 1981, 1.11 + 0.018 AR = 1.16,
  // plus 5 % for camber (judgement).
  clMax: 1.45,
  cd0: 0.015,
  k: 0.02,
  cl0: 0.6,
  cd90: 1.22,
};

export const sectionLimits: Readonly<Record<SailKind, SectionLimits>> = {
  mainsail: MAINSAIL,
  // A mizzen is a mainsail on another mast.
  mizzen: MAINSAIL,
  // A jib has no mast at its leading edge and works in the upwash of the mainsail: less drag and a higher limit, such
  // that main and jib together reach the lift of about 1.4 to 1.5 on their area that full-scale measurements and
  // Hazen 1980 give upwind (from memory; the limit itself is a judgement).
  jib: { clMax: 1.7, cd0: 0.012, k: 0.02, cl0: 0.6, cd90: 1.2 },
  // On the projected chord. clMax 1.5: a full section that must stand without a stay (judgement). cd90 1.35: within the
  // 1.1 to 1.45 that measured spinnakers give on projected area dead before the wind (from memory).
  spinnaker: { clMax: 1.5, cd0: 0.035, k: 0.03, cl0: 0.7, cd90: 1.35 },
  // clMax 1.7: within the 1.6 to 1.8 of published asymmetric spinnakers (from memory); drag between spinnaker and jib
  // (judgement).
  gennaker: { clMax: 1.7, cd0: 0.025, k: 0.025, cl0: 0.7, cd90: 1.3 },
  // A flat sail on a tight luff before the forestay: nearly a jib (judgement).
  reacher: { clMax: 1.65, cd0: 0.016, k: 0.02, cl0: 0.65, cd90: 1.2 },
};

const DEGREE = Math.PI / 180;

/** A change by a share of 1 between two apparent angles [rad]. */
export interface Ramp {
  readonly share: number;
  readonly start: number;
  readonly end: number;
}

/** How a kind of sail is carried round the compass. All judgement, but where said. */
export interface Carriage {
  /** Apparent angles over which it comes to stand; below them it collapses. */
  readonly stands?: Ramp;
  /** Its lift limit falls as its sheeting base ends. */
  readonly fade?: Ramp;
  /** The mainsail takes this share of its wind. */
  readonly blanket?: Ramp;
  /** Set to windward on a pole it gets this share of the lost wind back. */
  readonly gooseWing?: Ramp;
  /** Flies from a pole that squares it to any wind: it separates by apparent angle, not by the boom's limit. */
  readonly squared?: Ramp;
  /** Largest angle [rad] of the sail from the centreline where it has no boom. */
  readonly trimLimit?: number;
}

const ramp = (share: number, start: number, end: number): Ramp => ({
  share,
  start: start * DEGREE,
  end: end * DEGREE,
});

export const CARRIAGE: Readonly<Record<SailKind, Carriage>> = {
  mainsail: {},
  mizzen: {},
  jib: {
    fade: ramp(0.6, 40, 100),
    blanket: ramp(0.95, 100, 150),
    gooseWing: ramp(0.85, 150, 170),
  },
  spinnaker: {
    stands: ramp(1, 50, 75),
    blanket: ramp(0.12, 140, 180),
    squared: ramp(1, 95, 135),
  },
  gennaker: { stands: ramp(1, 40, 58), blanket: ramp(0.6, 125, 165), trimLimit: 80 * DEGREE },
  reacher: {
    stands: ramp(1, 24, 36),
    fade: ramp(0.5, 80, 130),
    blanket: ramp(0.9, 110, 155),
    trimLimit: 75 * DEGREE,
  },
};

/** Apparent angle at which the attached family of loadings is held: 76 deg (judgement). */
export const ATTACHED_COS = Math.cos(76 * DEGREE);
/** Least weight of drag in the loading problem, cos 56.3 deg: keeps it convex off the wind. */
export const COST_FLOOR = 0.555;
/**
 * Most that a price on moment adds to the weight of drag. Exact below 1.5; beyond, lift itself has long lost its worth
 * and a cap keeps the problem convex.
 */
export const COST_CEILING = 2;
/** The branches blend over these incidences (judgement: thin sections separate wholly between them). */
export const SEPARATION_START = 22 * DEGREE;
export const SEPARATION_END = 40 * DEGREE;
/** Incidence at which the separated normal force is full (judgement after flat-plate tests). */
export const FULL_NORMAL_FORCE = 42 * DEGREE;
/**
 * Drag of a sail that luffs, on its area, when all its load is given up: what a una rig in the tunnel has at no
 * incidence, 0.097, less its section and its spars (the polar attributed to Marchaj, second-hand).
 */
export const LUFFING_DRAG = 0.045;
