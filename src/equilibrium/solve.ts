import { type Attempt, createOptimiser } from './optimise.js';
import { createSurvey, type Survey } from './survey.js';
import { type ForceModel, type Unbalance, X } from './types.js';

export interface Solution {
  readonly ok: true;
  readonly x: Float64Array;
  readonly speed: number;
  /** d speed / d twa along the optimum [m/s per rad]. */
  readonly speedSlope: number;
  readonly residual: number;
  /** False when the state balances but is not proven to be the fastest. */
  readonly proven: boolean;
  readonly evaluations: number;
  /** Curvature of speed over the controls there, for a neighbour's start. */
  readonly curvature: Float64Array;
}

/** A state to start from: the vector alone, or with the curvature its own solution ended with. */
export type Start =
  | Float64Array
  | { readonly x: Float64Array; readonly curvature?: Float64Array | undefined };

export interface NoSolution {
  readonly ok: false;
  readonly why: Unbalance;
  readonly reason: string;
  readonly evaluations: number;
}

export type Outcome = Solution | NoSolution;

/** Finds the fastest balanced state of a force model. Keeps a workspace; answers depend on the arguments alone. */
export interface Solver {
  readonly model: ForceModel;
  /**
   * @param tws true wind speed [m/s]
   * @param twa true wind angle from the course [rad]
   * @param starts states to start from (neighbours of the polar); none: the survey finds starts
   */
  solve(tws: number, twa: number, starts: readonly Start[]): Outcome;
  /**
   * The same from the given starts alone: no survey when they fail. For second looks.
   * @param quick states that only fill a grid: see RunOptions
   */
  tryFrom(tws: number, twa: number, starts: readonly Start[], quick?: boolean): Outcome;
}

function isBalance(a: Attempt): boolean {
  return a.converged && a.stable;
}

export function createSolver(model: ForceModel): Solver {
  const optimiser = createOptimiser(model);
  const survey = createSurvey(model);

  const search = (
    tws: number,
    twa: number,
    starts: readonly Start[],
    further: boolean,
    quick = false,
  ): Outcome => {
    let evaluations = 0;
    let best: Attempt | undefined;
    const attempt = (start: Start, mostIterations?: number): Attempt => {
      const from = start instanceof Float64Array ? { x: start } : start;
      const options = {
        mostIterations: mostIterations ?? (quick ? QUICK_ITERATIONS : undefined),
        quick,
        curvature: 'curvature' in from ? from.curvature : undefined,
      };
      const a = optimiser.run(tws, twa, from.x, options);
      evaluations += a.evaluations;
      if (isBalance(a)) {
        if (best === undefined || a.x[X.speed]! > best.x[X.speed]!) best = a;
      }
      if (a.converged && !a.stable) {
        // The balance found is one the boat would leave by herself: look on either side of it.
        for (const f of [0.7, 1.3]) {
          const beside = a.x.slice();
          beside[X.speed]! *= f;
          const b = optimiser.run(tws, twa, beside, { mostIterations });
          evaluations += b.evaluations;
          if (isBalance(b) && (best === undefined || b.x[X.speed]! > best.x[X.speed]!)) best = b;
        }
      }
      return a;
    };
    const done = (a: Attempt): Solution => ({
      ok: true,
      x: a.x,
      speed: a.x[X.speed]!,
      speedSlope: a.speedSlope,
      residual: a.residual,
      proven: a.optimal,
      evaluations,
      curvature: a.curvature,
    });

    if (!(tws > 0)) {
      return { ok: false, why: 'no drive', reason: 'no wind, no motion', evaluations };
    }
    if (starts.length === 0 || further) {
      const proof = noDrive(model, tws, twa);
      evaluations += proof.evaluations;
      if (proof.proven) return { ok: false, why: 'no drive', reason: NO_FORCE, evaluations };
    }
    if (starts.length > 0) for (const s of starts) attempt(s);
    else for (const s of guesses(model)) attempt(s, 20);
    if (best?.optimal) return done(best);
    if (!further) {
      if (best !== undefined) return done(best);
      return {
        ok: false,
        why: 'not converged',
        reason: 'none of the given starts led to a balance',
        evaluations,
      };
    }

    let seen: Survey | undefined;
    let worst: Attempt | undefined;
    let hopeless = false;
    for (const thorough of [false, true]) {
      // Where the first look found her far overpowered at every start, the closer one looks at eased sails only.
      const look = survey(tws, twa, thorough, hopeless);
      evaluations += look.evaluations;
      // An eased look alone would forget that there is drive at full power.
      seen =
        hopeless && seen !== undefined
          ? { ...look, points: [...look.points, ...seen.points], anyDrive: true }
          : look;
      const excess = (p: Survey['points'][number]): number => p.armExcess + p.rudderExcess + p.foilExcess;
      const ranked = [...seen.points].sort(
        (a, b) =>
          (excess(a) === 0 ? 0 : 1 + excess(a)) - (excess(b) === 0 ? 0 : 1 + excess(b)) || b.x[0]! - a.x[0]!,
      );
      // The fastest start of those that hold, the next clearly slower ones, and the least violating one.
      // Far beyond what the crew can hold no step of the optimiser will mend it: the closer look decides.
      hopeless = ranked.length > 0 && ranked.every((p) => p.armExcess > HOPELESS);
      const chosen = hopeless ? [] : ranked.slice(0, thorough ? 5 : 3);
      for (const p of chosen) {
        const a = attempt(p.x, 25);
        if (!isBalance(a) && (worst === undefined || a.residual < worst.residual)) worst = a;
      }
      if (best?.optimal) return done(best);
      // Nowhere a surplus of drive, at full power or eased, upright or heeled: a closer look would find none.
      if (!seen.anyDrive) break;
    }
    if (best !== undefined) return done(best);
    // The most promising of the failed attempts gets a longer run.
    if (worst !== undefined && worst.residual < 1e-3) {
      const again = attempt(worst.x);
      if (best !== undefined) return done(best);
      if (again.residual <= worst.residual) worst = again;
    }
    return { ok: false, ...diagnose(model, seen!, worst), evaluations };
  };

  return {
    model,
    solve: (tws, twa, starts) => search(tws, twa, starts, true),
    tryFrom: (tws, twa, starts, quick) => search(tws, twa, starts, false, quick),
  };
}

/** Steps a start gets that only fills a grid: most need four. */
const QUICK_ITERATIONS = 14;
/** Excess of the crew's arm over its range beyond which a start is not worth an attempt; judgement. */
const HOPELESS = 0.3;
const NO_FORCE = 'the sails give no forward force that exceeds the resistance at any speed';
/** Ladder of speeds of the proof: lowest and highest over the boat's own speed, and how many. */
const LADDER = { low: 0.01, high: 2.6, rungs: 22 } as const;

/**
 * Whether even the most drive stays below the least resistance at every speed. Between two rungs the larger drive is held
 * against the resistance of the slower one, so that nothing slips through.
 */
function noDrive(model: ForceModel, tws: number, twa: number): { proven: boolean; evaluations: number } {
  const at = model.boundsAt;
  if (at === undefined) return { proven: false, evaluations: 0 };
  let slower: { drive: number; resistance: number } | undefined;
  for (let k = 0; k <= LADDER.rungs; k++) {
    const v = model.speedScale * LADDER.low * (LADDER.high / LADDER.low) ** (k / LADDER.rungs);
    const here = at(tws, twa, v);
    if (here.drive > here.resistance) return { proven: false, evaluations: k + 1 };
    if (slower !== undefined && Math.max(slower.drive, here.drive) > slower.resistance)
      return { proven: false, evaluations: k + 1 };
    slower = here;
  }
  return { proven: true, evaluations: LADDER.rungs + 1 };
}

/** Starts where nothing is known: at displacement speed and planing, at full power and eased. */
function guesses(model: ForceModel): Float64Array[] {
  const guess = (froude: number, heel: number, depower: number): Float64Array => {
    const x = new Float64Array(X.count);
    x[X.speed] = froude * model.speedScale;
    x[X.leeway] = 0.04;
    x[X.heel] = heel;
    x[X.depower] = depower;
    x[X.hoist] = model.bounds.upper[X.hoist]!;
    return x;
  };
  return [guess(0.3, 0.1, 0), guess(0.35, 0.25, 0.4), guess(1, 0.1, 0.3)];
}

/** What stands in the way at a state that balances but breaks a limit; undefined when none is broken. */
function brokenLimit(model: ForceModel, a: Attempt): { why: Unbalance; reason: string } | undefined {
  const { lower, upper } = model.bounds;
  const arm =
    Math.max(a.x[X.arm]! - upper[X.arm]!, lower[X.arm]! - a.x[X.arm]!) / (upper[X.arm]! - lower[X.arm]!);
  if (arm > 1e-6) return { why: 'overpowered', reason: armReason(arm) };
  if (Math.abs(a.x[X.rudder]!) > upper[X.rudder]! + 1e-6) return { why: 'rudder at its limit', reason: HELM };
  if (a.violation > 1e-6) {
    return { why: 'foil stalled', reason: 'keel or rudder would have to lift more than it can' };
  }
  return undefined;
}

const HELM = 'the helm cannot hold the course';

function armReason(excess: number): string {
  return `wherever she has drive the heeling moment exceeds what the crew can hold, by ${(100 * excess).toFixed(0)} % of their range or more`;
}

function diagnose(
  model: ForceModel,
  survey: Survey,
  worst: Attempt | undefined,
): { why: Unbalance; reason: string } {
  if (survey.points.length === 0) {
    return {
      why: 'no drive',
      reason: survey.anyDrive
        ? 'drive exceeds resistance at no speed at which leeway, heel and helm also balance'
        : NO_FORCE,
    };
  }
  const arm = Math.min(...survey.points.map((p) => p.armExcess));
  const rudder = Math.min(...survey.points.map((p) => p.rudderExcess));
  const foil = Math.min(...survey.points.map((p) => p.foilExcess));
  if (arm > 1e-6) {
    return {
      why: 'overpowered',
      reason: armReason(arm),
    };
  }
  if (foil > 1e-6) {
    return {
      why: 'foil stalled',
      reason: `a foil would need ${(100 * (1 + foil)).toFixed(0)} % of its largest lift`,
    };
  }
  if (rudder > 1e-6) return { why: 'rudder at its limit', reason: HELM };
  if (worst !== undefined && worst.residual < 1e-8) {
    const limit = brokenLimit(model, worst);
    if (limit !== undefined) return limit;
  }
  if (worst?.converged && !worst.stable) {
    return {
      why: 'no drive',
      reason:
        'forces balance only where the boat would not stay: a little slower and she stops, a little faster and she is gone',
    };
  }
  return {
    why: 'not converged',
    reason: `residual ${worst?.residual.toExponential(1) ?? 'unknown'} of weight, limits exceeded by ${worst?.violation.toExponential(1) ?? 'unknown'}, last speed ${worst?.x[X.speed]?.toFixed(3) ?? '-'} m/s`,
  };
}
