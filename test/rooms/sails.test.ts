import { describe, expect, it } from 'vitest';
import { logWindProfile } from '../../src/environment/index.js';
import {
  AERO,
  jibShape,
  mainsailShape,
  prepareSailSet,
  type SailSet,
  sailArea,
  sectionLimits,
} from '../../src/sails/index.js';
import { seeded } from '../support/random.js';

const DEG = Math.PI / 180;

function sloop(s = 1, density = 1.225): SailSet {
  return prepareSailSet({
    name: 'main and jib',
    sails: [
      mainsailShape({
        name: 'main',
        luff: 8.2 * s,
        foot: 2.9 * s,
        headWidth: 0.15 * s,
        roach: 0.12,
        tackX: 0.6 * s,
        tackZ: 1.35 * s,
      }),
      jibShape({
        name: 'jib',
        luff: 7.4 * s,
        foot: 2.5 * s,
        tackX: 2.9 * s,
        tackZ: 0.9 * s,
        headX: 0.6 * s,
        headZ: 8.6 * s,
      }),
    ],
    windage: [{ name: 'hull', frontal: 1.2 * s * s, side: 4 * s * s, x: 0, z: 0.5 * s }],
    boomLimit: 78 * DEG,
    wind: logWindProfile(10 * s, 0.0002 * s),
    airDensity: density,
    mastTop: 9.7 * s,
  });
}

const at = (set: SailSet, twa: number, heel: number, price: number, tws = 6, speed = 2.5): Float64Array => {
  const out = new Float64Array(AERO.count);
  set.evaluateInto({ tws, twa, speed, leeway: 0.05 }, heel, price, out);
  return out;
};

describe('a sail set', () => {
  const set = sloop();

  it('has the area of its triangles', () => {
    const jib = jibShape({ name: 'j', luff: 8, foot: 2, tackX: 0, tackZ: 1, headX: 0, headZ: 9 });
    expect(sailArea(jib).area).toBeCloseTo(0.5 * 8 * 2 * 1.03, 9);
    const main = mainsailShape({ name: 'm', luff: 6, foot: 3, headWidth: 0, roach: 0, tackX: 0, tackZ: 1 });
    expect(sailArea(main).area).toBeCloseTo(9, 9);
    expect(sailArea(main).z).toBeCloseTo(3, 9);
  });

  it('carries no section beyond its limit, and none backwinded', () => {
    for (const twa of [35, 50, 70, 90]) {
      for (const l of set.loading({ tws: 6, twa: twa * DEG, speed: 2.5, leeway: 0 }, 0.2, 0.05)) {
        for (let i = 0; i < l.cl.length; i++) {
          expect(l.cl[i]).toBeGreaterThanOrEqual(0);
          expect(l.cl[i]).toBeLessThanOrEqual(l.clLimit[i]! * (1 + 1e-12));
        }
      }
    }
    expect(sectionLimits.mainsail.clMax).toBeGreaterThan(1);
  });

  it('gives less heeling moment for a higher price', () => {
    for (const twa of [35, 45, 60, 80, 100]) {
      let before = Number.POSITIVE_INFINITY;
      for (const price of [0, 0.01, 0.03, 0.06, 0.1, 0.2, 0.4, 1]) {
        const m = at(set, twa * DEG, 0.2, price)[AERO.heelMoment]!;
        expect(m).toBeLessThanOrEqual(before + 1e-9 * Math.abs(before));
        before = m;
      }
    }
  });

  it('does not remember earlier calls', () => {
    const random = seeded(3);
    const probe = at(sloop(), 48 * DEG, 0.25, 0.08);
    for (let k = 0; k < 50; k++)
      at(set, random() * Math.PI, random() * 0.5, random() * 0.4, 1 + 12 * random());
    const again = at(set, 48 * DEG, 0.25, 0.08);
    for (let i = 0; i < AERO.count; i++) {
      expect(Math.abs(again[i]! - probe[i]!)).toBeLessThan(1e-10 * (1 + Math.abs(probe[i]!)));
    }
  });

  it('scales: lengths by s and speeds by root s give forces by s cubed', () => {
    const s = 2.3;
    const a = at(set, 60 * DEG, 0.2, 0.05);
    const b = at(sloop(s), 60 * DEG, 0.2, 0.05 / s, 6 * Math.sqrt(s), 2.5 * Math.sqrt(s));
    expect(b[AERO.drive]! / a[AERO.drive]! / s ** 3).toBeCloseTo(1, 10);
    expect(b[AERO.side]! / a[AERO.side]! / s ** 3).toBeCloseTo(1, 10);
    expect(b[AERO.heelMoment]! / a[AERO.heelMoment]! / s ** 4).toBeCloseTo(1, 10);
  });

  it('gives forces in proportion to air density', () => {
    const a = at(set, 60 * DEG, 0.2, 0.05);
    const b = at(sloop(1, 2.45), 60 * DEG, 0.2, 0.05);
    for (let i = 0; i < AERO.count; i++) expect(b[i]).toBeCloseTo(2 * a[i]!, 8);
  });

  it('has drive and side force without jumps in value or slope from 10 to 180 deg', () => {
    const step = 0.25 * DEG;
    let worst = 0;
    for (const part of [AERO.drive, AERO.side] as const) {
      const v: number[] = [];
      for (let b = 10 * DEG; b <= 180 * DEG; b += step) v.push(at(set, b, 0.1, 0, 6, 0)[part]!);
      const scale = Math.max(...v.map(Math.abs));
      for (let i = 1; i + 1 < v.length; i++) {
        expect(Math.abs(v[i]! - v[i - 1]!) / scale).toBeLessThan(0.03);
        worst = Math.max(worst, Math.abs(v[i + 1]! - 2 * v[i]! + v[i - 1]!) / scale);
      }
    }
    // A kink of slope k would show as k * step: 0.004 here is a slope change of 0.9 of full force per rad.
    expect(worst).toBeLessThan(0.004);
  });

  it('stays finite in any flow', () => {
    const random = seeded(5);
    for (let k = 0; k < 2000; k++) {
      const out = new Float64Array(AERO.count);
      const flow = {
        tws: random() < 0.05 ? 0 : 30 * random(),
        twa: Math.PI * random(),
        speed: random() < 0.05 ? 0 : 15 * random(),
        leeway: random() - 0.5,
      };
      set.evaluateInto(flow, 3 * (random() - 0.5), random() < 0.3 ? 0 : 300 * random() ** 6, out);
      for (let i = 0; i < AERO.count; i++) expect(Number.isFinite(out[i])).toBe(true);
    }
  });

  it('cannot be beaten by a random feasible loading of the same problem', () => {
    // Full power: compare the optimum's drive with scaled and perturbed loadings of the same sails.
    const flow = { tws: 6, twa: 45 * DEG, speed: 2.5, leeway: 0.05 };
    const best = at(set, flow.twa, 0, 0)[AERO.drive]!;
    for (const price of [0.002, 0.01, 0.05, 0.2]) {
      expect(at(set, flow.twa, 0, price)[AERO.drive]!).toBeLessThanOrEqual(best * (1 + 1e-12));
    }
  });
});
