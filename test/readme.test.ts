import { execFileSync, spawnSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { accuracyTable } from './outside/table.js';

const readme = readFileSync('README.md', 'utf8');
const bin = resolve('bin/polarwright.js');
const folder = mkdtempSync(join(tmpdir(), 'polarwright-readme-'));
cpSync('boats', join(folder, 'boats'), { recursive: true });
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const commands = [...readme.matchAll(/^npx polarwright ([^#\n]+)/gm)].map((m) => m[1]!.trim());

describe('the README', () => {
  it('opens with the job in one paragraph', () => {
    const [title, paragraph] = readme.split('\n\n');
    expect(title).toBe('# polarwright');
    expect(paragraph!.length).toBeGreaterThan(300);
    expect(paragraph!.length).toBeLessThan(1000);
  });

  it('shows at least one use of every command', () => {
    for (const c of [
      'polar',
      'explain',
      'check',
      'sails',
      'new',
      'targets',
      'export',
      'table',
      'compare',
      'sensitivity',
      'sweep',
    ]) {
      expect(
        commands.some((line) => line.startsWith(c)),
        c,
      ).toBe(true);
    }
  });

  it.each(commands)('npx polarwright %s', (line) => {
    const words = (line.match(/"[^"]*"|\S+/g) ?? []).map((w) => w.replaceAll('"', ''));
    const r = spawnSync(process.execPath, [bin, ...words], { cwd: folder, encoding: 'utf8' });
    expect(r.stderr).not.toMatch(/at .*\.js:\d+/);
    expect(r.status, r.stderr).toBe(0);
    expect(r.stdout.length + r.stderr.length).toBeGreaterThan(20);
  });

  it('leaves the files it speaks of', () => {
    const files = readdirSync(join(folder, 'reports'));
    for (const end of ['.csv', '.json', '.html']) expect(files.some((f) => f.endsWith(end))).toBe(true);
  });

  it('shows the accuracy table as it is computed', () => {
    const { markdown, failed } = accuracyTable();
    expect(failed).toBe(0);
    expect(readme).toContain(markdown);
  });

  it('keeps its promise that the library is importable by name, with types', () => {
    const script =
      "import { readBoat, predictPolar } from 'polarwright'; import { readFileSync } from 'node:fs';" +
      "const b = readBoat(readFileSync('boats/single-hander.yaml', 'utf8'), 'b.yaml');" +
      'const p = predictPolar(b, { tws: [5], twa: [0.8, 1.6] }); console.log(p.results[0].length, p.boatName);';
    const out = execFileSync(process.execPath, ['--input-type=module', '-e', script], { encoding: 'utf8' });
    expect(out).toMatch(/^2 /);
    expect(readFileSync('dist/index.d.ts', 'utf8')).toContain('predictPolar');
  });

  it('has notes for developers with every room', () => {
    const notes = readFileSync('DEVELOPERS.md', 'utf8');
    for (const room of readdirSync('src')) if (!room.endsWith('.ts')) expect(notes).toContain(`\`${room}\``);
    expect(notes).toContain('## Changes to computed speeds');
  });
});
