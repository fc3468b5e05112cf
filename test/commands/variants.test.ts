import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { afterAll, beforeEach, describe, expect, it } from 'vitest';
import { runCommand, runMain, scratchFolder } from '../support/command.js';
import { seeded } from '../support/random.js';

const DINGHY = readFileSync('boats/single-hander.yaml', 'utf8');
const PROGRAM = resolve('bin/polarwright.js');
const WITH_VARIANTS = `${DINGHY}
variants:
  heavy: { crew.mass_each: times 1.1 }
  same: { crew.mass_each: times 1 }
  mast: { rig.mast_height: plus 0 to 0.2 m in 2 steps }
`;
const QUICK = ['--wind', '8', '--course', 'upwind'];

const folders: ReturnType<typeof scratchFolder>[] = [];
let folder: ReturnType<typeof scratchFolder>;
let boat = '';
beforeEach(() => {
  folder = scratchFolder();
  folders.push(folder);
  boat = join(folder.path, 'boat.yaml');
  writeFileSync(boat, WITH_VARIANTS);
});
afterAll(() => {
  for (const f of folders) f.remove();
});
const longest = (text: string): number => Math.max(...text.split('\n').map((l) => [...l].length));

describe('compare', () => {
  it('ranks, tells changes and how sure it is, and writes results and page', async () => {
    const out = join(folder.path, 'reports');
    const run = await runMain(['compare', boat, 'heavy', 'same', ...QUICK, '--draws', '40', '--out', out]);
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    expect(run.out).toMatch(/^heavy +crew\.mass_each +80 kg +88 kg$/m);
    expect(run.out).toMatch(/Ranking by expected time/);
    expect(run.out).toMatch(/^\d +same .* 0\.0 .* 50 % /m);
    expect(run.out).toMatch(/what is common to the variants\s+cancels/);
    expect(run.out).toMatch(/no judgement of stability, strength or safety/);
    const json = JSON.parse(readFileSync(join(out, 'boat-comparison.json'), 'utf8'));
    const of = (name: string) => json.ranking.find((r: { name: string }) => r.name === name);
    expect(of('same')).toMatchObject({ difference_s: 0, against_base: { quicker: 0.5, spread_s: 0 } });
    expect(of('heavy').against_base.draws).toBe(40);
    const page = readFileSync(join(out, 'boat-comparison.html'), 'utf8');
    for (const id of ['ranking', 'changes', 'differences', 'certainty', 'polars', 'cautions'])
      expect(page).toContain(`id="${id}"`);
    expect(page).not.toMatch(/NaN|undefined|<script/);
  });

  it('says the same with any number of workers, and for the same seed only', async () => {
    const args = ['compare', boat, 'heavy', ...QUICK, '--draws', '24', '--json'];
    const one = await runMain(args);
    expect(JSON.parse(one.out).ranking).toHaveLength(2);
    expect(runCommand([...args, '--workers', '3']).out).toBe(one.out);
    expect((await runMain([...args, '--seed', '2'])).out).not.toBe(one.out);
  });

  it('takes all variants of the file, files of differences and whole boats', async () => {
    const tall = join(folder.path, 'tall.yaml');
    writeFileSync(tall, 'rig: { mast_height: plus 0.1 m }\n');
    const other = join(folder.path, 'other.yaml');
    writeFileSync(
      other,
      DINGHY.replace(/^name: .*$/m, 'name: Other').replace(/mass_each: \S+ kg/, 'mass_each: 90 kg'),
    );
    const all = await runMain(['compare', boat, ...QUICK, '--draws', '0', '--json']);
    expect(all.err).toBe('');
    const names = (text: string) =>
      JSON.parse(text)
        .ranking.map((r: { name: string }) => r.name)
        .sort();
    expect(names(all.out)).toEqual([
      'Tarvik 42',
      'heavy',
      'mast, mast_height plus 0 m',
      'mast, mast_height plus 0.2 m',
      'same',
    ]);
    const files = await runMain(['compare', boat, tall, other, ...QUICK, '--draws', '0', '--json']);
    expect(names(files.out)).toEqual(['Other', 'Tarvik 42', 'tall']);
    const changed = JSON.parse(files.out).ranking.find((r: { name: string }) => r.name === 'Other').changes;
    expect(changed).toContainEqual({ key: 'crew.mass_each', before: '80 kg', after: '90 kg' });
  });

  it('reads winds and courses in every form, a file of observations too', async () => {
    const obs = join(folder.path, 'wind.csv');
    writeFileSync(obs, 'time,tws_kn\n1,7\n2,8.5\n3,0.2\n4,7.5\n');
    const wind = async (text: string): Promise<{ tws_kn: number[]; share: number[]; words: string }> => {
      const run = await runMain([
        'compare',
        boat,
        'same',
        '--course',
        '0=1,90=1',
        '--wind',
        text,
        '--draws',
        '0',
        '--json',
      ]);
      expect(run.err).toBe('');
      return JSON.parse(run.out).wind;
    };
    expect(await wind('6=20,8=30')).toMatchObject({ tws_kn: [6, 8], share: [0.4, 0.6] });
    const seen = await wind(obs);
    expect(seen.tws_kn).toEqual([7.25, 8.5]);
    expect(seen.words).toMatch(/3 observations in bands of 2 kn; 1 calms below 1 kn left out/);
    expect((await wind('weibull 9 2')).tws_kn).toHaveLength(8);
  });

  it('answers what is wrong in one message with exit code 2, and writes nothing', async () => {
    const bad = join(folder.path, 'bad.csv');
    writeFileSync(bad, 'tws_kn\n7\nx\n');
    const wrong = join(folder.path, 'wrong.yaml');
    writeFileSync(wrong, WITH_VARIANTS.replace('rig.mast_height', 'rig.mast_hight'));
    const cases: [string[], RegExp][] = [
      [['compare', boat, 'heavie'], /there is no variant "heavie".*did you mean "heavy"\?/],
      [
        ['compare', wrong],
        /wrong\.yaml:\d+:\d+ variants\.mast\.rig\.mast_hight: there is no "mast_hight" in rig/,
      ],
      [['compare', resolve('boats/single-hander.yaml')], /has no variants; write some under variants:/],
      [
        ['compare', boat, '--course', 'triangel'],
        /--course: there is no course "triangel"; did you mean triangle\?/,
      ],
      [['compare', boat, '--course', '200=1'], /--course: 200 deg is outside 0 to 180 deg/],
      [['compare', boat, '--wind', '6=x'], /--wind: "6=x" is no pair/],
      [['compare', boat, '--wind', 'nofile.csv'], /neither a list of speeds nor a file/],
      [['compare', boat, '--wind', bad], /bad\.csv:3 "x" is no wind speed from 0 to 60 kn/],
      [['compare', boat, '--wind', 'weibull 11'], /write "weibull 11 2"/],
      [['compare', boat, '--draws', '1.5'], /--draws: "1\.5" is not a whole number/],
      [['compare', boat, '--workers', '0'], /--workers: "0" is not a whole number/],
      [['compare', boat, '--tacks', 'many'], /--tacks: "many" is not a number/],
      [['sweep', boat], /--vary is missing/],
      [['sweep', boat, '--vary', 'rig.mast_hight = 3 m'], /there is no "mast_hight" in rig/],
      [['sweep', boat, '--vary', 'crew.count = 1', '--shard', '3/2'], /--shard: "3\/2" is no part/],
      [['sweep', boat, '--vary', 'crew.count = 1 or 2', '--merge', '2'], /--merge: part 1 of 2 is missing/],
      [['sensitivity', boat, '--step', '90'], /--step: "90" is not a change of 0\.1 % to 25 %/],
    ];
    const out = join(folder.path, 'reports');
    for (const [args, message] of cases) {
      const run = await runMain([...args, '--out', out]);
      expect(run.code, args.join(' ')).toBe(2);
      expect(run.out).toBe('');
      expect(run.err.replace(/\s+/g, ' ')).toMatch(message);
    }
    expect(existsSync(out)).toBe(false);
  });
});

describe('sensitivity', () => {
  it('prints the table, widest effect first, and writes results and page', async () => {
    const out = join(folder.path, 'reports');
    const run = await runMain(['sensitivity', boat, '--wind', '8', '--out', out]);
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(longest(run.out)).toBeLessThanOrEqual(100);
    expect(run.out).toMatch(/^crew weight +-5 %/m);
    const json = JSON.parse(readFileSync(join(out, 'boat-sensitivity.json'), 'utf8'));
    const sizes = json.quantities.map((q: { less_s: number[][]; more_s: number[][] }) =>
      Math.max(...[...q.less_s.flat(), ...q.more_s.flat()].map(Math.abs)),
    );
    expect(sizes).toEqual([...sizes].sort((a, b) => b - a));
    const page = readFileSync(join(out, 'boat-sensitivity.html'), 'utf8');
    expect(page.match(/id="tornado-0-\d-t"/g)).toHaveLength(3);
    expect(page).not.toMatch(/NaN|undefined|<script/);
  });
});

describe('sweep', () => {
  const VARY = 'crew.mass_each = 70 to 90 kg in 4 steps; rig.mast_height = plus 0 to 0.2 m in 3 steps';
  const SWEEP = ['sweep', '--vary', VARY, '--course', 'reach', '--wind', '8'];
  const sweep = (out: string, ...more: string[]) =>
    runMain([...SWEEP, boat, '--out', join(folder.path, out), ...more]);
  const results = (out: string) => readFileSync(join(folder.path, out, 'boat-sweep.jsonl'), 'utf8');

  it('writes one line of JSON for each variant, the same with any number of workers, in shards or whole', async () => {
    const whole = await sweep('one');
    expect(whole.code).toBe(0);
    const lines = results('one')
      .trimEnd()
      .split('\n')
      .map((l) => JSON.parse(l));
    expect(lines.map((l) => l.number)).toEqual(Array.from({ length: 12 }, (_, i) => i));
    expect(lines[5].changes).toMatchObject({ 'crew.mass_each': expect.stringMatching(/^76\.6/) });
    runCommand([...SWEEP, boat, '--out', join(folder.path, 'two'), '--workers', '2']);
    expect(results('two')).toBe(results('one'));
    for (const part of ['2/3', '1/3', '3/3']) expect((await sweep('parts', '--shard', part)).code).toBe(0);
    const merged = await sweep('parts', '--merge', '3');
    expect(merged.code).toBe(0);
    expect(results('parts')).toBe(results('one'));
    expect(merged.out.replaceAll('parts', 'one')).toBe(whole.out);
  });

  it('refuses to go on with the results of another sweep, unless it is to begin anew', async () => {
    await sweep('out');
    const other = [...SWEEP.slice(0, -2), boat, '--out', join(folder.path, 'out'), '--wind', '9'];
    const again = await runMain(other);
    expect(again.code).toBe(2);
    expect(again.err.replace(/\s+/g, ' ')).toMatch(/belongs to another sweep .*--restart replaces it/);
    expect((await runMain([...other, '--restart'])).code).toBe(0);
  });

  it('reports a variant that is no boat in its line', async () => {
    const run = await runMain([
      'sweep',
      boat,
      '--vary',
      'crew.count = 1 or 90',
      ...QUICK,
      '--out',
      join(folder.path, 'o'),
    ]);
    expect(run.code).toBe(0);
    expect(run.out.replace(/\s+/g, ' ')).toMatch(
      /1 are no boats: - count 90: --vary:1:1 crew\.count: "90" is not/,
    );
    const lines = results('o')
      .trimEnd()
      .split('\n')
      .map((l) => JSON.parse(l));
    expect(lines[1]).toMatchObject({
      number: 1,
      time_s: null,
      refused: expect.stringMatching(/crew\.count/),
    });
  });

  it('killed 20 times at random moments goes on: nothing lost, nothing twice, no half line', async () => {
    const random = seeded(11);
    const out = join(folder.path, 'killed');
    const vary = 'crew.mass_each = 60 to 100 kg in 120 steps';
    const args = ['sweep', boat, '--vary', vary, '--course', 'reach', '--wind', '8', '--workers', '1'];
    const journal = join(out, 'boat-sweep.jsonl.part');
    const size = (): number => (existsSync(journal) ? statSync(journal).size : 0);
    let kills = 0;
    let seen = 0;
    while (kills < 20) {
      const child = spawn(process.execPath, [PROGRAM, ...args, '--out', out], { stdio: 'ignore' });
      const ended = once(child, 'exit');
      const before = size();
      // Some are killed before they begin, most in the midst of it.
      const early = random() < 0.15;
      while (!early && size() === before && child.exitCode === null)
        await new Promise((r) => setTimeout(r, 3));
      await new Promise((r) => setTimeout(r, 12 * random()));
      child.kill('SIGKILL');
      await ended;
      if (child.signalCode !== 'SIGKILL') break;
      kills++;
      expect(existsSync(join(out, 'boat-sweep.jsonl'))).toBe(false);
      expect(size()).toBeGreaterThanOrEqual(seen);
      seen = size();
    }
    expect(kills).toBe(20);
    // As if the last kill had cut a line in two.
    writeFileSync(journal, `${readFileSync(journal, 'utf8')}{"sweep":"half`);
    const last = runCommand([...args, '--out', out]);
    expect(last.err).toBe('');
    expect(last.code).toBe(0);
    expect(existsSync(journal)).toBe(false);
    const whole = join(folder.path, 'whole');
    runCommand([...args, '--out', whole]);
    expect(readFileSync(join(out, 'boat-sweep.jsonl'), 'utf8')).toBe(
      readFileSync(join(whole, 'boat-sweep.jsonl'), 'utf8'),
    );
  });
});
