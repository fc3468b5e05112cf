import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type Boat, BoatFileError, readBoat, rightingArms } from '../../src/boat/index.js';
import { asBinaryStl, asObj, asOffsets, asTextStl, withLines } from '../support/lines.js';

const DEG = Math.PI / 180;
const text = readFileSync('boats/keelboat.yaml', 'utf8');
const whole = readBoat(text, 'keelboat.yaml');
const { lwl } = whole.spec.hull.dimensions;
const files: Record<string, string | Uint8Array> = {
  'hull.csv': asOffsets(whole.lines, lwl),
  'hull.obj': asObj(whole.lines),
  'millimetres.obj': asObj(whole.lines, 1000),
  'text.stl': asTextStl(whole.lines),
  'binary.stl': asBinaryStl(whole.lines),
};
const beside = (name: string): Uint8Array => {
  const f = files[name]!;
  return typeof f === 'string' ? new TextEncoder().encode(f) : f;
};
const read = (lines: string): Boat => readBoat(withLines(text, lines), 'keelboat.yaml', undefined, beside);
const stations = (): string =>
  `stations:\n${whole.lines.stations
    .map(
      (s) =>
        `  - { aft_of_stem: ${0.5 * lwl - s.x}, half_breadths: [${s.y.join(', ')}], heights: [${s.z.join(', ')}] }`,
    )
    .join('\n')}`;
const mistake = (lines: string, given: Record<string, string | Uint8Array> = {}): string => {
  Object.assign(files, given);
  try {
    read(lines);
  } catch (error) {
    expect(error).toBeInstanceOf(BoatFileError);
    expect((error as Error).message).toMatch(/^keelboat\.yaml:\d+:\d+ hull/);
    return (error as Error).message;
  }
  throw new Error('no mistake was found');
};

describe('one hull given in several ways', () => {
  const ways: Record<string, string> = {
    'stations in the boat file': stations(),
    'a table of offsets': 'table: hull.csv',
    'a mesh of both sides': 'mesh: hull.obj',
    'a mesh in millimetres': 'mesh: millimetres.obj\nunit: mm',
    'a text STL of one side': 'mesh: text.stl',
    'a binary STL of one side': 'mesh: binary.stl\ncuts: 61',
  };
  for (const [way, lines] of Object.entries(ways)) {
    it(`${way} gives the same volume, form and righting arms`, () => {
      const b = read(lines);
      const [f, g] = [whole.hull.form, b.hull.form];
      for (const key of ['volume', 'cp', 'lwl', 'bwl', 'canoeDraft', 'waterplane', 'wetted'] as const)
        expect(Math.abs(g[key] / f[key] - 1), key).toBeLessThan(0.005);
      expect(Math.abs(g.lcbFromForward / g.lwl - f.lcbFromForward / f.lwl)).toBeLessThan(0.0025);
      const heels = [10, 20, 30, 40, 50, 60].map((d) => d * DEG);
      const [p, q] = [rightingArms(whole, heels), rightingArms(b, heels)];
      p.forEach((a, i) => {
        expect(Math.abs(q[i]!.inboard / a.inboard - 1)).toBeLessThan(0.005);
      });
    });
  }

  it('is found on its own axes and scale wherever the waterline is', () => {
    const lifted = {
      stations: whole.lines.stations.map((s) => ({ ...s, z: s.z.map((z) => z + 0.4) })),
    };
    files['lifted.csv'] = asOffsets(lifted, lwl);
    const b = read('table: lifted.csv\nwaterline_height: 0.4 m');
    expect(Math.abs(b.hull.form.volume / whole.hull.form.volume - 1)).toBeLessThan(1e-9);
    expect(Math.abs(b.hull.form.wetted / whole.hull.form.wetted - 1)).toBeLessThan(1e-9);
    // A mesh with x aft and y up.
    files['turned.obj'] = asObj(whole.lines).replace(
      /^v (\S+) (\S+) (\S+)$/gm,
      (_, x, y, z) => `v ${-x} ${z} ${y}`,
    );
    const c = read('mesh: turned.obj\nforward: -x\nup: y');
    expect(Math.abs(c.hull.form.wetted / whole.hull.form.wetted - 1)).toBeLessThan(0.005);
  });
});

describe('lines that make no hull', () => {
  it('name the file, the place and a way out', () => {
    expect(mistake('table: hull.csv\nmesh: hull.obj')).toMatch(/table and mesh are all given/);
    expect(mistake('unit: mm')).toMatch(/no lines are given; give one of/);
    expect(mistake('table: ../hull.csv')).toMatch(/leads out of the boat file's folder/);
    expect(
      mistake('table: few.csv', { 'few.csv': 'aft_of_stem,half_breadth,height\n0,1,0\n0,2,1\n' }),
    ).toMatch(/few\.csv: 1 stations found; at least 5/);
    expect(mistake('table: odd.csv', { 'odd.csv': 'aft,half,height\n' })).toMatch(
      /odd\.csv, line 1: the header has no column aft_of_stem/,
    );
    expect(mistake('table: word.csv', { 'word.csv': 'aft_of_stem,half_breadth,height\n0,one,0\n' })).toMatch(
      /word\.csv, line 2: "one" is no number for half_breadth/,
    );
    expect(
      mistake('mesh: cut.stl', { 'cut.stl': (files['binary.stl'] as Uint8Array).slice(0, 999) }),
    ).toMatch(/cut\.stl: this is neither a text nor a whole binary STL/);
    expect(mistake('mesh: gone.obj', { 'gone.obj': 'v 0 0 0\nf 1 2 3\n' })).toMatch(
      /gone\.obj, line 2: a face names point 2/,
    );
    expect(mistake('mesh: hull.obj\nforward: z\nup: z')).toMatch(/same axis/);
    expect(mistake('mesh: hull.obj\nunit: mm')).toMatch(/check unit and waterline_height|outside/);
    expect(mistake('table: hull.csv\nforward: x')).toMatch(/belongs to a mesh only/);
  });

  it('are refused where their place 0 is not the fore end of the waterline', () => {
    const moved = {
      stations: whole.lines.stations.map((s) => ({ ...s, x: s.x - 0.5 })),
    };
    expect(mistake('table: moved.csv', { 'moved.csv': asOffsets(moved, lwl) })).toMatch(
      /begins 0\.5 m aft of the place 0.*take 0\.5 m off each/,
    );
  });

  it('leave no main dimension beside them unanswered', () => {
    const both = withLines(text, 'table: hull.csv').replace(/^hull:\n/m, 'hull:\n  prismatic: 0.55\n');
    expect(() => readBoat(both, 'b.yaml', undefined, beside)).toThrow(
      /hull\.prismatic: this is measured from the lines/,
    );
  });

  it('cannot be named by a boat that has no folder', () => {
    expect(() => readBoat(withLines(text, 'table: hull.csv'), 'standard input')).toThrow(
      /has no folder of its own/,
    );
  });
});

describe('righting arms to 180 deg', () => {
  it('are those of the tables where both reach, and vanish upside down with the crew inboard', () => {
    const arms = rightingArms(
      whole,
      [0, 15, 30, 60, 120, 180].map((d) => d * DEG),
    );
    for (const a of arms.slice(0, 4))
      expect(Math.abs(a.inboard - whole.hull.rightingArm(a.heel))).toBeLessThan(2e-4);
    expect(Math.abs(arms[0]!.inboard)).toBeLessThan(1e-9);
    expect(Math.abs(arms[5]!.inboard)).toBeLessThan(1e-6);
    const lever = (whole.spec.crew.mass * whole.spec.crew.armOut) / whole.mass;
    expect(arms[2]!.out - arms[2]!.inboard).toBeCloseTo(lever * Math.cos(30 * DEG), 9);
  });
});
