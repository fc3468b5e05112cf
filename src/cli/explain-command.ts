import { forceBalance, solveState } from '../equilibrium/index.js';
import {
  balanceJson,
  balanceText,
  boatFacts,
  cautionText,
  figures,
  fixed,
  TEXT_WIDTH,
  wrapped,
} from '../publish/index.js';
import { fromKnots, radians } from '../units/index.js';
import { loadBoat } from './boat-input.js';
import { readOne, WIND_ANGLES, WIND_SPEEDS } from './grid.js';
import { print, printRaw } from './output.js';

export interface ExplainArguments {
  readonly boat: string;
  readonly tws: string;
  readonly twa: string;
  readonly json: boolean;
}

/** Solves one state and prints every force and moment in it, or why there is no state. */
export function explainCommand(a: ExplainArguments): void {
  const wind = { tws: fromKnots(readOne(a.tws, WIND_SPEEDS)), twa: radians(readOne(a.twa, WIND_ANGLES)) };
  const boat = loadBoat(a.boat);
  const state = solveState(boat, wind);
  const facts = boatFacts(boat);
  if (state.status === 'unbalanced') {
    if (a.json) {
      printRaw(balanceJson(facts, state));
      return;
    }
    const f = figures(state);
    const text = `No balanced state in ${fixed(f.twsKn, 1)} kn at ${fixed(f.twaDeg, 1)} deg: ${state.why}. ${state.reason}`;
    print(wrapped(text, TEXT_WIDTH));
    return;
  }
  const balance = forceBalance(boat, state);
  if (a.json) printRaw(balanceJson(facts, state, balance));
  else print([balanceText(facts, balance), '', cautionText()].join('\n'));
}
