import { boatFacts, boatJson, boatText, fileStem, hullPlanPage, writeFiles } from '../publish/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { print, printRaw } from './output.js';

export interface CheckArguments {
  readonly boat: string;
  readonly json: boolean;
  /** Folder to write the drawings to; undefined: none are made. */
  readonly plot: string | undefined;
}

/** Reads a boat file and prints what follows from it: quantities, estimates, warnings; draws the hull when asked. */
export function checkCommand(a: CheckArguments): void {
  const boat = loadBoat(a.boat);
  const facts = boatFacts(boat);
  const files =
    a.plot === undefined
      ? []
      : writeFiles(a.plot, [
          { name: `${fileStem(reportName(a.boat, boat))}-hull.html`, content: hullPlanPage(boat) },
        ]);
  if (a.json) printRaw(boatJson(facts));
  else print([boatText(facts), ...files.map((f) => `\nhull drawings  ${f}`)].join('\n'));
}
