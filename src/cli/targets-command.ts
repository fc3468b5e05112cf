import { defaultWindAngles, defaultWindSpeeds, predictPolar } from '../polar/index.js';
import {
  type CardPaper,
  cautionText,
  fileStem,
  percentCsv,
  type SpeedUnit,
  speedFrom,
  targetCard,
  targetsCardPage,
  targetsCsv,
  targetsJson,
  targetsText,
  writeFiles,
} from '../publish/index.js';
import { degrees, radians } from '../units/index.js';
import { loadBoat, reportName } from './boat-input.js';
import { readDecimals, readList, readOne, readPercent, WIND_ANGLES, windSpeedsIn } from './grid.js';
import { print, printRaw } from './output.js';

export interface TargetsArguments {
  readonly boat: string;
  readonly tws: string | undefined;
  readonly reach: string | undefined;
  readonly unit: SpeedUnit;
  readonly seaPercent: string | undefined;
  readonly crewPercent: string | undefined;
  readonly label: string | undefined;
  readonly paper: CardPaper;
  readonly decimals: string | undefined;
  readonly percents: boolean;
  readonly boatSpeed: string | undefined;
  readonly out: string;
  readonly json: boolean;
}

/** Reaching angles [deg] where none are asked for. */
const REACHES = [60, 75, 90, 105, 120, 135];
/** Wind speeds [m/s] of a card in m/s; a card in knots has the default grid. */
const METRIC_WINDS = [2, 3, 4, 5, 6, 8, 10, 12, 14];

/** Angles [rad], rising, none twice to a millionth of a degree. */
function joined(a: readonly number[], b: readonly number[]): number[] {
  const all = [...a, ...b].sort((x, y) => x - y);
  return all.filter((v, i) => i === 0 || v - all[i - 1]! > 1e-9);
}

/** Predicts the targets; prints them, writes tables and the cards for printing. */
export function targetsCommand(a: TargetsArguments): void {
  const allowed = windSpeedsIn(a.unit);
  const tws =
    a.tws !== undefined
      ? readList(a.tws, allowed).map((v) => speedFrom(a.unit, v))
      : a.unit === 'm/s'
        ? METRIC_WINDS
        : defaultWindSpeeds;
  const reach = a.reach === undefined ? REACHES : readList(a.reach, { ...WIND_ANGLES, option: '--reach' });
  const decimals = readDecimals(a.decimals) ?? 2;
  const share = (option: string, what: string, text: string | undefined) =>
    text === undefined ? [] : [{ what, share: readPercent(text, option) }];
  const shares = [
    ...share('--sea-percent', 'sea', a.seaPercent),
    ...share('--crew-percent', 'crew', a.crewPercent),
  ];
  const boatSpeed =
    a.boatSpeed === undefined
      ? undefined
      : speedFrom(a.unit, readOne(a.boatSpeed, windSpeedsIn(a.unit, '--boat-speed')));
  const boat = loadBoat(a.boat);
  const twa = joined(defaultWindAngles, reach.map(radians));
  const polar = predictPolar(boat, { tws, twa });
  const reachAngles = reach.map((d) => twa.find((t) => Math.abs(degrees(t) - d) < 1e-6)!);
  const card = targetCard(polar, { reachAngles, shares, label: a.label ?? '' });
  const style = { unit: a.unit, decimals };
  if (a.json) {
    printRaw(targetsJson(card, style));
    return;
  }
  const stem = fileStem(reportName(a.boat, boat));
  const files = writeFiles(a.out, [
    { name: `${stem}-targets.csv`, content: targetsCsv(card, style) },
    { name: `${stem}-percent.csv`, content: percentCsv(card, style) },
    { name: `${stem}-card-${a.paper.toLowerCase()}.html`, content: targetsCardPage(card, a.unit, a.paper) },
  ]);
  const what = ['targets', 'percents', 'cards'];
  print(
    [
      targetsText(card, style, { percents: a.percents, boatSpeed }),
      '',
      cautionText(),
      '',
      ...files.map((f, i) => `${what[i]!.padEnd(8)}  ${f}`),
    ].join('\n'),
  );
}
