import { deviationOf, ownSpread, type PairCertainty, pairCertainty } from './certainty.js';
import type { Course } from './course.js';
import { SPREADS, type Spread } from './spreads.js';
import { expectedTime, legTime, type NoTime, sailedPoints } from './times.js';
import type { VariantTimes } from './variant-times.js';
import type { WindTable } from './wind.js';

/** One boat in a comparison. The first of the list is the base. */
export interface Entrant {
  readonly name: string;
  readonly known: VariantTimes;
  /** Seconds per nautical mile [draw][wind] under the draws; empty without uncertainty. */
  readonly drawn: readonly (readonly number[])[];
}

/** Points of sail [rad] that differences are shown for: dead to windward and dead before the wind by best VMG. */
export const POINTS_OF_SAIL: readonly number[] = [
  0, 50, 60, 70, 80, 90, 100, 110, 120, 130, 140, 150, 160, 180,
].map((a) => (a * Math.PI) / 180);

/** One place in the ranking. Times in s per nautical mile. */
export interface Standing {
  readonly name: string;
  /** Number among the entrants. */
  readonly entrant: number;
  /** Expected time over the winds that every entrant can sail. */
  readonly secondsPerMile: number;
  /** The same less that of the base. */
  readonly difference: number;
  /** Where it loses most against the quickest of all: wind [m/s], and what it costs there. */
  readonly worst: { readonly tws: number; readonly loss: number } | undefined;
  /** Standard deviation of its own time over the draws; NaN without draws. The same in each wind. */
  readonly deviation: number;
  readonly windDeviations: readonly number[];
  /** Against the base; undefined for the base itself and without draws. */
  readonly againstBase: PairCertainty | undefined;
  /** Winds [m/s] in which it cannot sail the course, with the reason. */
  readonly unsailed: readonly { readonly tws: number; readonly reason: string }[];
}

/** Where the order of two entrants turns. */
export interface Crossover {
  readonly quickerBelow: number;
  readonly quickerAbove: number;
  /** True wind speed [m/s], in a straight line between winds of the table. */
  readonly tws: number;
}

export interface Comparison {
  readonly course: Course;
  readonly wind: WindTable;
  readonly names: readonly string[];
  /** Quickest first. Entrants of equal time stand in the order they were named in. */
  readonly ranking: readonly Standing[];
  /** Share of the wind table in which all entrants can sail the course. */
  readonly covered: number;
  /** Time on the course [entrant][wind], s per nautical mile; NaN where it cannot be sailed. */
  readonly times: readonly (readonly number[])[];
  /** Difference from the base [entrant][wind][point of sail], s per nautical mile; NaN where one cannot sail it. */
  readonly differences: readonly (readonly (readonly number[])[])[];
  readonly crossovers: readonly Crossover[];
  /** Probability that the first is quicker than the second [entrant][entrant]; NaN without draws. */
  readonly quicker: readonly (readonly number[])[];
  readonly spreads: readonly Spread[];
  readonly draws: number;
  readonly seed: number;
  /** Standard deviation over the draws of the base's own time, for comparison with that of the differences. */
  readonly baseDeviation: number;
}

const secondsOf = (t: { readonly ok: true; readonly secondsPerMile: number } | NoTime): number =>
  t.ok ? t.secondsPerMile : Number.NaN;

/** Where two rows of times over rising winds cross: each change of sign, in a straight line. */
export function crossoversOf(
  tws: readonly number[],
  a: readonly number[],
  b: readonly number[],
): { tws: number; firstBelow: boolean }[] {
  const out: { tws: number; firstBelow: boolean }[] = [];
  let last: { v: number; d: number } | undefined;
  tws.forEach((v, i) => {
    const d = a[i]! - b[i]!;
    if (!Number.isFinite(d) || d === 0) return;
    if (last !== undefined && last.d * d < 0)
      out.push({ tws: last.v + ((v - last.v) * last.d) / (last.d - d), firstBelow: last.d < 0 });
    last = { v, d };
  });
  return out;
}

/**
 * The answer to "which rig?": ranking by expected time, differences by wind and point of sail, winds at which the order
 * turns, and how sure it all is. Nothing here depends on the order of the entrants but which of them is the base.
 * @param z standard normal numbers of the draws [draw][constant]
 */
export function comparison(
  entrants: readonly Entrant[],
  course: Course,
  wind: WindTable,
  sampling: { readonly z: readonly Float64Array[]; readonly seed: number },
  spreads: readonly Spread[] = SPREADS,
): Comparison {
  const base = entrants[0];
  if (base === undefined) throw new RangeError('a comparison needs a boat');
  const times = entrants.map((e) => e.known.times.map(secondsOf));
  const shared = wind.tws.map((_, i) => times.every((t) => Number.isFinite(t[i]!)));
  const common = (e: Entrant) =>
    expectedTime(
      e.known.times.map((t, i) => (shared[i] ? t : { ok: false, reason: 'not sailed by all' })),
      wind,
    );
  const totals = entrants.map(common);
  const fastest = wind.tws.map((_, i) =>
    Math.min(...times.map((t) => t[i]!).filter((v) => Number.isFinite(v))),
  );
  const legs = entrants.map((e) =>
    wind.tws.map((_, i) => {
      const points = sailedPoints(e.known.polar, i);
      return POINTS_OF_SAIL.map((twa) => secondsOf(legTime(points, twa)));
    }),
  );
  const drawn = base.drawn.length > 0;
  const standings = entrants.map((e, k): Standing => {
    let worst: Standing['worst'];
    wind.tws.forEach((tws, i) => {
      const loss = times[k]![i]! - fastest[i]!;
      if (Number.isFinite(loss) && (worst === undefined || loss > worst.loss)) worst = { tws, loss };
    });
    return {
      name: e.name,
      entrant: k,
      secondsPerMile: totals[k]!.secondsPerMile,
      difference: totals[k]!.secondsPerMile - totals[0]!.secondsPerMile,
      worst,
      deviation: drawn ? ownSpread(e.drawn, wind).deviation : Number.NaN,
      windDeviations: drawn ? windDeviations(e, wind) : [],
      againstBase: drawn && k > 0 ? pairCertainty(e.drawn, base.drawn, wind, sampling.z) : undefined,
      unsailed: e.known.times.flatMap((t, i) => (t.ok ? [] : [{ tws: wind.tws[i]!, reason: t.reason }])),
    };
  });
  const crossovers: Crossover[] = [];
  for (let a = 0; a < entrants.length; a++)
    for (let b = a + 1; b < entrants.length; b++)
      for (const c of crossoversOf(wind.tws, times[a]!, times[b]!))
        crossovers.push({
          quickerBelow: c.firstBelow ? a : b,
          quickerAbove: c.firstBelow ? b : a,
          tws: c.tws,
        });
  return {
    course,
    wind,
    names: entrants.map((e) => e.name),
    ranking: [...standings].sort((p, q) => p.secondsPerMile - q.secondsPerMile || p.entrant - q.entrant),
    covered: totals[0]!.covered,
    times,
    differences: legs.map((rows) => rows.map((row, i) => row.map((v, j) => v - legs[0]![i]![j]!))),
    crossovers,
    quicker: entrants.map((a) =>
      entrants.map((b) =>
        !drawn ? Number.NaN : a === b ? 0.5 : pairCertainty(a.drawn, b.drawn, wind, sampling.z).quicker,
      ),
    ),
    spreads,
    draws: base.drawn.length,
    seed: sampling.seed,
    baseDeviation: drawn ? ownSpread(base.drawn, wind).deviation : Number.NaN,
  };
}

/** Spread of one boat's own times: standard deviation over the draws in each wind. */
function windDeviations(e: Entrant, wind: WindTable): number[] {
  return wind.tws.map((_, i) => deviationOf(e.drawn.map((d) => d[i]!).filter((v) => Number.isFinite(v))));
}
