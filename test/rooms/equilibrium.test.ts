import { describe, expect, it } from 'vitest';
import { assembleBoat } from '../../src/boat/index.js';
import {
  createSetSolvers,
  forceBalance,
  RES,
  type SailingState,
  solveAlone,
  solveState,
  stateVector,
  X,
} from '../../src/equilibrium/index.js';
import { FOIL } from '../../src/foils/index.js';
import { AERO } from '../../src/sails/index.js';
import { DEMO_BOATS, demoBoat, demoPolar } from '../support/demo.js';
import { seeded } from '../support/random.js';
import { densityScaled, froudeScaled } from '../support/scale.js';

const DEG = Math.PI / 180;
const KNOT = 1852 / 3600;

function balancedStates(name: (typeof DEMO_BOATS)[number]): SailingState[] {
  const p = demoPolar(name);
  return [...p.results.flat(), ...p.bestUp, ...p.bestDown].filter((s) => s.status === 'balanced');
}

function at(boat: ReturnType<typeof demoBoat>, tws: number, twa: number): SailingState {
  const s = solveState(boat, { tws, twa });
  if (s.status !== 'balanced') throw new Error(s.reason);
  return s;
}

describe.each(DEMO_BOATS)('%s: every state of the polar', (name) => {
  it('balances to 1e-9 of weight and has a place for most of the grid', () => {
    const states = balancedStates(name);
    expect(states.length).toBeGreaterThan(270);
    for (const s of states) expect(s.residual).toBeLessThan(1e-9);
  });

  it('is balanced, or says why, and never fails to converge', () => {
    for (const s of demoPolar(name).results.flat()) {
      if (s.status === 'unbalanced') {
        expect(s.reason.length).toBeGreaterThan(10);
        expect(s.why).not.toBe('not converged');
      } else {
        for (const v of [s.speed, s.leeway, s.heel, s.rudder, s.ease, s.crewArm, s.awa])
          expect(Number.isFinite(v)).toBe(true);
      }
    }
  });

  it('keeps crew, heel, rudder and foils within their limits', () => {
    const boat = demoBoat(name);
    for (const s of balancedStates(name)) {
      expect(s.crewArm).toBeLessThanOrEqual(boat.spec.crew.armOut + 1e-9);
      expect(s.crewArm).toBeGreaterThanOrEqual(boat.spec.crew.armLee - 1e-9);
      expect(Math.abs(s.rudder)).toBeLessThanOrEqual(boat.spec.limits.rudder + 1e-9);
      expect(s.heel).toBeLessThanOrEqual(boat.spec.limits.heel + 1e-9);
      expect(s.ease).toBeGreaterThanOrEqual(0);
      expect(s.ease).toBeLessThanOrEqual(1);
    }
  });

  it('obeys the course theorem: apparent angle from the course is the sum of the drag angles', () => {
    const boat = demoBoat(name);
    const sets = createSetSolvers(boat);
    const out = new Float64Array(RES.count);
    for (const s of balancedStates(name)) {
      const set = sets.find((x) => x.sailSet.name === s.sailSet)!;
      set.model.residualInto(s.tws, s.twa, stateVector(s), out);
      const { air, foils } = set.model.forces;
      const side = air[AERO.side]! * Math.cos(s.heel);
      const drive = air[AERO.drive]!;
      // Air force in course axes, then along and across the apparent wind.
      const fx = drive * Math.cos(s.leeway) + side * Math.sin(s.leeway);
      const fy = side * Math.cos(s.leeway) - drive * Math.sin(s.leeway);
      const course = s.awa + s.leeway;
      const dragA = -fx * Math.cos(course) + fy * Math.sin(course);
      const liftA = fx * Math.sin(course) + fy * Math.cos(course);
      const dragH = fx - out[RES.surge]! * boat.mass * boat.spec.gravity;
      const liftH = foils[FOIL.lift]! * Math.cos(s.heel);
      const sum = Math.atan2(dragA, liftA) + Math.atan2(dragH, liftH);
      const off = Math.atan2(Math.sin(course - sum), Math.cos(course - sum));
      const force = Math.hypot(fx, fy);
      expect(Math.abs(off)).toBeLessThan((5 * s.residual * boat.mass * boat.spec.gravity) / force + 1e-11);
    }
  });

  it('has a force table that adds up to nothing', () => {
    const boat = demoBoat(name);
    for (const [tws, twa] of [
      [8, 45],
      [12, 90],
      [15, 150],
    ] as const) {
      const b = forceBalance(boat, at(boat, tws * KNOT, twa * DEG));
      const weight = boat.mass * boat.spec.gravity;
      expect(Math.abs(b.sum.forward)).toBeLessThan(1e-9 * weight);
      expect(Math.abs(b.sum.leeward)).toBeLessThan(1e-9 * weight);
      expect(Math.abs(b.sum.roll)).toBeLessThan(1e-8 * weight);
      expect(Math.abs(b.sum.yaw)).toBeLessThan(1e-8 * weight);
    }
  });

  it('has best-VMG angles that meet the tangent condition on the solver, or stand at a named kink or dead run', () => {
    const boat = demoBoat(name);
    const p = demoPolar(name);
    let met = 0;
    for (const s of [...p.bestUp, ...p.bestDown]) {
      if (s.status !== 'balanced' || s.twa > 179 * DEG || s.notes.length > 0) continue;
      const set = createSetSolvers(boat).find((x) => x.sailSet.name === s.sailSet)!;
      const h = 0.05 * DEG;
      const x = stateVector(s);
      const a = set.solver.solve(s.tws, s.twa - h, [x]);
      const b = set.solver.solve(s.tws, s.twa + h, [x]);
      if (!a.ok || !b.ok) throw new Error('no neighbour');
      // Two-sided where the polar is smooth; where a control just reaches its limit the slopes on either side hold it.
      const wanted = s.speed * Math.tan(s.twa);
      const left = (s.speed - a.speed) / h;
      const right = (b.speed - s.speed) / h;
      const both = 0.5 * (left + right);
      const tolerance = 1e-3 * s.speed;
      const held = Math.min(left, right) - tolerance < wanted && wanted < Math.max(left, right) + tolerance;
      expect(Math.abs(both - wanted) < tolerance || held).toBe(true);
      met++;
    }
    expect(met).toBeGreaterThan(6);
  });

  it('is no slower than its grid: best VMG beats every grid angle', () => {
    const p = demoPolar(name);
    p.tws.forEach((_, i) => {
      const up = p.bestUp[i]!;
      const down = p.bestDown[i]!;
      for (const s of p.results[i]!) {
        if (s.status !== 'balanced') continue;
        if (up.status === 'balanced') expect(s.vmg).toBeLessThanOrEqual(up.vmg * (1 + 1e-9));
        if (down.status === 'balanced') expect(-s.vmg).toBeLessThanOrEqual(-down.vmg * (1 + 1e-9));
      }
    });
  });
});

describe('a board that can be raised', () => {
  it('is lowered as far as is fastest: no fixed share beats the choice', () => {
    const boat = demoBoat('trapeze-dinghy');
    for (const [tws, twa] of [
      [4, 45],
      [8, 42],
      [8, 100],
      [5, 160],
    ] as const) {
      const free = solveState(boat, { tws, twa: twa * DEG });
      if (free.status !== 'balanced') throw new Error('no state');
      expect(free.boardDown).toBeGreaterThanOrEqual(boat.spec.boardRange[0]);
      for (const share of [0.3, 0.5, 0.7, 0.85, 1]) {
        const held = assembleBoat({ spec: { ...boat.spec, boardRange: [share, share] } });
        const s = solveState(held, { tws, twa: twa * DEG });
        if (s.status === 'balanced') expect(s.speed).toBeLessThan(free.speed * (1 + 1e-6));
      }
    }
    const up = solveState(boat, { tws: 5, twa: 45 * DEG });
    const down = solveState(boat, { tws: 5, twa: 170 * DEG });
    if (up.status !== 'balanced' || down.status !== 'balanced') throw new Error('no state');
    expect(up.boardDown).toBeGreaterThan(down.boardDown + 0.3);
  });
});

describe('identities of the whole boat', () => {
  const cases = [
    [8, 45],
    [10, 70],
    [14, 42],
    [12, 120],
  ] as const;

  it.each(DEMO_BOATS)('%s: a Froude-scaled boat sails root s as fast at the same heel and leeway', (name) => {
    const boat = demoBoat(name);
    const s = 1.7;
    const big = froudeScaled(boat, s);
    for (const [tws, twa] of cases) {
      const a = at(boat, tws * KNOT, twa * DEG);
      const b = at(big, tws * KNOT * Math.sqrt(s), twa * DEG);
      expect(Math.abs(b.speed / a.speed / Math.sqrt(s) - 1)).toBeLessThan(1e-8);
      expect(Math.abs(b.leeway - a.leeway)).toBeLessThan(1e-4);
      expect(Math.abs(b.heel - a.heel)).toBeLessThan(1e-3);
    }
  });

  it.each(DEMO_BOATS)('%s: twice the density of everything changes nothing', (name) => {
    const boat = demoBoat(name);
    const dense = densityScaled(boat, 2);
    for (const [tws, twa] of cases) {
      const a = at(boat, tws * KNOT, twa * DEG);
      const b = at(dense, tws * KNOT, twa * DEG);
      expect(Math.abs(b.speed / a.speed - 1)).toBeLessThan(1e-9);
    }
  });

  it('gives port and starboard tack the same state', () => {
    const boat = demoBoat('keelboat');
    const a = solveState(boat, { tws: 5, twa: 0.8 });
    const b = solveState(boat, { tws: 5, twa: -0.8 });
    expect(b).toEqual(a);
  });

  it('never sails slower with a wider range of a control', () => {
    for (const name of DEMO_BOATS) {
      const boat = demoBoat(name);
      const wider = assembleBoat({
        spec: {
          ...boat.spec,
          crew: {
            ...boat.spec.crew,
            armOut: boat.spec.crew.armOut * 1.1,
            armLee: boat.spec.crew.armLee * 1.1,
          },
          limits: { ...boat.spec.limits, heel: boat.spec.limits.heel * 1.1 },
        },
        estimates: [],
      });
      for (const [tws, twa] of [...cases, [18, 60] as const]) {
        const a = at(boat, tws * KNOT, twa * DEG);
        const b = at(wider, tws * KNOT, twa * DEG);
        expect(b.speed).toBeGreaterThan(a.speed * (1 - 1e-6));
      }
    }
  });

  it('reports no motion without wind', () => {
    const s = solveState(demoBoat('keelboat'), { tws: 0, twa: 1 });
    expect(s).toMatchObject({ status: 'unbalanced', why: 'no drive' });
  });

  it('reports no drive in the no-go zone', () => {
    for (const name of DEMO_BOATS) {
      const s = solveState(demoBoat(name), { tws: 5, twa: 10 * DEG });
      expect(s.status).toBe('unbalanced');
      if (s.status === 'unbalanced') expect(['no drive', 'foil stalled']).toContain(s.why);
    }
  });
});

describe('the optimum', () => {
  it('is not beaten by a brute-force search over heel and depower', () => {
    const random = seeded(42);
    for (const name of DEMO_BOATS) {
      const boat = demoBoat(name);
      const set = createSetSolvers(boat)[0]!;
      const { model, solver } = set;
      for (let k = 0; k < 6; k++) {
        const tws = (4 + 16 * random()) * KNOT;
        const twa = (40 + 120 * random()) * DEG;
        const best = solveAlone(solver, tws, twa);
        if (!best.ok) continue;
        // At each pair of controls the four balances are solved by Newton from the optimum.
        const c = new Float64Array(RES.count);
        for (let i = 0; i <= 8; i++) {
          for (let j = 0; j <= 8; j++) {
            const x = best.x.slice();
            x[X.heel] = (i / 8) * model.bounds.upper[X.heel]!;
            x[X.depower] = (j / 8) ** 2 * 0.9;
            const v = newton(model, tws, twa, x, c);
            if (v === undefined) continue;
            if (x[X.arm]! > model.bounds.upper[X.arm]! || x[X.arm]! < model.bounds.lower[X.arm]!) continue;
            if (Math.abs(x[X.rudder]!) > model.bounds.upper[X.rudder]!) continue;
            expect(v, `${name} tws ${tws / KNOT} twa ${twa / DEG}`).toBeLessThan(best.speed * 1.0005);
          }
        }
      }
    }
  });
});

/** Solves the four balances at fixed heel and depower by a plain finite-difference Newton; undefined when it fails. */
function newton(
  model: ReturnType<typeof createSetSolvers>[number]['model'],
  tws: number,
  twa: number,
  x: Float64Array,
  c: Float64Array,
): number | undefined {
  const free = [X.speed, X.leeway, X.rudder, X.arm];
  const a = new Float64Array(16);
  const c1 = new Float64Array(4);
  for (let it = 0; it < 25; it++) {
    model.residualInto(tws, twa, x, c);
    if (Math.max(...c.map(Math.abs)) < 1e-9) return x[X.speed];
    free.forEach((j, col) => {
      const h = 1e-6;
      const keep = x[j]!;
      x[j] = keep + h;
      model.residualInto(tws, twa, x, c1);
      x[j] = keep;
      for (let i = 0; i < 4; i++) a[i * 4 + col] = (c1[i]! - c[i]!) / h;
    });
    const d = solve4(a, c);
    const most = Math.max(Math.abs(d[0]!) / 1, Math.abs(d[1]!) / 0.2, Math.abs(d[2]!) / 0.4);
    const scale = most > 1 ? 1 / most : 1;
    free.forEach((j, i) => {
      x[j]! -= scale * d[i]!;
    });
    if (!(x[X.speed]! > 0.01) || Math.abs(x[X.leeway]!) > 0.6) return undefined;
  }
  return undefined;
}

/** Gaussian elimination, written out so that the check shares nothing with the solver. */
function solve4(a: Float64Array, b: Float64Array): number[] {
  const m = Array.from({ length: 4 }, (_, i) => [...a.slice(4 * i, 4 * i + 4), b[i]!]);
  for (let k = 0; k < 4; k++) {
    let p = k;
    for (let i = k + 1; i < 4; i++) if (Math.abs(m[i]![k]!) > Math.abs(m[p]![k]!)) p = i;
    [m[k], m[p]] = [m[p]!, m[k]!];
    for (let i = 0; i < 4; i++) {
      if (i === k) continue;
      const f = m[i]![k]! / m[k]![k]!;
      for (let j = k; j < 5; j++) m[i]![j]! -= f * m[k]![j]!;
    }
  }
  return m.map((r, i) => r[4]! / r[i]!);
}
