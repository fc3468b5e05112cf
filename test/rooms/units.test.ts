import { createRequire } from 'node:module';
import fc from 'fast-check';
import { all, create, type MathJsInstance } from 'mathjs';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  DEGREE,
  degrees,
  editDistance,
  fromKnots,
  KINDS,
  KNOT,
  loadUnitEngine,
  nearest,
  parseQuantity,
  QuantityError,
  type QuantityKind,
  quickQuantity,
  radians,
  toKnots,
  type UnitEngine,
  unitEngineFrom,
  writeQuantity,
} from '../../src/units/index.js';

const BASE: Record<string, string> = {
  length: 'm',
  area: 'm2',
  volume: 'm3',
  mass: 'kg',
  angle: 'rad',
  speed: 'm/s',
  density: 'kg/m3',
  force: 'N',
};

let math: MathJsInstance;
beforeAll(() => {
  math = create(all!) as MathJsInstance;
  math.createUnit('kn', { definition: `${KNOT} m/s`, aliases: ['kt', 'kts', 'knot', 'knots'] });
});

describe('quantities in text', () => {
  it.each<[string, QuantityKind, number]>([
    ['16 ft 3 in', 'length', 16.25 * 0.3048],
    ['5\' 3"', 'length', 5.25 * 0.3048],
    ['5\'3"', 'length', 5.25 * 0.3048],
    ['-2 ft 6 in', 'length', -2.5 * 0.3048],
    ['16 ft 3 1/2 in', 'length', (16 + 3.5 / 12) * 0.3048],
    ['4200 mm', 'length', 4.2],
    ['4.2', 'length', 4.2],
    ['75 kg', 'mass', 75],
    ['12 stone 4 lb', 'mass', 172 * 0.45359237],
    ['12 deg', 'angle', (12 * Math.PI) / 180],
    ['12', 'angle', (12 * Math.PI) / 180],
    ['12°', 'angle', (12 * Math.PI) / 180],
    ['10 kn', 'speed', 18520 / 3600],
    ['7.06 m2', 'area', 7.06],
    ['76 ft²', 'area', 76 * 0.3048 ** 2],
    ['1025 kg/m3', 'density', 1025],
    ['56 %', 'ratio', 0.56],
    ['0.56', 'ratio', 0.56],
    ['15 °C', 'temperature', 15],
  ])('reads %s as %s', (text, kind, value) => {
    expect(parseQuantity(text, kind)).toBeCloseTo(value, 12);
  });

  it('agrees with mathjs to the last bit on every unit that both know, quotients to one unit in the last place', () => {
    let compared = 0;
    const skipped: string[] = [];
    for (const kind of Object.keys(BASE) as QuantityKind[]) {
      for (const unit of Object.keys(KINDS[kind].units)) {
        for (const number of ['1', '0.37', '4200', '1e-3', '-16.3', '7.06']) {
          const text = `${number} ${unit}`;
          let want: number;
          try {
            want = math.unit(text).toNumber(BASE[kind]!);
          } catch {
            if (!skipped.includes(unit)) skipped.push(unit);
            continue;
          }
          const got = quickQuantity(text, kind)!;
          // A quotient of units rounds once more in one order of working than in the other.
          if (unit.includes('/')) expect(Math.abs(got / want - 1), text).toBeLessThanOrEqual(2.3e-16);
          else expect(got, text).toBe(want);
          compared++;
        }
      }
    }
    expect(compared).toBeGreaterThan(250);
    // Signs and spellings mathjs does not have.
    const known = (u: string): boolean =>
      /['"°²³]|^metres?$|^(ft|in|yd)[23]$|^pounds?$|^kmh$|^mph$|^newtons$/.test(u);
    expect(skipped.filter((u) => !known(u))).toEqual([]);
  });

  it('reads back what it writes', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...(Object.keys(KINDS) as QuantityKind[])),
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        (kind, value) => {
          const back = parseQuantity(writeQuantity(value, kind, 15), kind);
          expect(Math.abs(back - value)).toBeLessThanOrEqual(1e-13 * Math.abs(value));
        },
      ),
      { seed: 11, numRuns: 300 },
    );
  });

  it('never answers with anything but a finite number or a QuantityError', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...(Object.keys(KINDS) as QuantityKind[])),
        fc.oneof(fc.string(), fc.stringMatching(/^[0-9 .'"eEa-z%-]{0,20}$/)),
        (kind, text) => {
          try {
            expect(Number.isFinite(parseQuantity(text, kind))).toBe(true);
          } catch (error) {
            expect(error).toBeInstanceOf(QuantityError);
            expect((error as QuantityError).hint).not.toBe('');
          }
        },
      ),
      { seed: 12, numRuns: 2000 },
    );
  });

  it.each<[string, QuantityKind, RegExp, RegExp]>([
    ['12 kg', 'length', /"12 kg" is a mass, but a length is wanted/, /4\.2 m/],
    ['NaN', 'length', /not a finite number/, /4\.2 m/],
    ['.inf', 'mass', /not a finite number/, /75 kg/],
    ['4,2 m', 'length', /is not a length/, /decimal point: 4\.2 m/],
    ['', 'area', /nothing written/, /7\.06 m2/],
    ['long', 'length', /"long" is not a length/, /number with a unit/],
    ['1e400', 'length', /is not a length/, /number with a unit/],
    ['3 in 16 ft', 'length', /is not a length/, /units: m/],
  ])('says what is wrong with %j as %s', (text, kind, message, hint) => {
    let caught: unknown;
    try {
      parseQuantity(text, kind);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(QuantityError);
    expect((caught as QuantityError).message).toMatch(message);
    expect((caught as QuantityError).hint).toMatch(hint);
  });
});

describe('the unit engine for everything else', () => {
  let engine: UnitEngine;
  beforeAll(async () => {
    engine = await loadUnitEngine();
  });

  it('is not made for what the quick reader knows', () => {
    const never = (): UnitEngine => {
      throw new Error('made without need');
    };
    expect(parseQuantity('16 ft 3 in', 'length', never)).toBeCloseTo(4.953, 12);
  });

  it('reads sums, products and rare units', () => {
    const lazy = (): UnitEngine => engine;
    expect(parseQuantity('2 * 3.1 m', 'length', lazy)).toBeCloseTo(6.2, 12);
    expect(parseQuantity('5 m + 20 cm', 'length', lazy)).toBeCloseTo(5.2, 12);
    expect(parseQuantity('0.5 mile', 'length', lazy)).toBeCloseTo(804.672, 9);
    expect(parseQuantity('2 kn * 1.5', 'speed', lazy)).toBeCloseTo(3 * KNOT, 12);
    expect(parseQuantity('1 / 2', 'ratio', lazy)).toBe(0.5);
  });

  it('keeps the kind, and refuses everything but arithmetic', () => {
    expect(engine('2 * 3 kg', 'length')).toBeUndefined();
    expect(engine('import("x")', 'length')).toBeUndefined();
    expect(engine('f(x) = 3 m', 'length')).toBeUndefined();
    expect(engine('sqrt(4) m', 'length')).toBeUndefined();
    expect(engine('1 / 0', 'ratio')).toBe(Number.POSITIVE_INFINITY);
    expect(() => parseQuantity('1 / 0', 'ratio', () => engine)).toThrow(QuantityError);
    expect(() => parseQuantity('1 m / 0', 'length', () => engine)).toThrow(QuantityError);
  });

  it('works on the build that Node loads without waiting, too', () => {
    const require = createRequire(import.meta.url);
    expect(unitEngineFrom(require('mathjs'))('2 * 3.1 m', 'length')).toBeCloseTo(6.2, 12);
  });
});

describe('exact factors and angles', () => {
  it('converts knots and degrees there and back', () => {
    expect(KNOT).toBe(1852 / 3600);
    expect(toKnots(fromKnots(7))).toBeCloseTo(7, 14);
    expect(degrees(radians(33))).toBeCloseTo(33, 13);
    expect(180 * DEGREE).toBe(Math.PI);
  });
});

describe('slips of the pen', () => {
  it('counts edits, a swap of neighbours as one', () => {
    expect(editDistance('luff', 'luff')).toBe(0);
    expect(editDistance('luf', 'luff')).toBe(1);
    expect(editDistance('foot', 'luff')).toBe(4);
    expect(editDistance('jbi', 'jib')).toBe(1);
  });

  it('suggests the nearest word only when it is near', () => {
    const words = ['waterline_length', 'waterline_beam', 'canoe_draft'];
    expect(nearest('waterline_lenght', words)).toBe('waterline_length');
    expect(nearest('Waterline Beam', words)).toBe('waterline_beam');
    expect(nearest('keel', words)).toBeUndefined();
  });
});
