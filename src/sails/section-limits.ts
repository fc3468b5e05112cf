import type { SailKind, SectionLimits } from './types.js';

/**
 * What a section of each kind of sail can do. Two-dimensional values on the sail's own chord:
 * drag cd0 + k (cl - cl0)^2 between cl = 0 and clMax; cd90 is the normal-force coefficient square to the wind.
 */
export const sectionLimits: Readonly<Record<SailKind, SectionLimits>> = {
  // clMax 1.45, cd0 0.015, k 0.02, cl0 0.6: judgement, within the spread of published section tests of thin cambered
  // sections behind a mast. cd90 1.22: flat plate of aspect 3 by Viterna & Corrigan 1981, 1.11 + 0.018 AR = 1.16,
  // plus 5 % for camber (judgement).
  mainsail: { clMax: 1.45, cd0: 0.015, k: 0.02, cl0: 0.6, cd90: 1.22 },
  // A jib has no mast at its leading edge and works in the upwash of the mainsail: less drag and a higher limit, such
  // that main and jib together reach the lift of about 1.4 to 1.5 on their area that full-scale measurements and
  // Hazen 1980 give upwind (from memory; the limit itself is a judgement).
  jib: { clMax: 1.7, cd0: 0.012, k: 0.02, cl0: 0.6, cd90: 1.2 },
};

const DEGREE = Math.PI / 180;

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
/** A jib's lift limit falls by this share over these apparent angles as its sheeting base ends (judgement). */
export const JIB_FADE = { share: 0.6, start: 40 * DEGREE, end: 100 * DEGREE } as const;
/** The mainsail takes this share of the jib's wind over these apparent angles (judgement). */
export const JIB_BLANKET = { share: 0.95, start: 100 * DEGREE, end: 150 * DEGREE } as const;
/** Drag of a sail that luffs, on its area, when all its load is given up (judgement). */
export const LUFFING_DRAG = 0.06;
