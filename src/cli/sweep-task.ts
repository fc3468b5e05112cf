import {
  BoatFileError,
  type Change,
  type Difference,
  differencesOf,
  readBoat,
  readBoatFile,
  showPath,
} from '../boat/index.js';
import { type Course, expectedTime, sweepTimes, type WindTable } from '../racecourse/index.js';
import { unitEngine } from './boat-input.js';

/** One variant of a sweep, to be read and timed. Plain data. */
export interface SweepTask {
  readonly kind: 'sweep';
  /** The boat file; its text where it came from standard input. */
  readonly path: string;
  readonly text: string;
  readonly changes: readonly Change[];
  readonly course: Course;
  readonly wind: WindTable;
}

/** What came of it: times in s per nautical mile, or why the variant is no boat. */
export type SweepResult = { readonly changes: readonly Difference[] } & (
  | {
      readonly refused: undefined;
      readonly secondsPerMile: number;
      readonly covered: number;
      /** For each wind; NaN where the course cannot be sailed. */
      readonly times: readonly number[];
      readonly reasons: readonly string[];
    }
  | { readonly refused: string }
);

export function doSweepTask(task: SweepTask): SweepResult {
  const { path, text, course, wind } = task;
  const changes = task.changes.length === 0 ? [] : differencesOf(text, task.changes);
  let boat: ReturnType<typeof readBoat>;
  try {
    boat =
      path === '-'
        ? readBoat(text, 'standard input', unitEngine, undefined, task.changes)
        : readBoatFile(path, task.changes);
  } catch (error) {
    if (!(error instanceof BoatFileError)) throw error;
    const told = task.changes.map((c) => ({
      key: showPath(c.path),
      before: '',
      after: c.value ?? 'left out',
    }));
    return { changes: changes.length > 0 ? changes : told, refused: error.message };
  }
  const times = sweepTimes(boat, course, wind);
  const { secondsPerMile, covered } = expectedTime(times, wind);
  return {
    changes,
    refused: undefined,
    secondsPerMile,
    covered,
    times: times.map((t) => (t.ok ? t.secondsPerMile : Number.NaN)),
    reasons: times.flatMap((t) => (t.ok ? [] : [t.reason])),
  };
}
