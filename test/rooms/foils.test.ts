import { describe, expect, it } from 'vitest';
import {
  bulbFormFactor,
  bulbVolume,
  bulbWetted,
  FOIL,
  type FoilSpec,
  foilFriction,
  prepareFoilSystem,
  rudderDownwash,
} from '../../src/foils/index.js';
import { seeded } from '../support/random.js';

const WATER = { density: 1025, kinematicViscosity: 1.19e-6 };

function system(random: () => number, s = 1) {
  const between = (a: number, b: number): number => a + (b - a) * random();
  const keel: FoilSpec = {
    kind: 'keel',
    span: s * between(0.7, 1.4),
    chords: [s * between(0.4, 0.9), s * between(0.25, 0.4)],
    sweep: between(0, 0.3),
    thickness: between(0.06, 0.14),
    x: s * between(0, 0.4),
    z: s * -0.3,
    surfacePiercing: false,
    clMax: 1.2,
  };
  const rudder: FoilSpec = {
    kind: 'rudder',
    span: s * between(0.5, 1),
    chords: [s * between(0.25, 0.35), s * between(0.15, 0.25)],
    sweep: 0.05,
    thickness: 0.1,
    x: s * -2.5,
    z: 0,
    surfacePiercing: true,
    clMax: 0.85,
  };
  return prepareFoilSystem({
    keel,
    rudder,
    canoeDraft: 0.3 * s,
    sidewaysVolume: 0.5 * s ** 3,
    water: { density: WATER.density, kinematicViscosity: WATER.kinematicViscosity * s ** 1.5 },
  });
}

const out = new Float64Array(FOIL.count);
const evaluate = (f: ReturnType<typeof system>, v: number, l: number, r: number, h: number, hoist = 1) => {
  f.evaluateInto(v, l, r, h, hoist, out);
  return out.slice();
};

describe('keel and rudder', () => {
  it('have lift odd and drag even under a change of sides', () => {
    const random = seeded(1);
    for (let k = 0; k < 40; k++) {
      const f = system(random);
      const a = evaluate(f, 3, 0.08, 0.03, 0.3);
      const b = evaluate(f, 3, -0.08, -0.03, -0.3);
      for (const i of [FOIL.lift, FOIL.heelMoment, FOIL.yawMoment, FOIL.keelLift, FOIL.rudderLift]) {
        expect(b[i]).toBeCloseTo(-a[i]!, 9);
      }
      for (const i of [
        FOIL.keelInduced,
        FOIL.keelProfile,
        FOIL.rudderInduced,
        FOIL.rudderProfile,
        FOIL.keelStall,
      ]) {
        expect(b[i]).toBeCloseTo(a[i]!, 9);
      }
    }
  });

  it('quarter the induced drag for twice the span at the same lift', () => {
    const base = system(seeded(3));
    const long = prepareFoilSystem({
      ...base.spec,
      canoeDraft: 0,
      keel: { ...base.spec.keel, span: 2 * base.spec.keel.span, chords: [0.5, 0.5], sweep: 0 },
    });
    const short = prepareFoilSystem({
      ...base.spec,
      canoeDraft: 0,
      keel: { ...base.spec.keel, chords: [0.25, 0.25], sweep: 0 },
    });
    const a = evaluate(short, 3, 0.05, 0, 0);
    const b = evaluate(long, 3, 0.05, 0, 0);
    // Same aspect ratio, so the same efficiency: Di / L^2 goes with 1 / span^2.
    const ratio =
      b[FOIL.keelInduced]! / b[FOIL.keelLift]! ** 2 / (a[FOIL.keelInduced]! / a[FOIL.keelLift]! ** 2);
    expect(ratio).toBeCloseTo(0.25, 9);
  });

  it('turn the bow to leeward when the rudder lifts to windward', () => {
    const f = system(seeded(5));
    const a = evaluate(f, 3, 0.05, 0, 0.2);
    const b = evaluate(f, 3, 0.05, 0.1, 0.2);
    expect(b[FOIL.rudderLift]).toBeGreaterThan(a[FOIL.rudderLift]!);
    expect(b[FOIL.yawMoment]).toBeLessThan(a[FOIL.yawMoment]!);
  });

  it('lose side force with heel and with the board raised', () => {
    const f = system(seeded(6));
    const up = evaluate(f, 3, 0.06, 0, 0)[FOIL.keelLift]!;
    expect(evaluate(f, 3, 0.06, 0, 0.4)[FOIL.keelLift]).toBeLessThan(up);
    let before = 0;
    for (const hoist of [0.3, 0.5, 0.7, 0.9, 1]) {
      const own = evaluate(f, 3, 0.06, 0, 0, hoist);
      const profile = own[FOIL.keelProfile]!;
      expect(profile).toBeGreaterThan(before);
      before = profile;
    }
  });

  it('are smooth in every argument, at rest too', () => {
    const f = system(seeded(7));
    const e = 1e-4;
    const base: [number, number, number, number, number][] = [
      [3, 0.05, 0.02, 0.2, 0.8],
      [3, 0, 0, 0, 0.8],
      [0.5, 0.02, 0, 0, 0.6],
    ];
    for (const p of base) {
      for (let j = 0; j < 5; j++) {
        const at = (d: number): Float64Array => {
          const q = [...p] as typeof p;
          q[j]! += d;
          return evaluate(f, ...q);
        };
        // Slopes on either side differ by curvature times step: halving the step must halve it; a kink would stay.
        const gap = (d: number): number[] => {
          const [a, b, c] = [at(-d), at(0), at(d)];
          return Array.from(b, (v, i) => (c[i]! - 2 * v + a[i]!) / d);
        };
        const wide = gap(e);
        const narrow = gap(0.5 * e);
        for (let i = 0; i < FOIL.keelStall; i++) {
          expect(Math.abs(narrow[i]!)).toBeLessThan(
            0.6 * Math.abs(wide[i]!) + 1e-5 * (1 + Math.abs(at(0)[i]!)),
          );
        }
      }
    }
    for (const v of evaluate(f, 0, 0.1, 0.1, 0.2)) expect(Number.isFinite(v)).toBe(true);
  });

  it('scale: s cubed the force at root s the speed', () => {
    for (const s of [0.5, 2.2]) {
      const a = evaluate(system(seeded(11)), 3, 0.06, 0.02, 0.2);
      const b = evaluate(system(seeded(11), s), 3 * Math.sqrt(s), 0.06, 0.02, 0.2);
      expect(b[FOIL.lift]! / a[FOIL.lift]! / s ** 3).toBeCloseTo(1, 10);
      expect(b[FOIL.keelProfile]! / a[FOIL.keelProfile]! / s ** 3).toBeCloseTo(1, 10);
      expect(b[FOIL.yawMoment]! / a[FOIL.yawMoment]! / s ** 4).toBeCloseTo(1, 10);
    }
  });
});

describe('foil sections and downwash', () => {
  it('have friction between the laminar and the turbulent line', () => {
    for (let p = 4.5; p < 7.5; p += 0.1) {
      const re = 10 ** p;
      const cf = foilFriction(re);
      expect(cf).toBeGreaterThanOrEqual(1.328 / Math.sqrt(re) - 1e-9);
      expect(cf).toBeLessThan(0.075 / (Math.log10(re) - 2) ** 2 + 2e-4);
    }
  });

  it('have downwash odd in lift and below both laws', () => {
    for (const cl of [0.01, 0.05, 0.2, 0.6]) {
      const d = rudderDownwash(cl, 4);
      expect(rudderDownwash(-cl, 4)).toBe(-d);
      expect(d).toBeLessThanOrEqual((2 * cl) / (Math.PI * 4) + 1e-12);
      expect(d).toBeLessThanOrEqual(0.136 * Math.sqrt(cl / 4) + 1e-12);
    }
  });
});

describe('planforms, twin blades, bulbs and kicked-up rudders', () => {
  const base = system(seeded(21)).spec;
  const plain = (over: Partial<FoilSpec> = {}, rudder: Partial<FoilSpec> = {}) =>
    prepareFoilSystem({
      ...base,
      keel: { ...base.keel, ...over },
      rudder: { ...base.rudder, ...rudder },
    });

  it('take chords along the span: the straight taper written out is the same foil', () => {
    const [r, t] = [base.keel.chords[0]!, base.keel.chords[1]!];
    const a = evaluate(plain(), 3, 0.06, 0.02, 0.2, 0.7);
    const b = evaluate(plain({ chords: [r, 0.5 * (r + t), t] }), 3, 0.06, 0.02, 0.2, 0.7);
    a.forEach((v, i) => {
      expect(b[i]).toBeCloseTo(v, 7);
    });
    // An ellipse carries its lift with the least induced drag of its span, a pointed tip higher up than a square one.
    const ellipse = Array.from({ length: 21 }, (_, i) => 0.6 * Math.sqrt(1 - (i / 20.2) ** 2));
    const e = evaluate(plain({ chords: ellipse, sweep: 0 }), 3, 0.06, 0, 0);
    const s = evaluate(plain({ chords: [0.47, 0.47], sweep: 0 }), 3, 0.06, 0, 0);
    const per = (o: Float64Array): number => o[FOIL.keelInduced]! / o[FOIL.keelLift]! ** 2;
    expect(per(e)).toBeLessThan(per(s));
    const arm = (o: Float64Array): number =>
      (o[FOIL.heelMoment]! - o[FOIL.rudderHeelMoment]!) / o[FOIL.keelLift]!;
    const p = evaluate(plain({ chords: [0.9, 0.05], sweep: 0 }), 3, 0.06, 0, 0);
    expect(arm(p)).toBeLessThan(arm(s));
  });

  it('add a bulb as drag alone', () => {
    const bulb = { length: 0.8, diameter: 0.14 };
    const a = evaluate(plain(), 3, 0.06, 0.02, 0.2);
    const b = evaluate(plain({ bulb }), 3, 0.06, 0.02, 0.2);
    a.forEach((v, i) => {
      if (i !== FOIL.keelProfile) expect(b[i]).toBe(v);
    });
    const wetted = bulbWetted(bulb);
    // Between the sphere of its diameter's surface and the cylinder round it.
    expect(wetted).toBeGreaterThan(0.75 * Math.PI * 0.8 * 0.14);
    expect(wetted).toBeLessThan(Math.PI * 0.8 * 0.14);
    const own =
      0.5 *
      WATER.density *
      9 *
      wetted *
      bulbFormFactor(bulb) *
      foilFriction((3 * 0.8) / WATER.kinematicViscosity);
    expect(b[FOIL.keelProfile]! - a[FOIL.keelProfile]!).toBeCloseTo(own, 9);
    expect(bulbVolume({ length: 2, diameter: 2 })).toBeCloseTo((4 / 3) * Math.PI, 12);
    expect(bulbWetted({ length: 2, diameter: 2 })).toBeCloseTo(4 * Math.PI, 12);
  });

  it('lift less and further aft with the rudder kicked up', () => {
    let before = Number.POSITIVE_INFINITY;
    for (const swung of [0, 0.3, 0.6, 0.9]) {
      const o = evaluate(plain({}, { swung }), 3, 0, 0.1, 0);
      expect(o[FOIL.rudderLift]).toBeLessThan(before);
      expect(-o[FOIL.rudderYawMoment]! / o[FOIL.rudderLift]!).toBeGreaterThan(-base.rudder.x - 1e-9);
      before = o[FOIL.rudderLift]!;
    }
  });

  it('share the work between twin blades, and lose the windward one with heel', () => {
    const twin = { offset: 0.4, cant: 0.17, lowered: 'both' } as const;
    const one = evaluate(plain(), 3, 0, 0.08, 0);
    const two = evaluate(plain({}, { twin }), 3, 0, 0.08, 0);
    // Upright both are down: nearly twice the force (each leans, and its root is at the surface).
    expect(two[FOIL.rudderLift]! / one[FOIL.rudderLift]!).toBeGreaterThan(1.7);
    expect(two[FOIL.rudderLift]! / one[FOIL.rudderLift]!).toBeLessThan(2);
    expect(two[FOIL.rudderProfile]! / one[FOIL.rudderProfile]!).toBeCloseTo(2, 1);
    // Far over, the leeward one alone stands upright in the water.
    const over = evaluate(plain({}, { twin: { ...twin, offset: 3 } }), 3, 0, 0.08, 0.5);
    const lee = evaluate(plain({}, { twin: { ...twin, offset: 3, lowered: 'leeward' } }), 3, 0, 0.08, 0.5);
    expect(over[FOIL.rudderLift]).toBeCloseTo(lee[FOIL.rudderLift]!, 9);
    // A leeward blade canted by the heel is upright: all its lift is horizontal.
    const upright = evaluate(
      plain({}, { twin: { offset: 0.4, cant: 0.3, lowered: 'leeward' } }),
      3,
      0,
      0.08,
      0.3,
    );
    expect(upright[FOIL.rudderLift]! * Math.cos(0.3)).toBeCloseTo(one[FOIL.rudderLift]!, 6);
  });

  it('stay smooth with twin blades as the windward one comes out', () => {
    const f = plain(
      { twin: { offset: 0.5, cant: 0.1, lowered: 'both' } },
      { twin: { offset: 0.4, cant: 0.17, lowered: 'both' } },
    );
    let previous: Float64Array | undefined;
    let slope: number[] | undefined;
    for (let heel = -0.1; heel < 1; heel += 0.002) {
      const o = evaluate(f, 3, 0.06, 0.02, heel);
      for (const v of o) expect(Number.isFinite(v)).toBe(true);
      const now = previous && Array.from(o, (v, i) => (v - previous![i]!) / 0.002);
      if (now && slope)
        for (const i of [FOIL.lift, FOIL.keelInduced, FOIL.rudderLift, FOIL.keelProfile])
          expect(Math.abs(now[i]! - slope[i]!)).toBeLessThan(0.05 * Math.max(20, Math.abs(o[FOIL.lift]!)));
      previous = o;
      slope = now;
    }
  });
});
