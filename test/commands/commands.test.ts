import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { readFileSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { afterAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { runCommand, runMain, scratchFolder } from '../support/command.js';

const KEELBOAT = resolve('boats/keelboat.yaml');
const DINGHY = resolve('boats/single-hander.yaml');
const GRID = ['--tws', '8,12', '--twa', '30:180:30'];

const folders: ReturnType<typeof scratchFolder>[] = [];
let folder: ReturnType<typeof scratchFolder>;
beforeEach(() => {
  folder = scratchFolder();
  folders.push(folder);
});
afterAll(() => {
  for (const f of folders) f.remove();
});

const longest = (text: string): number => Math.max(...text.split('\n').map((l) => [...l].length));

describe('sails', () => {
  it('prints coefficients and loading of every set, and writes page and table when asked', () => {
    const run = runCommand(['sails', KEELBOAT], { cwd: folder.path });
    expect(run.code).toBe(0);
    expect(folder.list()).toEqual([]);
    expect(run.out).toMatch(/main and gennaker, \d+/);
    expect(run.out).toMatch(/wind twist +sail twist/);
    expect(longest(run.out)).toBeLessThanOrEqual(110);
    const json = JSON.parse(runCommand(['sails', KEELBOAT, '--json']).out);
    expect(json.sail_sets[0].coefficients[0].awa_deg).toBe(20);
    runCommand(['sails', KEELBOAT, '--out', 'plans'], { cwd: folder.path });
    expect(folder.list()).toEqual([
      'plans',
      join('plans', 'keelboat-sails.csv'),
      join('plans', 'keelboat-sails.html'),
    ]);
    const page = readFileSync(join(folder.path, 'plans', 'keelboat-sails.html'), 'utf8');
    expect(page).not.toMatch(/NaN|n\/a|<script/);
  });
});

describe('check with drawings', () => {
  it('draws the hull into a page when asked, and nothing otherwise', () => {
    const plain = runCommand(['check', KEELBOAT], { cwd: folder.path });
    expect(folder.list()).toEqual([]);
    const run = runCommand(['check', KEELBOAT, '--plot', 'plans'], { cwd: folder.path });
    expect(run.code).toBe(0);
    expect(run.out.startsWith(plain.out.trimEnd())).toBe(true);
    expect(folder.list()).toEqual(['plans', join('plans', 'keelboat-hull.html')]);
    const page = readFileSync(join(folder.path, 'plans', 'keelboat-hull.html'), 'utf8');
    for (const id of ['body-plan', 'waterlines', 'section-areas', 'righting-arms', 'cautions'])
      expect(page).toContain(`<section id="${id}"`.replace('<section id="cautions"', 'id="cautions"'));
    expect(page).toMatch(/No judgement of stability/);
    expect(page).not.toMatch(/NaN|<script/);
  });
});

describe('polar', () => {
  it('prints targets and cautions and writes table, results and page', () => {
    const run = runCommand(['polar', KEELBOAT, ...GRID], { cwd: folder.path });
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(run.out).toMatch(/TWS +TWA +speed +VMG +AWA +heel +leeway +ease +crew +regime +sails/);
    expect(run.out.match(/^ *(8|12)\.0 +up /gm)).toHaveLength(2);
    expect(run.out.match(/^ +down /gm)).toHaveLength(2);
    expect(run.out).toMatch(/no judgement of stability, strength or safety/);
    for (const name of [
      'keelboat-polar.csv',
      'keelboat-resistance.csv',
      'keelboat-results.json',
      'keelboat-page.html',
    ])
      expect(run.out).toContain(join('reports', name));
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    expect(folder.list()).toEqual([
      'reports',
      join('reports', 'keelboat-crossover.csv'),
      join('reports', 'keelboat-page.html'),
      join('reports', 'keelboat-polar.csv'),
      join('reports', 'keelboat-resistance.csv'),
      join('reports', 'keelboat-results.json'),
    ]);
    const csv = readFileSync(join(folder.path, 'reports', 'keelboat-polar.csv'), 'utf8')
      .trimEnd()
      .split('\r\n');
    expect(csv).toHaveLength(1 + 2 * (6 + 3));
    // The figures of table and results are the same ones.
    const json = JSON.parse(readFileSync(join(folder.path, 'reports', 'keelboat-results.json'), 'utf8'));
    expect(json.tws_kn).toEqual([8, 12]);
    expect(json.twa_deg).toEqual([30, 60, 90, 120, 150, 180]);
    const speed = csv[0]!.split(',').indexOf('boat_speed_kn');
    const reach = csv.find((l) => l.startsWith('grid,12.000,90.00,'))!.split(',');
    expect(Number(reach[speed])).toBeCloseTo(json.winds[1].states[2].boat_speed_kn, 3);
    expect(json.winds[1].best_vmg_up.boat_speed_kn).toBeGreaterThan(2);
  });

  it('with --json prints the results alone and writes nothing; the same twice', () => {
    const first = runCommand(['polar', DINGHY, ...GRID, '--json'], { cwd: folder.path });
    const second = runCommand(['polar', '-', ...GRID, '--json'], {
      cwd: folder.path,
      input: readFileSync(DINGHY),
    });
    expect(first.code).toBe(0);
    expect(first.err).toBe('');
    const json = JSON.parse(first.out);
    expect(json.content).toBe('polar');
    expect(json.cautions.length).toBeGreaterThan(0);
    expect(json.boat.estimates.length).toBeGreaterThan(0);
    expect(second.out).toBe(first.out);
    expect(folder.list()).toEqual([]);
  });

  it('with --quiet prints nothing; --out and --decimals are heeded', () => {
    const run = runCommand(
      ['polar', DINGHY, '--tws=10', '--twa=60', '--quiet', '--out', 'deep/er', '--decimals', '1'],
      { cwd: folder.path },
    );
    expect(run).toEqual({ code: 0, out: '', err: '' });
    const csv = readFileSync(join(folder.path, 'deep/er/single-hander-polar.csv'), 'utf8');
    expect(csv).toMatch(/^grid,10\.0,60,\d+,\d+\.\d,/m);
  });

  it('names files after the boat file, cleaned up', async () => {
    const path = join(folder.path, ' ..bad:name*$(x) .yaml');
    writeFileSync(path, readFileSync(DINGHY));
    const out = join(folder.path, 'out');
    const run = await runMain(['polar', path, '--tws', '10', '--twa', '60', '--out', out]);
    expect(run.code).toBe(0);
    expect(folder.list()).toContain(join('out', 'bad-name-x-polar.csv'));
  });

  it('tells of a folder it cannot write to, and leaves nothing', async () => {
    const file = join(folder.path, 'in-the-way');
    writeFileSync(file, '');
    const run = await runMain(['polar', DINGHY, '--tws', '10', '--twa', '60', '--out', join(file, 'x')]);
    expect(run.code).toBe(2);
    expect(run.out).toBe('');
    expect(run.err).toMatch(/^cannot write .*in-the-way.*: a file is in the way of a folder\n$/);
    expect(folder.list()).toEqual(['in-the-way']);
  });

  it.each([
    ['4,,6', /--tws: a value is missing in "4,,6"/],
    ['four', /--tws: "four" is not a number; write a list such as/],
    ['4:20', /--tws: write a range as from:to:step, such as 4:20:2, not "4:20"/],
    ['20:4:2', /the end not before the start/],
    ['4:20:0', /the step must be above 0/],
    ['4:20:0.0001', /--tws: more than 200 values/],
    ['80', /--tws: 80 kn is outside 0\.5 to 60 kn/],
    ['0', /--tws: 0 kn is outside/],
    ['1e999', /--tws: Infinity kn is outside/],
    ['NaN', /--tws: "NaN" is not a number/],
  ])('refuses the wind speeds %s and says what is allowed', async (tws, wanted) => {
    const run = await runMain(['polar', DINGHY, '--tws', tws, '--out', join(folder.path, 'out')]);
    expect(run).toMatchObject({ code: 2, out: '' });
    expect(run.err).toMatch(wanted);
    expect(folder.list()).toEqual([]);
  });

  it('sorts a list and drops repeats', async () => {
    const run = await runMain(['polar', DINGHY, '--tws', '12,8:10:2,8', '--twa', '90,60', '--json']);
    const json = JSON.parse(run.out);
    expect(json.tws_kn).toEqual([8, 10, 12]);
    expect(json.twa_deg).toEqual([60, 90]);
  });

  it('does not complain when its reader goes away', async () => {
    const child = spawn(process.execPath, [
      resolve('bin/polarwright.js'),
      'polar',
      KEELBOAT,
      ...GRID,
      '--json',
    ]);
    let err = '';
    child.stderr.on('data', (d) => {
      err += d;
    });
    child.stdout.destroy();
    const [code] = await once(child, 'close');
    expect(err).toBe('');
    expect(code).toBe(0);
  });
});

describe('explain', () => {
  it('prints a force table that adds up', () => {
    const run = runCommand(['explain', KEELBOAT, '--tws', '12', '--twa', '45']);
    expect(run.code).toBe(0);
    expect(run.err).toBe('');
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    const lines = run.out.split('\n');
    const numbers = (line: string): number[] => (line.match(/-?\d+\.\d/g) ?? []).map(Number).slice(-4);
    const start = lines.findIndex((l) => l.startsWith('air '));
    const end = lines.findIndex((l) => l.startsWith('sum '));
    const rows = lines.slice(start, end).filter((l) => !/^-+$/.test(l));
    const parts = rows.filter((l) => !l.includes('= '));
    const groups = rows.filter((l) => l.includes('= '));
    expect(groups).toHaveLength(3);
    expect(parts.length).toBeGreaterThan(8);
    for (let j = 0; j < 4; j++) {
      // Printed to 0.1: rounding may leave half of that for each row.
      const total = parts.reduce((sum, l) => sum + numbers(l)[j]!, 0);
      expect(Math.abs(total)).toBeLessThan(0.05 * parts.length + 0.05);
      const together = groups.reduce((sum, l) => sum + numbers(l)[j]!, 0);
      expect(Math.abs(together)).toBeLessThan(0.2);
      expect(Math.abs(numbers(lines[end]!)[j]!)).toBeLessThan(0.1);
    }
    expect(Math.max(...parts.map((l) => Math.abs(numbers(l)[0]!)))).toBeGreaterThan(50);
  });

  it('with --json gives rows whose sums vanish beside the forces', async () => {
    const run = await runMain(['explain', DINGHY, '--tws', '14', '--twa', '50', '--json']);
    const json = JSON.parse(run.out);
    expect(json.state.status).toBe('balanced');
    for (const key of ['forward_N', 'leeward_N', 'heeling_N_m', 'yaw_to_windward_N_m']) {
      const values: number[] = json.rows.map((r: Record<string, number>) => r[key]);
      const largest = Math.max(...values.map(Math.abs));
      expect(largest).toBeGreaterThan(1);
      expect(Math.abs(values.reduce((a, b) => a + b, 0))).toBeLessThan(1e-4 * largest);
    }
  });

  it('says why where nothing balances', async () => {
    const run = await runMain(['explain', DINGHY, '--tws', '12', '--twa', '5']);
    expect(run.code).toBe(0);
    expect(run.out).toMatch(/No balanced state in 12\.0 kn at 5\.0 deg: no drive\. /);
    const json = JSON.parse((await runMain(['explain', DINGHY, '--tws=12', '--twa=5', '--json'])).out);
    expect(json.state).toMatchObject({ status: 'unbalanced', why: 'no drive', tws_kn: 12, twa_deg: 5 });
    expect(json.rows).toBeUndefined();
  });

  it('wants one wind', async () => {
    const missing = await runMain(['explain', DINGHY, '--tws', '12']);
    expect(missing.code).toBe(2);
    expect(missing.err).toMatch(/--twa is missing/);
    const many = await runMain(['explain', DINGHY, '--tws', '12,14', '--twa', '45']);
    expect(many.code).toBe(2);
    expect(many.err).toMatch(/one value is wanted/);
  });
});

describe('check', () => {
  it('prints quantities, estimates and warnings', () => {
    const run = runCommand(['check', KEELBOAT]);
    expect(run.code).toBe(0);
    expect(run.err).toBe('');
    expect(run.out).toMatch(/displacement with crew +1650 +kg/);
    expect(run.out).toMatch(/^Estimated, for want of a value in the file: [1-9]/m);
    expect(run.out).toMatch(/^Outside the range of a method: \d/m);
    expect(longest(run.out)).toBeLessThanOrEqual(100);
  });

  it('with --json gives the same as data', async () => {
    const json = JSON.parse((await runMain(['check', KEELBOAT, '--json'])).out);
    const mass = json.boat.quantities.find(
      (q: { quantity: string }) => q.quantity === 'displacement with crew',
    );
    expect(mass).toMatchObject({ value: 1650, unit: 'kg' });
  });
});

describe('new', () => {
  it.each(['dinghy', 'keelboat'])('writes a %s that check accepts', (kind) => {
    const run = runCommand(['new', 'mine.yaml', '--kind', kind], { cwd: folder.path });
    expect(run.code).toBe(0);
    expect(folder.list()).toEqual(['boat.schema.json', 'mine.yaml']);
    expect(runCommand(['check', 'mine.yaml'], { cwd: folder.path }).code).toBe(0);
  });

  it('replaces a file only with --force', () => {
    const path = join(folder.path, 'boat.yaml');
    writeFileSync(path, 'mine');
    const refused = runCommand(['new'], { cwd: folder.path });
    expect(refused.code).toBe(2);
    expect(refused.err).toMatch(/^boat\.yaml exists already; --force replaces it\n$/);
    expect(readFileSync(path, 'utf8')).toBe('mine');
    expect(runCommand(['new', '--force'], { cwd: folder.path }).code).toBe(0);
    expect(readFileSync(path, 'utf8')).toMatch(/^name: /m);
    expect(folder.list()).toEqual(['boat.schema.json', 'boat.yaml']);
  });

  it('prints to standard output for "-", ready for the next command', () => {
    const made = runCommand(['new', '-'], { cwd: folder.path });
    expect(made.code).toBe(0);
    expect(folder.list()).toEqual([]);
    expect(runCommand(['check', '-'], { input: made.out }).code).toBe(0);
  });
});

describe('the command line', () => {
  it.each([
    [['plar', 'x'], /there is no command "plar"; did you mean polar\?/],
    [['chekc'], /did you mean check\?/],
    [['polar', 'x', '--tsw', '4'], /there is no option "--tsw"; did you mean --tws\?/],
    [['polar', 'x', '--qiet'], /did you mean --quiet\?/],
    [['check', 'x', '--jsno'], /did you mean --json\?/],
    [['check', 'x', '--tws', '4'], /there is no option "--tws"/],
    [['polar', 'x', '-q'], /there is no option "-q"/],
    [['polar', 'x', '--tws'], /--tws wants a value/],
    [['polar', 'x', '--tws', '4', '--tws', '5'], /option --tws is given twice/],
    [['polar', 'x', '--json=no'], /--json takes no value/],
    [['polar', 'x', 'y'], /polar takes one boat only/],
    [['polar'], /name a boat file/],
    [['polar', 'x', '--decimals', '9'], /--decimals: "9" is not a whole number from 0 to 6/],
    [['new', 'x', '--kind', 'ship'], /--kind: "ship" is none of dinghy, keelboat/],
    [[], /name a command: polar, explain, compare/],
    [['constructor'], /there is no command "constructor"/],
    [['polar', 'x', '--__proto__', '1'], /there is no option "--__proto__"/],
  ])('answers %j with one message and code 2', async (args, wanted) => {
    const run = await runMain(args);
    expect(run.code).toBe(2);
    expect(run.out).toBe('');
    expect(run.err).toMatch(wanted);
    expect(run.err.trim().split('\n').length).toBeLessThanOrEqual(2);
  });

  it.each([['--help'], ['polar', '--help'], ['explain', '-h'], ['check', '--help'], ['new', '--help']])(
    'begins the help of %s with examples',
    (...args) => {
      const run = runCommand(args);
      expect(run.code).toBe(0);
      expect(run.err).toBe('');
      expect(run.out).toMatch(/^Examples:\n {2}polarwright /);
      expect(longest(run.out)).toBeLessThanOrEqual(100);
    },
  );

  it('shows the version of the package', () => {
    const { version } = JSON.parse(readFileSync('package.json', 'utf8')) as { version: string };
    expect(runCommand(['--version'])).toEqual({ code: 0, out: `${version}\n`, err: '' });
  });

  it('calls a fault of its own by its name: code 1, the stack only when asked for', async () => {
    const publish = await import('../../src/publish/index.js');
    const spy = vi.spyOn(publish.CAUTIONS, 'map').mockImplementation(() => {
      throw new Error('deliberate');
    });
    try {
      const plain = await runMain(['explain', DINGHY, '--tws', '12', '--twa', '60']);
      expect(plain).toMatchObject({ code: 1, out: '' });
      expect(plain.err).toMatch(/^Internal failure: deliberate\n/);
      expect(plain.err).not.toMatch(/^\s+at /m);
      vi.stubEnv('POLARWRIGHT_DEBUG', '1');
      const loud = await runMain(['explain', DINGHY, '--tws', '12', '--twa', '60']);
      expect(loud.code).toBe(1);
      expect(loud.err).toMatch(/^\s+at /m);
    } finally {
      spy.mockRestore();
      vi.unstubAllEnvs();
    }
  });
});
