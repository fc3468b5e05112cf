import { describe, expect, it } from 'vitest';
import {
  floatAt,
  generateRoundBilge,
  HULL,
  type Hull,
  type HullOptions,
  immerse,
  type MainDimensions,
  prepareHull,
  prepareLines,
  stationWeights,
  wettedArea,
} from '../../src/hull/index.js';
import { pchip, symmetricSpline } from '../../src/numerics/index.js';
import { seeded } from '../support/random.js';

const DEG = Math.PI / 180;
const G = 9.80665;
const SALT = { density: 1025, kinematicViscosity: 1.19e-6 };

function randomDimensions(random: () => number): MainDimensions {
  const between = (a: number, b: number): number => a + (b - a) * random();
  const lwl = between(3.5, 9);
  const bwl = lwl / between(2.8, 4.2);
  return {
    lwl,
    bwl,
    canoeDraft: bwl / between(4, 11),
    cp: between(0.53, 0.59),
    cm: between(0.65, 0.77),
    cwp: between(0.66, 0.72),
    lcbAft: between(0.01, 0.05),
    freeboard: between(0.08, 0.12) * lwl,
    beamMax: bwl * between(1.1, 1.4),
  };
}

function prepared(d: MainDimensions, scale = 1, planing = true): Hull {
  const s = scale;
  const big: MainDimensions = {
    ...d,
    lwl: d.lwl * s,
    bwl: d.bwl * s,
    canoeDraft: d.canoeDraft * s,
    freeboard: d.freeboard * s,
    beamMax: d.beamMax * s,
  };
  const volume = big.cp * big.cm * big.lwl * big.bwl * big.canoeDraft;
  const x = -big.lcbAft * big.lwl;
  return prepareHull(
    generateRoundBilge(big),
    { mass: volume * SALT.density, x, z: 0.05 * big.lwl },
    {
      water: { density: SALT.density, kinematicViscosity: SALT.kinematicViscosity * s ** 1.5 },
      gravity: G,
      residuary: 'delft-2008',
      planing,
      centreReach: [x - 0.06 * big.lwl, x + 0.04 * big.lwl],
    },
  );
}

describe('generated round-bilge hulls', () => {
  it('meet the coefficients they were asked for', () => {
    const random = seeded(2);
    for (let k = 0; k < 60; k++) {
      const d = randomDimensions(random);
      const p = prepareLines(generateRoundBilge(d));
      const im = immerse(p, { heel: 0, height: 0, trim: 0 });
      const most = Math.max(...im.sections);
      expect(Math.abs(im.volume / (most * d.lwl) / d.cp - 1)).toBeLessThan(0.0015);
      expect(Math.abs(most / (d.bwl * d.canoeDraft) / d.cm - 1)).toBeLessThan(0.002);
      expect(Math.abs(im.x / d.lwl + d.lcbAft)).toBeLessThan(1e-4);
      expect(Math.abs(im.waterplane / (d.lwl * d.bwl) / d.cwp - 1)).toBeLessThan(0.003);
    }
  });

  it('refuse coefficients no hull has', () => {
    const d = randomDimensions(seeded(1));
    expect(() => generateRoundBilge({ ...d, cp: 0.9 })).toThrow(/cp 0\.9 is outside/);
    expect(() => generateRoundBilge({ ...d, beamMax: 0.5 * d.bwl })).toThrow(/beam/);
  });
});

describe('hydrostatics', () => {
  it('integrates parabolas exactly on uneven stations', () => {
    const x = [-1, -0.4, 0.3, 0.55, 1.2];
    const w = stationWeights(x);
    const sum = x.reduce((s, v, i) => s + w[i]! * (2 + v + 3 * v * v), 0);
    expect(sum).toBeCloseTo(2 * 2.2 + (1.44 - 1) / 2 + 1.728 + 1, 12);
  });

  it('floats where volume and moment balance, at any heel', () => {
    const random = seeded(4);
    for (let k = 0; k < 12; k++) {
      const d = randomDimensions(random);
      const p = prepareLines(generateRoundBilge(d));
      const volume = d.cp * d.cm * d.lwl * d.bwl * d.canoeDraft;
      const load = { volume, x: -d.lcbAft * d.lwl, z: 0.1 };
      for (const heel of [0, 10, 25, 45].map((v) => v * DEG)) {
        const { flotation, immersed } = floatAt(p, load, heel);
        expect(Math.abs(immersed.volume / volume - 1)).toBeLessThan(1e-9);
        const lever = immersed.x - load.x + (immersed.z - load.z * Math.cos(heel)) * Math.tan(flotation.trim);
        expect(Math.abs(lever)).toBeLessThan(1e-8 * d.lwl);
        expect(wettedArea(p, flotation)).toBeGreaterThan(0);
      }
    }
  });

  it('says when a hull cannot carry its load', () => {
    const d = randomDimensions(seeded(9));
    const mass = 40 * d.lwl * d.bwl * d.canoeDraft * 1025;
    expect(() =>
      prepareHull(
        generateRoundBilge(d),
        { mass, x: 0, z: 0 },
        {
          water: SALT,
          gravity: G,
          residuary: 'delft-1998',
          planing: false,
        },
      ),
    ).toThrow(/float|sheer/);
  });
});

describe('resistance of random hulls', () => {
  const random = seeded(6);
  const hulls = Array.from({ length: 12 }, () => prepared(randomDimensions(random)));
  const out = new Float64Array(HULL.count);

  it('is finite, positive and never falls as speed rises', () => {
    for (const h of hulls) {
      let before = 0;
      for (let fn = 0.02; fn < 3; fn += 0.01) {
        const r = h.resistanceInto(fn * Math.sqrt(G * h.form.lwl), 0, out);
        expect(Number.isFinite(r)).toBe(true);
        expect(r).toBeGreaterThanOrEqual(before * (1 - 1e-12));
        expect(r).toBeGreaterThan(0);
        before = r;
      }
      expect(h.resistanceInto(0, 0.3, out)).toBe(0);
    }
  });

  it('has parts that add up to the whole', () => {
    for (const h of hulls) {
      for (const [v, heel] of [
        [1, 0],
        [3, 0.3],
        [8, -0.2],
      ] as const) {
        const r = h.resistanceInto(v, heel, out);
        expect(out.reduce((s, p) => s + p, 0)).toBeCloseTo(r, 9);
      }
    }
  });

  it('is continuous in slope over speed and heel', () => {
    const e = 1e-5;
    for (const h of hulls) {
      const c = Math.sqrt(G * h.form.lwl);
      const slope = (fn: number, heel: number): number =>
        (h.resistanceInto((fn + e) * c, heel, out) - h.resistanceInto((fn - e) * c, heel, out)) / (2 * e);
      const weight = h.form.volume * SALT.density * G;
      for (let i = 10; i < 200; i++) {
        const fn = 0.01 * i; // the grid's own points, where a kink would sit
        expect(Math.abs(slope(fn + 2 * e, 0.2) - slope(fn - 2 * e, 0.2)) / weight).toBeLessThan(2e-3);
      }
      const byHeel = (heel: number): number =>
        (h.resistanceInto(0.35 * c, heel + e, out) - h.resistanceInto(0.35 * c, heel - e, out)) / (2 * e);
      for (let heel = -0.5; heel <= 0.5; heel += 2.5 * DEG) {
        expect(Math.abs(byHeel(heel + 2 * e) - byHeel(heel - 2 * e)) / weight).toBeLessThan(1e-4);
      }
    }
  });

  it('is even in heel, and the righting arm odd', () => {
    for (const h of hulls) {
      for (const heel of [0.05, 0.2, 0.5, 0.9]) {
        expect(h.rightingArm(-heel)).toBe(-h.rightingArm(heel));
        expect(h.wetted(-heel)).toBe(h.wetted(heel));
        expect(h.resistanceInto(2, -heel, out)).toBe(h.resistanceInto(2, heel, out));
      }
    }
  });

  it('scales: a copy s times as long has s cubed the force at root s the speed', () => {
    const r = seeded(21);
    for (let k = 0; k < 4; k++) {
      const d = randomDimensions(r);
      const a = prepared(d);
      const s = 1 + 2 * r();
      const b = prepared(d, s);
      for (const fn of [0.2, 0.35, 0.5, 0.9, 1.6]) {
        const va = fn * Math.sqrt(G * a.form.lwl);
        const ra = a.resistanceInto(va, 0.2, out);
        const rb = b.resistanceInto(va * Math.sqrt(s), 0.2, out);
        expect(Math.abs(rb / ra / s ** 3 - 1)).toBeLessThan(1e-9);
      }
      expect(Math.abs(b.rightingArm(0.3) / a.rightingArm(0.3) / s - 1)).toBeLessThan(1e-9);
    }
  });

  it('follows a measured curve where one is given', () => {
    const d = randomDimensions(seeded(30));
    const volume = d.cp * d.cm * d.lwl * d.bwl * d.canoeDraft;
    const h = prepareHull(
      generateRoundBilge(d),
      { mass: volume * SALT.density, x: -d.lcbAft * d.lwl, z: 0 },
      {
        water: SALT,
        gravity: G,
        residuary: 'delft-2008',
        planing: true,
        measured: { speed: [1, 2, 3, 4], force: [10, 45, 160, 300] },
      },
    );
    expect(h.resistanceInto(2, 0, out)).toBeCloseTo(45, 0);
    expect(h.resistanceInto(3, 0, out)).toBeCloseTo(160, -0.5);
  });
});

describe('prepared hulls at the edges of their tables and inputs', () => {
  const out = new Float64Array(HULL.count);
  const d = randomDimensions(seeded(40));
  const volume = d.cp * d.cm * d.lwl * d.bwl * d.canoeDraft;
  const load = { mass: volume * SALT.density, x: -d.lcbAft * d.lwl, z: 0.05 * d.lwl };
  const options: HullOptions = {
    water: SALT,
    gravity: G,
    residuary: 'delft-2008',
    planing: true,
    centreReach: [load.x - 0.06 * d.lwl, load.x + 0.04 * d.lwl],
  };
  const lines = generateRoundBilge(d);

  it('keep value and slope across the end of the Froude table, planing or not', () => {
    const e = 1e-6;
    for (const planing of [true, false]) {
      const h = prepareHull(lines, load, { ...options, planing });
      const c = Math.sqrt(G * h.form.lwl);
      const r = (fn: number): number => h.resistanceInto(fn * c, 0.15, out);
      const before = (r(2.6 - e) - r(2.6 - 3 * e)) / (2 * e);
      const after = (r(2.6 + 3 * e) - r(2.6 + e)) / (2 * e);
      expect(Math.abs(after / before - 1)).toBeLessThan(1e-4);
      expect(Math.abs(r(2.6 + e) / r(2.6 - e) - 1)).toBeLessThan(1e-5);
      expect(r(5)).toBeGreaterThan(r(2.6));
    }
  });

  it('keep all ratios when densities and masses grow alike', () => {
    const k = 7.3;
    const a = prepareHull(lines, load, options);
    const b = prepareHull(
      lines,
      { ...load, mass: k * load.mass },
      { ...options, water: { ...SALT, density: k * SALT.density } },
    );
    for (const v of [0.5, 2, 4, 8]) {
      for (const heel of [0, 0.3]) {
        const ratio = b.resistanceInto(v, heel, out) / a.resistanceInto(v, heel, out);
        expect(Math.abs(ratio / k - 1)).toBeLessThan(1e-12);
      }
    }
    expect(Math.abs(b.rightingArm(0.3) / a.rightingArm(0.3) - 1)).toBeLessThan(1e-12);
  });

  it('are slowed by roughness at every speed, planing too', () => {
    const smooth = prepareHull(lines, load, options);
    const rough = prepareHull(lines, load, { ...options, roughness: 2e-4 });
    const none = prepareHull(lines, load, { ...options, roughness: 0 });
    for (const fn of [0.2, 0.4, 0.7, 1, 1.5, 2]) {
      const v = fn * Math.sqrt(G * smooth.form.lwl);
      const r = smooth.resistanceInto(v, 0, out);
      expect(rough.resistanceInto(v, 0, out)).toBeGreaterThan(1.02 * r);
      expect(none.resistanceInto(v, 0, out)).toBe(r);
    }
  });

  it('warn where planing states leave the published range, and only hulls that plane', () => {
    // A light 4.2 m dinghy: its trim of least drag falls below 2 deg when fast, its bottom is longer than 4 beams.
    const light = generateRoundBilge({
      lwl: 3.9,
      bwl: 1.05,
      canoeDraft: 0.099,
      cp: 0.57,
      cm: 0.7,
      cwp: 0.69,
      lcbAft: 0.035,
      freeboard: 0.33,
      beamMax: 1.4,
    });
    const warned = (planing: boolean) =>
      prepareHull(
        light,
        { mass: 165, x: -0.1365, z: 0.35 },
        { ...options, planing, centreReach: [-0.53, 0.17] },
      ).warnings;
    const planing = warned(true).filter((w) => w.method.includes('Savitsky'));
    expect(planing.map((w) => w.parameter)).toEqual(['trim [deg]', 'wetted length/beam']);
    for (const w of planing) {
      expect(w.value < w.range[0] || w.value > w.range[1], w.parameter).toBe(true);
    }
    expect(warned(false).filter((w) => w.method.includes('Savitsky'))).toEqual([]);
  });

  it('refuse figures that could only end in no number', () => {
    const keel = { volume: 0.02, centreDepth: 0.5, draft: 1 };
    const refuse = (l: object, o: object, message: RegExp): void =>
      expect(() => prepareHull(lines, { ...load, ...l }, { ...options, ...o })).toThrow(message);
    refuse({ mass: Number.NaN }, {}, /mass in the hull is NaN kg/);
    refuse({ mass: 0 }, {}, /mass in the hull is 0 kg/);
    refuse({ x: Number.NaN }, {}, /x of the centre of mass/);
    refuse({}, { roughness: -1e-4 }, /roughness of the hull is -0\.0001 m/);
    refuse({}, { keel: { ...keel, volume: 0 } }, /volume of the keel is 0 m3/);
    refuse({}, { keel: { ...keel, draft: 0 } }, /draft of the keel is 0 m/);
    refuse({}, { centreReach: [1, -1] }, /aft end comes first/);
    refuse({}, { measured: { speed: [1, 2], force: [10] } }, /2 speeds and 1 forces/);
    refuse({}, { measured: { speed: [1, 2], force: [10, Number.NaN] } }, /measured force NaN N at 2 m\/s/);
    refuse({}, { measured: { speed: [1, 2], force: [-5, 10] } }, /measured force -5 N at 1 m\/s/);
    refuse({}, { measured: { speed: [2, 1], force: [1, 2] } }, /measured speed 1 m\/s comes after 2/);
  });

  it('cannot be generated from lengths that are none', () => {
    for (const name of ['lwl', 'bwl', 'canoeDraft', 'freeboard'] as const) {
      for (const value of [Number.NaN, 0, -1, Number.POSITIVE_INFINITY]) {
        expect(() => generateRoundBilge({ ...d, [name]: value }), `${name} ${value}`).toThrow(
          `${name} is ${value} m`,
        );
      }
    }
  });
});

describe('interpolation', () => {
  it('never leaves the range of its points when they rise', () => {
    const random = seeded(8);
    for (let k = 0; k < 100; k++) {
      const x = [0];
      const y = [0];
      for (let i = 0; i < 8; i++) {
        x.push(x[i]! + 0.05 + random());
        y.push(y[i]! + (random() < 0.3 ? 0 : random()));
      }
      const p = pchip(x, y);
      let before = -1e-12;
      for (let v = 0; v <= x[8]!; v += 0.01) {
        const at = p.value(v);
        expect(at).toBeGreaterThanOrEqual(before - 1e-12);
        before = at;
      }
    }
  });

  it('reproduces sine and cosine from symmetric splines', () => {
    const n = 40;
    const h = Math.PI / n;
    const sine = symmetricSpline(
      'odd',
      h,
      Array.from({ length: n + 1 }, (_, i) => Math.sin(i * h)),
    );
    const cosine = symmetricSpline(
      'even',
      h,
      Array.from({ length: n / 2 + 1 }, (_, i) => Math.cos(i * h)),
    );
    for (const v of [-1.2, -0.3, 0.01, 0.7, 1.1]) {
      expect(sine.value(v)).toBeCloseTo(Math.sin(v), 5);
      expect(cosine.value(v)).toBeCloseTo(Math.cos(v), 4);
    }
  });
});
