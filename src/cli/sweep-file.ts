import { closeSync, existsSync, ftruncateSync, openSync, readFileSync, rmSync, writeSync } from 'node:fs';
import { dirname } from 'node:path';
import { makeFolder, rounded } from '../publish/index.js';
import { UsageError } from './errors.js';
import type { SweepResult } from './sweep-task.js';

/** One line of a sweep's results as it is kept: its number in the grid, and the whole text of the line. */
export interface SweepLine {
  readonly index: number;
  readonly text: string;
}

/** The line of one variant: JSON without line breaks. Times in s per nautical mile. */
export function sweepLine(key: string, index: number, name: string, r: SweepResult): SweepLine {
  const changes = Object.fromEntries(r.changes.map((c) => [c.key, c.after === '' ? null : c.after]));
  const result =
    r.refused === undefined
      ? {
          time_s: rounded(r.secondsPerMile),
          sailed: rounded(r.covered),
          time_by_wind_s: r.times.map((t) => rounded(t)),
          ...(r.reasons.length > 0 ? { not_sailed: [...new Set(r.reasons)] } : {}),
        }
      : { time_s: null, refused: r.refused };
  return { index, text: JSON.stringify({ sweep: key, number: index, variant: name, changes, ...result }) };
}

/** Reads the whole lines of a results file or journal. A last line without its end is what a kill left: it is dropped. */
export function readSweepLines(path: string, key: string): { lines: Map<number, string>; bytes: number } {
  const lines = new Map<number, string>();
  if (!existsSync(path)) return { lines, bytes: 0 };
  const text = readFileSync(path, 'utf8');
  const whole = text.slice(0, text.lastIndexOf('\n') + 1);
  whole
    .split('\n')
    .slice(0, -1)
    .forEach((line, i) => {
      let said: { sweep?: unknown; number?: unknown };
      try {
        said = JSON.parse(line) as typeof said;
      } catch {
        throw new UsageError(`${path}:${i + 1} is no line of a sweep; --restart begins anew`);
      }
      if (said.sweep !== key)
        throw new UsageError(
          `${path} belongs to another sweep (other boat, variants, course or wind); --restart replaces it, --out writes elsewhere`,
        );
      lines.set(said.number as number, line);
    });
  return { lines, bytes: Buffer.byteLength(whole) };
}

/** A journal that lines are added to whole; it outlives a kill at any moment, and a half line at its end is cut off. */
export function openJournal(
  path: string,
  bytes: number,
): { add(line: string): void; close(): void; remove(): void } {
  makeFolder(dirname(path));
  const file = openSync(path, 'a');
  ftruncateSync(file, bytes);
  return {
    add: (line) => {
      const data = Buffer.from(`${line}\n`);
      for (let at = 0; at < data.length; ) at += writeSync(file, data, at);
    },
    close: () => closeSync(file),
    remove: () => rmSync(path, { force: true }),
  };
}
