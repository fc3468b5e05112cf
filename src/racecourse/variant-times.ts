import { assembleBoat, type Boat, type BoatSpec, boatWithFactors, type ModelFactors } from '../boat/index.js';
import { createSetSolvers, type SetSolver, solveAlone, stateVector } from '../equilibrium/index.js';
import { type Polar, predictPolar } from '../polar/index.js';
import type { Course } from './course.js';
import { type CourseTime, courseTime, type NoTime, type SailedPoint, sailedPoints } from './times.js';
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

/** Angles at which a course needs states: a comparison's, and the course's own where a boat can go straight. */
export function anglesFor(course: Course, angles: readonly number[] = COMPARISON_ANGLES): number[] {
  const own = course.legs.map((l) => l.twa).filter((a) => a >= angles[0]!);
  const all = [...angles, ...own].sort((a, b) => a - b);
  return all.filter((a, i) => i === 0 || a - all[i - 1]! > 1e-9);
}

function anchorsFor(
  polar: Polar,
  i: number,
  time: CourseTime | NoTime,
  sets: readonly SetSolver[],
): Anchor[] {
  if (!time.ok) return [];
  const wanted = [...new Set(time.legs.flatMap((l) => l.parts.map((p) => p.twa)))].sort((a, b) => a - b);
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

/**
 * Seconds per nautical mile of the course in each wind, for each set of factors: the states the course is sailed with
 * are solved again at their own angles. That the best angles themselves move a little with the constants is left out:
 * at an optimum it costs to second order only. NaN where a leg cannot be sailed any more.
 */
export function timesUnderFactors(
  boat: Boat,
  course: Course,
  tws: readonly number[],
  anchors: readonly (readonly Anchor[])[],
  draws: readonly ModelFactors[],
): number[][] {
  const names = new Set(anchors.flatMap((a) => a.flatMap((b) => b.starts.map((s) => s.sailSet))));
  const few = withSets(boat, names);
  return draws.map((factors) => {
    // Solvers of its own for every draw: the answer must not depend on what was solved before.
    const sets = new Map(createSetSolvers(boatWithFactors(few, factors)).map((s) => [s.sailSet.name, s]));
    return tws.map((v, i) => {
      const points: SailedPoint[] = [];
      for (const anchor of anchors[i]!) {
        let speed = 0;
        for (const { sailSet, x } of anchor.starts) {
          const { solver } = sets.get(sailSet)!;
          const first = solver.tryFrom(v, anchor.twa, [x]);
          const outcome = first.ok ? first : solver.solve(v, anchor.twa, [x]);
          if (outcome.ok) speed = Math.max(speed, outcome.speed);
        }
        if (speed > 0) points.push({ twa: anchor.twa, speed });
      }
      const time = courseTime(points, course);
      return time.ok ? time.secondsPerMile : Number.NaN;
    });
  });
}

/** Work for one worker: plain data in, plain data out. */
export type VariantTask =
  | { readonly kind: 'times'; readonly spec: BoatSpec; readonly course: Course; readonly wind: WindTable }
  | {
      readonly kind: 'draws';
      readonly spec: BoatSpec;
      readonly course: Course;
      readonly tws: readonly number[];
      readonly anchors: readonly (readonly Anchor[])[];
      readonly draws: readonly ModelFactors[];
    };

export function doVariantTask(task: VariantTask): VariantTimes | number[][] {
  const boat = assembleBoat({ spec: task.spec });
  return task.kind === 'times'
    ? variantTimes(boat, task.course, task.wind)
    : timesUnderFactors(boat, task.course, task.tws, task.anchors, task.draws);
}
