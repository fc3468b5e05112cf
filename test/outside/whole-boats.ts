import {
  createSolver,
  type SailingResult,
  type SailingState,
  solveState,
} from '../../src/equilibrium/index.js';
import { bestVmg, predictPolar } from '../../src/polar/index.js';
import { type DemoBoat, demoBoat } from '../support/demo.js';
import { dragOnly, fixedDragAngles } from '../support/stub-models.js';
import { absolute, band, type OutsideCase, type OutsideCheck } from './check.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;
const BAND = 'common practice, no source';

function upwind(name: DemoBoat, tws: number): SailingState {
  const p = predictPolar(demoBoat(name), {
    tws: [tws * KNOT],
    twa: [35, 40, 45, 50, 55, 60, 75, 90].map((a) => a * DEG),
  });
  return balanced(p.bestUp[0]!);
}

function at(name: DemoBoat, tws: number, twa: number): SailingState {
  return balanced(solveState(demoBoat(name), { tws: tws * KNOT, twa: twa * DEG }));
}

function balanced(s: SailingResult): SailingState {
  if (s.status !== 'balanced') throw new Error(`no state: ${s.reason}`);
  return s;
}

const WINDS = [6, 10, 15] as const;
const SPEEDS: readonly (readonly [number, number])[] = [
  [4.0, 4.9],
  [5.1, 5.8],
  [5.5, 6.2],
];
const ANGLES: readonly (readonly [number, number])[] = [
  [41, 47],
  [39, 45],
  [37, 44],
];

/** Printed, never tuned to: what boats like the demo boats are seen to do. */
const wide = { source: BAND, printOnly: true } as const;

export const checks: readonly OutsideCheck[] = [
  {
    source: 'exact: V/V_T = sin(twa - b)/sin(b), stub boat through the real solver',
    quantity: 'best VMG up and down over wind speed, b = 20, 30, 40 deg',
    tolerance: 1e-6,
    errorUnit: '',
    run: () => {
      const cases: OutsideCase[] = [];
      for (const [b, up, down] of [
        [20, 0.961902, 1.961902],
        [30, 0.5, 1.5],
        [40, 0.277862, 1.277862],
      ] as const) {
        const solver = createSolver(fixedDragAngles(0.4 * b * DEG, 0.6 * b * DEG));
        const tws = 6;
        const seeds = [];
        let start: Float64Array | undefined;
        for (let a = b + 10; a <= 175; a += 7.5) {
          const outcome = solver.solve(tws, a * DEG, start ? [start] : []);
          if (outcome.ok) start = outcome.x;
          seeds.push({ twa: a * DEG, outcome });
        }
        const u = bestVmg(solver, tws, seeds, 1);
        const d = bestVmg(solver, tws, seeds, -1);
        cases.push(absolute(`b ${b}, up`, up, u ? (u.solution.speed * Math.cos(u.twa)) / tws : Number.NaN));
        cases.push(
          absolute(`b ${b}, down`, down, d ? (-d.solution.speed * Math.cos(d.twa)) / tws : Number.NaN),
        );
      }
      return cases;
    },
  },
  {
    source: 'exact: V/V_T = k/(1 + k), drag alone on a dead run, through the real solver',
    quantity: 'speed over wind speed',
    tolerance: 1e-6,
    errorUnit: '',
    run: () => {
      const r = createSolver(dragOnly(1.225, 1.2 * 7, 1025, 0.004 * 1.6)).solve(5, Math.PI, []);
      return [absolute('k 1.252437', 0.556036, r.ok ? r.speed / 5 : Number.NaN)];
    },
  },
  {
    ...wide,
    quantity: 'keelboat upwind, boat speed at 6, 10, 15 kn of wind',
    tolerance: 0,
    errorUnit: 'kn',
    note: 'boats behind the band set genoas and quote wind at the masthead; no light-air physics has been tuned in',
    run: () => WINDS.map((w, i) => band(`${w} kn`, SPEEDS[i]!, upwind('keelboat', w).speed / KNOT)),
  },
  {
    ...wide,
    quantity: 'keelboat upwind, true wind angle at 6, 10, 15 kn',
    tolerance: 0,
    errorUnit: 'deg',
    run: () => WINDS.map((w, i) => band(`${w} kn`, ANGLES[i]!, upwind('keelboat', w).twa / DEG)),
  },
  {
    ...wide,
    quantity: 'keelboat, beam reach at 12 kn, boat speed',
    tolerance: 0,
    errorUnit: 'kn',
    run: () => [band('90 deg', [6.0, 7.2], at('keelboat', 12, 90).speed / KNOT)],
  },
  {
    ...wide,
    quantity: 'trapeze dinghy upwind at 11 kn, boat speed',
    tolerance: 0,
    errorUnit: 'kn',
    run: () => [band('11 kn', [4.9, 6.0], upwind('trapeze-dinghy', 11).speed / KNOT)],
  },
  {
    ...wide,
    quantity: 'trapeze dinghy upwind at 11 kn, VMG',
    tolerance: 0,
    errorUnit: 'kn',
    run: () => [band('11 kn', [3.5, 4.3], upwind('trapeze-dinghy', 11).vmg / KNOT)],
  },
  {
    ...wide,
    quantity: 'keelboat upwind, Froude number at 10 to 18 kn',
    tolerance: 0,
    errorUnit: '',
    run: () =>
      [10, 12, 15, 18].map((w) => {
        const b = demoBoat('keelboat');
        return band(
          `${w} kn`,
          [0.33, 0.42],
          upwind('keelboat', w).speed / Math.sqrt(b.spec.gravity * b.hull.form.lwl),
        );
      }),
  },
  ...(
    [
      [6, [0.35, 0.5]],
      [10, [0.3, 0.42]],
      [16, [0.2, 0.3]],
    ] as const
  ).map(
    ([w, limits]): OutsideCheck => ({
      ...wide,
      quantity: `best VMG up over wind speed at ${w} kn, three demo boats`,
      tolerance: 0,
      errorUnit: '',
      run: () =>
        (['single-hander', 'trapeze-dinghy', 'keelboat'] as const).map((n) =>
          band(n, limits, upwind(n, w).vmg / (w * KNOT)),
        ),
    }),
  ),
  {
    ...wide,
    quantity: 'dead run without spinnaker over wind speed at 10 kn',
    tolerance: 0,
    errorUnit: '',
    run: () =>
      (['single-hander', 'trapeze-dinghy', 'keelboat'] as const).map((n) =>
        band(n, [0.4, 0.6], at(n, 10, 180).speed / (10 * KNOT)),
      ),
  },
  {
    ...wide,
    quantity: 'upwind at 12 kn: leeway 2 to 6 deg',
    tolerance: 0,
    errorUnit: 'deg',
    run: () =>
      (['single-hander', 'trapeze-dinghy', 'keelboat'] as const).map((n) =>
        band(n, [2, 6], upwind(n, 12).leeway / DEG),
      ),
  },
  {
    ...wide,
    quantity: 'upwind at 12 kn: apparent wind angle 24 to 35 deg',
    tolerance: 0,
    errorUnit: 'deg',
    run: () =>
      (['single-hander', 'trapeze-dinghy', 'keelboat'] as const).map((n) =>
        band(n, [24, 35], upwind(n, 12).awa / DEG),
      ),
  },
  {
    ...wide,
    quantity: 'keelboat upwind, heel 12 to 28 deg at 12 to 18 kn',
    tolerance: 0,
    errorUnit: 'deg',
    run: () => [12, 15, 18].map((w) => band(`${w} kn`, [12, 28], upwind('keelboat', w).heel / DEG)),
  },
];
