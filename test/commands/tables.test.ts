import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { runCommand, runMain, scratchFolder } from '../support/command.js';

const BOAT = resolve('boats/single-hander.yaml');
const GRID = ['--tws', '8,14', '--twa', '30:180:30'];

const folders: ReturnType<typeof scratchFolder>[] = [];
let folder: ReturnType<typeof scratchFolder>;
beforeEach(() => {
  folder = scratchFolder();
  folders.push(folder);
});
afterAll(() => {
  for (const f of folders) f.remove();
});
const at = (name: string): string => join(folder.path, name);
const longest = (text: string): number => Math.max(...text.split('\n').map((l) => [...l].length));

describe('targets', () => {
  it('prints targets and cautions; writes targets, percents and cards', () => {
    const run = runCommand(
      ['targets', BOAT, '--tws', '8,14', '--reach', '62,100', '--boat-speed', '4', '--percents'],
      {
        cwd: folder.path,
      },
    );
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(run.out).toMatch(/targets, wind at 10 m, kn/);
    expect(run.out).toMatch(/ TWS +62 deg +100 deg\n/);
    expect(run.out).toMatch(/4\.00 kn in percent of target/);
    expect(run.out).toMatch(/Percent of target, down/);
    expect(run.out).toMatch(/no judgement of stability, strength or safety/);
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    expect(folder.list()).toEqual(
      ['', '/single-hander-card-a5.html', '/single-hander-percent.csv', '/single-hander-targets.csv'].map(
        (f) => `reports${f}`,
      ),
    );
  });

  it('takes bare wind speeds in the unit of the card, and shows what is taken off', async () => {
    const args = ['targets', BOAT, '--unit', 'm/s', '--sea-percent', '90 %', '--label', 'chop', '--json'];
    const json = JSON.parse((await runMain([...args, '--tws', '4'])).out);
    expect(json.winds).toHaveLength(1);
    expect(json.winds[0].tws_m_s).toBe(4);
    expect(json).toMatchObject({ percent_of_prediction: 90, label: 'chop' });
    const up = json.winds[0].best_vmg_up;
    expect(up.target_speed_m_s).toBeCloseTo(0.9 * up.predicted_speed_m_s, 7);
    const same = JSON.parse((await runMain([...args, '--tws', '14.4 km/h'])).out);
    expect(same.winds[0].best_vmg_up.target_speed_m_s).toBeCloseTo(up.target_speed_m_s, 6);
  });

  it.each([
    [['--sea-percent', '5'], /--sea-percent: "5" is not a percent from 30 to 100; it is what is left/],
    [['--crew-percent', 'ten'], /--crew-percent: "ten" is not a percent/],
    [['--paper', 'A4'], /--paper: "A4" is none of A5, A6/],
    [['--unit', 'mph'], /--unit: "mph" is none of kn, m\/s/],
    [['--reach', '60,190'], /--reach: 190 deg is outside 0 to 180 deg/],
    [['--unit', 'm/s', '--tws', '40'], /--tws: 40 m\/s is outside 0\.3 to 30\.9 m\/s/],
  ])('refuses %j', async (args, wanted) => {
    const run = await runMain(['targets', BOAT, '--out', at('out'), ...args]);
    expect(run).toMatchObject({ code: 2, out: '' });
    expect(run.err).toMatch(wanted);
    expect(folder.list()).toEqual([]);
  });
});

describe('export', () => {
  it('writes a rectangle without holes, and says how it was filled', () => {
    const run = runCommand(['export', BOAT, ...GRID, '--top', '30'], { cwd: folder.path });
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(run.out).toMatch(/^4 wind speeds by 7 angles, no cell empty: reports/);
    expect(run.out).toMatch(/Wind at 10 m/);
    expect(run.out).toMatch(/Below 8 kn: a row at rest/);
    expect(run.out).toMatch(/Above 14 kn, .* up to 30 kn: the\s+speeds of that wind are held/);
    expect(run.out).toMatch(/no judgement of stability, strength or safety/);
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    const lines = readFileSync(at('reports/single-hander-routing.csv'), 'utf8').split('\r\n');
    expect(lines[0]).toBe('twa_deg:tws_kn:boat_speed_kn,0,8,14,30');
    expect(lines.slice(1, -1).map((l) => l.split(',')[0])).toEqual([
      '0',
      '30',
      '60',
      '90',
      '120',
      '150',
      '180',
    ]);
    for (const l of lines.slice(1, -1)) expect(l).toMatch(/^\d+,0\.00(,\d+\.\d\d){3}$/);
  });

  it('holds the speeds that polar predicts', async () => {
    const json = JSON.parse((await runMain(['polar', BOAT, ...GRID, '--json'])).out);
    const { out } = await runMain(['export', BOAT, ...GRID, '--print', '--decimals', '4', '--shape', 'list']);
    const rows = out
      .split('\r\n')
      .slice(1, -1)
      .map((l) => l.split(',').map(Number));
    let compared = 0;
    json.winds.forEach((w: { tws_kn: number; states: Record<string, number>[] }) => {
      for (const s of w.states) {
        const row = rows.find(([tws, twa]) => tws === w.tws_kn && twa === s.twa_deg)!;
        expect(row[2]).toBeCloseTo(s.boat_speed_kn ?? 0, 3);
        compared++;
      }
    });
    expect(compared).toBe(12);
  });

  it('takes delimiter, decimal mark, header, units, decimals and line ends as asked', async () => {
    const { out } = await runMain(
      (
        'export BOAT --tws 4,8 --twa 60:180:60 --print --shape angles-across --delimiter bar --decimal-mark comma ' +
        '--header none --wind-unit m/s --speed-unit km/h --angle-unit rad --decimals 1 --line-ends lf'
      )
        .split(' ')
        .map((w) => (w === 'BOAT' ? BOAT : w)),
    );
    const lines = out.split('\n');
    expect(lines[0]).toBe('|0|1,0472|2,0944|3,1416');
    expect(lines[1]).toBe('0|0,0|0,0|0,0|0,0');
    expect(lines[2]).toMatch(/^4\|0,0(\|\d+,\d){3}$/);
    expect(lines).toHaveLength(5);
    expect(lines[4]).toBe('');
  });

  it('adds the angles of best VMG when asked, and their speeds are those of best VMG', async () => {
    const json = JSON.parse((await runMain(['polar', BOAT, ...GRID, '--json'])).out);
    const args = ['export', BOAT, ...GRID, '--print', '--shape', 'list', '--optimum'];
    const rows = (await runMain(args)).out.split('\r\n').map((l) => l.split(',').map(Number));
    for (const w of json.winds) {
      const best = w.best_vmg_up;
      const near = rows.find(([tws, twa]) => tws === w.tws_kn && Math.abs(twa! - best.twa_deg) < 0.06)!;
      // The angle is rounded to 0.1 deg: VMG is flat there.
      expect(near[2]! * Math.cos((near[1]! * Math.PI) / 180)).toBeCloseTo(best.vmg_kn, 1);
    }
  });

  it('counts no more wind than the cap, and takes percents off by wind speed', async () => {
    const table = async (...more: string[]): Promise<number[][]> =>
      (
        await runMain([
          'export',
          BOAT,
          '--twa',
          '90',
          '--print',
          '--shape',
          'angles-across',
          '--decimals',
          '4',
          ...more,
        ])
      ).out
        .split('\r\n')
        .slice(1, -1)
        .map((l) => l.split(',').map(Number));
    const capped = await table('--tws', '8,14,20', '--cap', '10', '--top', '20');
    expect(capped.map((r) => r[0])).toEqual([0, 8, 10, 20]);
    expect(capped[3]!.slice(1)).toEqual(capped[2]!.slice(1));
    const plain = await table('--tws', '8,14');
    const night = await table('--tws', '8,14', '--percent', '90', '--percent-by-wind', '8:100,14:80');
    expect(night[1]![2]).toBeCloseTo(0.9 * plain[1]![2]!, 3);
    expect(night[2]![2]).toBeCloseTo(0.72 * plain[2]![2]!, 3);
  });

  it('writes Signal K that the published schemas accept', async () => {
    const { default: schema } = await import('@signalk/signalk-schema');
    const run = await runMain(['export', BOAT, ...GRID, '--shape', 'signal-k', '--out', folder.path]);
    expect(run.code).toBe(0);
    const tree = JSON.parse(readFileSync(at('single-hander-signal-k.json'), 'utf8'));
    expect(schema.validateFull(tree).valid).toBe(true);
    const { polars } = (
      Object.values(tree.vessels)[0] as { performance: { polars: Record<string, { description: string }> } }
    ).performance;
    expect(Object.values(polars)[0]!.description).toMatch(/Wind at 10 m.*no judgement of stability/);
  });

  it.each([
    [['--shape', 'round'], /--shape: "round" is none of angles-down/],
    [['--delimiter', 'colon'], /--delimiter: "colon" is none of comma, semicolon, tab, bar, blank/],
    [['--decimal-mark', 'comma'], /both a comma; take --delimiter semicolon or tab/],
    [['--header', 'a,b'], /--header: the text must not hold quotes, the delimiter/],
    [['--header', '=1+1'], /--header: "=1\+1" begins like a formula/],
    [['--shape', 'list', '--header', 'a,b'], /a list wants three names/],
    [['--top', '10'], /--top: 10 is below the highest computed wind, 26 kn/],
    [['--above', 'fade'], /--above fade wants --top/],
    [['--percent', '5'], /--percent: "5" is not a percent from 30 to 100/],
    [['--percent-by-wind', '10'], /write wind:percent pairs such as 10:100,20:90, not "10"/],
    [['--percent-by-wind', '10:90,10:80'], /a wind speed stands twice/],
    [
      ['--shape', 'signal-k', '--decimals', '3'],
      /--decimals is for delimited text; Signal K is m\/s and rad/,
    ],
  ])('refuses %j', async (args, wanted) => {
    const run = await runMain(['export', BOAT, '--out', at('out'), ...args]);
    expect(run).toMatchObject({ code: 2, out: '' });
    expect(run.err).toMatch(wanted);
    expect(folder.list()).toEqual([]);
  });
});

describe('table', () => {
  it('shows what it took a table for, and plots it', async () => {
    writeFileSync(at('theirs.txt'), 'TWA \\ TWS m/s\t4\t8\n45\t2,1\t3\n90\t3,2\t4,4\n');
    const run = await runMain(['table', at('theirs.txt'), '--out', at('reports')]);
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(run.out).toMatch(/^theirs\.txt: 2 wind speeds, 2 angles each\n/);
    expect(run.out).toMatch(/delimiter +tab +guessed/);
    expect(run.out).toMatch(/decimal mark +, +guessed/);
    expect(run.out).toMatch(/wind unit +m\/s +named in the table/);
    const page = readFileSync(at('reports/theirs-plot.html'), 'utf8');
    expect(page.match(/role="img"/g)).toHaveLength(2);
    expect(page).not.toMatch(/NaN|<script/);
  });

  it.each(['angles-across-tab', 'signal-k'])(
    'of the boat herself (%s) shows no difference but rounding',
    async (shape) => {
      await runMain(['export', BOAT, ...GRID, '--shape', shape, '--out', folder.path]);
      const name = shape === 'signal-k' ? 'single-hander-signal-k.json' : 'single-hander-routing.txt';
      const run = await runMain(['table', at(name), '--boat', BOAT, '--out', folder.path]);
      expect(run.err).toBe('');
      expect(run.code).toBe(0);
      const csv = readFileSync(at(`${name.replace(/\.\w+$/, '')}-differences.csv`), 'utf8')
        .trimEnd()
        .split('\r\n');
      const column = csv[0]!.split(',').indexOf('difference_kn');
      const differences = csv.slice(1).map((l) => l.split(',')[column]!);
      expect(differences).toHaveLength(2 * 6);
      for (const d of differences) if (d !== '') expect(Math.abs(Number(d))).toBeLessThanOrEqual(0.0055);
      expect(differences.filter((d) => d !== '').length).toBeGreaterThan(9);
      expect(run.out).toMatch(/no judgement of stability/);
      expect(longest(run.out.split('\ndifferences ')[0]!)).toBeLessThanOrEqual(100);
    },
  );

  it('takes wind quoted lower down for more wind', async () => {
    writeFileSync(at('t.csv'), 'x,8,14\n60,4,4\n90,4,4\n');
    const predicted = async (...more: string[]): Promise<number> => {
      const run = await runMain(['table', at('t.csv'), '--boat', BOAT, '--out', folder.path, ...more]);
      expect(run.code).toBe(0);
      return Number(readFileSync(at('t-differences.csv'), 'utf8').split('\r\n')[1]!.split(',')[3]);
    };
    expect(await predicted('--wind-height', '2 m')).toBeGreaterThan(await predicted());
    expect(await predicted('--wind-height', '10 m')).toBe(await predicted());
  });

  it('reads what polar writes', async () => {
    await runMain(['polar', BOAT, ...GRID, '--quiet', '--out', folder.path]);
    const run = await runMain(['table', at('single-hander-polar.csv'), '--out', folder.path]);
    expect(run.err).toBe('');
    expect(run.out).toMatch(/layout +list/);
    expect(run.out).toMatch(/^single-hander-polar\.csv: 2 wind speeds/);
  });

  it.each([
    ['', [], /: this is no table/],
    ['x,6,10\n45,3,-4\n90,4,5\n', [], /bad\.csv:2: boat speed -4 kn is outside 0 to 117 kn/],
    [
      'x,6,10\n45,3,4\n90,4,5\n',
      ['--wind-height', '10 m'],
      /--wind-height is for a comparison: name the boat/,
    ],
    [
      'x,6,10\n45,3,4\n90,4,5\n',
      ['--boat', BOAT, '--wind-height', '900 m'],
      /--wind-height: 900 m is outside 0\.5 m to 60 m/,
    ],
    ['x,6,10\n45,3,4\n90,4,5\n', ['--boat', 'gone.yaml'], /gone\.yaml/],
    ['\0\0', [], /this is not a text file/],
  ])('refuses %j %j', async (content, args, wanted) => {
    writeFileSync(at('bad.csv'), content);
    const run = await runMain(['table', at('bad.csv'), '--out', at('out'), ...args]);
    expect(run).toMatchObject({ code: 2, out: '' });
    expect(run.err).toMatch(wanted);
    expect(existsSync(at('out'))).toBe(false);
  });

  it('wants a table that is there', async () => {
    expect((await runMain(['table'])).err).toMatch(/table: name a table, or "-"/);
    const gone = await runMain(['table', at('gone.csv')]);
    expect(gone.code).toBe(2);
    expect(gone.err).toMatch(/gone\.csv: there is no such file/);
    expect((await runMain(['table', folder.path])).err).toMatch(/this is not a file/);
  });
});
