import {
  fileStem,
  sailCsv,
  sailPage,
  sailReport,
  sailReportJson,
  sailText,
  writeFiles,
} from '../publish/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { print, printRaw } from './output.js';

export interface SailsArguments {
  readonly boat: string;
  readonly json: boolean;
  /** Folder to write page and table to; undefined: nothing is written. */
  readonly out: string | undefined;
}

/** Prints coefficients and loading of every sail set; writes a page and a table when asked. */
export function sailsCommand(a: SailsArguments): void {
  const boat = loadBoat(a.boat);
  const report = sailReport(boat);
  const stem = fileStem(reportName(a.boat, boat));
  const files =
    a.out === undefined
      ? []
      : writeFiles(a.out, [
          { name: `${stem}-sails.html`, content: sailPage(report) },
          { name: `${stem}-sails.csv`, content: sailCsv(report) },
        ]);
  if (a.json) printRaw(sailReportJson(report));
  else print([sailText(report), ...files.map((f) => `\nwritten  ${f}`)].join('\n'));
}
