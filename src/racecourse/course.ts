const DEGREE = Math.PI / 180;

/** One leg: its direction as a true wind angle [rad] (0 dead to windward, pi dead to leeward), its share of the way. */
export interface Leg {
  readonly name: string;
  readonly twa: number;
  readonly share: number;
}

/** Time lost in tacks and gybes: their number per nautical mile of a leg that is tacked or gybed, and each one's cost. */
export interface Manoeuvres {
  readonly tacksPerMile: number;
  readonly gybesPerMile: number;
  /** Cost [s] of each. */
  readonly tack: number;
  readonly gybe: number;
}

/** A course as shares of the distance by true wind angle. Shares add up to 1. */
export interface Course {
  readonly name: string;
  readonly legs: readonly Leg[];
  readonly manoeuvres: Manoeuvres;
}

export const NO_COST: Manoeuvres = { tacksPerMile: 0, gybesPerMile: 0, tack: 0, gybe: 0 };

/** What a leg in a direction is called. */
export function legName(twa: number): string {
  const deg = Math.round(twa / DEGREE);
  if (deg < 30) return 'beat';
  if (deg > 165) return 'run';
  return `reach ${deg}`;
}

/**
 * A course from the lengths of its legs in any unit; angles in rad.
 * @throws RangeError when there is no leg, or an angle or length makes no sense
 */
export function courseOf(
  name: string,
  legs: readonly { readonly twa: number; readonly length: number }[],
  manoeuvres: Manoeuvres = NO_COST,
): Course {
  if (legs.length === 0) throw new RangeError('a course needs a leg');
  for (const leg of legs) {
    if (!(leg.twa >= 0 && leg.twa <= Math.PI + 1e-12))
      throw new RangeError(`leg angle ${leg.twa} rad is outside 0 to pi`);
    if (!(leg.length > 0 && Number.isFinite(leg.length)))
      throw new RangeError(`leg length ${leg.length} is not above 0`);
  }
  for (const [key, value] of Object.entries(manoeuvres))
    if (!(value >= 0 && Number.isFinite(value))) throw new RangeError(`${key} ${value} is below 0`);
  const total = legs.reduce((s, leg) => s + leg.length, 0);
  return {
    name,
    legs: legs.map((leg) => ({ name: legName(leg.twa), twa: leg.twa, share: leg.length / total })),
    manoeuvres,
  };
}

const BEAT = 0;
const RUN = 180;
/**
 * Courses by generic names, as [angle in deg, length] of their legs; plane geometry. The trapezoid goes a beat of 1, a
 * reach of 2/3 at 120 deg, a run of 2/3 and straight across the wind back to where it began (proportions: judgement).
 */
const SHAPES = {
  'windward-leeward': [
    [BEAT, 1],
    [RUN, 1],
  ],
  triangle: [
    [BEAT, 1],
    [120, 1],
    [120, 1],
  ],
  'right-triangle': [
    [BEAT, 1],
    [135, Math.SQRT1_2],
    [135, Math.SQRT1_2],
  ],
  trapezoid: [
    [BEAT, 1],
    [120, 2 / 3],
    [RUN, 2 / 3],
    [90, 1 / Math.sqrt(3)],
  ],
  upwind: [[BEAT, 1]],
  reach: [[90, 1]],
  downwind: [[RUN, 1]],
  /** Every direction alike, from head to wind to dead before it: the middles of twelve equal sectors. */
  circle: Array.from({ length: 12 }, (_, i) => [7.5 + 15 * i, 1] as const),
} as const satisfies Record<string, readonly (readonly [number, number])[]>;

export type CourseName = keyof typeof SHAPES;

export const COURSE_NAMES = Object.keys(SHAPES) as readonly CourseName[];

/** A built-in course. */
export function namedCourse(name: CourseName, manoeuvres: Manoeuvres = NO_COST): Course {
  return courseOf(
    name,
    SHAPES[name].map(([deg, length]) => ({ twa: deg * DEGREE, length })),
    manoeuvres,
  );
}
