import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { assembleBoat, readBoat } from '../../src/boat/index.js';
import { createSetSolvers, solveAlone, solveState } from '../../src/equilibrium/index.js';
import { predictPolar } from '../../src/polar/index.js';
import { DEMO_BOATS, demoBoat } from '../support/demo.js';
import { optimality } from '../support/optimality.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;
const range = (from: number, to: number, step: number): number[] =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step);

/** Second differences of speed, as shares, and the Froude numbers about them. */
function bends(name: (typeof DEMO_BOATS)[number], tws: readonly number[], twa: readonly number[]) {
  const boat = demoBoat(name);
  const scale = Math.sqrt(boat.spec.gravity * boat.hull.form.lwl);
  const polar = predictPolar(boat, { tws: tws.map((v) => v * KNOT), twa: twa.map((a) => a * DEG) });
  const line = tws.length === 1 ? polar.results[0]! : polar.results.map((row) => row[0]!);
  const out: { at: string; bend: number; froude: number; named: boolean }[] = [];
  for (let i = 2; i < line.length; i++) {
    const [a, b, c] = [line[i - 2]!, line[i - 1]!, line[i]!];
    if (a.status !== 'balanced' || b.status !== 'balanced' || c.status !== 'balanced') continue;
    out.push({
      at: `${name} ${(b.tws / KNOT).toFixed(2)} kn, ${(b.twa / DEG).toFixed(2)} deg`,
      bend: Math.abs(c.speed - 2 * b.speed + a.speed) / b.speed,
      froude: b.speed / scale,
      named: a.regime !== c.regime || a.sailSet !== c.sailSet,
    });
  }
  expect(out.length).toBeGreaterThan(0.8 * (line.length - 2));
  return out;
}

describe('polars in small steps', () => {
  for (const name of DEMO_BOATS) {
    it(`of the ${name} have no jump but where she starts to plane`, () => {
      for (const b of [
        ...bends(name, [9], range(35, 180, 0.25)),
        ...bends(name, range(4, 24, 0.25), [100]),
        ...bends(name, range(4, 24, 0.25), [45]),
      ]) {
        // Where regime or sails change the slope may, a little. At Froude number 0.60 the regression ends and planing takes over: there the speed may rise quickly.
        const planing = b.froude > 0.5 && b.froude < 0.75;
        expect(b.bend, b.at).toBeLessThan(planing ? 0.08 : b.named ? 0.02 : 0.012);
      }
    });
  }
});

describe('a sweep', () => {
  it('is nowhere slower than each of its states solved from nothing', () => {
    for (const name of DEMO_BOATS) {
      const boat = demoBoat(name);
      const sets = createSetSolvers(boat);
      const tws = [6, 8, 12, 15, 18, 22].map((v) => v * KNOT);
      const twa = range(30, 180, 10).map((a) => a * DEG);
      const polar = predictPolar(boat, { tws, twa });
      // A third of the states, in turns: each costs some hundred evaluations.
      polar.results.flat().forEach((s, n) => {
        if (n % 3 !== 0) return;
        let alone = 0;
        for (const set of sets) {
          const r = solveAlone(set.solver, s.tws, s.twa);
          if (r.ok) alone = Math.max(alone, r.speed);
        }
        const swept = s.status === 'balanced' ? s.speed : 0;
        expect(alone, `${name} ${s.tws / KNOT} kn ${s.twa / DEG} deg`).toBeLessThanOrEqual(swept * 1.0005);
      });
    }
  });
});

describe('answers of the solver', () => {
  it('are not beaten by more than 0.05 % anywhere on a brute-force grid over speed, heel, depower and board', () => {
    const c = optimality(8, 11, [5, 5, 10]);
    expect(c.states).toBe(8);
    expect(c.beaten).toEqual([]);
    // The grid comes near: it is no empty search.
    expect(c.worst).toBeGreaterThan(-0.05);
  });
});

describe('a state with some of it held', () => {
  const boat = demoBoat('single-hander');
  const wind = { tws: 10 * KNOT, twa: 42 * DEG };
  const free = solveState(boat, wind);
  if (free.status !== 'balanced') throw new Error('no state');

  it('is where it is held, and no faster than the free one', () => {
    for (const [held, got] of [
      [{ heel: 3 * DEG }, (s: typeof free) => s.heel],
      [{ crewShare: 0.4 }, (s: typeof free) => s.crewShare],
      [{ boardDown: 0.8 }, (s: typeof free) => s.boardDown],
      [{ ease: 0.3 }, (s: typeof free) => s.ease],
    ] as const) {
      const s = solveState(boat, wind, held);
      if (s.status !== 'balanced') throw new Error(`${JSON.stringify(held)}: ${s.reason}`);
      expect(got(s)).toBeCloseTo(Object.values(held)[0]!, 5);
      expect(s.speed).toBeLessThanOrEqual(free.speed * (1 + 1e-9));
      expect(s.residual).toBeLessThan(1e-8);
    }
  });

  it('held at the optimum is the optimum', () => {
    const s = solveState(boat, wind, { heel: free.heel, boardDown: free.boardDown });
    if (s.status !== 'balanced') throw new Error('no state');
    expect(Math.abs(s.speed / free.speed - 1)).toBeLessThan(1e-7);
  });

  it('keeps to the sail set it is told, and refuses what is out of range', () => {
    const keelboat = demoBoat('keelboat');
    const s = solveState(keelboat, { tws: 6, twa: 2 }, { sailSet: 'main alone' });
    expect(s.status === 'balanced' && s.sailSet).toBe('main alone');
    expect(() => solveState(keelboat, wind, { sailSet: 'kite' })).toThrow(/no sail set "kite"/);
    expect(() => solveState(boat, wind, { heel: 2 })).toThrow(/heel 2 is outside/);
  });
});

describe('a boat with a hump in her resistance', () => {
  it('has two balances over a range of winds; the faster is given and the slower noted', () => {
    // A measured curve that falls after a steep hump: what the regressions never do.
    const text = readFileSync('boats/single-hander.yaml', 'utf8').replace(
      /^hull:\n/m,
      `hull:
  measured_resistance:
    - { speed: 1.0 m/s, force: 6 N }
    - { speed: 2.0 m/s, force: 30 N }
    - { speed: 2.6 m/s, force: 80 N }
    - { speed: 3.2 m/s, force: 230 N }
    - { speed: 3.8 m/s, force: 190 N }
    - { speed: 5.0 m/s, force: 170 N }
    - { speed: 7.0 m/s, force: 230 N }
    - { speed: 9.0 m/s, force: 330 N }
`,
    );
    const boat = readBoat(text, 'hump.yaml');
    const tws = range(8, 20, 0.5).map((v) => v * KNOT);
    const polar = predictPolar(boat, { tws, twa: [100, 110, 120].map((a) => a * DEG) });
    const both = polar.results
      .map((row) => row[1]!)
      .filter((r) => r.status === 'balanced' && r.slowerSpeed !== undefined);
    expect(both.length).toBeGreaterThan(1);
    for (const r of both) {
      if (r.status !== 'balanced') continue;
      expect(r.slowerSpeed).toBeLessThan(0.97 * r.speed);
      // The slower one is a true balance too: found from a slow start, it stays.
      const slow = solveState(assembleBoat({ spec: boat.spec }), { tws: r.tws, twa: r.twa });
      expect(slow.status).toBe('balanced');
    }
    // Below the range only the slow one, above it only the fast one.
    const line = polar.results.map((row) => row[1]!);
    const first = line.findIndex((r) => r.status === 'balanced' && r.slowerSpeed !== undefined);
    expect(first).toBeGreaterThan(0);
    expect(line.at(-1)!.status === 'balanced' && line.at(-1)!.status).toBe('balanced');
  });
});
