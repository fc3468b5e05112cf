import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  BoatFileError,
  differencesOf,
  fileDifferences,
  isWholeBoat,
  readBoatSpec,
  valuesOf,
  variantGrid,
  variantsFromFile,
  variantsIn,
} from '../../src/boat/index.js';

const BASE = readFileSync('boats/keelboat.yaml', 'utf8');
const spec = (text: string, changes: Parameters<typeof readBoatSpec>[4] = []) =>
  readBoatSpec(text, 'boat.yaml', undefined, undefined, changes).spec;
const withVariants = (text: string): string => `${BASE}\nvariants:\n${text.replace(/^/gm, '  ')}\n`;
const only = (text: string) => {
  const all = variantsIn(withVariants(text), 'boat.yaml');
  expect(all).toHaveLength(1);
  return all[0]!;
};
const problemOf = (make: () => unknown): string => {
  try {
    make();
  } catch (error) {
    if (error instanceof BoatFileError) return error.message;
    throw error;
  }
  throw new Error('nothing was refused');
};

describe('a variant', () => {
  it('of nothing is the boat itself', () => {
    expect(spec(BASE, [])).toEqual(spec(BASE));
  });

  it('reads as if the file said so, by dotted or by nested keys', () => {
    const said = BASE.replace('mast_height: 10.1 m', 'mast_height: 10.6 m').replace('count: 4', 'count: 5');
    expect(said).not.toBe(BASE);
    const dotted = only('tall:\n  rig.mast_height: 10.6 m\n  crew.count: 5');
    const nested = only('tall:\n  rig: { mast_height: 10.6 m }\n  crew:\n    count: 5');
    expect(spec(BASE, dotted.changes)).toEqual(spec(said));
    expect(spec(BASE, nested.changes)).toEqual(spec(said));
  });

  it('adds keys and sections, leaves keys out, replaces lists and their entries', () => {
    const v = only(
      'v:\n  water.kind: fresh\n  sails.gennaker: left out\n  sail_sets.main and gennaker: left out',
    );
    const s = spec(BASE, v.changes);
    expect(s.water.name).toMatch(/fresh/);
    expect(s.sails.map((x) => x.name)).not.toContain('gennaker');
    const reefs = only('v:\n  sails.main.reefs: [80 %, 60 %]');
    expect(spec(BASE, reefs.changes).sails.filter((x) => (x.reef ?? 0) > 0)).toHaveLength(2);
    const deeper = only('v:\n  sails.main.reefs[1]: 70 %');
    expect(spec(BASE, deeper.changes)).toEqual(spec(BASE.replace('[82 %]', '[70 %]')));
  });

  it('may say times, plus and minus what the file says', () => {
    const v = only('v:\n  rig.mast_height: plus 50 cm\n  sails.jib.area: times 110 %\n  crew.count: minus 1');
    const s = spec(BASE, v.changes);
    expect(s.rig.mastTop).toBeCloseTo(10.6, 9);
    expect(s.crew.count).toBe(3);
    expect(differencesOf(BASE, v.changes)).toEqual([
      { key: 'rig.mast_height', before: '10.1 m', after: '10.6 m' },
      { key: 'sails.jib.area', before: '9.8 m2', after: '10.78 m2' },
      { key: 'crew.count', before: '4', after: '3' },
    ]);
  });

  it('leaves the file it came from as it was', () => {
    const text = withVariants('tall:\n  rig.mast_height: 10.6 m');
    expect(spec(text)).toEqual(spec(BASE));
  });
});

describe('ranges and grids', () => {
  it('count both ends among their steps', () => {
    expect(valuesOf('8 to 10 m in 5 steps')).toEqual(['8 m', '8.5 m', '9 m', '9.5 m', '10 m']);
    expect(valuesOf('times 0.9 to 1.1 in 3 steps')).toEqual(['times 0.9', 'times 1', 'times 1.1']);
    expect(valuesOf('3 or 4')).toEqual(['3', '4']);
    expect(valuesOf('8.4 m')).toEqual(['8.4 m']);
    expect(valuesOf('800 mm to 1 m in 2 steps')).toMatchObject({ message: /two units/ });
    expect(valuesOf('8 to 10 m in 1 steps')).toMatchObject({ message: /2 to 1000/ });
    expect(valuesOf('8 to 10 m in many steps')).toMatchObject({ hint: /8 to 10 m in 5 steps/ });
  });

  it('make named variants, two of them a grid', () => {
    const all = variantsIn(
      withVariants('mast:\n  rig.mast_height: 10 to 11 m in 3 steps\n  crew.count: 3 or 4'),
    );
    expect(all.map((v) => v.name)).toEqual(
      ['10 m', '10.5 m', '11 m'].flatMap((h) => [3, 4].map((n) => `mast, mast_height ${h}, count ${n}`)),
    );
    expect(spec(BASE, all[3]!.changes).crew.count).toBe(4);
    expect(spec(BASE, all[3]!.changes).rig.mastTop).toBeCloseTo(10.5, 9);
  });

  it('of a sweep number every combination once, keys in one text moving together', () => {
    const grid = variantGrid(
      ['rig.mast_height, sails.main.luff = plus 0 to 0.4 m in 3 steps', 'crew.count = 3 or 4 or 5'],
      BASE,
    );
    expect(grid.count).toBe(9);
    const names = Array.from({ length: 9 }, (_, i) => grid.at(i).name);
    expect(new Set(names).size).toBe(9);
    expect(differencesOf(BASE, grid.at(8).changes)).toEqual([
      { key: 'rig.mast_height', before: '10.1 m', after: '10.5 m' },
      { key: 'sails.main.luff', before: '8.4 m', after: '8.8 m' },
      { key: 'crew.count', before: '4', after: '5' },
    ]);
  });
});

describe('what is wrong with a variant', () => {
  it('is told with file, line and a hint, when the boat file itself is read', () => {
    const lines = BASE.split('\n').length;
    const text = withVariants('tall:\n  rig.mast_hight: 10.6 m');
    expect(problemOf(() => readBoatSpec(text, 'boat.yaml'))).toBe(
      `boat.yaml:${lines + 3}:5 variants.tall.rig.mast_hight: there is no "mast_hight" in rig; did you mean "mast_height"?`,
    );
    expect(problemOf(() => variantsIn(withVariants('tall:'), 'boat.yaml'))).toMatch(
      /changes are wanted here/,
    );
    expect(problemOf(() => variantsIn(withVariants('tall:\n  crew.count:'), 'boat.yaml'))).toMatch(
      /variants\.tall\.crew\.count: nothing is written here; write the new value/,
    );
  });

  it('is told at the place of the change when a value does not fit', () => {
    const v = only('tall:\n  rig.mast_height: 1060 m');
    const lines = BASE.split('\n').length;
    expect(problemOf(() => spec(BASE, v.changes))).toBe(
      `boat.yaml:${lines + 3}:22 rig.mast_height: 1060 m (1060 m) is outside 1 m to 50 m; is it in millimetres?`,
    );
    const grid = variantGrid(['crew.count = 40'], BASE);
    expect(problemOf(() => spec(BASE, grid.at(0).changes))).toMatch(/^--vary:1:1 crew\.count: "40" is not/);
  });

  it('names what is not there to be changed', () => {
    const of = (text: string) => problemOf(() => spec(BASE, only(text).changes));
    expect(of('v:\n  sails.spare: left out')).toMatch(/sails\.spare: there is nothing here to leave out/);
    expect(of('v:\n  sails.main.leech: plus 1 m')).toMatch(
      /needs a value in the boat file to start from|there is no/,
    );
    expect(of('v:\n  sails.main.reefs[3]: 70 %')).toMatch(/the list has 1 entries/);
    expect(problemOf(() => variantGrid(['mast'], BASE))).toMatch(/has no "="/);
    expect(problemOf(() => variantGrid(['mast = 3'], BASE))).toMatch(/there is no "mast" in a boat file/);
  });

  it('never goes by unnoticed or as a fault of the program, whatever the text', () => {
    const key = fc.constantFrom(
      'rig.mast_height',
      'crew',
      'sails.main',
      'name',
      'sails.main.reefs[1]',
      'a b',
      '',
      'crew.count',
    );
    const value = fc.oneof(
      fc.string({ maxLength: 12 }),
      fc.constantFrom(
        'times 2',
        'left out',
        '[1, 2]',
        '{ a: 1 }',
        '10 m',
        '9 to 10 m in 2 steps',
        '*x',
        '!t 3',
      ),
    );
    fc.assert(
      fc.property(key, value, (k, v) => {
        try {
          const grid = variantGrid([`${k} = ${v}`], BASE);
          spec(BASE, grid.at(grid.count - 1).changes);
        } catch (error) {
          expect(error).toBeInstanceOf(BoatFileError);
        }
      }),
      { numRuns: 150, seed: 4 },
    );
  });
});

describe('files of their own', () => {
  it('that hold only differences make variants under their own name', () => {
    const v = variantsFromFile('name: Tall\nrig:\n  mast_height: 10.6 m\n', 'tall.yaml', 'tall', BASE);
    expect(v).toHaveLength(1);
    expect(v[0]!.name).toBe('Tall');
    expect(spec(BASE, v[0]!.changes).rig.mastTop).toBeCloseTo(10.6, 9);
    expect(spec(BASE, v[0]!.changes).name).toBe('Tall');
    expect(problemOf(() => variantsFromFile('rig: { mast: 3 }', 'tall.yaml', 'tall', BASE))).toMatch(
      /^tall\.yaml:1:8 rig\.mast: there is no "mast" in rig/,
    );
  });

  it('that describe a whole boat are known as such, and compared key by key', () => {
    expect(isWholeBoat(BASE)).toBe(true);
    expect(isWholeBoat('rig: { mast_height: 9 m }')).toBe(false);
    const other = BASE.replace('mast_height: 10.1 m', 'mast_height: 10.6 m').replace('  heel: 30 deg', '');
    expect(fileDifferences(BASE, other.replace(/^limits:\s*$/m, ''))).toEqual([
      { key: 'rig.mast_height', before: '10.1 m', after: '10.6 m' },
      { key: 'limits.heel', before: '30 deg', after: '' },
    ]);
    expect(fileDifferences(BASE, BASE)).toEqual([]);
  });
});
