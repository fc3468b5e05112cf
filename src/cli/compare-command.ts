import {
  cautionText,
  comparisonJson,
  comparisonPage,
  comparisonText,
  fileStem,
  writeFiles,
} from '../publish/index.js';
import { comparison, type Entrant, factorDraws, type VariantTimes } from '../racecourse/index.js';
import { reportName } from './boat-input.js';
import { type CourseArguments, readCourse, readWind } from './conditions.js';
import { UsageError } from './errors.js';
import { print, printRaw } from './output.js';
import { progressLine } from './progress.js';
import type { Task } from './tasks.js';
import { loadVariants, loadVaried } from './variant-input.js';
import { readWorkers, runAll } from './workers.js';

export interface CompareArguments extends CourseArguments {
  readonly boat: string;
  readonly variants: readonly string[];
  readonly wind: string | undefined;
  readonly draws: string;
  readonly seed: string;
  readonly workers: string | undefined;
  readonly out: string;
  readonly json: boolean;
}

/** Most variants and draws of one comparison. */
const MOST_VARIANTS = 40;
const MOST_DRAWS = 100_000;
/** Draws a worker does at a time. */
const CHUNK = 20;

export function readWhole(option: string, text: string, least: number, most: number): number {
  const n = Number(text.trim());
  if (!/^\d+$/.test(text.trim()) || n < least || n > most)
    throw new UsageError(`${option}: "${text}" is not a whole number from ${least} to ${most}`);
  return n;
}

/** Compares variants of a boat on a course: ranking, differences, crossovers, and how sure it is. */
export async function compareCommand(a: CompareArguments): Promise<void> {
  const course = readCourse(a);
  const wind = readWind(a.wind);
  const count = readWhole('--draws', a.draws, 0, MOST_DRAWS);
  const seed = readWhole('--seed', a.seed, 0, 2 ** 32 - 1);
  const workers = readWorkers(a.workers);
  const file = loadVaried(a.boat);
  const variants = loadVariants(file, a.variants);
  if (variants.length === 0)
    throw new UsageError(
      `${a.boat} has no variants; write some under variants:, or name files with differences or other boats`,
      'polarwright compare --help',
    );
  if (variants.length > MOST_VARIANTS)
    throw new UsageError(
      `${variants.length} variants; at most ${MOST_VARIANTS} are compared, a sweep takes more`,
    );
  const boats = [{ name: file.base.spec.name, boat: file.base, differences: [] }, ...variants];

  const sure = progressLine('polars', boats.length);
  const known = await runAll<VariantTimes>(
    boats.map(({ boat }): Task => ({ kind: 'times', spec: boat.spec, course, wind })),
    workers,
    sure.show,
  );
  sure.end();
  const draw = factorDraws(seed);
  const draws = Array.from({ length: count }, (_, i) => draw(i));
  const parts = Array.from({ length: Math.ceil(count / CHUNK) }, (_, i) =>
    draws.slice(i * CHUNK, (i + 1) * CHUNK).map((d) => d.factors),
  );
  const tasks = boats.flatMap(({ boat }, k) =>
    parts.map(
      (part): Task => ({
        kind: 'draws',
        spec: boat.spec,
        course,
        tws: wind.tws,
        known: { anchors: known[k]!.anchors, times: known[k]!.times },
        draws: part,
      }),
    ),
  );
  const bar = progressLine('draws', tasks.length);
  const drawn = await runAll<number[][]>(tasks, workers, bar.show);
  bar.end();
  const entrants = boats.map(
    ({ name }, k): Entrant => ({
      name,
      known: known[k]!,
      drawn: drawn.slice(k * parts.length, (k + 1) * parts.length).flat(),
    }),
  );
  const result = comparison(entrants, course, wind, { z: draws.map((d) => d.z), seed });
  const report = {
    comparison: result,
    boats: boats.map(({ name, boat, differences }) => ({ name, differences, warnings: boat.warnings })),
    polars: known.map((k) => k.polar),
  };
  if (a.json) {
    printRaw(comparisonJson(report));
    return;
  }
  const stem = fileStem(reportName(a.boat, file.base));
  const files = writeFiles(a.out, [
    { name: `${stem}-comparison.json`, content: comparisonJson(report) },
    { name: `${stem}-comparison.html`, content: comparisonPage(report) },
  ]);
  print(
    [comparisonText(report), '', cautionText(), '', `results  ${files[0]}`, `page     ${files[1]}`].join(
      '\n',
    ),
  );
}
