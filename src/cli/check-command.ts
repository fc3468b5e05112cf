import { boatFacts, boatJson, boatText } from '../publish/index.js';
import { loadBoat } from './boat-input.js';
import { print, printRaw } from './output.js';

/** Reads a boat file and prints what follows from it: quantities, estimates, warnings. */
export function checkCommand(a: { readonly boat: string; readonly json: boolean }): void {
  const facts = boatFacts(loadBoat(a.boat));
  if (a.json) printRaw(boatJson(facts));
  else print(boatText(facts));
}
