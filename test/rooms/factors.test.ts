import { describe, expect, it } from 'vitest';
import { boatWithFactors, FACTOR_NAMES, type ModelFactors, NO_FACTORS } from '../../src/boat/index.js';
import { solveState } from '../../src/equilibrium/index.js';
import { HULL } from '../../src/hull/index.js';
import { predictPolar } from '../../src/polar/index.js';
import { DEMO_BOATS, demoBoat } from '../support/demo.js';

const DEG = Math.PI / 180;
const KNOT = 1852 / 3600;
const speed = (
  name: (typeof DEMO_BOATS)[number],
  f: Partial<ModelFactors>,
  kn: number,
  deg: number,
): number => {
  const r = solveState(boatWithFactors(demoBoat(name), { ...NO_FACTORS, ...f }), {
    tws: kn * KNOT,
    twa: deg * DEG,
  });
  if (r.status !== 'balanced') throw new Error(r.reason);
  return r.speed;
};

describe('factors on the model', () => {
  it.each(DEMO_BOATS)('all at 1 change no bit of a polar: %s', (name) => {
    const request = { tws: [5, 9], twa: [40, 90, 150].map((a) => a * DEG) };
    const plain = predictPolar(demoBoat(name), request);
    const one = predictPolar(boatWithFactors(demoBoat(name), NO_FACTORS), request);
    expect(one).toEqual(plain);
  });

  it('act on speed in the direction their name says', () => {
    const cases: [keyof ModelFactors, (typeof DEMO_BOATS)[number], number, number, 1 | -1][] = [
      ['residuary', 'keelboat', 12, 90, -1],
      ['friction', 'keelboat', 6, 90, -1],
      ['planing', 'trapeze-dinghy', 18, 110, -1],
      ['sailLift', 'keelboat', 6, 60, 1],
      ['sailNormal', 'single-hander', 8, 180, 1],
      ['sailDrag', 'keelboat', 6, 45, -1],
      ['windage', 'keelboat', 15, 45, -1],
      ['righting', 'keelboat', 16, 45, 1],
      ['crewReach', 'single-hander', 16, 50, 1],
      ['foilInduced', 'keelboat', 8, 45, -1],
      ['foilProfile', 'keelboat', 8, 60, -1],
      // More shear for a wind quoted at 10 m: less of it where these sails are.
      ['windShear', 'single-hander', 8, 90, -1],
    ];
    expect(new Set(cases.map((c) => c[0]))).toEqual(new Set(FACTOR_NAMES));
    for (const [factor, boat, kn, deg, sign] of cases) {
      const change = speed(boat, { [factor]: 1.05 }, kn, deg) - speed(boat, { [factor]: 0.95 }, kn, deg);
      expect(Math.sign(change), factor).toBe(sign);
    }
  });

  it('on a planing hull: friction and waves count while it floats, planing when it planes', () => {
    const boat = demoBoat('trapeze-dinghy');
    const drag = (f: Partial<ModelFactors>, v: number): number => {
      const out = new Float64Array(HULL.count);
      return boatWithFactors(boat, { ...NO_FACTORS, ...f }).hull.resistanceInto(v, 0, out);
    };
    const [slow, fast] = [1.5, 9];
    expect(drag({ planing: 1.3 }, slow)).toBeCloseTo(drag({}, slow), 4);
    expect(drag({ planing: 1.3 }, fast)).toBeCloseTo(1.3 * drag({}, fast), 6);
    expect(drag({ residuary: 1.3, friction: 1.3 }, fast)).toBeCloseTo(drag({}, fast), 6);
    expect(drag({ residuary: 1.3, friction: 1.3 }, slow)).toBeCloseTo(1.3 * drag({}, slow), 4);
  });
});
