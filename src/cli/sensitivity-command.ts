import {
  cautionText,
  fileStem,
  sensitivityJson,
  sensitivityPage,
  sensitivityText,
  writeFiles,
} from '../publish/index.js';
import { SENSITIVITY_LEGS, sensitivityPlan } from '../racecourse/index.js';
import { fromKnots } from '../units/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { UsageError } from './errors.js';
import { readList, WIND_SPEEDS } from './grid.js';
import { print, printRaw } from './output.js';
import { progressLine } from './progress.js';
import type { Task } from './tasks.js';
import { readWorkers, runAll } from './workers.js';

export interface SensitivityArguments {
  readonly boat: string;
  readonly wind: string;
  readonly step: string;
  readonly workers: string | undefined;
  readonly out: string;
  readonly json: boolean;
}

/** What a small change of each design quantity does to the time, upwind, reaching and downwind. */
export async function sensitivityCommand(a: SensitivityArguments): Promise<void> {
  const tws = readList(a.wind, { ...WIND_SPEEDS, option: '--wind' }).map(fromKnots);
  if (tws.length > 6) throw new UsageError(`--wind: ${tws.length} winds; at most 6 here`);
  const match = /^\s*(\d+\.?\d*|\.\d+)\s*%?\s*$/.exec(a.step);
  const step = match === null ? Number.NaN : Number(match[1]) / 100;
  if (!(step >= 0.001 && step <= 0.25))
    throw new UsageError(`--step: "${a.step}" is not a change of 0.1 % to 25 %`);
  const workers = readWorkers(a.workers);
  const boat = loadBoat(a.boat);
  const plan = sensitivityPlan(boat.spec, step);
  const bar = progressLine('boats', plan.boats.length);
  const times = await runAll<number[][] | undefined>(
    plan.boats.map((altered): Task => ({ kind: 'legs', altered, tws })),
    workers,
    bar.show,
  );
  bar.end();
  const report = {
    name: boat.spec.name,
    step,
    tws,
    legs: SENSITIVITY_LEGS,
    base: times[0]!,
    rows: plan.gather(times),
    warnings: boat.warnings,
  };
  if (a.json) {
    printRaw(sensitivityJson(report));
    return;
  }
  const stem = fileStem(reportName(a.boat, boat));
  const files = writeFiles(a.out, [
    { name: `${stem}-sensitivity.json`, content: sensitivityJson(report) },
    { name: `${stem}-sensitivity.html`, content: sensitivityPage(report) },
  ]);
  print(
    [sensitivityText(report), '', cautionText(), '', `results  ${files[0]}`, `page     ${files[1]}`].join(
      '\n',
    ),
  );
}
