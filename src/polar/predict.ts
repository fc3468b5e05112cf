import type { Boat } from '../boat/index.js';
import {
  createSetSolvers,
  describeOutcome,
  describeState,
  type Outcome,
  type SailingResult,
  type SetSolver,
  type Solution,
  type Start,
  solveAlone,
  X,
} from '../equilibrium/index.js';
import { CARRIAGE } from '../sails/index.js';
import { bestVmg, fastestAngle } from './best-vmg.js';
import type { Polar, PolarRequest } from './types.js';

const DEGREE = Math.PI / 180;
const KNOT = 1852 / 3600;

/** Grid of true wind speeds [m/s] used when none is asked for: 4, 6, 8, 10, 12, 15, 18, 22, 26 kn. */
export const defaultWindSpeeds: readonly number[] = [4, 6, 8, 10, 12, 15, 18, 22, 26].map((v) => v * KNOT);
/** Grid of true wind angles [rad] used when none is asked for: 30 to 180 deg by 5. */
export const defaultWindAngles: readonly number[] = Array.from(
  { length: 31 },
  (_, i) => (30 + 5 * i) * DEGREE,
);

/** Angle [rad] at which the sweep of a wind speed starts: where every boat that sails at all has drive. */
const SWEEP_START = 95 * DEGREE;

/** Every so many radians, and at the last angle, a state is also solved from less wind and from another way to sail her. */
const CROSS_CHECK = (20 * Math.PI) / 180;
/** Heel [rad] within which a boat may have a best state on either side of upright. */
const NEAR_UPRIGHT = 0.1;
/** Differences in heel [rad] and depower between neighbours that may be two ways of sailing; each is tried on the other. */
const OTHER_WAY = { heel: 0.06, depower: 0.1 } as const;
/** Sails slower than this share of the fastest are not looked at from more sides. */
const RIVAL = 0.97;
/** Most rounds of trying. */
const ROUNDS = 6;
/** Change of speed between neighbours, as a share, that is looked at from all sides. */
const JUMP = 0.15;
/** A second balance at the same wind and angle counts as another one when it is slower by this share. */
const APART = 0.03;
/** Froude number above which a state may be one of planing. */
const PLANING_FROUDE = 0.5;
/** Sets whose best VMG on the grid comes this near the best of all get their own search. */
const VMG_RIVAL = 0.985;
/** A reefed set is worth a look where the whole one gives up this share of its heeling moment, or does not balance. */
const REEF_EASE = 0.01;

/** The state beyond `near`, seen from `far`: a start, no more. */
function extrapolated(near: Solution, far: Solution): Start {
  return { x: near.x.map((v, i) => v + 0.9 * (v - far.x[i]!)), curvature: near.curvature };
}

/**
 * Another way to sail her: heeled well to the other side where she is near upright, upright and eased where she heels.
 */
function otherWay(x: Float64Array): Float64Array {
  const y = x.slice();
  if (Math.abs(x[X.heel]!) < NEAR_UPRIGHT) {
    y[X.heel] = x[X.heel]! > 0.02 ? -0.08 : 0.16;
    y[X.depower] = 0;
    return y;
  }
  y[X.heel] = 0.4 * x[X.heel]!;
  y[X.depower] = Math.max(0.15, x[X.depower]!);
  return y;
}

const NOT_TRIED: Outcome = {
  ok: false,
  why: 'not converged',
  reason: 'another sail set is the one to carry here',
  evaluations: 0,
};

/** The grid of every sail set, and the slower balances found beside the best ones. */
interface Sweep {
  readonly sets: readonly SetSolver[];
  /** outcomes[k][i][j] of set k at tws[i], twa[j]. */
  readonly outcomes: Outcome[][][];
  /** Speed [m/s] of a slower stable balance of the fastest set, NaN where there is none known. */
  readonly slower: number[][];
  evaluations: number;
}

const speedOf = (o: Outcome): number => (o.ok ? o.speed : 0);

function fastestAt(sweep: Sweep, i: number, j: number): number {
  let best = -1;
  let top = 0;
  sweep.outcomes.forEach((o, k) => {
    const r = o[i]![j]!;
    if (r.ok && r.speed > top) {
      top = r.speed;
      best = k;
    }
  });
  return best;
}

/** For every set the number of the set it is a reef of, or -1; and the least apparent angle at which it stands. */
function familyOf(sets: readonly SetSolver[]): { wholeOf: number[]; stands: number[] } {
  const bare = (name: string): string => name.replace(/, reef \d+$/, '');
  const names = sets.map((s) => s.sailSet.name);
  return {
    wholeOf: sets.map((s) =>
      s.sailSet.spec.sails.some((x) => (x.reef ?? 0) > 0) ? names.indexOf(bare(s.sailSet.name)) : -1,
    ),
    stands: sets.map((s) =>
      Math.max(0, ...s.sailSet.spec.sails.map((x) => CARRIAGE[x.kind].stands?.start ?? 0)),
    ),
  };
}

function apparentAngle(tws: number, twa: number, x: Float64Array): number {
  const leeway = x[X.leeway]!;
  // On a dead run the wind may come from a little to leeward.
  return Math.abs(
    Math.atan2(
      tws * Math.sin(twa - leeway) - x[X.speed]! * Math.sin(leeway),
      tws * Math.cos(twa - leeway) + x[X.speed]! * Math.cos(leeway),
    ),
  );
}

function sweepAll(boat: Boat, tws: readonly number[], twa: readonly number[]): Sweep {
  const sets = createSetSolvers(boat);
  const { wholeOf, stands } = familyOf(sets);
  const byArea = sets.map((_, k) => k).sort((a, b) => sets[a]!.sailSet.area - sets[b]!.sailSet.area);
  const sweep: Sweep = {
    sets,
    outcomes: sets.map(() => tws.map(() => new Array<Outcome>(twa.length).fill(NOT_TRIED))),
    slower: tws.map(() => new Array<number>(twa.length).fill(Number.NaN)),
    evaluations: 0,
  };
  const { outcomes } = sweep;
  const order = twa.map((_, j) => j).sort((a, b) => twa[a]! - twa[b]!);
  let startAt = 0;
  for (let i = 0; i < order.length; i++) {
    const better = Math.abs(twa[order[i]!]! - SWEEP_START) < Math.abs(twa[order[startAt]!]! - SWEEP_START);
    if (better) startAt = i;
  }
  // Angles at which every state is looked at from more sides.
  const checked = order.map((_, n) => {
    const from = twa[order[startAt]!]!;
    const part = (k: number): number => Math.floor(Math.abs(twa[order[k]!]! - from) / CROSS_CHECK + 1e-9);
    const before = n > startAt ? n - 1 : n + 1;
    return n === startAt || n === 0 || n === order.length - 1 || part(n) !== part(before);
  });
  const counted = (o: Outcome): Outcome => {
    sweep.evaluations += o.evaluations;
    return o;
  };
  const attempt = (k: number, i: number, j: number, starts: readonly Start[], quick = true): Outcome =>
    counted(sets[k]!.solver.tryFrom(tws[i]!, twa[j]!, starts, quick));

  // Solved from the neighbouring angle, carried on in a straight line where two are known. Every few angles, and where
  // that fails, also from the same angle in less wind and from the other sets: starts that have met other obstacles.
  const visit = (i: number, n: number, step: 1 | -1): void => {
    const j = order[n]!;
    const first = n === startAt;
    const done: Solution[] = [];
    let topNear = 0;
    if (!first) for (const o of outcomes) topNear = Math.max(topNear, speedOf(o[i]![order[n - step]!]!));
    for (let k = 0; k < sets.length; k++) {
      const row = outcomes[k]![i]!;
      const near = first ? undefined : row[order[n - step]!];
      const far = first ? undefined : row[order[n - 2 * step]!];
      const slower = i > 0 ? outcomes[k]![i - 1]![j] : undefined;
      const whole = wholeOf[k]! >= 0 ? outcomes[wholeOf[k]!]![i]![j]! : undefined;
      if (whole?.ok && whole.x[X.depower]! < REEF_EASE) continue;
      if (done.length > 0 && apparentAngle(tws[i]!, twa[j]!, done[0]!.x) < stands[k]!) continue;
      // Sails far from the best at the last angle are carried on, no more.
      const rival = !(near?.ok && near.speed < RIVAL * topNear);
      const both = rival && checked[n]!;
      const starts: Start[] = [];
      if (near?.ok) starts.push(far?.ok ? extrapolated(near, far) : near);
      if (slower?.ok && (starts.length === 0 || both)) starts.push(slower);
      if (near?.ok && both) starts.push({ x: otherWay(near.x), curvature: near.curvature });
      if (whole?.ok && (both || starts.length === 0)) starts.push(whole);
      if (starts.length === 0) starts.push(...done);
      let o = starts.length > 0 ? attempt(k, i, j, starts) : NOT_TRIED;
      if (!o.ok && starts.length > 0 && rival) {
        const more = [...(near?.ok ? [near] : []), ...(slower?.ok ? [slower] : []), ...done];
        if (more.length > 0) o = attempt(k, i, j, more, false);
      }
      if (!o.ok && first && i === 0) o = counted(solveAlone(sets[k]!.solver, tws[i]!, twa[j]!));
      if (near?.ok && o.ok && Math.abs(o.speed - near.speed) > JUMP * near.speed) {
        // A jump between neighbours: look from all sides before believing it.
        const again = attempt(k, i, j, [near, ...(slower?.ok ? [slower] : []), o]);
        if (again.ok && again.speed > o.speed) o = again;
      }
      row[j] = o;
      if (o.ok) done.push(o);
    }
    if (done.length > 0) return;
    // No set balances from anywhere near: each is searched from nothing, until one does, for a reason worth printing.
    // Sails that do not stand at such an angle are left; a sail is left whose reefed self is overpowered already.
    const overpowered = new Set<number>();
    for (const k of byArea) {
      if (twa[j]! < stands[k]! || overpowered.has(k)) continue;
      const o = counted(
        done.length > 0
          ? sets[k]!.solver.tryFrom(tws[i]!, twa[j]!, done)
          : solveAlone(sets[k]!.solver, tws[i]!, twa[j]!),
      );
      outcomes[k]![i]![j] = o;
      if (o.ok) done.push(o);
      else if (o.why === 'overpowered' && wholeOf[k]! >= 0) overpowered.add(wholeOf[k]!);
    }
  };
  for (let i = 0; i < tws.length; i++) {
    for (let n = startAt; n < order.length; n++) visit(i, n, 1);
    for (let n = startAt - 1; n >= 0; n--) visit(i, n, -1);
  }
  otherWays(sweep, tws, twa, order);
  if (boat.spec.hull.planing) acrossTheHump(boat, sweep, tws, twa, order);
  return sweep;
}

/**
 * A boat may be sailed fastest in more than one way, heeled or upright, eased or not, and each way is a summit of its own.
 * Where neighbours in wind or angle are sailed differently, each way is tried on the other; what wins is passed on.
 */
function otherWays(
  sweep: Sweep,
  tws: readonly number[],
  twa: readonly number[],
  order: readonly number[],
): void {
  const { sets, outcomes } = sweep;
  const differ = (a: Solution, b: Solution): boolean =>
    Math.abs(a.x[X.heel]! - b.x[X.heel]!) > OTHER_WAY.heel ||
    Math.abs(a.x[X.depower]! - b.x[X.depower]!) > OTHER_WAY.depower;
  const tried = new Set<string>();
  let changed = true;
  for (let round = 0; round < ROUNDS && changed; round++) {
    changed = false;
    for (let i = 0; i < tws.length; i++) {
      for (let n = 0; n < order.length; n++) {
        const j = order[n]!;
        const best = fastestAt(sweep, i, j);
        if (best < 0) continue;
        const top = (outcomes[best]![i]![j] as Solution).speed;
        for (let k = 0; k < sets.length; k++) {
          const own = outcomes[k]![i]![j]!;
          // Sets that are far from the fastest may keep a state that is not quite their best.
          if (!own.ok || own.speed < RIVAL * top) continue;
          for (const [i2, j2] of [
            [i, order[n - 1]],
            [i, order[n + 1]],
            [i - 1, j],
            [i + 1, j],
          ] as const) {
            const other = j2 === undefined ? undefined : outcomes[k]![i2]?.[j2];
            const now = outcomes[k]![i]![j] as Solution;
            if (!other?.ok || !differ(now, other)) continue;
            const key = `${k},${i},${j},${i2},${j2},${other.speed}`;
            if (tried.has(key)) continue;
            tried.add(key);
            const o = sets[k]!.solver.tryFrom(tws[i]!, twa[j]!, [other], true);
            sweep.evaluations += o.evaluations;
            if (o.ok && o.speed > now.speed * (1 + 1e-6)) {
              outcomes[k]![i]![j] = o;
              changed = true;
            }
          }
        }
      }
    }
  }
}

/**
 * Boats that plane can have two balances at one wind and angle. Planing ones are carried back from more wind and from
 * neighbouring angles, slower ones forward from less wind; the faster is kept, and the other noted.
 */
function acrossTheHump(
  boat: Boat,
  sweep: Sweep,
  tws: readonly number[],
  twa: readonly number[],
  order: readonly number[],
): void {
  const { sets, outcomes, slower } = sweep;
  const planing = PLANING_FROUDE * Math.sqrt(boat.spec.gravity * boat.hull.form.lwl);
  const better = (k: number, i: number, j: number, from: Outcome | undefined): void => {
    const own = outcomes[k]![i]![j]!;
    if (!from?.ok || from.speed < planing || (own.ok && from.speed < (1 + APART) * own.speed)) return;
    const o = sets[k]!.solver.tryFrom(tws[i]!, twa[j]!, [from], true);
    sweep.evaluations += o.evaluations;
    if (o.ok && (!own.ok || o.speed > own.speed)) outcomes[k]![i]![j] = o;
  };
  for (let k = 0; k < sets.length; k++) {
    for (let i = tws.length - 1; i >= 0; i--) {
      const row = outcomes[k]![i]!;
      if (i + 1 < tws.length) for (const j of order) better(k, i, j, outcomes[k]![i + 1]![j]);
      for (let n = 1; n < order.length; n++) better(k, i, order[n]!, row[order[n - 1]!]);
      for (let n = order.length - 2; n >= 0; n--) better(k, i, order[n]!, row[order[n + 1]!]);
    }
  }
  // The slower balance of the set that sails, carried on from less wind for as long as it lasts.
  for (const j of order) {
    let held: Solution | undefined;
    for (let i = 0; i < tws.length; i++) {
      const k = fastestAt(sweep, i, j);
      if (k < 0) continue;
      const best = outcomes[k]![i]![j] as Solution;
      if (best.speed < planing) {
        held = best;
        continue;
      }
      if (held === undefined) continue;
      const o = sets[k]!.solver.tryFrom(tws[i]!, twa[j]!, [held], true);
      sweep.evaluations += o.evaluations;
      held = o.ok && o.speed < (1 - APART) * best.speed ? o : undefined;
      if (held !== undefined) slower[i]![j] = held.speed;
    }
  }
}

/**
 * The polar of a boat: for every true wind speed the whole angle grid and the two best-VMG states, with the
 * fastest sail set at each. States that do not balance are kept, with their reason.
 * @param request wind speeds [m/s] and angles [rad]; the default grid where left out
 */
export function predictPolar(boat: Boat, request: Partial<PolarRequest> = {}): Polar {
  const tws = request.tws ?? defaultWindSpeeds;
  const twa = request.twa ?? defaultWindAngles;
  for (const v of tws)
    if (!(v >= 0 && v < 60)) throw new RangeError(`wind speed ${v} m/s is outside 0 to 60 m/s`);
  for (const a of twa)
    if (!(a >= 0 && a <= Math.PI + 1e-12)) throw new RangeError(`wind angle ${a} rad is outside 0 to pi`);
  const sweep = sweepAll(boat, tws, twa);
  const { sets, outcomes } = sweep;
  const results = tws.map((windSpeed, i) =>
    twa.map((angle, j): SailingResult => {
      const k = fastestAt(sweep, i, j);
      if (k < 0) {
        // The reason of the set that came nearest: one that is overpowered has drive.
        const reasons = sets.map((_, n) => outcomes[n]![i]![j]!);
        const tried = reasons.findIndex((o) => o !== NOT_TRIED);
        const told = reasons.findIndex((o) => !o.ok && o.why !== 'no drive' && o !== NOT_TRIED);
        const n = Math.max(told, tried, 0);
        return describeOutcome(sets[n]!, windSpeed, angle, reasons[n]!);
      }
      const state = describeState(sets[k]!, windSpeed, angle, outcomes[k]![i]![j] as Solution);
      const other = sweep.slower[i]![j]!;
      if (Number.isNaN(other)) return state;
      const note = `also stays at ${(other / KNOT).toFixed(2)} kn: she can stay planing, but may not get there by herself`;
      return { ...state, slowerSpeed: other, notes: [...state.notes, note] };
    }),
  );
  const optimum = (i: number, which: 'up' | 'down'): SailingResult => {
    const direction = which === 'up' ? 1 : -1;
    const made = (o: Outcome, j: number): number => (o.ok ? direction * o.speed * Math.cos(twa[j]!) : 0);
    const tops = sets.map((_, k) => Math.max(0, ...twa.map((__, j) => made(outcomes[k]![i]![j]!, j))));
    const top = Math.max(...tops);
    let best: SailingResult | undefined;
    sets.forEach((set, k) => {
      if (!(top > 0) || tops[k]! < VMG_RIVAL * top) return;
      const seeds = twa.map((angle, j) => ({ twa: angle, outcome: outcomes[k]![i]![j]! }));
      const b = bestVmg(set.solver, tws[i]!, seeds, direction);
      if (b === undefined) return;
      sweep.evaluations += b.evaluations;
      const state = describeState(set, tws[i]!, b.twa, b.solution);
      const noted =
        b.tangent || b.twa > Math.PI - 1e-9
          ? state
          : { ...state, notes: [...state.notes, 'best VMG at a kink'] };
      const better =
        best === undefined || best.status !== 'balanced' || Math.abs(noted.vmg) > Math.abs(best.vmg);
      if (better) best = noted;
    });
    return (
      best ?? {
        status: 'unbalanced',
        tws: tws[i]!,
        twa: which === 'up' ? 0 : Math.PI,
        why: 'no drive',
        reason: `no balanced state makes good ${which === 'up' ? 'to windward' : 'to leeward'} on this grid of angles`,
        evaluations: 0,
      }
    );
  };
  /** The fastest angle of a wind speed, as a true optimum of the set that is fastest there. */
  const fastest = (i: number): SailingResult => {
    let j = -1;
    let top = 0;
    results[i]!.forEach((r, n) => {
      if (r.status === 'balanced' && r.speed > top) {
        top = r.speed;
        j = n;
      }
    });
    if (j < 0) return results[i]![0]!;
    const k = fastestAt(sweep, i, j);
    const seeds = twa.map((angle, n) => ({ twa: angle, outcome: outcomes[k]![i]![n]! }));
    const b = fastestAngle(sets[k]!.solver, tws[i]!, seeds);
    if (b === undefined) return results[i]![j]!;
    sweep.evaluations += b.evaluations;
    return describeState(sets[k]!, tws[i]!, b.twa, b.solution);
  };
  const bestUp = tws.map((_, i) => optimum(i, 'up'));
  const bestDown = tws.map((_, i) => optimum(i, 'down'));
  return {
    boatName: boat.spec.name,
    tws,
    twa,
    windHeight: boat.wind.referenceHeight,
    results,
    bestUp,
    bestDown,
    fastest: tws.map((_, i) => fastest(i)),
    sets: sets.map((s, k) => ({
      name: s.sailSet.name,
      speed: outcomes[k]!.map((row) => row.map((o) => (o.ok ? o.speed : Number.NaN))),
    })),
    evaluations: sweep.evaluations,
  };
}
