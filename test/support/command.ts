import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { vi } from 'vitest';
import { main } from '../../src/cli/index.js';

export interface Run {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

const PROGRAM = resolve('bin/polarwright.js');

/** Runs the built command as a child process. */
export function runCommand(
  args: readonly string[],
  options: { input?: string | Uint8Array; cwd?: string; env?: Record<string, string> } = {},
): Run {
  const r = spawnSync(process.execPath, [PROGRAM, ...args], {
    cwd: options.cwd ?? process.cwd(),
    input: options.input ?? '',
    env: { ...process.env, ...options.env },
    encoding: 'utf8',
    maxBuffer: 64e6,
  });
  return { code: r.status ?? -1, out: r.stdout, err: r.stderr };
}

/** Runs the command in this process, from the sources, and catches what it prints. */
export async function runMain(args: readonly string[]): Promise<Run> {
  let out = '';
  let err = '';
  const spies = [
    vi.spyOn(process.stdout, 'write').mockImplementation((text) => {
      out += text;
      return true;
    }),
    vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
      err += text;
      return true;
    }),
  ];
  try {
    const code = await main(args);
    return { code, out, err };
  } finally {
    for (const s of spies) s.mockRestore();
  }
}

/** A folder of one's own, and what is in it. */
export function scratchFolder(): { path: string; list: () => string[]; remove: () => void } {
  const path = mkdtempSync(join(tmpdir(), 'polarwright-'));
  return {
    path,
    list: () => readdirSync(path, { recursive: true }).map(String).sort(),
    remove: () => rmSync(path, { recursive: true, force: true }),
  };
}
