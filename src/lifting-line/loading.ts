import { type BoxQp, createBoxQp, solveBoxQp, solveFreeBlock } from '../numerics/index.js';
import { unknownNodes, unknownsOf, type WakeLine, wakeEnergyMatrix } from './wake.js';

/**
 * The loading of lifting lines as the unknown. Which spanwise circulation gives the most force in one direction
 * when a price is put on the moment it makes? With section drag cd0 + k (cl - cl0)^2 and section limits
 * 0 <= cl <= clmax this is a convex quadratic programme (Munk's minimum-drag problem, with the price of R. T. Jones
 * 1950 on bending moment):
 *
 *   minimise 1/2 G'H G - g'G,   0 <= G_i <= 1/2 V_i c_i clmax_i
 *   H = 1/2 (diag(d) A + A diag(d)) + diag(4 k_i d_i w_i / c_i)
 *   g_i = w_i V_i l_i + 2 d_i k_i cl0_i w_i V_i
 *
 * l_i is the worth of a unit of lift at node i and d_i > 0 the cost of a unit of drag there; all per unit density.
 */
export interface LoadingProblem {
  readonly n: number;
  /** Heights, trapezoid widths and chords at the unknown nodes, line after line. */
  readonly z: Float64Array;
  readonly width: Float64Array;
  readonly chord: Float64Array;
  /** Section drag: k and cl0 by node. */
  readonly k: Float64Array;
  readonly cl0: Float64Array;
  /** First unknown of each line, and the total at the end. */
  readonly first: readonly number[];
  /** Wake energy matrix, row-major. */
  readonly energy: Float64Array;
  /** Inputs of the next solve, filled by the caller: speed, worth of lift, cost of drag, section limit. */
  readonly speed: Float64Array;
  readonly worth: Float64Array;
  readonly cost: Float64Array;
  readonly clMax: Float64Array;
}

export interface LineSpec {
  readonly line: WakeLine;
  readonly chordAt: (z: number) => number;
  readonly k: number;
  readonly cl0: number;
}

export function prepareLoading(lines: readonly LineSpec[], image: boolean): LoadingProblem {
  const first: number[] = [];
  let n = 0;
  for (const l of lines) {
    first.push(n);
    n += unknownsOf(l.line);
  }
  first.push(n);
  const z = new Float64Array(n);
  const width = new Float64Array(n);
  const chord = new Float64Array(n);
  const k = new Float64Array(n);
  const cl0 = new Float64Array(n);
  lines.forEach((l, b) => {
    const nodes = unknownNodes(l.line, { image });
    for (let i = first[b]!; i < first[b + 1]!; i++) {
      z[i] = nodes.z[i - first[b]!]!;
      width[i] = nodes.width[i - first[b]!]!;
      chord[i] = l.chordAt(z[i]!);
      k[i] = l.k;
      cl0[i] = l.cl0;
    }
  });
  return {
    n,
    z,
    width,
    chord,
    k,
    cl0,
    first,
    energy: wakeEnergyMatrix(
      lines.map((l) => l.line),
      { image },
    ),
    speed: new Float64Array(n),
    worth: new Float64Array(n),
    cost: new Float64Array(n),
    clMax: new Float64Array(n),
  };
}

/** A workspace that remembers the last loading as the start of the next; keep one per family of solves. */
export function createLoadingSolver(problem: LoadingProblem): BoxQp {
  return createBoxQp(problem.n);
}

/** Solves for the inputs now in the problem; the circulation [m2/s] is left in `solver.x`. */
export function solveLoading(problem: LoadingProblem, solver: BoxQp): void {
  const { n, width, chord, k, cl0, energy, speed, worth, cost, clMax } = problem;
  const { h, g, upper, place } = solver;
  for (let i = 0; i < n; i++) {
    const di = cost[i]!;
    const row = i * n;
    for (let j = 0; j < i; j++) {
      const v = 0.5 * (di + cost[j]!) * energy[row + j]!;
      h[row + j] = v;
      h[j * n + i] = v;
    }
    h[row + i] = di * (energy[row + i]! + (4 * k[i]! * width[i]!) / chord[i]!);
    g[i] = width[i]! * speed[i]! * (worth[i]! + 2 * di * k[i]! * cl0[i]!);
    upper[i] = 0.5 * speed[i]! * chord[i]! * clMax[i]!;
  }
  if (solveBoxQp(solver)) return;
  // Costs that differ so much along the height that the problem is no longer convex, which no sailing state asks for:
  // their geometric mean in place of the arithmetic one is convex always.
  for (let i = 0; i < n; i++) {
    const row = i * n;
    for (let j = 0; j < i; j++) {
      const v = Math.sqrt(cost[i]! * cost[j]!) * energy[row + j]!;
      h[row + j] = v;
      h[j * n + i] = v;
    }
  }
  place.fill(0);
  solveBoxQp(solver);
}

/** Nodal shares of 2 Di / rho: G_i (A G)_i, written to out. */
export function inducedInto(problem: LoadingProblem, circulation: Float64Array, out: Float64Array): void {
  const { n, energy } = problem;
  for (let i = 0; i < n; i++) {
    let s = 0;
    const row = i * n;
    for (let j = 0; j < n; j++) s += energy[row + j]! * circulation[j]!;
    out[i] = circulation[i]! * s;
  }
}

/**
 * The loading for the inputs now in the problem, to first order about the loading last solved in `solver`: sections at
 * a limit stay there, the others move by one solve with the old factor. For derivatives; `out` gets the circulation.
 */
export function linearisedLoading(
  problem: LoadingProblem,
  solver: BoxQp,
  out: Float64Array,
  scratch: Float64Array,
): void {
  const { n, width, chord, k, cl0, energy, speed, worth, cost, clMax } = problem;
  const { x, rhs, free, bound, freeCount, boundCount } = solver;
  out.fill(0);
  for (let b = 0; b < boundCount; b++) {
    const i = bound[b]!;
    out[i] = 0.5 * speed[i]! * chord[i]! * clMax[i]!;
  }
  for (let a = 0; a < freeCount; a++) out[free[a]!] = x[free[a]!]!;
  for (let i = 0; i < n; i++) scratch[i] = cost[i]! * out[i]!;
  for (let a = 0; a < freeCount; a++) {
    const i = free[a]!;
    const row = i * n;
    let plain = 0;
    let weighted = 0;
    for (let j = 0; j < n; j++) {
      const e = energy[row + j]!;
      plain += e * out[j]!;
      weighted += e * scratch[j]!;
    }
    const di = cost[i]!;
    rhs[a] =
      width[i]! * speed[i]! * (worth[i]! + 2 * di * k[i]! * cl0[i]!) -
      0.5 * (di * plain + weighted) -
      ((4 * k[i]! * di * width[i]!) / chord[i]!) * out[i]!;
  }
  solveFreeBlock(solver, rhs);
  for (let a = 0; a < freeCount; a++) out[free[a]!]! += rhs[a]!;
}
