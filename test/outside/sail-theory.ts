import {
  createLoadingSolver,
  inducedInto,
  type LoadingProblem,
  prepareLoading,
  solveLoading,
  unknownNodes,
  wakeEnergyMatrix,
  wakeLine,
} from '../../src/lifting-line/index.js';
import { seeded } from '../support/random.js';
import { absolute, type OutsideCheck, relative } from './check.js';

const DEG = Math.PI / 180;
const MAIN = { foot: 1.35, head: 9.55, chord: 2.9 } as const;
const JIB = { foot: 0.9, head: 8.0, chord: 2.5 } as const;
const chordOf =
  (s: { foot: number; head: number; chord: number }) =>
  (z: number): number =>
    s.chord * (1 - 0.95 * ((z - s.foot) / (s.head - s.foot)));

/** The loading problem of a sloop at an apparent angle in an even wind of 1 m/s. */
function sloop(
  n: number,
  awa: number,
  sails: readonly (typeof MAIN | typeof JIB)[] = [MAIN, JIB],
): LoadingProblem {
  const p = prepareLoading(
    sails.map((s) => ({ line: wakeLine(s.foot, s.head, n), chordAt: chordOf(s), k: 0.02, cl0: 0.6 })),
    true,
  );
  for (let i = 0; i < p.n; i++) {
    p.speed[i] = 1;
    p.worth[i] = Math.sin(awa);
    p.cost[i] = Math.max(0.555, Math.cos(awa));
    p.clMax[i] = 1.45;
  }
  return p;
}

/** Drive and side force (per rho) of the best loading, section drag 0.015 + 0.02 (cl - 0.6)^2 included. */
function forces(p: LoadingProblem, awa: number): { drive: number; side: number; x: Float64Array } {
  const solver = createLoadingSolver(p);
  solveLoading(p, solver);
  const induced = new Float64Array(p.n);
  inducedInto(p, solver.x, induced);
  let lift = 0;
  let drag = 0;
  for (let i = 0; i < p.n; i++) {
    const cl = (2 * solver.x[i]!) / p.chord[i]!;
    lift += p.width[i]! * solver.x[i]!;
    drag += 0.5 * induced[i]! + 0.5 * p.chord[i]! * p.width[i]! * (0.015 + 0.02 * (cl - 0.6) ** 2);
  }
  return {
    drive: lift * Math.sin(awa) - drag * Math.cos(awa),
    side: lift * Math.cos(awa) + drag * Math.sin(awa),
    x: solver.x,
  };
}

const GAUSS = [
  [-0.9602898564975363, 0.1012285362903763],
  [-0.7966664774136267, 0.2223810344533745],
  [-0.525532409916329, 0.3137066458778873],
  [-0.1834346424956498, 0.362683783378362],
  [0.1834346424956498, 0.362683783378362],
  [0.525532409916329, 0.3137066458778873],
  [0.7966664774136267, 0.2223810344533745],
  [0.9602898564975363, 0.1012285362903763],
] as const;

/** Energy of a line with its image in the sea when the line leans by an angle: the image leans the other way. */
function imageTerm(nodes: readonly number[], lean: number): Float64Array {
  const n = nodes.length - 2;
  const out = new Float64Array(n * n);
  const cos2 = Math.cos(2 * lean);
  const place = (k: number): number => (k >= 1 && k <= n ? k - 1 : -1);
  for (let e = 0; e + 1 < nodes.length; e++) {
    for (let f = 0; f + 1 < nodes.length; f++) {
      const [a, b, c, d] = [nodes[e]!, nodes[e + 1]!, nodes[f]!, nodes[f + 1]!];
      let mean = 0;
      for (const [xs, ws] of GAUSS)
        for (const [xt, wt] of GAUSS) {
          const s = 0.5 * (a + b) + 0.5 * (b - a) * xs;
          const t = 0.5 * (c + d) + 0.5 * (d - c) * xt;
          mean += 0.25 * ws * wt * 0.5 * Math.log(s * s + t * t + 2 * s * t * cos2);
        }
      for (const [i, si] of [
        [place(e + 1), 1],
        [place(e), -1],
      ] as const)
        for (const [j, sj] of [
          [place(f + 1), 1],
          [place(f), -1],
        ] as const)
          if (i >= 0 && j >= 0) out[i * n + j]! += (si * sj * mean) / (2 * Math.PI);
    }
  }
  return out;
}

export const checks: readonly OutsideCheck[] = [
  {
    source: 'the same problem on finer grids',
    quantity: 'drive of a sloop at 25 deg apparent, N nodes a sail against 96: 8, 16, 32, 64',
    tolerance: 0.008,
    errorUnit: 'relative',
    showCases: true,
    note: '16 are used',
    run: () => {
      const fine = forces(sloop(96, 25 * DEG), 25 * DEG).drive;
      return [8, 16, 32, 64].map((n) => relative(`${n}`, fine, forces(sloop(n, 25 * DEG), 25 * DEG).drive));
    },
  },
  {
    source: 'the same problem on finer grids',
    quantity: 'side force of a sloop at 25 deg apparent, N nodes a sail against 96: 8, 16, 32, 64',
    tolerance: 0.004,
    errorUnit: 'relative',
    showCases: true,
    run: () => {
      const fine = forces(sloop(96, 25 * DEG), 25 * DEG).side;
      return [8, 16, 32, 64].map((n) => relative(`${n}`, fine, forces(sloop(n, 25 * DEG), 25 * DEG).side));
    },
  },
  {
    source: 'exact: Munk 1921, stagger theorem',
    quantity:
      'two sails on one trace, on grids that do not match, against one sail with the sum of their loads',
    tolerance: 0.004,
    errorUnit: 'relative',
    note: 'each grid draws the elliptic load in its own straight pieces',
    run: () => {
      const shape = (s: number): number => Math.sqrt(Math.max(0, 1 - (2 * s - 1) ** 2));
      const energy = (parts: readonly (readonly [number, number])[]): number => {
        const lines = parts.map(([n]) => wakeLine(1, 9, n));
        const a = wakeEnergyMatrix(lines, { image: true });
        const g = lines.flatMap((l, b) =>
          Array.from(unknownNodes(l, { image: true }).z, (z) => parts[b]![1] * shape((z - 1) / 8)),
        );
        return g.reduce((s, gi, i) => s + gi * g.reduce((t, gj, j) => t + a[i * g.length + j]! * gj, 0), 0);
      };
      const whole = energy([[48, 1]]);
      return [
        relative(
          'half and half',
          whole,
          energy([
            [24, 0.5],
            [31, 0.5],
          ]),
        ),
        relative(
          'a quarter and three',
          whole,
          energy([
            [24, 0.25],
            [40, 0.75],
          ]),
        ),
      ];
    },
  },
  {
    source: 'the leaning sail with its image leaning the other way (exact in the plane far behind)',
    quantity:
      'drive and side force of a mainsail at 30 deg apparent, effective angle against leaning image: heel 10, 20, 30 deg',
    tolerance: 0.01,
    errorUnit: 'relative',
    showCases: true,
    note: 'Kerwin 1978 for the effective angle, upright image',
    run: () =>
      [10, 20, 30].flatMap((deg) => {
        const lean = deg * DEG;
        const awa = Math.atan(Math.tan(30 * DEG) * Math.cos(lean));
        const upright = sloop(16, awa, [MAIN]);
        const a = forces(upright, awa);
        const leaning = sloop(16, awa, [MAIN]);
        const nodes = [...wakeLine(MAIN.foot, MAIN.head, 16).nodes];
        const [flat, tilted] = [imageTerm(nodes, 0), imageTerm(nodes, lean)];
        for (let i = 0; i < leaning.energy.length; i++) leaning.energy[i]! += tilted[i]! - flat[i]!;
        const b = forces(leaning, awa);
        return [relative(`${deg}, drive`, b.drive, a.drive), relative(`${deg}, side`, b.side, a.side)];
      }),
  },
  {
    source: 'exact: convex problem',
    quantity: 'what the best of 10,000 random feasible loadings of a sloop gains over the optimum',
    tolerance: 0,
    errorUnit: 'relative',
    run: () => {
      const awa = 30 * DEG;
      const p = sloop(16, awa);
      const { x } = forces(p, awa);
      const random = seeded(404);
      const induced = new Float64Array(p.n);
      /** What the loading is worth in the problem's own terms. */
      const worth = (g: Float64Array): number => {
        inducedInto(p, g, induced);
        let w = 0;
        for (let i = 0; i < p.n; i++) {
          const cl = (2 * g[i]!) / p.chord[i]!;
          const profile = 0.5 * p.chord[i]! * p.width[i]! * p.k[i]! * (cl - p.cl0[i]!) ** 2;
          w += p.width[i]! * g[i]! * p.worth[i]! - p.cost[i]! * (0.5 * induced[i]! + profile);
        }
        return w;
      };
      const best = worth(x);
      let gain = Number.NEGATIVE_INFINITY;
      const g = new Float64Array(p.n);
      for (let k = 0; k < 10_000; k++) {
        // From a hair beside the optimum to anything the sections can carry.
        const spread = 10 ** (-4 * random());
        for (let i = 0; i < p.n; i++) {
          const top = 0.5 * p.chord[i]! * p.clMax[i]!;
          g[i] = Math.min(top, Math.max(0, x[i]! + spread * top * (2 * random() - 1)));
        }
        gain = Math.max(gain, worth(g) / best - 1);
      }
      return [absolute('best try', 0, Math.max(0, gain))];
    },
  },
];
