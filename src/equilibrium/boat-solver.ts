import type { Boat } from '../boat/index.js';
import type { SailSet } from '../sails/index.js';
import { AERO } from '../sails/index.js';
import { type BoatModel, createBoatModel } from './boat-model.js';
import { createSolver, type Outcome, type Solution, type Solver } from './solve.js';
import { RES, type Regime, type SailingResult, type SailingState, X } from './types.js';

/** A boat under one sail set, ready to be solved at many winds and angles. */
export interface SetSolver {
  readonly sailSet: SailSet;
  readonly model: BoatModel;
  readonly solver: Solver;
}

/** One solver per sail set. Each keeps a workspace: do not share one between workers. */
export function createSetSolvers(boat: Boat): readonly SetSolver[] {
  return boat.sailSets.map((sailSet) => {
    const model = createBoatModel(boat, sailSet);
    return { sailSet, model, solver: createSolver(model) };
  });
}

/** Ease below this share is called full power. */
const EASE_SHOWN = 0.005;

function regimeOf(model: BoatModel, x: Float64Array, ease: number): Regime {
  const { upper } = model.bounds;
  if (model.sailSet.spec.sails.some((s) => (s.reef ?? 0) > 0)) return 'reefed';
  if (ease > EASE_SHOWN) return 'easing';
  if (x[X.heel]! > upper[X.heel]! - 1e-6) return 'heel limited';
  if (x[X.arm]! > upper[X.arm]! * (1 - 1e-6)) return 'crew full out';
  if (Math.abs(x[X.arm]!) < 0.02 * upper[X.arm]!) return 'crew inboard';
  return 'crew part out';
}

/** Angles from the lee quarter are given past 180 deg, so that a dead run does not jump to the other side. */
function aroundTheStern(angle: number): number {
  return angle < -0.5 * Math.PI ? angle + 2 * Math.PI : angle;
}

/** The report of a solved state: angles, wind over the deck, ease, regime. */
export function describeState(set: SetSolver, tws: number, twa: number, s: Solution): SailingState {
  const { model, sailSet } = set;
  const { x } = s;
  const res = new Float64Array(RES.count);
  model.prepare?.(tws, twa);
  model.residualInto(tws, twa, x, res);
  const speed = x[X.speed]!;
  const leeway = x[X.leeway]!;
  const heel = x[X.heel]!;
  const ahead = tws * Math.cos(twa - leeway) + speed * Math.cos(leeway);
  const windward = tws * Math.sin(twa - leeway) - speed * Math.sin(leeway);
  const flow = { tws, twa, speed, leeway };
  let ease = 0;
  if (x[X.depower]! > 0) {
    const full = sailSet.fullMoment(flow, heel);
    const { air } = model.forces;
    const moment = air[AERO.heelMoment]! - air[AERO.windageMoment]!;
    ease = full > 0 ? Math.max(0, 1 - moment / full) : 0;
  }
  const arm = x[X.arm]!;
  const { lower, upper } = model.bounds;
  const notes: string[] = [];
  if (!s.proven) notes.push('balances, but not proven to be the fastest state: the search ended at an edge');
  return {
    status: 'balanced',
    tws,
    twa,
    twaHeading: twa - leeway,
    aws: Math.hypot(ahead, windward),
    awa: aroundTheStern(Math.atan2(windward, ahead)),
    speed,
    vmg: speed * Math.cos(twa),
    leeway,
    heel,
    rudder: x[X.rudder]!,
    ease,
    depower: x[X.depower]!,
    crewArm: arm,
    crewShare: arm >= 0 ? arm / Math.max(1e-9, upper[X.arm]!) : -arm / Math.min(-1e-9, lower[X.arm]!),
    boardDown: x[X.hoist]!,
    sailSet: sailSet.name,
    regime: regimeOf(model, x, ease),
    residual: s.residual,
    evaluations: s.evaluations,
    notes,
  };
}

export function describeOutcome(set: SetSolver, tws: number, twa: number, outcome: Outcome): SailingResult {
  if (outcome.ok) return describeState(set, tws, twa, outcome);
  return {
    status: 'unbalanced',
    tws,
    twa,
    why: outcome.why,
    reason: outcome.reason,
    evaluations: outcome.evaluations,
  };
}

/** Vector of unknowns of a reported state, to start from or to evaluate again. */
export function stateVector(s: SailingState): Float64Array {
  const x = new Float64Array(X.count);
  x[X.speed] = s.speed;
  x[X.leeway] = s.leeway;
  x[X.heel] = s.heel;
  x[X.rudder] = s.rudder;
  x[X.depower] = s.depower;
  x[X.arm] = s.crewArm;
  x[X.hoist] = s.boardDown;
  return x;
}

/**
 * The fastest balanced state at one true wind speed [m/s] and angle [rad, from the course], over all sail sets.
 * Solved from nothing: no neighbouring state is needed.
 */
export function solveState(boat: Boat, wind: { readonly tws: number; readonly twa: number }): SailingResult {
  const twa = Math.abs(wind.twa);
  let best: SailingResult | undefined;
  for (const set of createSetSolvers(boat)) {
    const r = describeOutcome(set, wind.tws, twa, solveAlone(set.solver, wind.tws, twa));
    if (best === undefined) best = r;
    else if (r.status === 'balanced' && (best.status !== 'balanced' || r.speed > best.speed)) best = r;
  }
  if (best === undefined) throw new RangeError('the boat has no sail set');
  return best;
}

/**
 * A state from another side: full power, heeled the other way. Boats that the crew hold up have a best state to either
 * side of upright now and then.
 */
export function otherSide(x: Float64Array): Float64Array {
  const y = x.slice();
  y[X.depower] = 0;
  y[X.heel] = x[X.heel]! > 0 ? -0.05 : 0.06;
  return y;
}

/** One state without neighbours: from guesses or the survey, then once more from the other side. */
export function solveAlone(solver: Solver, tws: number, twa: number): Outcome {
  const first = solver.solve(tws, twa, []);
  if (!first.ok) return first;
  const second = solver.tryFrom(tws, twa, [otherSide(first.x)]);
  const evaluations = first.evaluations + second.evaluations;
  const better = second.ok && second.speed > first.speed * (1 + 1e-9) ? second : first;
  return { ...better, evaluations };
}
