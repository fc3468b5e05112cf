import { describe, expect, it } from 'vitest';
import { generateRoundBilge, HULL, type MainDimensions, prepareHull } from '../../src/hull/index.js';
import { seeded } from '../support/random.js';

const G = 9.80665;
const RHO = 1025;

/** A hull inside the Delft ranges, floating a little light or heavy of its lines. */
function prepared(random: () => number, planing: boolean, scale = 1) {
  const between = (a: number, b: number): number => a + (b - a) * random();
  const lwl = between(3, 10) * scale;
  const bwl = lwl / between(2.8, 4.8);
  const d: MainDimensions = {
    lwl,
    bwl,
    canoeDraft: bwl / between(3.5, 12),
    cp: between(0.525, 0.595),
    cm: between(0.655, 0.775),
    cwp: between(0.66, 0.72),
    lcbAft: between(0.005, 0.055),
    freeboard: between(0.07, 0.12) * lwl,
    beamMax: bwl * between(1.05, 1.4),
  };
  const mass = RHO * d.cp * d.cm * lwl * bwl * d.canoeDraft * between(0.9, 1.1);
  const x = -d.lcbAft * lwl;
  return prepareHull(
    generateRoundBilge(d),
    { mass, x, z: between(0, 0.1) * lwl },
    {
      water: { density: RHO, kinematicViscosity: 1.19e-6 * scale ** 1.5 },
      gravity: G,
      residuary: random() < 0.5 ? 'delft-1998' : 'delft-2008',
      planing,
      centreReach: [x - 0.06 * lwl, x + 0.04 * lwl],
    },
  );
}

describe('two thousand random hulls in range', () => {
  it('have resistance finite, positive, never falling with speed and smooth in slope', () => {
    const random = seeded(2026);
    const out = new Float64Array(HULL.count);
    let turns = 0;
    for (let k = 0; k < 2000; k++) {
      const h = prepared(random, k % 10 === 0);
      const c = Math.sqrt(G * h.form.lwl);
      const weight = RHO * h.form.volume * G;
      const heel = 0.4 * random();
      let before = 0;
      for (let fn = 0.05; fn <= 1.5; fn += 0.05) {
        const r = h.resistanceInto(fn * c, 0, out) / weight;
        expect(r > 0 && r < 2, `hull ${k} Fn ${fn}`).toBe(true);
        if (r < before * (1 - 1e-12)) turns++;
        before = r;
      }
      // Slope on either side of a table point, where a kink would sit.
      const fn = 0.05 + 0.01 * Math.floor(120 * random());
      const e = 1e-5;
      const slope = (f: number): number =>
        (h.resistanceInto((f + e) * c, heel, out) - h.resistanceInto((f - e) * c, heel, out)) / (2 * e);
      expect(Math.abs(slope(fn + 2 * e) - slope(fn - 2 * e)) / weight).toBeLessThan(3e-3);
      expect(h.rightingArm(0.02)).toBeGreaterThan(-0.02 * h.form.lwl);
      expect(h.wetted(heel)).toBeGreaterThan(0);
    }
    expect(turns).toBe(0);
  });

  it('agree with their Froude-scaled copies', () => {
    const out = new Float64Array(HULL.count);
    for (let k = 0; k < 60; k++) {
      const s = 0.6 + 0.03 * k;
      const a = prepared(seeded(k), k % 3 === 0);
      const b = prepared(seeded(k), k % 3 === 0, s);
      for (const fn of [0.25, 0.4, 0.7, 1.2]) {
        const va = fn * Math.sqrt(G * a.form.lwl);
        const ratio = b.resistanceInto(va * Math.sqrt(s), 0.2, out) / a.resistanceInto(va, 0.2, out);
        expect(Math.abs(ratio / s ** 3 - 1)).toBeLessThan(1e-9);
      }
    }
  });
});
