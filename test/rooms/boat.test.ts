import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parse } from 'yaml';
import {
  type Boat,
  boatJsonSchema,
  describeBoat,
  lateralCentre,
  leadOf,
  readBoat,
  readBoatFile,
  readBoatSpec,
  starterBoat,
} from '../../src/boat/index.js';
import { boatFile, explain } from '../../src/boat/schema.js';
import { sailArea } from '../../src/sails/index.js';
import { DEGREE, loadUnitEngine } from '../../src/units/index.js';
import { brokenBoats, soundDinghy, soundKeelboat } from '../support/broken-boats.js';

const folder = new URL('../../boats/', import.meta.url);
const demoNames = ['single-hander', 'trapeze-dinghy', 'keelboat'] as const;
const demoText = (name: string): string => readFileSync(new URL(`${name}.yaml`, folder), 'utf8');
const demos = Object.fromEntries(demoNames.map((n) => [n, readBoat(demoText(n), n)])) as Record<
  (typeof demoNames)[number],
  Boat
>;

describe('the JSON Schema of the boat file', () => {
  const validate = new Ajv2020({ strict: true, allowUnionTypes: true }).compile(boatJsonSchema());

  it('in boats/ is up to date', () => {
    const written = JSON.parse(readFileSync(new URL('boat.schema.json', folder), 'utf8'));
    expect(written).toEqual(boatJsonSchema());
  });

  it('accepts demo boats and starter files', () => {
    for (const text of [...demoNames.map(demoText), starterBoat('dinghy'), starterBoat('keelboat')]) {
      expect(validate(parse(text)), JSON.stringify(validate.errors)).toBe(true);
    }
  });

  it('refuses unknown keys, missing sections and bare numbers out of range, like the reader', () => {
    const refused = ['unknown key', 'missing rig', 'millimetres without a unit', 'half a person'];
    for (const name of refused) {
      const boat = brokenBoats.find((b) => b.name === name)!;
      expect(validate(parse(boat.text as string)), name).toBe(false);
    }
  });

  it('explains every key', () => {
    const walk = (field: Parameters<typeof explain>[0]): void => {
      expect(explain(field)).toMatch(/\w.*\.$/s);
      if (field.type === 'section') Object.values(field.keys).forEach(walk);
      if (field.type === 'named' || field.type === 'list') walk(field.entry);
    };
    walk(boatFile);
  });
});

describe('reading a boat file', () => {
  it('turns units and places into SI and body axes', () => {
    const { spec } = readBoatSpec(soundDinghy);
    expect(spec.hull.dimensions.lwl).toBe(4);
    expect(spec.rig.mastX).toBeCloseTo(2 - 1.3, 12);
    // The keel's x is that of the quarter chord at the root.
    expect(spec.keel.x).toBeCloseTo(2 - 1.6 - 0.1, 12);
    expect(spec.rudder.surfacePiercing).toBe(true);
    expect(spec.crew.mass).toBe(140);
    expect(spec.limits.heel).toBeCloseTo(20 * DEGREE, 12);
  });

  it('gives the same boat whichever units it is written in', () => {
    const imperial = soundDinghy
      .replace('waterline_length: 4 m', `waterline_length: ${4 / 0.3048} ft`)
      .replace('root_chord: 40 cm', 'root_chord: 400 mm')
      .replace('mass: 80 kg', `mass: ${80 / 0.45359237} lb`);
    const a = readBoatSpec(soundDinghy).spec;
    const b = readBoatSpec(imperial).spec;
    expect(b.hull.dimensions.canoeDraft).toBeCloseTo(a.hull.dimensions.canoeDraft, 12);
    for (const key of ['span', 'x', 'z'] as const) {
      expect(b.keel[key]).toBeCloseTo(a.keel[key], 12);
    }
  });

  it('gives the hull just the draft that carries weights and crew', () => {
    const { spec } = readBoatSpec(soundKeelboat);
    const d = spec.hull.dimensions;
    const canoe = d.cp * d.cm * d.lwl * d.bwl * d.canoeDraft;
    expect((canoe + spec.keelVolume) * spec.water.density).toBeCloseTo(750 + 520 + 80 + 300, 6);
  });

  it('takes the midship coefficient from the draft when that is given', () => {
    const draft = readBoatSpec(soundDinghy).spec.hull.dimensions.canoeDraft * 1.05;
    const { spec, estimates } = readBoatSpec(
      soundDinghy.replace('beam_overall: 1.5 m', `beam_overall: 1.5 m\n  canoe_draft: ${draft} m`),
    );
    expect(spec.hull.dimensions.cm).toBeCloseTo(0.72 / 1.05, 9);
    expect(estimates.find((e) => e.key === 'hull.midship')?.rule).toMatch(/displacement and the canoe draft/);
  });

  it('puts the centre of buoyancy under the centre of mass, so that the boat floats level', () => {
    const { spec } = readBoatSpec(soundDinghy);
    const moment = spec.weights.reduce((s, w) => s + w.mass * w.x, 0) + spec.crew.mass * spec.crew.x;
    const mass = spec.weights.reduce((s, w) => s + w.mass, 0) + spec.crew.mass;
    expect(spec.hull.dimensions.lcbAft).toBeCloseTo(-moment / mass / 4, 12);
  });

  it('makes sails of the area asked for, by foot or by roach', () => {
    const { spec } = readBoatSpec(soundKeelboat);
    expect(sailArea(spec.sails[0]!).area).toBeCloseTo(14, 9);
    const byRoach = readBoatSpec(soundDinghy.replace('foot: 2.4 m', 'foot: 2.4 m, area: 8.2 m2')).spec;
    expect(sailArea(byRoach.sails[0]!).area).toBeCloseTo(8.2, 9);
    expect(sailArea(byRoach.sails[1]!).area).toBeCloseTo(3.4, 9);
  });

  it('counts the crew by their style: half the beam and the mean reach', () => {
    const { spec } = readBoatSpec(soundDinghy);
    expect(spec.crew.armOut).toBeCloseTo(0.75 + (1.0 + 0.35) / 2, 12);
    expect(spec.crew.dragArea).toBeCloseTo(0.55 + 0.4, 12);
    expect(readBoatSpec(soundKeelboat).spec.crew.style).toBe('rail');
  });

  it('says of every estimate what was assumed and by which rule', () => {
    for (const text of [soundDinghy, soundKeelboat]) {
      const { estimates } = readBoatSpec(text);
      expect(estimates.length).toBeGreaterThan(25);
      expect(new Set(estimates.map((e) => e.key)).size).toBe(estimates.length);
      for (const e of estimates) {
        expect(e.value).not.toMatch(/NaN|undefined|Infinity/);
        expect(e.rule.length).toBeGreaterThan(10);
      }
    }
  });

  it('estimates nothing that the file says', () => {
    const { estimates } = readBoatSpec(demoText('keelboat'));
    const said = ['hull.freeboard', 'hull.prismatic', 'rig.boom_height', 'crew.style', 'hull.length_overall'];
    for (const key of said) expect(estimates.map((e) => e.key)).not.toContain(key);
  });

  it('reads arithmetic in quantities when a unit engine is passed', async () => {
    const engine = await loadUnitEngine();
    const text = soundDinghy.replace('waterline_length: 4 m', 'waterline_length: 2 * 2 m');
    expect(() => readBoatSpec(text)).toThrow(/"2 \* 2 m" is not a length/);
    expect(readBoatSpec(text, 'x', () => engine).spec).toEqual(readBoatSpec(soundDinghy).spec);
  });

  it('never fails but with a BoatFileError, whatever figures stand in the file', () => {
    const numbers = [...soundDinghy.matchAll(/[\d.]+(?= (m|cm|kg)\b)/g)];
    fc.assert(
      fc.property(
        fc.nat(numbers.length - 1),
        fc.oneof(fc.double({ min: -5, max: 50, noNaN: true }), fc.double()),
        (i, value) => {
          const m = numbers[i]!;
          const text = soundDinghy.slice(0, m.index) + value + soundDinghy.slice(m.index + m[0].length);
          try {
            const { spec } = readBoatSpec(text);
            expect(JSON.stringify(spec)).not.toMatch(/null/);
          } catch (error) {
            expect((error as Error).name).toBe('BoatFileError');
          }
        },
      ),
      { seed: 5, numRuns: 400 },
    );
  });
});

describe('starter boats', () => {
  it.each(['dinghy', 'keelboat'] as const)('read as they stand: %s', (kind) => {
    const text = starterBoat(kind);
    expect(text.split('\n')[0]).toBe('# yaml-language-server: $schema=./boat.schema.json');
    expect(Math.max(...text.split('\n').map((l) => l.length))).toBeLessThanOrEqual(120);
    const boat = readBoat(text);
    expect(boat.hull.form.gm).toBeGreaterThan(0.2);
    expect(Math.abs(boat.hull.form.trim / DEGREE)).toBeLessThan(1);
  });

  it('name every key of the definition that they leave out', () => {
    const text = starterBoat('keelboat');
    for (const key of Object.keys(boatFile.keys.hull.keys)) expect(text).toContain(`${key}:`);
    for (const key of Object.keys(boatFile.keys.rig.keys)) expect(text).toContain(`${key}:`);
  });

  it('of another kind are refused', () => {
    expect(() => starterBoat('raft' as 'dinghy')).toThrow(/"raft" is not one of dinghy, keelboat/);
  });
});

describe('the demo boats', () => {
  it.each(demoNames)('float level and on their lines: %s', (name) => {
    const boat = demos[name];
    const d = boat.spec.hull.dimensions;
    expect(Math.abs(boat.hull.form.trim / DEGREE)).toBeLessThan(0.5);
    expect(boat.hull.form.lwl / d.lwl).toBeCloseTo(1, 1.5);
    expect(boat.hull.form.canoeDraft / d.canoeDraft).toBeCloseTo(1, 1);
  });

  it('have the size and the stability of their kind', () => {
    const gm = (name: (typeof demoNames)[number]): number => demos[name].hull.form.gm;
    expect(demos['single-hander'].mass).toBeCloseTo(155, 9);
    expect(demos['trapeze-dinghy'].mass).toBeCloseTo(264, 9);
    expect(demos.keelboat.mass).toBeCloseTo(1650, 9);
    // Dinghies with the crew sitting in: 0.2 to 0.8 m; light fin keelboats 0.7 to 1.2 m (practice, no source).
    expect(gm('single-hander')).toBeGreaterThan(0.2);
    expect(gm('single-hander')).toBeLessThan(0.8);
    expect(gm('trapeze-dinghy')).toBeGreaterThan(0.2);
    expect(gm('trapeze-dinghy')).toBeLessThan(0.9);
    expect(gm('keelboat')).toBeGreaterThan(0.7);
    expect(gm('keelboat')).toBeLessThan(1.2);
  });

  it.each(demoNames)('have sails whose force leads the lateral centre a little: %s', (name) => {
    const boat = demos[name];
    const lead = leadOf(boat, boat.sailSets[0]!) / boat.spec.hull.dimensions.lwl;
    expect(lead).toBeGreaterThan(0);
    expect(lead).toBeLessThan(0.1);
    expect(lateralCentre(boat)).toBeLessThan(boat.spec.keel.x);
  });

  it.each(demoNames)('are the same read from disk: %s', (name) => {
    const boat = readBoatFile(new URL(`${name}.yaml`, folder).pathname);
    expect(boat.spec).toEqual(demos[name].spec);
  });
});

describe('describing a boat', () => {
  it.each(demoNames)('gives finite numbers with units: %s', (name) => {
    const rows = describeBoat(demos[name]);
    expect(rows.length).toBeGreaterThan(40);
    for (const r of rows) {
      if (typeof r.value === 'number') expect(Number.isFinite(r.value), r.quantity).toBe(true);
      expect(r.section).not.toBe('');
    }
    const value = (q: string): number | string | undefined => rows.find((r) => r.quantity === q)?.value;
    expect(value('displacement with crew')).toBe(demos[name].mass);
    expect(new Set(rows.map((r) => `${r.section} ${r.quantity}`)).size).toBe(rows.length);
  });
});
