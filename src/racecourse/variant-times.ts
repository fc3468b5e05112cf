import {
  assembleBoat,
  type Boat,
  type BoatSpec,
  boatWithFactors,
  type ModelFactors,
  NO_FACTORS,
} from '../boat/index.js';
import { createSetSolvers, type SetSolver, solveAlone, stateVector } from '../equilibrium/index.js';
import { hermite } from '../numerics/index.js';
import { type Polar, predictPolar } from '../polar/index.js';
import type { Course } from './course.js';
import {
  type CourseTime,
  courseTime,
  type LegTime,
  type NoTime,
  type SailedPoint,
  sailedPoints,
} from './times.js';
import type { WindTable } from './wind.js';

const DEGREE = Math.PI / 180;

/** True wind angles [rad] of a comparison's polars; the course's own are added. */
export const COMPARISON_ANGLES: readonly number[] = Array.from(
  { length: 16 },
  (_, i) => (30 + 10 * i) * DEGREE,
);

/** A state that a course is sailed with, to be solved again when the model's constants change. Plain data. */
export interface Anchor {
  readonly twa: number;
  /** Sail sets worth trying there, each with the state solved under it. */
  readonly starts: readonly { readonly sailSet: string; readonly x: Float64Array }[];
}

/** What is known of one boat on a course in the winds of a table. Plain data. */
export interface VariantTimes {
  readonly polar: Polar;
  /** For each wind of the table. */
  readonly times: readonly (CourseTime | NoTime)[];
  readonly anchors: readonly (readonly Anchor[])[];
}

/** Sail sets slower than the fastest by more than this share are not tried again (judgement). */
const WORTH_TRYING = 0.04;
/** States that fall short of the best line by less than this share are solved again beside the best (judgement). */
const NEAR = 0.05;
/** Between states closer than this [rad] the polar is carried on by a cubic, at so many points. */
const BRIDGED = 12 * DEGREE;
const BRIDGE_POINTS = 5;
/** Most that a cubic may rise above both of its ends, as a share. */
const SWING = 0.01;

/** Angles at which a course needs states: a comparison's, and the course's own where a boat can go straight. */
export function anglesFor(course: Course, angles: readonly number[] = COMPARISON_ANGLES): number[] {
  const own = course.legs.map((l) => l.twa).filter((a) => a >= angles[0]!);
  const all = [...angles, ...own].sort((a, b) => a - b);
  return all.filter((a, i) => i === 0 || a - all[i - 1]! > 1e-9);
}

/**
 * Angles of the states with which a leg is sailed, and of those that come near to it: within a share of the line that
 * touches the polar there. Between them lies whatever angle is best when the constants change a little.
 */
function nearAngles(leg: LegTime, points: readonly SailedPoint[]): number[] {
  const own = leg.parts.map((p) => p.twa);
  const [a, b] = leg.parts.map((p) => ({
    x: p.speed * Math.cos(p.twa),
    y: p.side * p.speed * Math.sin(p.twa),
  }));
  // The line n . v = 1 through both states; square to the leg through a single one.
  const det = b === undefined ? 0 : a!.x * b.y - a!.y * b.x;
  const r2 = a!.x ** 2 + a!.y ** 2;
  const n =
    b === undefined || Math.abs(det) < 1e-9 * r2
      ? { x: a!.x / r2, y: a!.y / r2 }
      : { x: (b.y - a!.y) / det, y: (a!.x - b.x) / det };
  const near = points.filter((p) => {
    const across = Math.abs(n.y) * p.speed * Math.sin(p.twa);
    return n.x * p.speed * Math.cos(p.twa) + across > 1 - NEAR;
  });
  return [...own, ...near.map((p) => p.twa)];
}

function anchorsFor(
  polar: Polar,
  i: number,
  time: CourseTime | NoTime,
  sets: readonly SetSolver[],
): Anchor[] {
  if (!time.ok) return [];
  const points = sailedPoints(polar, i);
  const wanted = [...new Set(time.legs.flatMap((l) => nearAngles(l, points)))].sort((a, b) => a - b);
  const states = [...polar.results[i]!, polar.bestUp[i]!, polar.bestDown[i]!];
  return wanted.map((twa) => {
    const state = states.find((s) => s.status === 'balanced' && s.twa === twa);
    if (state?.status !== 'balanced')
      throw new Error('a course is sailed with a state that is not in the polar');
    const starts = [{ sailSet: state.sailSet, x: stateVector(state) }];
    for (const set of sets) {
      if (set.sailSet.name === state.sailSet) continue;
      const other = solveAlone(set.solver, polar.tws[i]!, twa);
      if (other.ok && other.speed > (1 - WORTH_TRYING) * state.speed)
        starts.push({ sailSet: set.sailSet.name, x: other.x });
    }
    return { twa, starts };
  });
}

/** The polar of a boat in the winds of a table, the time of the course in each, and the states it is sailed with. */
export function variantTimes(boat: Boat, course: Course, wind: WindTable): VariantTimes {
  const polar = predictPolar(boat, { tws: wind.tws, twa: anglesFor(course) });
  const times = wind.tws.map((_, i) => courseTime(sailedPoints(polar, i), course));
  const sets = createSetSolvers(boat);
  return { polar, times, anchors: times.map((t, i) => anchorsFor(polar, i, t, sets)) };
}

/** Angles [rad] of a sweep's polars: close where best VMG lies, wide between. */
const SWEEP_ANGLES: readonly number[] = [32, 40, 48, 60, 75, 90, 105, 120, 135, 150, 165, 180].map(
  (a) => a * DEGREE,
);

/** The time of the course in each wind of the table, without the rest: what a sweep needs of each variant. */
export function sweepTimes(boat: Boat, course: Course, wind: WindTable): (CourseTime | NoTime)[] {
  const polar = predictPolar(boat, { tws: wind.tws, twa: anglesFor(course, SWEEP_ANGLES) });
  return wind.tws.map((_, i) => courseTime(sailedPoints(polar, i), course));
}

/** The boat with only those of its sail sets that are named. */
function withSets(boat: Boat, names: ReadonlySet<string>): Boat {
  const { spec } = boat;
  return {
    ...boat,
    spec: {
      ...spec,
      sailSets: spec.sailSets.filter((s) => names.has(s.name)),
      measuredRigs: spec.measuredRigs.filter((s) => names.has(s.name)),
    },
    sailSets: boat.sailSets.filter((s) => names.has(s.name)),
  };
}

interface SolvedPoint extends SailedPoint {
  readonly sailSet: string;
  /** d speed / d twa [m/s per rad]. */
  readonly slope: number;
}

/** The solved states, and between neighbours under one sail set points of the cubic through their speeds and slopes. */
function bridged(solved: readonly SolvedPoint[]): SailedPoint[] {
  const out: SailedPoint[] = [...solved];
  for (let k = 1; k < solved.length; k++) {
    const [p, q] = [solved[k - 1]!, solved[k]!];
    const width = q.twa - p.twa;
    if (p.sailSet !== q.sailSet || width > BRIDGED) continue;
    for (let m = 1; m <= BRIDGE_POINTS; m++) {
      const t = m / (BRIDGE_POINTS + 1);
      const speed = hermite(t, width, p.speed, q.speed, p.slope, q.slope);
      // A cubic between states of two kinds (floating and planing) may swing beyond both: not believed.
      if (speed <= Math.max(p.speed, q.speed) * (1 + SWING)) out.push({ twa: p.twa + t * width, speed });
    }
  }
  return out;
}

/** Time of the course in one wind with the anchors solved by `sets`; NaN where a leg cannot be sailed. */
function anchoredTime(
  sets: ReadonlyMap<string, SetSolver>,
  course: Course,
  tws: number,
  anchors: readonly Anchor[],
): number {
  const solved: SolvedPoint[] = [];
  for (const anchor of anchors) {
    let best: SolvedPoint | undefined;
    for (const { sailSet, x } of anchor.starts) {
      const { solver } = sets.get(sailSet)!;
      const first = solver.tryFrom(tws, anchor.twa, [x]);
      const o = first.ok ? first : solver.solve(tws, anchor.twa, [x]);
      if (o.ok && (best === undefined || o.speed > best.speed))
        best = { twa: anchor.twa, speed: o.speed, slope: o.speedSlope, sailSet };
    }
    if (best !== undefined) solved.push(best);
  }
  const time = courseTime(bridged(solved), course);
  return time.ok ? time.secondsPerMile : Number.NaN;
}

/**
 * Seconds per nautical mile of the course in each wind, for each set of factors: the states that the course is sailed
 * with, and those near to being so, are solved again from where they were; what that finds for the unchanged boat is
 * brought to her time in the polar, and every draw with it. NaN where a leg cannot be sailed any more.
 */
export function timesUnderFactors(
  boat: Boat,
  course: Course,
  tws: readonly number[],
  known: Pick<VariantTimes, 'anchors' | 'times'>,
  draws: readonly ModelFactors[],
): number[][] {
  const { anchors, times } = known;
  const names = new Set(anchors.flatMap((a) => a.flatMap((b) => b.starts.map((s) => s.sailSet))));
  const few = withSets(boat, names);
  const timed = (factors: ModelFactors): number[] => {
    // Solvers of its own for every draw: the answer must not depend on what was solved before.
    const sets = new Map(createSetSolvers(boatWithFactors(few, factors)).map((s) => [s.sailSet.name, s]));
    return tws.map((v, i) => anchoredTime(sets, course, v, anchors[i]!));
  };
  const plain = timed(NO_FACTORS);
  const scale = times.map((t, i) => (t.ok ? t.secondsPerMile / plain[i]! : Number.NaN));
  return draws.map((factors) => timed(factors).map((t, i) => scale[i]! * t));
}

/** Work for one worker: plain data in, plain data out. */
export type VariantTask =
  | { readonly kind: 'times'; readonly spec: BoatSpec; readonly course: Course; readonly wind: WindTable }
  | {
      readonly kind: 'draws';
      readonly spec: BoatSpec;
      readonly course: Course;
      readonly tws: readonly number[];
      readonly known: Pick<VariantTimes, 'anchors' | 'times'>;
      readonly draws: readonly ModelFactors[];
    };

export function doVariantTask(task: VariantTask): VariantTimes | number[][] {
  const boat = assembleBoat({ spec: task.spec });
  return task.kind === 'times'
    ? variantTimes(boat, task.course, task.wind)
    : timesUnderFactors(boat, task.course, task.tws, task.known, task.draws);
}
