import { createHash } from 'node:crypto';
import { existsSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { BoatFileError, variantGrid } from '../boat/index.js';
import { cautionText, fileStem, OutputError, sweepText, writeFiles } from '../publish/index.js';
import { reportName } from './boat-input.js';
import { type CourseArguments, readCourse, readWind } from './conditions.js';
import { UsageError } from './errors.js';
import { print } from './output.js';
import { progressLine } from './progress.js';
import { openJournal, readSweepLines, sweepLine } from './sweep-file.js';
import type { SweepResult } from './sweep-task.js';
import type { Task } from './tasks.js';
import { loadVaried } from './variant-input.js';
import { readWorkers, runTasks } from './workers.js';

export interface SweepArguments extends CourseArguments {
  readonly boat: string;
  readonly vary: string;
  readonly wind: string | undefined;
  readonly shard: string | undefined;
  readonly merge: string | undefined;
  readonly restart: boolean;
  readonly workers: string | undefined;
  readonly out: string;
}

const MOST_SHARDS = 100_000;

/** Reads "2/8". @throws UsageError */
function readShard(text: string | undefined): { part: number; of: number } {
  if (text === undefined) return { part: 1, of: 1 };
  const match = /^(\d+)\s*\/\s*(\d+)$/.exec(text.trim());
  const [part, of] = match === null ? [0, 0] : [Number(match[1]), Number(match[2])];
  if (!(part >= 1 && part <= of && of <= MOST_SHARDS))
    throw new UsageError(`--shard: "${text}" is no part; write 1/8 to 8/8 for eight parts`);
  return { part, of };
}

const shardName = (stem: string, part: number, of: number): string =>
  of === 1 ? `${stem}-sweep.jsonl` : `${stem}-sweep-${part}of${of}.jsonl`;

/** Times every variant of a grid, on worker threads; goes on where it was stopped; does a part, or joins the parts. */
export async function sweepCommand(a: SweepArguments): Promise<void> {
  const course = readCourse(a);
  const wind = readWind(a.wind);
  const workers = readWorkers(a.workers);
  if (a.shard !== undefined && a.merge !== undefined)
    throw new UsageError('--shard and --merge are different jobs; give one of them');
  const { part, of } = readShard(a.shard);
  const file = loadVaried(a.boat);
  const grid = ((): ReturnType<typeof variantGrid> => {
    try {
      return variantGrid(
        a.vary
          .split(';')
          .map((t) => t.trim())
          .filter((t) => t !== ''),
        file.text,
      );
    } catch (error) {
      if (error instanceof BoatFileError) throw new UsageError(error.message);
      throw error;
    }
  })();
  const stem = fileStem(reportName(a.boat, file.base));
  const key = createHash('sha256')
    .update(JSON.stringify([file.base.spec, a.vary, course, wind]))
    .digest('hex')
    .slice(0, 12);
  const finish = (lines: ReadonlyMap<number, string>, name: string): void => {
    const sorted = [...lines].sort((p, q) => p[0] - q[0]).map(([, line]) => line);
    const [path] = writeFiles(a.out, [{ name, content: `${sorted.join('\n')}\n` }]);
    print(
      [sweepText(file.base.spec.name, course, wind, sorted), '', cautionText(), '', `results  ${path}`].join(
        '\n',
      ),
    );
  };

  if (a.merge !== undefined) {
    const n = Number(a.merge);
    if (!/^\d+$/.test(a.merge.trim()) || n < 2 || n > MOST_SHARDS)
      throw new UsageError(`--merge: "${a.merge}" is not a number of parts from 2 to ${MOST_SHARDS}`);
    const lines = new Map<number, string>();
    for (let i = 1; i <= n; i++) {
      const path = join(a.out, shardName(stem, i, n));
      if (!existsSync(path)) throw new UsageError(`--merge: part ${i} of ${n} is missing (${path})`);
      for (const [index, line] of readSweepLines(path, key).lines) lines.set(index, line);
    }
    for (let i = 0; i < grid.count; i++)
      if (!lines.has(i))
        throw new UsageError(`--merge: variant ${i} is in no part; was every part run to its end?`);
    finish(lines, shardName(stem, 1, 1));
    return;
  }

  const name = shardName(stem, part, of);
  const target = join(a.out, name);
  const journalPath = `${target}.part`;
  if (a.restart) for (const p of [target, journalPath]) rmSync(p, { force: true });
  const wanted: number[] = [];
  for (let i = part - 1; i < grid.count; i += of) wanted.push(i);
  if (wanted.length === 0)
    throw new UsageError(`--shard: the grid has ${grid.count} variants; part ${part} has none`);
  const before = readSweepLines(target, key).lines;
  const journaled = readSweepLines(journalPath, key);
  const lines = new Map([...before, ...journaled.lines]);
  const left = wanted.filter((i) => !lines.has(i));
  if (left.length > 0) {
    const journal = ((): ReturnType<typeof openJournal> => {
      try {
        return openJournal(journalPath, journaled.bytes);
      } catch (error) {
        throw new OutputError(
          `cannot write ${journalPath}: ${(error as NodeJS.ErrnoException).code ?? error}`,
        );
      }
    })();
    const bar = progressLine('variants', wanted.length);
    try {
      let at = 0;
      await runTasks(
        (): Task | undefined => {
          if (at >= left.length) return undefined;
          const { changes } = grid.at(left[at++]!);
          return { kind: 'sweep', path: a.boat, text: file.text, changes, course, wind };
        },
        Math.min(workers, left.length),
        (number, result) => {
          const index = left[number]!;
          const line = sweepLine(key, index, grid.at(index).name, result as SweepResult);
          journal.add(line.text);
          lines.set(index, line.text);
          bar.show(lines.size);
        },
      );
    } finally {
      bar.end();
      journal.close();
    }
  }
  finish(lines, name);
  rmSync(journalPath, { force: true });
}
