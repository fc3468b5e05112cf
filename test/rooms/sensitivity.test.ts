import { describe, expect, it } from 'vitest';
import { type Boat, boatWithFactors, NO_FACTORS } from '../../src/boat/index.js';
import { createSetSolvers, RES, solveAlone, X } from '../../src/equilibrium/index.js';
import { luFactor, luSolve } from '../../src/numerics/index.js';
import { DESIGN_QUANTITIES, legTimes, sensitivityPlan } from '../../src/racecourse/index.js';
import { DEMO_BOATS, demoBoat } from '../support/demo.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;
/** Change of the time for 5 % more of a quantity: [wind][upwind, reaching, downwind]. */
const change = (boat: Boat, quantity: string, kn: readonly number[]): number[][] => {
  const q = DESIGN_QUANTITIES.find((d) => d.name === quantity)!;
  const tws = kn.map((v) => v * KNOT);
  const more = legTimes(q.alter(boat.spec, 1.05)!, tws);
  const base = legTimes({ spec: boat.spec, factors: NO_FACTORS }, tws);
  return more.map((row, i) => row.map((v, j) => v - base[i]![j]!));
};

describe('what is known in the trade (common practice, no source)', () => {
  it.each(DEMO_BOATS)(
    'more sail wins in light air, and stops paying upwind with the crew at its limit: %s',
    (name) => {
      const [light, strong] = change(demoBoat(name), 'sail area', [6, 16]);
      for (const v of light!) expect(v).toBeLessThan(-3);
      expect(strong![0]).toBeGreaterThan(0);
    },
  );

  it.each(DEMO_BOATS)('more crew weight hurts in light air and helps upwind in a breeze: %s', (name) => {
    const [light, strong] = change(demoBoat(name), 'crew weight', [6, 16]);
    for (const v of light!) expect(v).toBeGreaterThan(0);
    expect(strong![0]).toBeLessThan(0);
  });

  it.each(DEMO_BOATS)('a taller, narrower rig of the same area wins upwind in light air: %s', (name) => {
    const [light, strong] = change(demoBoat(name), 'rig height', [6, 16]);
    expect(light![0]).toBeLessThan(-10);
    expect(strong![0]).toBeGreaterThan(light![0]!);
  });
});

describe('a sensitivity', () => {
  it('leaves out what a boat has none of, and names all else once', () => {
    const names = (boat: Boat) =>
      sensitivityPlan(boat.spec, 0.05)
        .gather([[[0, 0, 0]]])
        .map((s) => s.name);
    expect(names(demoBoat('keelboat'))).toEqual(DESIGN_QUANTITIES.map((q) => q.name));
    expect(names(demoBoat('single-hander'))).not.toContain('ballast');
  });

  it('is nothing where nothing is changed', () => {
    const { spec } = demoBoat('keelboat');
    for (const q of DESIGN_QUANTITIES) {
      const same = q.alter(spec, 1)!;
      expect(same.factors, q.name).toEqual(NO_FACTORS);
      expect(same.spec.crew).toEqual(spec.crew);
      expect(same.spec.weights).toEqual(spec.weights);
      for (const [i, s] of same.spec.sails.entries())
        for (const [k, height] of s.z.entries()) expect(height).toBeCloseTo(spec.sails[i]!.z[k]!, 12);
    }
  });

  it('a taller rig keeps the area of every sail', () => {
    const { spec } = demoBoat('keelboat');
    const taller = DESIGN_QUANTITIES.find((q) => q.name === 'rig height')!.alter(spec, 1.1)!.spec;
    const area = (s: (typeof spec.sails)[number]): number =>
      s.z
        .slice(1)
        .reduce((sum, height, i) => sum + 0.5 * (height - s.z[i]!) * (s.chord[i]! + s.chord[i + 1]!), 0);
    for (const [i, s] of spec.sails.entries()) expect(area(taller.sails[i]!)).toBeCloseTo(area(s), 9);
  });

  it('by solving again agrees with the envelope theorem where no limit binds', () => {
    // Heel and depower are chosen for speed: to first order they may be held while the four balances are met again.
    const boat = demoBoat('keelboat');
    const [tws, twa] = [7 * KNOT, 100 * DEG];
    for (const factor of ['friction', 'windage', 'foilProfile', 'residuary'] as const) {
      const set = (f: number) => createSetSolvers(boatWithFactors(boat, { ...NO_FACTORS, [factor]: f }))[0]!;
      const centre = set(1);
      const best = solveAlone(centre.solver, tws, twa);
      if (!best.ok) throw new Error(best.reason);
      const { upper, lower } = centre.model.bounds;
      expect(best.x[X.arm]).toBeLessThan(0.95 * upper[X.arm]!);
      expect(best.x[X.arm]).toBeGreaterThan(0.95 * lower[X.arm]!);
      const held = (f: number): number => {
        const { model } = set(f);
        const x = best.x.slice();
        const basic = [X.speed, X.leeway, X.rudder, X.arm];
        const [c, d] = [new Float64Array(RES.count), new Float64Array(RES.count)];
        model.prepare?.(tws, twa);
        for (let k = 0; k < 8; k++) {
          model.residualInto(tws, twa, x, c);
          const jac = new Float64Array(16);
          for (const [j, at] of basic.entries()) {
            const y = x.slice();
            y[at]! += 1e-6;
            model.residualInto(tws, twa, y, d);
            for (let i = 0; i < 4; i++) jac[4 * i + j] = (d[i]! - c[i]!) / 1e-6;
          }
          const pivots = new Int32Array(4);
          const step = c.map((v) => -v);
          luFactor(4, jac, pivots);
          luSolve(4, jac, pivots, step);
          for (const [j, at] of basic.entries()) x[at]! += step[j]!;
        }
        model.residualInto(tws, twa, x, c);
        expect(Math.max(...c.map(Math.abs))).toBeLessThan(1e-9);
        return x[X.speed]!;
      };
      const free = (f: number): number => {
        const r = set(f).solver.solve(tws, twa, [best.x]);
        if (!r.ok) throw new Error(r.reason);
        return r.speed;
      };
      const h = 0.02;
      const byHolding = (held(1 + h) - held(1 - h)) / (2 * h);
      const bySolving = (free(1 + h) - free(1 - h)) / (2 * h);
      expect(Math.abs(byHolding / bySolving - 1), factor).toBeLessThan(0.01);
    }
  });
});
