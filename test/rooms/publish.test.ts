import {
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { predictPolar } from '../../src/polar/index.js';
import {
  csvText,
  fileStem,
  fixed,
  OutputError,
  POLAR_COLUMNS,
  type PolarReport,
  polarCsv,
  polarJson,
  polarPage,
  polarReport,
  RESISTANCE_PARTS,
  resistanceCsv,
  rounded,
  significant,
  targetTable,
  terminalText,
  wrapped,
  writeFiles,
} from '../../src/publish/index.js';
import { fromKnots, radians } from '../../src/units/index.js';
import { demoBoat } from '../support/demo.js';

const boat = demoBoat('trapeze-dinghy');
const polar = predictPolar(boat, {
  tws: [8, 14].map(fromKnots),
  twa: [5, 45, 90, 135, 180].map(radians),
});
const report = polarReport(boat, polar);

const HOSTILE = `=1+1,"x"</script><img src=x onerror=alert(1)>&'\u202e\u001b[31m`;

/** The same report with hostile texts wherever a text can come from a boat file. */
function hostileReport(): PolarReport {
  const spoil = <T extends object>(r: T): T => ('sailSet' in r ? { ...r, sailSet: HOSTILE } : r);
  return {
    boat: {
      ...report.boat,
      name: HOSTILE,
      note: HOSTILE,
      description: report.boat.description.map((r) => ({ ...r, quantity: HOSTILE })),
      estimates: [{ key: HOSTILE, value: HOSTILE, rule: HOSTILE }],
      warnings: [{ method: HOSTILE, parameter: HOSTILE, value: 1, range: [2, 3], treatment: HOSTILE }],
    },
    polar: {
      ...polar,
      boatName: HOSTILE,
      results: polar.results.map((row) => row.map(spoil)),
      bestUp: polar.bestUp.map(spoil),
      bestDown: polar.bestDown.map(spoil),
      sets: polar.sets.map((s) => ({ ...s, name: HOSTILE })),
    },
    resistance: report.resistance,
    righting: { ...report.righting, points: report.righting.points.map((p) => ({ ...p })) },
    sails: {
      ...report.sails,
      boat: HOSTILE,
      sets: report.sails.sets.map((s) => ({
        ...s,
        name: HOSTILE,
        loadings: s.loadings.map((l) => ({ ...l, sails: l.sails.map((x) => ({ ...x, sail: HOSTILE })) })),
      })),
    },
    balances: report.balances.map((b) => ({ ...b, state: { ...b.state, sailSet: HOSTILE } })),
  };
}

/** A reader of RFC 4180, written from its grammar. */
function readCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = '';
  let inside = false;
  for (let i = 0; i < text.length; i++) {
    const c = text[i]!;
    if (inside) {
      if (c !== '"') cell += c;
      else if (text[i + 1] === '"') {
        cell += '"';
        i++;
      } else inside = false;
    } else if (c === '"') inside = true;
    else if (c === ',') {
      row.push(cell);
      cell = '';
    } else if (c === '\r' && text[i + 1] === '\n') {
      rows.push([...row, cell]);
      row = [];
      cell = '';
      i++;
    } else cell += c;
  }
  expect(cell).toBe('');
  return rows;
}

describe('numbers as text', () => {
  it('have fixed decimals and no negative zero', () => {
    expect(fixed(-0.004, 2)).toBe('0.00');
    expect(fixed(-0.006, 2)).toBe('-0.01');
    expect(fixed(Number.NaN, 2)).toBe('n/a');
    expect(fixed(1e7, 0)).toBe('10000000');
  });
  it('keep significant digits without exponents where that is readable', () => {
    expect(significant(1649.96)).toBe('1650');
    expect(significant(0.0715)).toBe('0.0715');
    expect(significant(-12.3456)).toBe('-12.35');
    expect(significant(3)).toBe('3');
    expect(significant(1e-9)).toBe('1.000e-9');
    expect(significant(Number.POSITIVE_INFINITY)).toBe('n/a');
  });
  it('become null for programs where they are not finite', () => {
    expect(rounded(Number.NaN)).toBeNull();
    expect(Object.is(rounded(-0), 0)).toBe(true);
    expect(rounded(1234.5678, 5)).toBe(1234.6);
  });
});

describe('texts of unknown origin', () => {
  it('lose what a terminal would act on', () => {
    expect(terminalText('a\u001b[2Jb\u202ec\u0085d\ne')).toBe('a?[2Jb?c?d\ne');
  });
  it('wrap at blanks within the width', () => {
    const text = wrapped('one two three four five six', 12, '  ');
    expect(text).toBe('one two\n  three four\n  five six');
  });
  it('become safe names of files', () => {
    expect(fileStem('../../etc/passwd')).toBe('etc-passwd');
    expect(fileStem('.hidden')).toBe('hidden');
    expect(fileStem('   ')).toBe('boat');
    expect(fileStem('con')).toBe('boat-con');
    expect(fileStem('Möwe 7 (blau)')).toBe('Möwe-7-blau');
    expect(Buffer.byteLength(fileStem('船'.repeat(300)))).toBeLessThan(200);
    expect(fileStem('a\u0000b\u202ec')).toBe('a-b-c');
  });
});

describe('the polar as comma-separated values', () => {
  it('quotes what RFC 4180 asks to quote', () => {
    expect(csvText('plain')).toBe('plain');
    expect(csvText('a,b')).toBe('"a,b"');
    expect(csvText('say "ho"')).toBe('"say ""ho"""');
    expect(csvText('two\nlines')).toBe('"two\nlines"');
  });
  it('disarms texts a spreadsheet would take for a formula', () => {
    for (const text of ['=1+1', '+1', '-1', '@x', '|x', '\t=1', ' =1', '\uff1d1'])
      expect(readCsv(`${csvText(text)}\r\n`)[0]![0]).toBe(`'${text}`);
    expect(csvText('main-sail')).toBe('main-sail');
  });
  it('holds every state of the grid and the best ones, each with all columns', () => {
    const rows = readCsv(polarCsv(report));
    expect(rows[0]).toEqual([...POLAR_COLUMNS]);
    expect(rows).toHaveLength(1 + 2 * (5 + 3));
    for (const row of rows) expect(row).toHaveLength(POLAR_COLUMNS.length);
    const at = (row: string[], column: (typeof POLAR_COLUMNS)[number]): string =>
      row[POLAR_COLUMNS.indexOf(column)]!;
    const reach = rows.find((r) => r[0] === 'grid' && r[1] === '14.000' && r[2] === '90.00')!;
    const state = polar.results[1]![2]!;
    if (state.status !== 'balanced') throw new Error('a beam reach must balance');
    expect(Number(at(reach, 'boat_speed_kn')) * (1852 / 3600)).toBeCloseTo(state.speed, 3);
    expect(Number(at(reach, 'heel_deg'))).toBeCloseTo((state.heel * 180) / Math.PI, 2);
    expect(at(reach, 'status')).toBe('balanced');
  });
  it('shows a state that does not balance as what it is, without figures', () => {
    const rows = readCsv(polarCsv(report));
    const dead = rows.find((r) => r[0] === 'grid' && r[2] === '5.00')!;
    expect(dead.slice(3, -2).join('')).toBe('');
    expect(dead.at(-2)).toBe('no drive');
    expect(dead.at(-1)).toMatch(/\w{3}/);
  });
  it('survives hostile names', () => {
    const rows = readCsv(polarCsv(hostileReport()));
    for (const row of rows) expect(row).toHaveLength(POLAR_COLUMNS.length);
    expect(rows[3]![POLAR_COLUMNS.indexOf('sails')]).toBe(`'${HOSTILE}`);
  });
});

describe('the results file', () => {
  it('is complete, with units in its keys, and the same every time', () => {
    const text = polarJson(report);
    const json = JSON.parse(text);
    expect(json.winds).toHaveLength(2);
    expect(json.winds[0].states).toHaveLength(5);
    expect(json.winds[0].states[0]).toMatchObject({ status: 'unbalanced', why: 'no drive', twa_deg: 5 });
    expect(json.boat.estimates).toEqual(boat.estimates.map((e) => ({ ...e })));
    expect(json.boat.quantities.length).toBeGreaterThan(30);
    expect(json.cautions).toHaveLength(3);
    expect(json.error_bands.of_boat_speed.length).toBeGreaterThan(2);
    expect(polarJson(polarReport(boat, polar))).toBe(text);
    expect(text).not.toMatch(/\d{4}-\d\d-\d\dT/);
  });
});

describe('the target table', () => {
  it('fits the width and keeps its columns whatever the names', () => {
    for (const r of [report, hostileReport()]) {
      const text = targetTable(r);
      expect(terminalText(text)).toBe(text);
      for (const line of text.split('\n')) expect(line.length).toBeLessThanOrEqual(100);
      expect(text.match(/ up /g)).toHaveLength(2);
    }
  });
  it('says why where nothing makes good to windward', () => {
    const lost = predictPolar(boat, { tws: [fromKnots(8)], twa: [radians(2), radians(120)] });
    const text = targetTable(polarReport(boat, lost));
    expect(text).toMatch(/8\.0 +up +no drive/);
    expect(text).toMatch(/8\.0 kn up: no drive\. .*to windward/);
  });
});

describe('the page', () => {
  const withoutScripts = (html: string): string =>
    html.replace(/<script[^>]*>[\s\S]*?<\/script>/g, '').replace(/<style>[\s\S]*?<\/style>/, '');

  it('escapes every name', () => {
    const html = polarPage(hostileReport());
    expect(html.match(/<script/g)!.length).toBeGreaterThanOrEqual(3);
    expect(html.match(/<\/script>/gi)).toHaveLength(3);
    const body = withoutScripts(html);
    expect(body).not.toMatch(/<img|<script/i);
    expect(body).toMatch(/&lt;img src=x onerror=alert\(1\)&gt;/);
    const data = html.match(/<script type="application\/json" id="polar-data">([\s\S]*?)<\/script>/)![1]!;
    expect(data).not.toMatch(/[<>]/);
    const facts = JSON.parse(data).curves[0].facts.at(-1);
    expect(facts.at(-1)).not.toMatch(/</);
  });
  it('allows its own scripts only and no network', () => {
    const html = polarPage(report);
    const policy = html.match(/Content-Security-Policy" content="([^"]*)"/)![1]!;
    expect(policy).toMatch(/default-src &#39;none&#39;/);
    expect(policy.match(/sha256-/g)).toHaveLength(2);
    expect(policy).not.toMatch(/https?:|\*|unsafe-eval|connect-src/);
    expect(withoutScripts(html)).not.toMatch(/(src|href)="(?!#|data:,)/);
  });
  it('holds cautions, error bands, estimates, and the cause at every state that does not balance', () => {
    const html = polarPage(report);
    expect(html).toMatch(/no judgement of stability, strength or safety/);
    expect(html).toMatch(/± 15 to 20 %/);
    expect(html).toMatch(/id="estimates"/);
    const dead = polar.results.flat().filter((r) => r.status === 'unbalanced');
    expect(dead.length).toBeGreaterThan(1);
    expect(html.match(/<td class="none"[^>]*>[a-z ]+: \w/g)).toHaveLength(dead.length);
  });
});

describe('files', () => {
  let folder = '';
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), 'publish-'));
  });
  afterEach(() => rmSync(folder, { recursive: true, force: true }));
  const files = [
    { name: 'a.txt', content: 'new a' },
    { name: 'b.txt', content: 'new b' },
  ];

  it('are written into folders made for them, nothing else beside', () => {
    const out = join(folder, 'x', 'y');
    expect(writeFiles(out, files)).toEqual([join(out, 'a.txt'), join(out, 'b.txt')]);
    expect(readdirSync(out).sort()).toEqual(['a.txt', 'b.txt']);
    expect(readFileSync(join(out, 'b.txt'), 'utf8')).toBe('new b');
  });
  it('are all as before when one cannot be written', () => {
    writeFileSync(join(folder, 'a.txt'), 'old a');
    mkdirSync(join(folder, 'b.txt'));
    expect(() => writeFiles(folder, files)).toThrow(OutputError);
    expect(() => writeFiles(folder, files)).toThrow(/b\.txt: a folder is in the way/);
    expect(readFileSync(join(folder, 'a.txt'), 'utf8')).toBe('old a');
    expect(readdirSync(folder).sort()).toEqual(['a.txt', 'b.txt']);
  });
  it.skipIf(!existsSync('/proc/self'))('are refused at once where no folder can be made', () => {
    expect(() => writeFiles('/proc/polarwright/none', [{ name: 'a.txt', content: 'a' }])).toThrow(
      OutputError,
    );
  });

  it('come back as they were when a later one of them fails, and no folder stays', () => {
    const long = [files[0]!, { name: `${'n'.repeat(300)}.txt`, content: '' }];
    const astray = [files[0]!, { name: join('no-such-folder', 'b.txt'), content: '' }];
    for (const set of [long, astray]) {
      expect(() => writeFiles(join(folder, 'x', 'y'), set)).toThrow(OutputError);
      expect(readdirSync(folder)).toEqual([]);
    }
    writeFileSync(join(folder, 'a.txt'), 'old a');
    for (const set of [long, astray]) {
      expect(() => writeFiles(folder, set)).toThrow(OutputError);
      expect(readdirSync(folder)).toEqual(['a.txt']);
      expect(readFileSync(join(folder, 'a.txt'), 'utf8')).toBe('old a');
    }
    expect(writeFiles(folder, files)).toHaveLength(2);
    expect(readdirSync(folder).sort()).toEqual(['a.txt', 'b.txt']);
    expect(readFileSync(join(folder, 'a.txt'), 'utf8')).toBe('new a');
  });
  it('are left alone when replacing is not wanted', () => {
    writeFileSync(join(folder, 'b.txt'), 'old b');
    expect(() => writeFiles(folder, files, { overwrite: false })).toThrow(/b\.txt exists already/);
    expect(readdirSync(folder)).toEqual(['b.txt']);
    expect(readFileSync(join(folder, 'b.txt'), 'utf8')).toBe('old b');
  });
});

describe('the resistance report', () => {
  it('has every part in a CSV that adds up, with the range of the regression marked', () => {
    const rows = readCsv(resistanceCsv(report.resistance, 6));
    const head = rows[0]!;
    const at = (name: string): number => head.indexOf(name);
    expect(rows.length).toBe(1 + 4 * 81);
    const parts = RESISTANCE_PARTS.map((p) => at(p.key));
    for (const r of rows.slice(1)) {
      const sum = parts.reduce((s, i) => s + Number(r[i]), 0);
      expect(sum).toBeCloseTo(Number(r[at('total_n')]), 4);
      const fn = Number(r[at('froude')]);
      if (Math.abs(fn - 0.15) > 1e-3 && Math.abs(fn - 0.6) > 1e-3) {
        expect(r[at('regression')]).toBe(fn >= 0.15 && fn <= 0.6 ? 'inside' : 'outside');
      }
    }
  });

  it('draws charts that say in words what they show', () => {
    const page = polarPage(report);
    const from = page.indexOf('<section id="resistance"');
    const section = page.slice(from, page.indexOf('</section>', from));
    expect(section.match(/<figure class="chart">/g)).toHaveLength(3);
    expect(section).toContain('speeds the wave-resistance regression was made for');
    expect(section).not.toMatch(/NaN|Infinity/);
  });
});
