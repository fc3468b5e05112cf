/**
 * Speed, printed as ratios against references in the same run. Not a test: times depend on the machine.
 *
 * The reference solves the same problem with general-purpose minimisers from npm: for each state the same
 * residual, from the same starts, with fmin's Nelder-Mead on a penalised objective, and
 * ml-levenberg-marquardt on the residual alone (heel and depower given, the solver's own optimum).
 */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { createRequire } from 'node:module';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { levenbergMarquardt } from 'ml-levenberg-marquardt';

// Measured on the built files, as users run them.
const built = (room: string): Promise<unknown> =>
  import(new URL(`../../dist/${room}/index.js`, import.meta.url).href);
const { createSetSolvers, describeState, RES, solveAlone, stateVector, X } = (await built(
  'equilibrium',
)) as typeof import('../../src/equilibrium/index.js');
const { assembleBoat, readBoat } = (await built('boat')) as typeof import('../../src/boat/index.js');
const { defaultWindAngles, defaultWindSpeeds, predictPolar } = (await built(
  'polar',
)) as typeof import('../../src/polar/index.js');

const boat = readBoat(readFileSync('boats/keelboat.yaml', 'utf8'), 'boats/keelboat.yaml');

// The package's module entry holds CommonJS, so it is required.
const fmin: typeof import('fmin') = createRequire(import.meta.url)('fmin');
// Its shrink step counts in a variable it never declares: without this one it would stop there.
(globalThis as unknown as { i: number }).i = 0;
const now = () => Number(process.hrtime.bigint()) / 1e6;

function timed<T>(f: () => T): { ms: number; value: T } {
  const t = now();
  const value = f();
  return { ms: now() - t, value };
}

const { prepareSailSet } = (await built('sails')) as typeof import('../../src/sails/index.js');
const prepareAll = () => boat.sailSets.map((s) => prepareSailSet(s.spec));
const sailsCold = timed(prepareAll).ms;
const cold = timed(() => predictPolar(boat));
let best = Number.POSITIVE_INFINITY;
for (let i = 0; i < 5; i++) best = Math.min(best, timed(() => predictPolar(boat)).ms);
const polar = cold.value;
const grid = polar.results.flat();
const all = [...grid, ...polar.bestUp, ...polar.bestDown];
const balanced = all.filter((s) => s.status === 'balanced');
const counts = grid.map((s) => s.evaluations);
const notConverged = all.filter((s) => s.status === 'unbalanced' && s.why === 'not converged');

const set = createSetSolvers(boat)[0]!;
const { model, solver } = set;
const c = new Float64Array(RES.count);

function perCall(n: number, f: () => void): number {
  for (let i = 0; i < n / 5; i++) f();
  const t = now();
  for (let i = 0; i < n; i++) f();
  return ((now() - t) / n) * 1000;
}

// One force evaluation, and one state from its neighbour.
const sample = balanced.filter((s) => s.sailSet === set.sailSet.name).slice(0, 120);
const x0 = stateVector(sample[40]!);
const evaluation = perCall(20000, () => model.residualInto(sample[40]!.tws, sample[40]!.twa, x0, c));
const out = new Float64Array(32);
const hullCost = perCall(200000, () => boat.hull.resistanceInto(x0[X.speed]!, x0[X.heel]!, out));
const foilCost = perCall(200000, () =>
  boat.foils.evaluateInto(x0[X.speed]!, x0[X.leeway]!, x0[X.rudder]!, x0[X.heel]!, 1, out),
);
const flow = { tws: 6, twa: 1, speed: 2.5, leeway: 0.06 };
const airCost = perCall(20000, () => boat.sailSets[0]!.evaluateInto(flow, 0.2, 0.1, out));
/** Bytes of new heap per call, over many calls without a collection between. */
function allocated(n: number, f: () => void): number {
  for (let i = 0; i < 2000; i++) f();
  let least = Number.POSITIVE_INFINITY;
  for (let k = 0; k < 5; k++) {
    const before = process.memoryUsage().heapUsed;
    for (let i = 0; i < n; i++) f();
    least = Math.min(least, Math.max(0, (process.memoryUsage().heapUsed - before) / n));
  }
  return least;
}
const heapHull = allocated(200000, () => boat.hull.resistanceInto(x0[X.speed]!, x0[X.heel]!, out));
const heapFoils = allocated(200000, () =>
  boat.foils.evaluateInto(x0[X.speed]!, x0[X.leeway]!, x0[X.rudder]!, x0[X.heel]!, 1, out),
);
const heapAll = allocated(20000, () => model.residualInto(sample[40]!.tws, sample[40]!.twa, x0, c));
const sailsWarm = perCall(20, prepareAll) / 1000;
const prepareCost = perCall(20, () => assembleBoat({ spec: boat.spec })) / 1000;
const starts = sample.map((s) => {
  const x = stateVector(s);
  x[X.speed]! *= 0.97;
  x[X.heel]! *= 0.9;
  return x;
});
const ours = timed(() => sample.map((s, i) => solver.solve(s.tws, s.twa, [starts[i]!])));

// Reference A: Nelder-Mead on -speed + penalty, unknowns scaled to order one.
const few = sample.filter((_, i) => i % 12 === 0);
const scale = [model.speedScale, 0.05, 0.2, 0.05, 0.3, Math.abs(model.bounds.upper[X.arm]!)];
const reference = timed(() =>
  few.map((s) => {
    const start = stateVector(s);
    start[X.speed]! *= 0.97;
    start[X.heel]! *= 0.9;
    const x = new Float64Array(X.count);
    let z = scale.map((s, j) => start[j]! / s);
    let value = { x: z, fx: 0 };
    for (const penalty of [1e2, 1e4, 1e6]) {
      value = fmin.nelderMead(
        (zz: number[]) => {
          let out = 0;
          x[X.hoist] = 1;
          for (let j = 0; j < scale.length; j++) {
            x[j] = zz[j]! * scale[j]!;
            out += Math.max(0, x[j]! - model.bounds.upper[j]!, model.bounds.lower[j]! - x[j]!) ** 2;
            x[j] = Math.min(model.bounds.upper[j]!, Math.max(model.bounds.lower[j]!, x[j]!));
          }
          x[X.speed] = Math.max(1e-3, x[X.speed]!);
          model.residualInto(s.tws, s.twa, x, c);
          let e = 0;
          for (let i = 0; i < 4; i++) e += c[i]! * c[i]!;
          return -x[X.speed]! / model.speedScale + penalty * (e * 100 + out);
        },
        z,
        { maxIterations: 3000 },
      );
      z = value.x;
    }
    return z[X.speed]! * scale[X.speed]!;
  }),
);
const worseBy = few.map((s, i) => reference.value[i]! / s.speed - 1);

// Reference B: the residual alone by Levenberg-Marquardt, heel and depower held at our optimum.
const lm = timed(() =>
  few.map((s) => {
    const x = stateVector(s);
    const names = [X.speed, X.leeway, X.rudder, X.arm];
    const initial = names.map((j) => (x[j]! * 0.97) / scale[j]!);
    const fit = levenbergMarquardt(
      { x: [0, 1, 2, 3], y: [0, 0, 0, 0] },
      (p: number[]) => {
        const xx = x.slice();
        names.forEach((j, i) => {
          xx[j] = p[i]! * scale[j]!;
        });
        xx[X.speed] = Math.max(1e-3, xx[X.speed]!);
        const r = new Float64Array(4);
        model.residualInto(s.tws, s.twa, xx, r);
        return (k: number) => r[k]! * 100;
      },
      {
        initialValues: initial,
        maxIterations: 100,
        gradientDifference: 1e-6,
        damping: 1e-3,
        errorTolerance: 1e-18,
      },
    );
    return { speed: fit.parameterValues[0]! * scale[0]!, error: fit.parameterError };
  }),
);
const lmOff = few.map((s, i) => lm.value[i]!.speed / s.speed - 1);

const perState = ours.ms / sample.length;
const f = (v: number, d = 2) => v.toFixed(d);
console.log(
  `keelboat, ${defaultWindSpeeds.length} wind speeds x ${defaultWindAngles.length} angles and both optima`,
);
console.log(`full polar                     cold ${f(cold.ms, 0)} ms, warm ${f(best, 0)} ms`);
console.log(
  `states                         ${all.length}, balanced ${balanced.length}, not converged ${notConverged.length}`,
);
console.log(`states per second              ${f((all.length / best) * 1000, 0)}`);
console.log(
  `force evaluations per state    mean ${f(polar.evaluations / all.length, 1)}, worst on the grid ${Math.max(...counts)}`,
);
console.log(`one force evaluation           ${f(evaluation)} us`);
console.log(
  `  of it hull, foils, sails      ${f(hullCost)}, ${f(foilCost)}, ${f(airCost)} us; new heap ${f(heapHull, 1)}, ${f(heapFoils, 1)} and in all ${f(heapAll, 1)} bytes a call`,
);
console.log(`preparing all sail sets        cold ${f(sailsCold, 1)} ms, warm ${f(sailsWarm, 1)} ms`);
console.log(`assembling the boat            ${f(prepareCost, 1)} ms`);
console.log(`one state from a neighbour     ${f(perState * 1000, 0)} us`);
console.log('');
console.log('ratios in this run (reference / ours, per state)');
console.log(
  `Nelder-Mead (fmin)             ${f(reference.ms / few.length / perState, 0)}x; its speed is ${f(100 * Math.min(...worseBy), 3)} to ${f(100 * Math.max(...worseBy), 3)} % off ours`,
);
console.log(
  `Levenberg-Marquardt, balance   ${f(lm.ms / few.length / perState, 1)}x for the residual alone, controls given; ${f(100 * Math.min(...lmOff), 4)} to ${f(100 * Math.max(...lmOff), 4)} % off ours`,
);
console.log(
  `same problem, whole polar      ${f(((reference.ms / few.length) * all.length * boat.sailSets.length) / best, 0)}x (reference per state times states and sail sets, against the warm polar, impossible states included)`,
);
// A state solved from nothing finds what the sweep found.
const alone = few.map((s) => {
  const r = solveAlone(solver, s.tws, s.twa);
  return r.ok ? describeState(set, s.tws, s.twa, r).speed / s.speed - 1 : Number.NaN;
});
console.log(
  `from nothing against the sweep ${f(100 * Math.max(...alone.map(Math.abs)), 5)} % largest difference in speed`,
);

console.log('');
// The same boat with her two plain sets only.
const plain = assembleBoat({
  spec: {
    ...boat.spec,
    sailSets: boat.spec.sailSets.filter((x) => x.name === 'main and jib' || x.name === 'main alone'),
  },
});
let two = Number.POSITIVE_INFINITY;
for (let i = 0; i < 5; i++) two = Math.min(two, timed(() => predictPolar(plain)).ms);
console.log(`full polar, two plain sets     warm ${f(two, 0)} ms (five sets ${f(best, 0)} ms)`);

// Time per state at ten times the states.
const tenfold = Array.from({ length: 10 * defaultWindSpeeds.length }, (_, i) => {
  const at = (i * (defaultWindSpeeds.length - 1)) / (10 * defaultWindSpeeds.length - 1);
  const k = Math.min(defaultWindSpeeds.length - 2, Math.floor(at));
  return defaultWindSpeeds[k]! + (at - k) * (defaultWindSpeeds[k + 1]! - defaultWindSpeeds[k]!);
});
const many = timed(() => predictPolar(boat, { tws: tenfold })).ms;
console.log(`time per state at 10x states   ${f(many / 10 / best)} of that at 1x`);

// Work spread over worker threads: the same sweep with one and with two.
const sweep = (workers: number, folder: string): number =>
  timed(() =>
    execFileSync(
      process.execPath,
      [
        'bin/polarwright.js',
        'sweep',
        'boats/keelboat.yaml',
        '--vary',
        'weights.ballast.mass = 480 to 560 kg in 8 steps; sails.main.area = 13 to 15.4 m2 in 8 steps',
        '--wind',
        '6,12',
        '--workers',
        String(workers),
        '--out',
        folder,
      ],
      { stdio: 'ignore' },
    ),
  ).ms;
const scratch = mkdtempSync(join(tmpdir(), 'polarwright-bench-'));
try {
  const one = sweep(1, join(scratch, 'one'));
  const both = sweep(2, join(scratch, 'two'));
  console.log(
    `sweep of 64 variants           ${f(one / 1000, 1)} s on one worker, ${f(one / both)}x faster on two`,
  );
} finally {
  rmSync(scratch, { recursive: true, force: true });
}
const start = (...words: string[]): number =>
  Math.min(
    ...[1, 2, 3].map(
      () =>
        timed(() => execFileSync(process.execPath, ['bin/polarwright.js', ...words], { stdio: 'ignore' })).ms,
    ),
  );
console.log(
  `cold process                   --version ${f(start('--version'), 0)} ms, check ${f(start('check', 'boats/keelboat.yaml'), 0)} ms, polar ${f(start('polar', 'boats/keelboat.yaml', '--json'), 0)} ms`,
);
