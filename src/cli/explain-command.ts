import { assembleBoat, type Boat } from '../boat/index.js';
import { forceBalance, type Held, type SailingResult, solveState } from '../equilibrium/index.js';
import {
  balanceJson,
  balancePage,
  balanceText,
  boatFacts,
  cautionText,
  figures,
  fileStem,
  fixed,
  heldText,
  TEXT_WIDTH,
  wrapped,
  writeFiles,
} from '../publish/index.js';
import { fromKnots, nearest, radians } from '../units/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { UsageError } from './errors.js';
import { CREW_MASS, readOne, SHARES, WIND_ANGLES, WIND_SPEEDS } from './grid.js';
import { print, printRaw } from './output.js';

export interface ExplainArguments {
  readonly boat: string;
  readonly tws: string;
  readonly twa: string;
  /** What is held instead of chosen. */
  readonly heel: string | undefined;
  readonly crew: string | undefined;
  readonly ease: string | undefined;
  readonly board: string | undefined;
  readonly sails: string | undefined;
  readonly crewMass: string | undefined;
  readonly out: string | undefined;
  readonly json: boolean;
}

function readHeld(a: ExplainArguments, boat: Boat): Held {
  const held: { -readonly [K in keyof Held]: Held[K] } = {};
  const limit = (boat.spec.limits.heel * 180) / Math.PI;
  if (a.heel !== undefined)
    held.heel = radians(
      readOne(a.heel, { ...WIND_ANGLES, option: '--heel', least: -15, most: Math.max(45, limit) }),
    );
  if (a.crew !== undefined) held.crewShare = readOne(a.crew, { ...SHARES, option: '--crew', least: -1 });
  if (a.ease !== undefined) held.ease = readOne(a.ease, { ...SHARES, option: '--ease', most: 0.95 });
  if (a.board !== undefined) {
    const [least, most] = boat.spec.boardRange;
    if (least === most) throw new UsageError('--board: this boat has a fixed keel');
    held.boardDown = readOne(a.board, { ...SHARES, option: '--board', least, most });
  }
  if (a.sails !== undefined) {
    const names = boat.sailSets.map((s) => s.name);
    if (!names.includes(a.sails)) {
      const near = nearest(a.sails, names);
      throw new UsageError(
        `--sails: there is no sail set "${a.sails}"; ${near === undefined ? `there are ${names.join(', ')}` : `did you mean "${near}"?`}`,
      );
    }
    held.sailSet = a.sails;
  }
  return held;
}

/** Solves one state and prints every force and moment in it, or why there is no state; with some of it held, what that costs. */
export function explainCommand(a: ExplainArguments): void {
  const wind = { tws: fromKnots(readOne(a.tws, WIND_SPEEDS)), twa: radians(readOne(a.twa, WIND_ANGLES)) };
  const own = loadBoat(a.boat);
  const held = readHeld(a, own);
  const crewMass = a.crewMass === undefined ? undefined : readOne(a.crewMass, CREW_MASS);
  const boat =
    crewMass === undefined
      ? own
      : assembleBoat({
          spec: { ...own.spec, crew: { ...own.spec.crew, mass: crewMass } },
          estimates: own.estimates,
        });
  const changed = crewMass !== undefined || Object.keys(held).length > 0;
  const state = solveState(boat, wind, held);
  const free: SailingResult | undefined = changed ? solveState(own, wind) : undefined;
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
  const files =
    a.out === undefined
      ? []
      : writeFiles(a.out, [
          {
            name: `${fileStem(reportName(a.boat, boat))}-balance.html`,
            content: balancePage(facts, balance),
          },
        ]);
  if (a.json) printRaw(balanceJson(facts, state, balance, free));
  else
    print(
      [
        balanceText(facts, balance),
        ...(free === undefined ? [] : ['', heldText(state, free)]),
        '',
        cautionText(),
        ...files.map((f) => `\nbalance  ${f}`),
      ].join('\n'),
    );
}
