import { join } from 'node:path';
import { predictPolar } from '../polar/index.js';
import {
  cautionText,
  crossoverCsv,
  fileStem,
  polarCsv,
  polarJson,
  polarPage,
  polarReport,
  resistanceCsv,
  TEXT_WIDTH,
  targetTable,
  warningText,
  wrapped,
  writeFiles,
} from '../publish/index.js';
import { fromKnots, radians } from '../units/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { readDecimals, readList, WIND_ANGLES, WIND_SPEEDS } from './grid.js';
import { print, printRaw } from './output.js';

export interface PolarArguments {
  readonly boat: string;
  readonly tws: string | undefined;
  readonly twa: string | undefined;
  readonly out: string;
  readonly json: boolean;
  readonly quiet: boolean;
  readonly decimals: string | undefined;
}

/** Predicts the polar, writes its files, prints the targets. */
export function polarCommand(a: PolarArguments): void {
  const tws = a.tws === undefined ? undefined : readList(a.tws, WIND_SPEEDS).map(fromKnots);
  const twa = a.twa === undefined ? undefined : readList(a.twa, WIND_ANGLES).map(radians);
  const decimals = readDecimals(a.decimals);
  const boat = loadBoat(a.boat);
  const polar = predictPolar(boat, { ...(tws && { tws }), ...(twa && { twa }) });
  const report = polarReport(boat, polar);
  if (a.json) {
    printRaw(polarJson(report));
    return;
  }
  const stem = fileStem(reportName(a.boat, boat));
  const files = writeFiles(a.out, [
    { name: `${stem}-polar.csv`, content: polarCsv(report, decimals) },
    ...(polar.sets.length > 1
      ? [{ name: `${stem}-crossover.csv`, content: crossoverCsv(polar, decimals) }]
      : []),
    { name: `${stem}-resistance.csv`, content: resistanceCsv(report.resistance, decimals) },
    { name: `${stem}-results.json`, content: polarJson(report) },
    { name: `${stem}-page.html`, content: polarPage(report, decimals) },
  ]);
  if (a.quiet) return;
  const what = [
    'polar table',
    ...(polar.sets.length > 1 ? ['crossover'] : []),
    'resistance',
    'results',
    'page',
  ];
  const places = files.map((f, i) => `${what[i]!.padEnd(11)}  ${join(f)}`);
  const { warnings } = report.boat;
  const beyond = warnings.map((w) => wrapped(`- ${warningText(w)}`, TEXT_WIDTH, '  '));
  print(
    [
      targetTable(report, decimals),
      ...(beyond.length > 0 ? ['', 'Outside the range of a method', ...beyond] : []),
      '',
      cautionText(),
      '',
      ...places,
    ].join('\n'),
  );
}
