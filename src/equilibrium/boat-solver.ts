import type { Boat } from '../boat/index.js';
import type { SailSet } from '../sails/index.js';
import { AERO } from '../sails/index.js';
import { type BoatModel, createBoatModel, type HeldControls } from './boat-model.js';
import { createSolver, type Outcome, type Solution, type Solver } from './solve.js';
import { RES, type Regime, type SailingResult, type SailingState, X } from './types.js';

/** A boat under one sail set, ready to be solved at many winds and angles. */
export interface SetSolver {
  readonly sailSet: SailSet;
  readonly model: BoatModel;
  readonly solver: Solver;
}

/** One solver per sail set. Each keeps a workspace: do not share one between workers. */
export function createSetSolvers(boat: Boat, held: HeldControls = {}): readonly SetSolver[] {
  return boat.sailSets.map((sailSet) => {
    const model = createBoatModel(boat, sailSet, held);
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
  const { armOut } = model.boat.spec.crew;
  if (x[X.arm]! > armOut * (1 - 1e-6)) return 'crew full out';
  if (Math.abs(x[X.arm]!) < 0.02 * armOut) return 'crew inboard';
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
  const { armOut, armLee } = model.boat.spec.crew;
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
    crewShare: arm >= 0 ? arm / Math.max(1e-9, armOut) : -arm / Math.min(-1e-9, armLee),
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

/** What is held while the rest is chosen for most speed; see `solveState`. */
export interface Held extends Omit<HeldControls, 'depower'> {
  /** Share of the full heeling moment given up, 0 to below 1. */
  readonly ease?: number | undefined;
  /** Name of the sail set. */
  readonly sailSet?: string | undefined;
}

/** The depower value that gives up a share of the heeling moment: ease grows with it, so a bracket closes on it. */
function solveEased(boat: Boat, set: SailSet, tws: number, twa: number, held: Held): SailingResult {
  const ease = held.ease ?? 0;
  const at = (depower: number): { set: SetSolver; result: SailingResult } => {
    const model = createBoatModel(boat, set, { ...held, depower });
    const solver = { sailSet: set, model, solver: createSolver(model) };
    return { set: solver, result: describeOutcome(solver, tws, twa, solveAlone(solver.solver, tws, twa)) };
  };
  let low = 0;
  let high = 0.98;
  let best = at(0).result;
  if (best.status !== 'balanced' || ease <= 0) return best;
  for (let i = 0; i < 40; i++) {
    const mid = 0.5 * (low + high);
    const r = at(mid).result;
    if (r.status !== 'balanced' || r.ease > ease) high = mid;
    else low = mid;
    if (r.status === 'balanced') best = r;
    if (r.status === 'balanced' && Math.abs(r.ease - ease) < 1e-6) break;
  }
  if (best.status === 'balanced' && Math.abs(best.ease - ease) > 1e-3) {
    return {
      status: 'unbalanced',
      tws,
      twa,
      why: 'not converged',
      reason: `no state eased by ${ease} balances; the nearest gives up ${best.ease.toFixed(3)}`,
      evaluations: best.evaluations,
    };
  }
  return best;
}

/**
 * The fastest balanced state at one true wind speed [m/s] and angle [rad, from the course], over all sail sets.
 * Solved from nothing: no neighbouring state is needed.
 * @param held what is not chosen but held: heel, crew, board, ease, sail set
 * @throws RangeError when something is held outside its range
 */
export function solveState(
  boat: Boat,
  wind: { readonly tws: number; readonly twa: number },
  held: Held = {},
): SailingResult {
  const twa = Math.abs(wind.twa);
  const range = boat.spec.boardRange;
  const checked = (name: string, value: number | undefined, low: number, high: number): void => {
    if (value !== undefined && !(value >= low && value <= high))
      throw new RangeError(`${name} ${value} is outside ${low} to ${high}`);
  };
  checked('heel', held.heel, -0.6, 1);
  checked('crew share', held.crewShare, -1, 1);
  checked('board', held.boardDown, range[0], range[1]);
  checked('ease', held.ease, 0, 0.95);
  const sets = boat.sailSets.filter((s) => held.sailSet === undefined || s.name === held.sailSet);
  if (sets.length === 0) throw new RangeError(`the boat has no sail set "${held.sailSet ?? ''}"`);
  let best: SailingResult | undefined;
  for (const sailSet of sets) {
    let r: SailingResult;
    if (held.ease !== undefined) r = solveEased(boat, sailSet, wind.tws, twa, held);
    else {
      const model = createBoatModel(boat, sailSet, held);
      const set = { sailSet, model, solver: createSolver(model) };
      r = describeOutcome(set, wind.tws, twa, solveAlone(set.solver, wind.tws, twa));
    }
    if (best === undefined) best = r;
    else if (r.status === 'balanced' && (best.status !== 'balanced' || r.speed > best.speed)) best = r;
  }
  return best!;
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
