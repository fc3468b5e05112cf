import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { assembleBoat, readBoat, windageOf } from '../../src/boat/index.js';
import { solveState } from '../../src/equilibrium/index.js';
import { crossover, predictPolar } from '../../src/polar/index.js';
import {
  AERO,
  mainsailShape,
  offWindShape,
  profileAt,
  reefedShape,
  type SailSet,
  sailArea,
  sailCoefficients,
} from '../../src/sails/index.js';
import { DEMO_BOATS, demoBoat } from '../support/demo.js';

const DEG = Math.PI / 180;
const keelboat = readFileSync('boats/keelboat.yaml', 'utf8');
const dinghy = readFileSync('boats/single-hander.yaml', 'utf8');
const read = (text: string) => readBoat(text, 'b.yaml');
const swap = (text: string, from: string | RegExp, to: string): string => {
  const out = text.replace(from, to);
  expect(out).not.toBe(text);
  return out;
};
const at = (set: SailSet, awa: number, price = 0): Float64Array => {
  const out = new Float64Array(AERO.count);
  set.evaluateInto({ tws: 6, twa: awa, speed: 0, leeway: 0 }, 0, price, out);
  return out;
};
const base = { name: 'm', luff: 6, foot: 2.4, headWidth: 0.1, roach: 0, tackX: 0, tackZ: 1 };

describe('mainsails of any plan form', () => {
  it('run through their measured widths', () => {
    const m = mainsailShape({
      ...base,
      widths: { at: [0, 0.25, 0.5, 0.75, 0.875, 1], width: [2.4, 2.2, 1.9, 1.4, 1.1, 0.8] },
    });
    for (const [s, w] of [
      [0, 2.4],
      [0.25, 2.2],
      [0.5, 1.9],
      [0.75, 1.4],
      [0.875, 1.1],
      [1, 0.8],
    ] as const)
      expect(profileAt(m.z, m.chord, 1 + 6 * s)).toBeCloseTo(w, 2);
    // A fat head carries its area higher than a triangle on the same luff and foot.
    expect(sailArea(m).z).toBeGreaterThan(sailArea(mainsailShape(base)).z + 0.3);
  });

  it('spread by a gaff are quadrilaterals', () => {
    // Luff 3 up to the throat, gaff 2 m at 30 deg: corners (0,1), (0,4), (-1.732,5), (-2.4,1).
    const g = mainsailShape({ ...base, luff: 3, gaff: { length: 2, angle: 30 * DEG } });
    const corners: [number, number][] = [
      [0, 1],
      [0, 4],
      [-2 * Math.cos(30 * DEG), 5],
      [-2.4, 1],
    ];
    let area = 0;
    corners.forEach(([x, z], i) => {
      const [x2, z2] = corners[(i + 1) % 4]!;
      area += 0.5 * (x * z2 - x2 * z);
    });
    expect(sailArea(g).area).toBeCloseTo(Math.abs(area), 9);
    expect(g.z[g.z.length - 1]).toBeCloseTo(5, 12);
    expect(g.chord[g.chord.length - 1]).toBeCloseTo(0, 12);
  });

  it('reefed keep what was above the reef, lowered to the tack', () => {
    const m = mainsailShape({ ...base, roach: 0.1 });
    const r = reefedShape(m, 0.7, 1);
    expect(r.z[0]).toBeCloseTo(1, 12);
    expect(r.z[r.z.length - 1]).toBeCloseTo(1 + 0.7 * 6, 12);
    for (const s of [0, 0.3, 0.8, 1])
      expect(profileAt(r.z, r.chord, 1 + 4.2 * s)).toBeCloseTo(
        profileAt(m.z, m.chord, 1 + 6 * (0.3 + 0.7 * s)),
        3,
      );
    expect(sailArea(r).area).toBeLessThan(sailArea(m).area);
  });
});

describe('a wardrobe in the boat file', () => {
  it('takes widths, a gaff, and a luff perpendicular', () => {
    const wide = read(
      swap(
        keelboat,
        '    area: 14.2 m2\n    reefs: [82 %]\n',
        '    half_width: 2.1 m\n    three_quarter_width: 1.5 m\n    head_width: 0.8 m\n',
      ),
    );
    const main = wide.spec.sails.find((s) => s.name === 'main')!;
    expect(profileAt(main.z, main.chord, main.z[0]! + 4.2)).toBeCloseTo(2.1, 3);
    const gaff = read(
      swap(dinghy, /luff: .*\n/, 'luff: 3.2 m\n    gaff_length: 1.5 m\n    gaff_angle: 70 deg\n').replace(
        / {4}(area|roach|head_width): .*\n/g,
        '',
      ),
    );
    expect(gaff.spec.sails[0]!.z.at(-1)! - gaff.spec.sails[0]!.z[0]!).toBeCloseTo(
      3.2 + 1.5 * Math.sin(70 * DEG),
      6,
    );
    // Area of a jib is half of luff times luff perpendicular; a foot longer than the foretriangle overlaps the mast.
    const genoa = read(swap(keelboat, '    area: 9.8 m2', '    luff_perpendicular: 3.4 m'));
    expect(sailArea(genoa.spec.sails.find((s) => s.name === 'jib')!).area).toBeCloseTo(0.5 * 7.3 * 3.4, 6);
  });

  it('makes a sail set of every reef', () => {
    const b = read(swap(keelboat, 'reefs: [82 %]', 'reefs: [85 %, 70 %]'));
    expect(b.sailSets.map((s) => s.name)).toEqual([
      'main and jib',
      'main and jib, reef 1',
      'main and jib, reef 2',
      'main alone',
      'main alone, reef 1',
      'main alone, reef 2',
      'main and gennaker',
    ]);
    const area = (name: string): number => b.sailSets.find((s) => s.name === name)!.area;
    expect(area('main alone, reef 2')).toBeLessThan(area('main alone, reef 1'));
    expect(() => read(swap(keelboat, 'reefs: [82 %]', 'reefs: [70 %, 85 %]'))).toThrow(
      /reefs\[2\].*falling order/,
    );
  });

  it('sets a mizzen on a second mast, and asks for the mast', () => {
    const mizzen = '  mizzen:\n    kind: mizzen\n    luff: 3.4 m\n    foot: 1.6 m\n';
    const text = keelboat
      .replace('sail_sets:\n', `${mizzen}\nsail_sets:\n  yawl: [main, jib, mizzen]\n`)
      .replace(
        '  boom_height: 1.5 m\n',
        '  boom_height: 1.5 m\n  mizzen_mast: { aft_of_stem: 6.0 m, height: 5.2 m }\n',
      );
    const yawl = read(text);
    const plain = demoBoat('keelboat');
    const set = yawl.sailSets[0]!;
    expect(set.area).toBeGreaterThan(plain.sailSets[0]!.area + 2);
    // Its force acts aft: the yaw arm of the side force moves aft.
    const arm = (s: SailSet): number => {
      const o = at(s, 35 * DEG);
      return o[AERO.sideX]! / o[AERO.side]!;
    };
    expect(arm(set)).toBeLessThan(arm(plain.sailSets[0]!) - 0.2);
    expect(windageOf(yawl.spec).map((w) => w.name)).toContain('mizzen mast');
    expect(() => read(keelboat.replace('sail_sets:\n', `${mizzen}\nsail_sets:\n`))).toThrow(
      /needs a second mast/,
    );
  });

  it('refuses keys of another kind of sail, and two of a kind in a set', () => {
    expect(() => read(swap(keelboat, '    luff: 7.3 m', '    luff: 7.3 m\n    roach: 10 %'))).toThrow(
      /sails\.jib\.roach: a jib has no roach here/,
    );
    expect(() => read(swap(keelboat, 'kind: gennaker', 'kind: gennaker\n    goose_wing: yes'))).toThrow(
      /goose_wing/,
    );
    expect(() => read(swap(keelboat, 'main and gennaker: [main, gennaker]', 'odd: [main, main]'))).toThrow(
      /both of the kind mainsail/,
    );
    expect(() => read(swap(keelboat, 'area: 30 m2', 'area: 30 m2\n    head_height: 0.9 m'))).toThrow(
      /head lies between/,
    );
  });

  it('takes section figures over the table of limits', () => {
    const b = read(
      swap(
        keelboat,
        '    area: 9.8 m2',
        '    area: 9.8 m2\n    lift_limit: 1.5\n    section: { least_drag: 0.02, square_drag: 1.1 }',
      ),
    );
    const jib = b.spec.sails.find((s) => s.name === 'jib')!;
    expect(jib.section).toMatchObject({ clMax: 1.5, cd0: 0.02, cd90: 1.1, k: 0.02, cl0: 0.6 });
  });
});

describe('off-wind sails', () => {
  const spinnaker = offWindShape({
    name: 's',
    kind: 'spinnaker',
    area: 20,
    foot: 3,
    halfWidth: 3.4,
    projected: 0.8,
    tackX: 3,
    tackZ: 1.5,
    headX: 0,
    headZ: 8,
  });

  it('have the projected area of their cloth', () => {
    expect(sailArea(spinnaker).area).toBeCloseTo(16, 6);
    expect(spinnaker.cloth).toBe(20);
  });

  it('collapse close-hauled, draw on a reach, and stand square on a run', () => {
    const boat = demoBoat('keelboat');
    const set = boat.sailSets.find((s) => s.name === 'main and gennaker')!;
    const main = boat.sailSets.find((s) => s.name === 'main alone')!;
    expect(at(set, 30 * DEG)[AERO.drive]).toBeLessThan(at(main, 30 * DEG)[AERO.drive]!);
    expect(at(set, 90 * DEG)[AERO.drive]).toBeGreaterThan(2 * at(main, 90 * DEG)[AERO.drive]!);
    expect(at(set, 180 * DEG)[AERO.drive]).toBeGreaterThan(at(main, 180 * DEG)[AERO.drive]! * 1.2);
  });

  it('of a goose-winged jib pull on a run where a blanketed one does not', () => {
    const boat = demoBoat('keelboat');
    const winged = read(swap(keelboat, '    area: 9.8 m2', '    area: 9.8 m2\n    goose_wing: yes'));
    const drive = (b: typeof boat, deg: number): number => at(b.sailSets[0]!, deg * DEG)[AERO.drive]!;
    expect(drive(winged, 180) / drive(boat, 180)).toBeGreaterThan(1.3);
    expect(drive(winged, 90)).toBe(drive(boat, 90));
  });

  it('have drive and side force without jumps in value or slope from 10 to 180 deg, on every demo boat', () => {
    const step = 0.25 * DEG;
    for (const name of DEMO_BOATS)
      for (const set of demoBoat(name).sailSets)
        for (const part of [AERO.drive, AERO.side] as const) {
          const v: number[] = [];
          for (let b = 10 * DEG; b <= 180 * DEG; b += step) v.push(at(set, b)[part]!);
          const scale = Math.max(...v.map(Math.abs));
          for (let i = 1; i + 1 < v.length; i++) {
            expect(Math.abs(v[i]! - v[i - 1]!) / scale).toBeLessThan(0.03);
            // A kink of slope k shows as k times the step: 0.006 is a change of 1.4 of full force per rad.
            expect(Math.abs(v[i + 1]! - 2 * v[i]! + v[i - 1]!) / scale, `${name} ${set.name}`).toBeLessThan(
              0.006,
            );
          }
        }
  });
});

describe('a sail set given by its coefficients', () => {
  const main = demoBoat('single-hander').sailSets[0]!;
  const angles = Array.from({ length: 35 }, (_, i) => (10 + 5 * i) * DEG);
  const own = sailCoefficients(main, angles);
  const rows = own
    .map(
      (r) =>
        `      - { awa: ${r.awa / DEG} deg, lift: ${r.lift}, drag: ${Math.max(0, r.drag)}, height: ${Math.max(0.3, r.height)} m }`,
    )
    .join('\n');
  const text = `${dinghy}
measured_rigs:
  tunnel:
    area: ${main.area} m2
    centre_aft_of_stem: ${0.5 * demoBoat('single-hander').spec.hull.dimensions.lwl - main.centre[0]} m
    centre_height: ${main.centre[1]} m
    rows:
${rows}
`;

  it('taken from a set of the boat sails like that set', () => {
    const boat = read(text);
    expect(boat.sailSets.map((s) => s.name)).toContain('tunnel');
    const alone = { ...boat, sailSets: boat.sailSets.filter((s) => s.name === 'tunnel') };
    const plain = demoBoat('single-hander');
    for (const [tws, twa, within] of [
      [4, 50, 0.03],
      [4, 90, 0.03],
      [5, 150, 0.03],
      // Eased: the table knows one centre of effort, the sail lowers its own.
      [9, 45, 0.08],
    ] as const) {
      const a = solveState(plain, { tws, twa: twa * DEG });
      const b = solveState(alone, { tws, twa: twa * DEG });
      if (a.status !== 'balanced' || b.status !== 'balanced') throw new Error('no state');
      expect(Math.abs(b.speed / a.speed - 1)).toBeLessThan(within);
    }
  });

  it('gives up lift for a price on heeling moment, smoothly', () => {
    const set = read(text).sailSets.find((s) => s.name === 'tunnel')!;
    let before = Number.POSITIVE_INFINITY;
    for (const price of [0, 0.01, 0.05, 0.1, 0.15, 0.2, 0.4]) {
      const m = at(set, 40 * DEG, price)[AERO.heelMoment]!;
      expect(m).toBeLessThanOrEqual(before + 1e-9);
      before = m;
    }
    expect(before).toBeLessThan(0.3 * at(set, 40 * DEG)[AERO.heelMoment]!);
    // At no price nothing is eased: the table's own drive.
    const o = at(set, 40 * DEG);
    const r = own.find((x) => Math.abs(x.awa - 40 * DEG) < 1e-9)!;
    const v = 6 * set.spec.wind.factor(r.height);
    const q = 0.5 * set.spec.airDensity * v * v * set.area;
    expect((o[AERO.drive]! - o[AERO.windageDrive]!) / q).toBeCloseTo(
      r.lift * Math.sin(r.awa) - r.drag * Math.cos(r.awa),
      2,
    );
  });

  it('is refused with the place of what is wrong', () => {
    const table = text.replace(/ {4}rows:\n[\s\S]*$/, '    table: rig.csv\n');
    const with_ = (csv: string) => () =>
      readBoat(table, 'b.yaml', undefined, () => new TextEncoder().encode(csv));
    expect(with_('awa,lift,drag\n20,1,0.2\n40,1.2,0.3\n90,1.2,0.5\n180,0,1.1\n')).not.toThrow();
    expect(with_('awa,lift\n20,1\n')).toThrow(
      /measured_rigs\.tunnel\.table: rig\.csv: line 1: the header has no column drag/,
    );
    expect(with_('awa,lift,drag\n20,1,x\n')).toThrow(/line 2: drag "x"/);
    expect(with_('awa,lift,drag\n20,1,1\n10,1,1\n30,1,1\n')).toThrow(/row 2 is not above/);
    expect(() => read(text.replace(/ {4}rows:\n[\s\S]*$/, ''))).toThrow(/neither table nor rows/);
  });
});

describe('a crossover', () => {
  const boat = demoBoat('keelboat');
  const polar = predictPolar(boat, { tws: [4, 9], twa: [40, 90, 150].map((d) => d * DEG) });
  const chart = crossover(polar);

  it('names the set the polar sails with, and what the others lose', () => {
    polar.results.forEach((row, i) => {
      row.forEach((r, j) => {
        if (r.status !== 'balanced') return;
        const { fastest, lost } = chart[i]![j]!;
        expect(polar.sets[fastest]!.name).toBe(r.sailSet);
        expect(polar.sets[fastest]!.speed[i]![j]).toBeCloseTo(r.speed, 9);
        for (const l of lost) if (!Number.isNaN(l)) expect(l).toBeGreaterThanOrEqual(0);
        expect(lost[fastest]).toBe(0);
      });
    });
    expect(polar.sets[chart[0]![2]!.fastest]!.name).toBe('main and gennaker');
    expect(polar.sets[chart[0]![0]!.fastest]!.name).toBe('main and jib');
  });

  it('of a boat with one set names that', () => {
    const one = assembleBoat({ spec: { ...boat.spec, sailSets: [boat.spec.sailSets[0]!] } });
    const p = predictPolar(one, { tws: [5], twa: [1] });
    expect(crossover(p)[0]![0]).toEqual({ fastest: 0, lost: [0] });
  });
});
