import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { SailingResult } from '../../src/equilibrium/index.js';
import {
  commonAngles,
  compareTable,
  completeTable,
  type Derating,
  PLAIN_COMPLETION,
  type Polar,
  predictPolar,
  type SpeedTable,
  shareAt,
  summarise,
} from '../../src/polar/index.js';
import {
  delimitedTable,
  readDelimitedTable,
  readSignalKPolar,
  signalKPolar,
  speedFrom,
  TABLE_PRESETS,
  TableFileError,
  type TableFormat,
  type TableHints,
} from '../../src/publish/index.js';
import { fromKnots, radians } from '../../src/units/index.js';
import { demoBoat } from '../support/demo.js';

const polar = predictPolar(demoBoat('single-hander'), {
  tws: [6, 12, 22].map(fromKnots),
  twa: [20, 25, 30, 40, 60, 90, 120, 150, 180].map(radians),
});

/** The polar with one state replaced by a failure. */
function broken(i: number, j: number, why: 'overpowered' | 'not converged'): Polar {
  const { tws, twa } = polar.results[i]![j]!;
  const gone: SailingResult = { status: 'unbalanced', tws, twa, why, reason: 'for the test', evaluations: 0 };
  return {
    ...polar,
    results: polar.results.map((row, a) => row.map((r, b) => (a === i && b === j ? gone : r))),
  };
}

describe('the complete rectangle', () => {
  const { table, closest } = completeTable(polar);

  it('reaches from no wind and from the eye of the wind to 180 deg, with a number in every cell', () => {
    expect(table.rows[0]!.tws).toBe(0);
    const angles = commonAngles(table)!;
    expect(angles[0]).toBe(0);
    expect(angles[angles.length - 1]).toBe(Math.PI);
    for (const r of table.rows) for (const p of r.points) expect(p.speed).toBeGreaterThanOrEqual(0);
    for (const p of table.rows[0]!.points) expect(p.speed).toBe(0);
  });

  it('holds every balanced state as it was solved', () => {
    let seen = 0;
    polar.results.forEach((row, i) => {
      for (const r of row) {
        if (r.status !== 'balanced') continue;
        seen++;
        expect(table.rows[i + 1]!.points.find((p) => p.twa === r.twa)!.speed).toBe(r.speed);
      }
    });
    expect(seen).toBeGreaterThan(18);
  });

  it('tells how close to the wind each wind speed balances, and has no speed above that', () => {
    closest.forEach((c, i) => {
      expect(c.twa).toBeGreaterThan(radians(20));
      for (const p of table.rows[i + 1]!.points) expect(p.speed > 0).toBe(p.twa >= c.twa!);
    });
  });

  it('fades in the no-go zone without ever offering more to windward than best VMG', () => {
    const faded = completeTable(polar, { ...PLAIN_COMPLETION, noGo: 'fade' }).table;
    faded.rows.slice(1).forEach((row, i) => {
      const best = polar.bestUp[i]!;
      const vmg = best.status === 'balanced' ? best.vmg : 0;
      const inside = row.points.filter((p) => p.twa > 0 && p.twa < closest[i]!.twa!);
      expect(inside.length).toBeGreaterThan(0);
      for (const p of inside) {
        expect(p.speed).toBeGreaterThan(0);
        expect(p.speed * Math.cos(p.twa)).toBeLessThanOrEqual(vmg * (1 + 1e-12));
      }
      for (let j = 1; j < inside.length; j++) expect(inside[j]!.speed).toBeGreaterThan(inside[j - 1]!.speed);
    });
  });

  it('fades below a wide no-go zone without more to windward than its edge', () => {
    // Nothing balances closer than 90 deg: nothing is made good to windward at all.
    const wide: Polar = {
      ...polar,
      results: polar.results.map((row) =>
        row.map((r) =>
          r.twa < radians(89)
            ? {
                status: 'unbalanced' as const,
                tws: r.tws,
                twa: r.twa,
                why: 'no drive' as const,
                reason: '',
                evaluations: 0,
              }
            : r,
        ),
      ),
      bestUp: polar.bestUp.map((r) => ({
        status: 'unbalanced' as const,
        tws: r.tws,
        twa: 0,
        why: 'no drive' as const,
        reason: '',
        evaluations: 0,
      })),
    };
    const { rows } = completeTable(wide, { ...PLAIN_COMPLETION, noGo: 'fade' }).table;
    for (const r of rows.slice(1))
      for (const p of r.points) if (p.twa < radians(89)) expect(p.speed * Math.cos(p.twa)).toBeLessThan(1e-9);
  });

  it('gives an overpowered boat no speed, bridges a fault of the search, and tells of both', () => {
    const over = completeTable(broken(1, 5, 'overpowered'));
    expect(over.table.rows[2]!.points.find((p) => p.twa === polar.twa[5])!.speed).toBe(0);
    expect(over.filled).toEqual([
      { tws: polar.tws[1], twa: polar.twa[5], why: 'overpowered', filledWith: 'zero' },
    ]);
    const fault = completeTable(broken(1, 5, 'not converged'));
    const row = fault.table.rows[2]!.points;
    const j = row.findIndex((p) => p.twa === polar.twa[5]);
    // 60, 90 and 120 deg: half way.
    expect(row[j]!.speed).toBeCloseTo((row[j - 1]!.speed + row[j + 1]!.speed) / 2, 12);
    expect(fault.filled[0]!.filledWith).toBe('straight line');
    const last = completeTable(broken(1, 8, 'not converged'));
    expect(last.filled[0]!.filledWith).toBe('zero');
  });

  it('goes on above the highest wind as asked', () => {
    const top = fromKnots(40);
    const held = completeTable(polar, { ...PLAIN_COMPLETION, top }).table.rows;
    expect(held[4]!.points).toEqual(held[3]!.points);
    expect(held[4]!.tws).toBe(top);
    const fading = completeTable(polar, { ...PLAIN_COMPLETION, top, above: 'fade' }).table.rows;
    for (const p of fading[4]!.points) expect(p.speed).toBe(0);
    expect(fading[3]).toEqual(held[3]);
  });

  it('takes percents off, in every wind and by wind speed, best VMG with it', () => {
    const derating: Derating = {
      share: 0.9,
      byWind: [
        { tws: fromKnots(12), share: 1 },
        { tws: fromKnots(32), share: 0.5 },
      ],
    };
    const { rows } = completeTable(polar, { ...PLAIN_COMPLETION, derating, top: fromKnots(50) }).table;
    const shares = [0.9, 0.9, 0.9 * 0.75];
    shares.forEach((s, i) => {
      rows[i + 1]!.points.forEach((p, j) => {
        expect(p.speed).toBeCloseTo(table.rows[i + 1]!.points[j]!.speed * s, 12);
      });
      expect(rows[i + 1]!.beat!.speed).toBeCloseTo(table.rows[i + 1]!.beat!.speed * s, 12);
    });
    // Where the share changes above the computed winds, a row stands: a router's straight lines then follow it.
    expect(rows.map((r) => r.tws)).toEqual([0, 6, 12, 22, 32, 50].map(fromKnots));
    const at = (i: number): number => rows[i]!.points[5]!.speed / table.rows[3]!.points[5]!.speed;
    expect(at(4)).toBeCloseTo(0.45, 12);
    expect(at(5)).toBeCloseTo(0.45, 12);
  });

  it('asks for a polar that can be completed', () => {
    expect(() => completeTable({ ...polar, twa: polar.twa.map((a) => 0.9 * a) })).toThrow(/180 deg/);
    expect(() => completeTable({ ...polar, tws: [0], results: [polar.results[0]!] })).toThrow(/above 0/);
  });
});

describe('a share by wind speed', () => {
  it('keeps to its points, lies between neighbours, and is held beyond both ends', () => {
    const point = fc.record({
      tws: fc.integer({ min: 1, max: 40 }),
      share: fc.double({ min: 0.3, max: 1, noNaN: true }),
    });
    fc.assert(
      fc.property(
        fc.uniqueArray(point, { minLength: 1, maxLength: 6, selector: (p) => p.tws }),
        fc.double({ min: 0, max: 60, noNaN: true }),
        (points, tws) => {
          const byWind = [...points].sort((a, b) => a.tws - b.tws);
          const d: Derating = { share: 0.8, byWind };
          for (const p of byWind) expect(shareAt(d, p.tws)).toBeCloseTo(0.8 * p.share, 12);
          const all = byWind.map((p) => p.share);
          expect(shareAt(d, tws)).toBeGreaterThanOrEqual(0.8 * Math.min(...all) - 1e-12);
          expect(shareAt(d, tws)).toBeLessThanOrEqual(0.8 * Math.max(...all) + 1e-12);
        },
      ),
      { seed: 3 },
    );
  });
});

describe('a table as delimited text', () => {
  const { table } = completeTable(polar);

  it.each(Object.entries(TABLE_PRESETS))('%s: read again it is written again to the last digit', (_, f) => {
    const text = delimitedTable(table, f);
    const reading = readDelimitedTable(text, 'own.csv');
    expect(reading.format).toMatchObject({
      layout: f.layout,
      delimiter: f.delimiter,
      decimalMark: f.decimalMark,
      lineEnd: f.lineEnd,
      windUnit: 'kn',
      speedUnit: 'kn',
      angleUnit: 'deg',
    });
    expect(delimitedTable(reading.table, f)).toBe(text);
    expect(delimitedTable(reading.table, reading.format!)).toBe(text);
  });

  const anyFormat = fc.record({
    layout: fc.constantFrom('angles-down', 'angles-across', 'list'),
    marks: fc.constantFrom(
      [',', '.'],
      [';', ','],
      [';', '.'],
      ['\t', ','],
      ['\t', '.'],
      ['|', '.'],
      [' ', '.'],
    ),
    lineEnd: fc.constantFrom('\n', '\r\n'),
    windUnit: fc.constantFrom('kn', 'm/s', 'km/h'),
    speedUnit: fc.constantFrom('kn', 'm/s', 'km/h'),
    angleUnit: fc.constantFrom('deg', 'rad'),
    decimals: fc.integer({ min: 1, max: 5 }),
  });

  it('any format of any table comes back to the last digit, nothing but the text being known', () => {
    const rows = fc
      .uniqueArray(fc.integer({ min: 1, max: 50 }), { minLength: 3, maxLength: 7 })
      .map((winds) => winds.sort((a, b) => a - b));
    const angles = fc
      .uniqueArray(fc.integer({ min: 1, max: 178 }), { minLength: 3, maxLength: 12 })
      .map((list) => [0, ...list.sort((a, b) => a - b), 180]);
    fc.assert(
      fc.property(
        anyFormat,
        rows,
        angles,
        fc.infiniteStream(fc.double({ min: 0, max: 15, noNaN: true })),
        (a, winds, degs, speeds) => {
          const f = {
            ...a,
            delimiter: a.marks[0],
            decimalMark: a.marks[1],
            windDecimals: 3,
            angleDecimals: 4,
          } as unknown as TableFormat;
          const any: SpeedTable = {
            name: '',
            windHeight: 10,
            rows: winds.map((w) => ({
              tws: speedFrom(f.windUnit, w),
              points: degs.map((d) => ({ twa: radians(d), speed: speeds.next().value as number })),
            })),
          };
          const text = delimitedTable(any, f);
          const reading = readDelimitedTable(text, 'any');
          expect(delimitedTable(reading.table, f)).toBe(text);
          expect(reading.table.rows).toHaveLength(winds.length);
        },
      ),
      { seed: 11, numRuns: 150 },
    );
  });

  it('takes its corner, heads and marks from the format', () => {
    const f = TABLE_PRESETS['angles-down-semicolon']!;
    const lines = delimitedTable(table, { ...f, header: 'Winkel', lineEnd: '\n', decimals: 3 }).split('\n');
    expect(lines[0]).toBe('Winkel;0;6;12;22');
    expect(lines.find((l) => l.startsWith('90;'))).toMatch(/^90;0,000(;\d+,\d{3}){3}$/);
    const own = delimitedTable(table, { ...TABLE_PRESETS.list!, header: ['w', 'a', 's'] });
    expect(own.split('\r\n').slice(0, 2)).toEqual(['w,a,s', '0,0,0.00']);
  });

  it('refuses a rectangle of rows that do not fit together', () => {
    const ragged: SpeedTable = {
      ...table,
      rows: [table.rows[0]!, { ...table.rows[1]!, points: table.rows[1]!.points.slice(1) }],
    };
    expect(() => delimitedTable(ragged, TABLE_PRESETS['angles-down']!)).toThrow(RangeError);
    expect(delimitedTable(ragged, TABLE_PRESETS.list!).split('\r\n').length).toBeGreaterThan(10);
  });
});

describe('a table from elsewhere', () => {
  const note = (text: string, what: string, hints = {}): string => {
    const n = readDelimitedTable(text, 't', hints).notes.find((x) => x.what === what)!;
    return `${n.value}: ${n.grounds}`;
  };

  it.each([
    ['# a note\n\n \t6\t10\n45\t3,5\t4,5\n90\t5,0\t6,0\n', 'tab', ',', 'angles-down'],
    ['x;45;90;\n6;3.5;5\n10;4.5;6\n', 'semicolon', '.', 'angles-across'],
    ['     6.0  10.0\n45   3.5   4.5\n90   5.0   6.0\n', 'blank', '.', 'angles-down'],
    ['\ufeffx|6|10\r\n45|3.5|4.5\r\n90|5|6\r\n', 'bar', '.', 'angles-down'],
    ['6,45,3.5\n6,90,5\n10,45,4.5\n10,90,6\n', 'comma', '.', 'list'],
    ['"wind speed","wind angle","speed"\n6,45,3.5\n6,90,5\n10,45,4.5\n10,90,6\n', 'comma', '.', 'list'],
  ])('is understood without being told: %j', (text, delimiter, mark, layout) => {
    expect(note(text, 'delimiter')).toMatch(new RegExp(`^${delimiter}: guessed`));
    expect(note(text, 'decimal mark')).toBe(`${mark}: guessed`);
    expect(note(text, 'layout')).toMatch(new RegExp(`^${layout}: `));
    const { rows } = readDelimitedTable(text, 't').table;
    expect(rows.map((r) => r.tws)).toEqual([6, 10].map(fromKnots));
    expect(rows.map((r) => r.points)).toEqual([
      [
        { twa: radians(45), speed: fromKnots(3.5) },
        { twa: radians(90), speed: fromKnots(5) },
      ],
      [
        { twa: radians(45), speed: fromKnots(4.5) },
        { twa: radians(90), speed: fromKnots(6) },
      ],
    ]);
  });

  it('in m/s or radians is known by its heads, else by its values, else as told', () => {
    expect(note('angle wind m/s;4;8\n45;2;3\n90;3;4\n', 'wind unit')).toBe('m/s: named in the table');
    expect(note('x;2.06;4.12;6.17\n45;2;3;3\n90;3;4;5\n', 'wind unit')).toBe(
      'm/s: guessed: the winds are whole knots in m/s',
    );
    expect(note('x;4;8\n45;2;3\n90;3;4\n', 'wind unit')).toBe('kn: guessed: nothing says otherwise');
    expect(note('x;4;8\n45;2;3\n90;3;4\n', 'boat speed unit', { windUnit: 'km/h' })).toBe(
      'km/h: guessed: as the wind',
    );
    expect(note('x;4;8\n0.785;2;3\n1.571;3;4\n', 'angle unit')).toBe('rad: guessed: no value beyond 6.3');
    const told = readDelimitedTable('x;4;8\n45;2;3\n90;3;4\n', 't', {
      windUnit: 'm/s',
      speedUnit: 'kn',
    }).table;
    expect(told.rows[1]).toEqual({
      tws: 8,
      points: [
        { twa: radians(45), speed: fromKnots(3) },
        { twa: radians(90), speed: fromKnots(4) },
      ],
    });
  });

  it('may have empty cells and the other tack, which are counted and left out', () => {
    const reading = readDelimitedTable('x,6,10\n45,3,\n90,4,5\n270,4,5\n-45,3,4\n', 't');
    expect(reading.notes.find((n) => n.what === 'empty cells')!.value).toBe('1');
    expect(reading.notes.find((n) => n.what === 'cells of the other tack')!.value).toBe('4');
    expect(reading.table.rows.map((r) => r.points.length)).toEqual([2, 1]);
  });

  it.each<[string, RegExp, TableHints?]>([
    ['', /^t: this is no table/],
    ['hello', /^t:1: this is no table/],
    ['x,6,10\n45,3,4\n90,4\n', /^t:3: 2 columns, where the first row has 3; every row/],
    [
      'x,6,10\n45,3,fast\n90,4,5\n',
      /^t:2: column 3: "fast" is no number, where a boat speed is wanted; if columns/,
    ],
    [
      'x,6,10\n45,3,-4\n90,4,5\n',
      /^t:2: boat speed -4 kn is outside 0 to 117 kn; is the unit another one\? say --speed-unit/,
    ],
    [
      'x,6,200\n45,3,4\n90,4,5\n120,4,5\n',
      /^t:2: wind speed 200 kn is outside 0 to 117 kn/,
      { layout: 'angles-down' },
    ],
    [
      'x,6,10\n45,3,4\n90,4,5\n390,4,5\n',
      /^t:4: wind angle 390 deg is outside a circle/,
      { layout: 'angles-down' },
    ],
    [
      'x,6,10\n45,3,4\n45,4,5\n90,4,5\n',
      /^t:3: wind 6 kn and angle 45 deg come twice, with different speeds/,
    ],
    ['x,6,10\n4,3,4\n8,4,5\n', /^t:1: neither the first row nor the first column .* say --layout/],
    ['x,6,10\n45,,\n90,,\n', /there is no boat speed in it/],
    ['a,b,c\n6,45,3\n', /^t:1: the heads "a, b, c" do not name/],
  ])('that cannot be used gets one message: %j', (text, message, hints: TableHints = {}) => {
    expect(() => readDelimitedTable(text, 't', hints)).toThrow(TableFileError);
    expect(() => readDelimitedTable(text, 't', hints)).toThrow(message);
  });

  it('never crashes the reader: any text is a table or one message', () => {
    const piece = fc.constantFrom(
      '1',
      '2.5',
      '45',
      '180',
      ',',
      ';',
      '\t',
      ' ',
      '\n',
      '\r\n',
      'x',
      '"',
      '-',
      '.',
      '1e9',
      'NaN',
      '#',
      '°',
    );
    fc.assert(
      fc.property(
        fc.array(piece, { maxLength: 40 }).map((p) => p.join('')),
        (text) => {
          try {
            const { table } = readDelimitedTable(text, 't');
            for (const r of table.rows) {
              expect(r.tws).toBeGreaterThanOrEqual(0);
              for (const p of r.points)
                expect(Number.isFinite(p.speed) && p.twa >= 0 && p.twa <= Math.PI).toBe(true);
            }
          } catch (error) {
            expect(error).toBeInstanceOf(TableFileError);
            expect((error as Error).message).not.toContain('\n');
          }
        },
      ),
      { seed: 5, numRuns: 800 },
    );
  });
});

describe('a Signal K polar', () => {
  const { table } = completeTable(polar);
  const text = signalKPolar(table, 'a note');

  it('is a valid document by the published schemas, and the schemas would notice', async () => {
    const { default: schema } = await import('@signalk/signalk-schema');
    const tree = JSON.parse(text);
    expect(schema.validateFull(tree).valid).toBe(true);
    const spoilt = JSON.parse(text.replace('"trueWindSpeed": 0,', '"trueWindSpeed": "0",'));
    expect(schema.validateFull(spoilt).valid).toBe(false);
    const bare = JSON.parse(text.replaceAll('"angleData"', '"angles"'));
    expect(schema.validateFull(bare).valid).toBe(false);
  });

  it('is in m/s and rad, with optimal beats and gybes', () => {
    const tree = JSON.parse(text);
    const vessel = tree.vessels[tree.self.replace(/^vessels\./, '')];
    const data = vessel.performance.polars[vessel.performance.activePolar].windData;
    expect(data.map((w: { trueWindSpeed: number }) => w.trueWindSpeed)).toEqual([
      0, 3.08667, 6.17333, 11.31778,
    ]);
    expect(data[0].optimalBeats).toBeUndefined();
    for (const [i, w] of data.slice(1).entries()) {
      const [up, down] = [polar.bestUp[i]!, polar.bestDown[i]!];
      if (up.status !== 'balanced' || down.status !== 'balanced') throw new Error('the demo boat sails');
      expect(w.optimalBeats).toEqual([[Number(up.twa.toFixed(5)), Number(up.speed.toFixed(5))]]);
      expect(w.optimalGybes).toEqual([[Number(down.twa.toFixed(5)), Number(down.speed.toFixed(5))]]);
      for (const [twa, speed, vmg] of w.angleData) expect(vmg).toBeCloseTo(speed * Math.cos(twa), 5);
    }
  });

  it('read again is written again to the last digit; whole, by branch, or alone', () => {
    const reading = readSignalKPolar(text, 'own.json');
    expect(signalKPolar(reading.table, 'a note')).toBe(text);
    const tree = JSON.parse(text);
    const vessel = Object.values(tree.vessels)[0] as { performance: { polars: Record<string, unknown> } };
    for (const part of [
      vessel,
      vessel.performance,
      vessel.performance.polars,
      Object.values(vessel.performance.polars)[0],
    ])
      expect(readSignalKPolar(JSON.stringify(part), 'part').table.rows).toEqual(reading.table.rows);
  });

  it('keeps a hostile name harmless and whole', async () => {
    const name = `</script>"[ 1 ]\u202e\n${'x'.repeat(10_000)}`;
    const hostile = signalKPolar({ ...table, name }, 'a "note"\n[ 2 ]');
    const { default: schema } = await import('@signalk/signalk-schema');
    expect(schema.validateFull(JSON.parse(hostile)).valid).toBe(true);
    expect(hostile).toContain('</script>\\"[ 1 ]? x');
    expect(readSignalKPolar(hostile, 'h').table.name).toHaveLength(80);
  });

  it.each([
    ['{', /^t: this is no JSON/],
    ['{"a":1}', /^t: there is no polar with windData in it; a Signal K document/],
    ['{"windData":[{"trueWindSpeed":3,"angleData":[[1,"x"]]}]}', /^t: windData\[0\]\.angleData\[0\]\[1\]: /],
    [
      '{"windData":[{"trueWindSpeed":-3,"angleData":[[1,2]]}]}',
      /^t: windData\[0\]\.trueWindSpeed: .*; speeds are m\/s from 0 to 60/,
    ],
    [
      '{"windData":[{"trueWindSpeed":3,"angleData":[[1,2],[1,3]]}]}',
      /angle 1 comes twice at trueWindSpeed 3/,
    ],
    [
      '{"windData":[{"trueWindSpeed":3,"angleData":[]},{"trueWindSpeed":3,"angleData":[]}]}',
      /trueWindSpeed 3 comes twice/,
    ],
    ['{"windData":[{"trueWindSpeed":3,"angleData":[]}]}', /there is no boat speed in it/],
  ])('that cannot be used gets one message: %s', (json, message) => {
    expect(() => readSignalKPolar(json, 't')).toThrow(message);
    expect(() => readSignalKPolar(json, 't')).toThrow(TableFileError);
  });
});

describe('a table beside the prediction', () => {
  const { table } = completeTable(polar);
  const predictedAt = (tws: number, twa: number): SailingResult =>
    polar.results[polar.tws.indexOf(tws)]![polar.twa.indexOf(twa)]!;

  it('made from it shows no difference, and leaves out rest and the eye of the wind', () => {
    const differences = compareTable(table, predictedAt);
    expect(differences).toHaveLength(polar.tws.length * polar.twa.length);
    for (const d of differences) {
      if (d.predicted.status === 'balanced') expect(d.difference).toBe(0);
      else expect(d.share).toBeUndefined();
    }
    for (const s of summarise(differences)) expect(s).toMatchObject({ mean: 0, rms: 0, unbalanced: 0 });
  });

  it('ten percent faster shows ten percent, everywhere', () => {
    const fast = {
      ...table,
      rows: table.rows.map((r) => ({ ...r, points: r.points.map((p) => ({ ...p, speed: 1.1 * p.speed })) })),
    };
    for (const s of summarise(compareTable(fast, predictedAt))) {
      expect(s.mean).toBeCloseTo(0.1, 12);
      expect(s.rms).toBeCloseTo(0.1, 12);
      expect(s.largest!.share).toBeCloseTo(0.1, 12);
    }
  });

  it('counts speeds where the prediction has no state', () => {
    const row = table.rows[1]!;
    const brave = { ...table, rows: [{ ...row, points: row.points.map((p) => ({ ...p, speed: 1 })) }] };
    const [s] = summarise(compareTable(brave, predictedAt));
    const dead = polar.results[0]!.filter((r) => r.status === 'unbalanced').length;
    expect(dead).toBeGreaterThan(0);
    expect(s).toMatchObject({ unbalanced: dead, count: polar.twa.length - dead });
  });
});
