import type { Boat } from '../boat/index.js';
import {
  createSetSolvers,
  describeOutcome,
  describeState,
  type Outcome,
  otherSide,
  type SailingResult,
  type SetSolver,
  solveAlone,
} from '../equilibrium/index.js';
import { type BestVmg, bestVmg } from './best-vmg.js';
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

/** Every so many angles a state is also solved from the same angle in less wind. */
const CROSS_CHECK = 3;
/** Change of speed between neighbouring angles, as a share, that is looked at from all sides. */
const JUMP = 0.15;

/** The state beyond `near`, seen from `far`: a start, no more. */
function extrapolated(near: Float64Array, far: Float64Array): Float64Array {
  return near.map((v, i) => v + 0.8 * (v - far[i]!));
}

interface SetSweep {
  readonly set: SetSolver;
  readonly outcomes: Outcome[][];
  readonly up: (BestVmg | undefined)[];
  readonly down: (BestVmg | undefined)[];
}

function sweepSet(set: SetSolver, tws: readonly number[], twa: readonly number[]): SetSweep {
  const { solver } = set;
  const order = twa.map((_, j) => j).sort((a, b) => twa[a]! - twa[b]!);
  let startAt = 0;
  for (let i = 0; i < order.length; i++) {
    const better = Math.abs(twa[order[i]!]! - SWEEP_START) < Math.abs(twa[order[startAt]!]! - SWEEP_START);
    if (better) startAt = i;
  }
  const outcomes: Outcome[][] = [];
  const up: (BestVmg | undefined)[] = [];
  const down: (BestVmg | undefined)[] = [];
  for (let i = 0; i < tws.length; i++) {
    const row: Outcome[] = new Array(twa.length);
    const previous = i > 0 ? outcomes[i - 1] : undefined;
    // Solved from the neighbouring angle, carried on in a straight line where two are known. Every few angles, and
    // where that fails, also from the same angle in less wind: another start that has met other obstacles.
    const visit = (k: number, step: 1 | -1): void => {
      const j = order[k]!;
      const starts: Float64Array[] = [];
      const near = k === startAt && step === 1 ? undefined : row[order[k - step]!];
      const far = row[order[k - 2 * step]!];
      if (near?.ok) starts.push(far?.ok && far !== near ? extrapolated(near.x, far.x) : near.x);
      const slower = previous?.[j];
      const both = (k - startAt) % CROSS_CHECK === 0;
      if (slower?.ok && (starts.length === 0 || both)) starts.push(slower.x);
      if (near?.ok && both) starts.push(otherSide(near.x));
      let outcome =
        starts.length > 0 ? solver.solve(tws[i]!, twa[j]!, starts) : solveAlone(solver, tws[i]!, twa[j]!);
      if (near?.ok && outcome.ok && Math.abs(outcome.speed - near.speed) > JUMP * near.speed) {
        // A jump between neighbours: look from all sides before believing it.
        const more = [near.x, ...(slower?.ok ? [slower.x] : []), outcome.x];
        const again = solver.tryFrom(tws[i]!, twa[j]!, more);
        if (again.ok && again.speed > outcome.speed)
          outcome = { ...again, evaluations: again.evaluations + outcome.evaluations };
      }
      row[j] = outcome;
    };
    for (let k = startAt; k < order.length; k++) visit(k, 1);
    for (let k = startAt - 1; k >= 0; k--) visit(k, -1);
    const seeds = twa.map((angle, j) => ({ twa: angle, outcome: row[j]! }));
    outcomes.push(row);
    up.push(bestVmg(solver, tws[i]!, seeds, 1));
    down.push(bestVmg(solver, tws[i]!, seeds, -1));
  }
  return { set, outcomes, up, down };
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
  const sweeps = createSetSolvers(boat).map((set) => sweepSet(set, tws, twa));
  let evaluations = 0;
  const faster = (a: SailingResult | undefined, b: SailingResult): SailingResult => {
    if (a === undefined) return b;
    if (b.status === 'balanced' && (a.status !== 'balanced' || b.speed > a.speed)) return b;
    return a;
  };
  const results = tws.map((windSpeed, i) =>
    twa.map((angle, j) => {
      let best: SailingResult | undefined;
      for (const s of sweeps) {
        const o = s.outcomes[i]![j]!;
        evaluations += o.evaluations;
        best = faster(best, describeOutcome(s.set, windSpeed, angle, o));
      }
      return best!;
    }),
  );
  const optimum = (i: number, which: 'up' | 'down'): SailingResult => {
    let best: SailingResult | undefined;
    for (const s of sweeps) {
      const b = s[which][i];
      if (b === undefined) continue;
      evaluations += b.evaluations;
      const state = describeState(s.set, tws[i]!, b.twa, b.solution);
      const noted =
        b.tangent || b.twa > Math.PI - 1e-9
          ? state
          : { ...state, notes: [...state.notes, 'best VMG at a kink'] };
      const better =
        best === undefined || best.status !== 'balanced' || Math.abs(noted.vmg) > Math.abs(best.vmg);
      if (better) best = noted;
    }
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
  return {
    boatName: boat.spec.name,
    tws,
    twa,
    windHeight: boat.wind.referenceHeight,
    results,
    bestUp: tws.map((_, i) => optimum(i, 'up')),
    bestDown: tws.map((_, i) => optimum(i, 'down')),
    sets: sweeps.map((s) => ({
      name: s.set.sailSet.name,
      speed: s.outcomes.map((row) => row.map((o) => (o.ok ? o.speed : Number.NaN))),
    })),
    evaluations,
  };
}
