import { type Outcome, type Solution, type Solver, X } from '../equilibrium/index.js';
import { boundedMinimum, bracketedRoot } from '../numerics/index.js';

/** A solved angle: the polar's grid states seed the search. */
export interface Seed {
  readonly twa: number;
  readonly outcome: Outcome;
}

export interface BestVmg {
  readonly twa: number;
  readonly solution: Solution;
  readonly evaluations: number;
  /** True when the tangent condition d speed / d twa = speed tan(twa) holds; false at 180 deg or at a kink. */
  readonly tangent: boolean;
}

/** Angle tolerance [rad] of the tangent condition's root. */
const ANGLE_TOLERANCE = 1e-6;

/** What is sought over the angle: a weight on speed and its slope there. */
interface Aim {
  readonly weight: (twa: number) => number;
  readonly slope: (twa: number) => number;
}

/**
 * Best velocity made good to windward (direction 1) or to leeward (direction -1) as a true optimum of the
 * solver: the root of d(V cos twa)/d twa = V' cos twa - V sin twa, with V' from the envelope theorem, bracketed
 * by the neighbours of the best grid angle. Where the polar has a kink the root is replaced by a minimum search
 * (golden section with parabolic steps).
 * @returns undefined when no seed balances with a positive VMG in that direction
 */
export function bestVmg(
  solver: Solver,
  tws: number,
  seeds: readonly Seed[],
  direction: 1 | -1,
): BestVmg | undefined {
  return optimumAngle(solver, tws, seeds, {
    weight: (twa) => direction * Math.cos(twa),
    slope: (twa) => -direction * Math.sin(twa),
  });
}

/** The fastest angle of a wind speed, likewise: the root of V'. */
export function fastestAngle(solver: Solver, tws: number, seeds: readonly Seed[]): BestVmg | undefined {
  return optimumAngle(solver, tws, seeds, { weight: () => 1, slope: () => 0 });
}

function optimumAngle(solver: Solver, tws: number, seeds: readonly Seed[], aim: Aim): BestVmg | undefined {
  const solved = seeds
    .filter((s): s is Seed & { outcome: Solution } => s.outcome.ok)
    .sort((a, b) => a.twa - b.twa);
  let k = -1;
  let top = 0;
  for (let i = 0; i < solved.length; i++) {
    const v = solved[i]!.outcome.speed * aim.weight(solved[i]!.twa);
    if (v > top) {
      top = v;
      k = i;
    }
  }
  if (k < 0) return undefined;
  const centre = solved[k]!;
  let evaluations = 0;
  const known: { twa: number; solution: Solution }[] = solved.map((s) => ({
    twa: s.twa,
    solution: s.outcome,
  }));
  const solveAt = (twa: number): Solution | undefined => {
    let nearest = known[0]!;
    for (const c of known) if (Math.abs(c.twa - twa) < Math.abs(nearest.twa - twa)) nearest = c;
    if (Math.abs(nearest.twa - twa) < 1e-12) return nearest.solution;
    const r = solver.tryFrom(tws, twa, [nearest.solution]);
    evaluations += r.evaluations;
    if (!r.ok) return undefined;
    known.push({ twa, solution: r });
    return r;
  };
  const vmgAt = (twa: number): number => {
    const s = solveAt(twa);
    return s === undefined ? -1e9 : s.speed * aim.weight(twa);
  };
  /** Slope of the made-good speed; a failed state counts as rising away from it. */
  const slopeAt = (twa: number, failed: number): number => {
    const s = solveAt(twa);
    return s === undefined ? failed : s.speedSlope * aim.weight(twa) + s.speed * aim.slope(twa);
  };

  const left = k > 0 ? solved[k - 1]!.twa : Math.max(0.5 * centre.twa, centre.twa - (5 * Math.PI) / 180);
  const right =
    k < solved.length - 1 ? solved[k + 1]!.twa : Math.min(Math.PI, centre.twa + (5 * Math.PI) / 180);
  let best = { twa: centre.twa, solution: centre.outcome, vmg: top, tangent: false };
  const keep = (twa: number, tangent: boolean): void => {
    const s = solveAt(twa);
    if (s === undefined) return;
    const v = s.speed * aim.weight(twa);
    if (v > best.vmg || (tangent && v >= best.vmg * (1 - 1e-12)))
      best = { twa, solution: s, vmg: v, tangent };
  };

  const sLeft = slopeAt(left, 1);
  const sRight = right >= Math.PI ? slopeAt(Math.PI - 1e-3, 1) : slopeAt(right, -1);
  if (right >= Math.PI && sRight >= 0) {
    keep(Math.PI, false);
  }
  if (sLeft > 0 && sRight < 0) {
    const hi = right >= Math.PI ? Math.PI - 1e-3 : right;
    const root = bracketedRoot((t) => slopeAt(t, t < centre.twa ? 1 : -1), left, hi, ANGLE_TOLERANCE);
    const s = solveAt(root);
    if (s !== undefined) {
      const slope = s.speedSlope * aim.weight(root) + s.speed * aim.slope(root);
      keep(root, Math.abs(slope) < 1e-4 * s.speed);
    }
  }
  if (!best.tangent && best.twa < Math.PI - 1e-9) {
    const { x } = boundedMinimum((t) => -vmgAt(t), left, right, 1e-5);
    keep(x, false);
  }
  if (!(best.solution.x[X.speed]! > 0)) return undefined;
  return { twa: best.twa, solution: best.solution, evaluations, tangent: best.tangent };
}
