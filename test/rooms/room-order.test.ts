import { execFileSync } from 'node:child_process';
import { readdirSync, readFileSync, statSync } from 'node:fs';
import { builtinModules } from 'node:module';
import { dirname, join, normalize, relative } from 'node:path';
import { describe, expect, it } from 'vitest';

/** Ground floor first: a room may import only from rooms before it. */
const ROOMS = [
  'units',
  'numerics',
  'environment',
  'lifting-line',
  'hull',
  'foils',
  'sails',
  'boat',
  'equilibrium',
  'polar',
  'racecourse',
  'logs',
  'publish',
  'cli',
];
/** Rooms that run anywhere: no module of Node's own, but for the named files. */
const ANYWHERE = ROOMS.slice(0, ROOMS.indexOf('racecourse') + 1);
const READS_FILES = ['boat/read-file.ts'];

function filesBelow(folder: string): string[] {
  return readdirSync(folder).flatMap((f) => {
    const path = join(folder, f);
    return statSync(path).isDirectory() ? filesBelow(path) : path.endsWith('.ts') ? [path] : [];
  });
}

const files = filesBelow('src').map((f) => relative('src', f));
const roomOf = (file: string): string => file.split('/')[0]!;

function importsOf(file: string): string[] {
  const text = readFileSync(join('src', file), 'utf8');
  return [...text.matchAll(/(?:from\s+|import\s*\(\s*|^import\s+)['"]([^'"]+)['"]/gm)].map((m) => m[1]!);
}

/** The source file a relative import means, below src. */
function target(file: string, spec: string): string {
  return normalize(join(dirname(file), spec)).replace(/\.js$/, '.ts');
}

describe('the rooms', () => {
  it('are the ones on the plan', () => {
    for (const f of files) if (f !== 'index.ts') expect(ROOMS, f).toContain(roomOf(f));
    expect(files.length).toBeGreaterThan(40);
  });

  it('import only from rooms below them, through the index of that room', () => {
    const wrong: string[] = [];
    for (const f of files) {
      for (const spec of importsOf(f)) {
        if (!spec.startsWith('.')) continue;
        const t = target(f, spec);
        if (f === 'index.ts') continue;
        if (roomOf(t) === roomOf(f)) continue;
        if (ROOMS.indexOf(roomOf(t)) >= ROOMS.indexOf(roomOf(f)) || t.split('/').length === 1)
          wrong.push(`${f} -> ${t}`);
        else if (!t.endsWith('/index.ts')) wrong.push(`${f} -> ${t} (not through its index)`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it('have no import circles between files', () => {
    const graph = new Map(
      files.map((f) => [
        f,
        importsOf(f)
          .filter((s) => s.startsWith('.'))
          .map((s) => target(f, s)),
      ]),
    );
    const state = new Map<string, 'open' | 'done'>();
    const circles: string[] = [];
    const visit = (f: string, path: string[]): void => {
      if (state.get(f) === 'done') return;
      if (state.get(f) === 'open') {
        circles.push([...path.slice(path.indexOf(f)), f].join(' -> '));
        return;
      }
      state.set(f, 'open');
      for (const t of graph.get(f) ?? []) visit(t, [...path, f]);
      state.set(f, 'done');
    };
    for (const f of files) visit(f, []);
    expect(circles).toEqual([]);
  });

  it("keep Node's own modules out of everything that runs anywhere", () => {
    const wrong: string[] = [];
    for (const f of files) {
      if (!ANYWHERE.includes(roomOf(f)) || READS_FILES.includes(f)) continue;
      for (const spec of importsOf(f)) {
        if (spec.startsWith('node:') || builtinModules.includes(spec)) wrong.push(`${f} -> ${spec}`);
      }
    }
    expect(wrong).toEqual([]);
  });

  it('speak of the project alone', () => {
    const tracked = execFileSync('git', ['ls-files', '-co', '--exclude-standard'], { encoding: 'utf8' })
      .split('\n')
      .filter((f) => f !== '' && f !== 'package-lock.json' && !f.endsWith('room-order.test.ts'));
    const unwanted = new RegExp(
      ['trans' + 'cript', 'lec' + 'ture', '\\.\\./sha' + 'red', '/wo' + 'rk/', 'registry\\.npm'].join('|'),
      'i',
    );
    const hits: string[] = [];
    for (const f of tracked) {
      if (!/\.(ts|js|json|md|ya?ml|css|html|sh)$/.test(f) && f !== '.ci/run') continue;
      readFileSync(f, 'utf8')
        .split('\n')
        .forEach((line, i) => {
          if (unwanted.test(line)) hits.push(`${f}:${i + 1}`);
        });
    }
    expect(hits).toEqual([]);
  });
});
