import type { Polar } from '../polar/index.js';
import type { Course, Manoeuvres } from './course.js';
import { NO_COST } from './course.js';
import type { WindTable } from './wind.js';

/** Metres in a nautical mile. */
export const NAUTICAL_MILE = 1852;

/** A state that can be sailed in some wind: true wind angle [rad] from the course, 0 to pi, and speed [m/s]. */
export interface SailedPoint {
  readonly twa: number;
  readonly speed: number;
}

/** A point of a polar on one of the two tacks. */
export interface LegPart extends SailedPoint {
  readonly side: 1 | -1;
  /** Seconds sailed so per metre made good along the leg. */
  readonly slowness: number;
}

/** How a leg is sailed: straight along it, by two angles on one tack, or tacking or gybing. */
export type LegManner = 'direct' | 'two angles' | 'tacking' | 'gybing';

export interface LegTime {
  readonly ok: true;
  readonly secondsPerMile: number;
  readonly manner: LegManner;
  readonly parts: readonly LegPart[];
}

export interface NoTime {
  readonly ok: false;
  readonly reason: string;
}

/** Directions closer than this [rad] count as the same. */
const SAME = 1e-9;
/** A mix must be quicker by this share to be told from rounding. */
const GAIN = 1e-13;

/**
 * The quickest way along a leg: of all mixes of two states, port or starboard, the one that makes the leg good in the
 * least time. That is the gauge of the convex hull of the polar and its mirror image (two points suffice in the
 * plane: Caratheodory 1907), so that the time of two legs is never less than that of their sum.
 * @param points the states of one wind
 * @param twa direction of the leg [rad]
 */
export function legTime(
  points: readonly SailedPoint[],
  twa: number,
  manoeuvres: Manoeuvres = NO_COST,
): LegTime | NoTime {
  const ex = Math.cos(twa);
  const ey = Math.sin(twa);
  const sided: { p: SailedPoint; side: 1 | -1; x: number; y: number }[] = [];
  for (const p of points) {
    if (!(p.speed > 0)) continue;
    const x = p.speed * Math.cos(p.twa);
    const dead = p.twa < SAME || p.twa > Math.PI - SAME;
    const y = dead ? 0 : p.speed * Math.sin(p.twa);
    sided.push({ p, side: 1, x, y });
    if (!dead) sided.push({ p, side: -1, x, y: -y });
  }
  let best = Number.MAX_VALUE;
  let found: LegTime | undefined;
  const quicker = (seconds: number): boolean => seconds < best * (1 - GAIN);
  for (const { p } of sided) {
    const slowness = 1 / p.speed;
    const seconds = NAUTICAL_MILE * slowness;
    if (Math.abs(p.twa - twa) > SAME || !quicker(seconds)) continue;
    best = seconds;
    found = {
      ok: true,
      secondsPerMile: seconds,
      manner: 'direct',
      parts: [{ twa: p.twa, speed: p.speed, side: 1, slowness }],
    };
  }
  const tackCost = manoeuvres.tacksPerMile * manoeuvres.tack;
  const gybeCost = manoeuvres.gybesPerMile * manoeuvres.gybe;
  for (let i = 0; i < sided.length; i++) {
    const a = sided[i]!;
    for (let j = i + 1; j < sided.length; j++) {
      const b = sided[j]!;
      const det = a.x * b.y - a.y * b.x;
      if (Math.abs(det) < 1e-12 * a.p.speed * b.p.speed) continue;
      const s = (ex * b.y - ey * b.x) / det;
      const t = (a.x * ey - a.y * ex) / det;
      if (!(s > SAME * t && t > SAME * s) || !quicker(NAUTICAL_MILE * (s + t))) continue;
      const crosses = a.y * b.y < 0;
      // Where the line between the two crosses the wind's axis: ahead it is a tack, astern a gybe.
      const ahead = a.x * Math.abs(b.y) + b.x * Math.abs(a.y) > 0;
      const seconds = NAUTICAL_MILE * (s + t) + (crosses ? (ahead ? tackCost : gybeCost) : 0);
      if (!quicker(seconds)) continue;
      best = seconds;
      found = {
        ok: true,
        secondsPerMile: seconds,
        manner: crosses ? (ahead ? 'tacking' : 'gybing') : 'two angles',
        parts: [
          { twa: a.p.twa, speed: a.p.speed, side: a.side, slowness: s },
          { twa: b.p.twa, speed: b.p.speed, side: b.side, slowness: t },
        ],
      };
    }
  }
  return found ?? { ok: false, reason: 'no mix of balanced states makes this leg good' };
}

export interface CourseTime {
  readonly ok: true;
  readonly secondsPerMile: number;
  readonly legs: readonly LegTime[];
}

/** Seconds per nautical mile of a course in one wind: the legs' times weighed by their shares of the way. */
export function courseTime(points: readonly SailedPoint[], course: Course): CourseTime | NoTime {
  const legs: LegTime[] = [];
  let seconds = 0;
  for (const leg of course.legs) {
    const t = legTime(points, leg.twa, course.manoeuvres);
    if (!t.ok) return { ok: false, reason: `${leg.name}: ${t.reason}` };
    legs.push(t);
    seconds += leg.share * t.secondsPerMile;
  }
  return { ok: true, secondsPerMile: seconds, legs };
}

/** The balanced states of a polar in its i-th wind, the best-VMG states among them. */
export function sailedPoints(polar: Polar, i: number): SailedPoint[] {
  const points: SailedPoint[] = [];
  for (const r of [...polar.results[i]!, polar.bestUp[i]!, polar.bestDown[i]!])
    if (r.status === 'balanced') points.push({ twa: r.twa, speed: r.speed });
  return points;
}

/** Time of a course over all winds of a table. Winds without a time are kept with their reason. */
export interface ExpectedTime {
  /** Mean seconds per nautical mile over the winds that have a time; infinite where none has. */
  readonly secondsPerMile: number;
  /** Share of the wind table that has a time: 1 where all is well. */
  readonly covered: number;
  readonly winds: readonly (CourseTime | NoTime)[];
}

/** @param times of the course in each wind of the table, in its order */
export function expectedTime(times: readonly (CourseTime | NoTime)[], wind: WindTable): ExpectedTime {
  let seconds = 0;
  let covered = 0;
  times.forEach((t, i) => {
    if (!t.ok) return;
    seconds += wind.share[i]! * t.secondsPerMile;
    covered += wind.share[i]!;
  });
  return {
    secondsPerMile: covered > 0 ? seconds / covered : Number.POSITIVE_INFINITY,
    covered,
    winds: times,
  };
}
