import { basename } from 'node:path';
import { comparablePoints, compareTable, predictPolar, summarise } from '../polar/index.js';
import {
  cautionText,
  differencesCsv,
  differencesText,
  fileStem,
  type ReadingNote,
  readingText,
  type SpeedUnit,
  tablePage,
  writeFiles,
} from '../publish/index.js';
import { parseQuantity, QuantityError } from '../units/index.js';
import { loadBoat } from './boat-input.js';
import { UsageError } from './errors.js';
import { print } from './output.js';
import { loadTable, type TableWords, tableHints } from './table-options.js';

export interface TableArguments extends TableWords {
  readonly table: string;
  readonly layout: string | undefined;
  /** Boat to predict for comparison; undefined: none. */
  readonly boat: string | undefined;
  /** Height above the water of the table's wind, as text; undefined: that of the boat file. */
  readonly windHeight: string | undefined;
  readonly out: string;
}

/** Most states that one comparison may ask for: a few minutes' work. */
const MOST_STATES = 8000;

function readHeight(text: string): number {
  try {
    const height = parseQuantity(text, 'length');
    if (height >= 0.5 && height <= 60) return height;
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error;
    throw new UsageError(`--wind-height: ${error.message}; ${error.hint}`);
  }
  throw new UsageError(`--wind-height: ${text} is outside 0.5 m to 60 m`);
}

/** Reads a table of boat speeds, says what it was taken for, plots it, and compares it with a boat's prediction. */
export function tableCommand(a: TableArguments): void {
  if (a.table === '-' && a.boat === '-')
    throw new UsageError('table and --boat cannot both be standard input');
  if (a.windHeight !== undefined && a.boat === undefined)
    throw new UsageError('--wind-height is for a comparison: name the boat with --boat');
  const reading = loadTable(a.table, tableHints(a, a.layout));
  const { table, format } = reading;
  const unit: SpeedUnit = format?.speedUnit ?? 'kn';
  const title = a.table === '-' ? 'Table from standard input' : basename(a.table);
  const stem = fileStem(a.table === '-' ? 'table' : title.replace(/\.[^.]+$/, ''), 'table');
  if (a.boat === undefined) {
    const files = writeFiles(a.out, [{ name: `${stem}-plot.html`, content: tablePage(title, table, unit) }]);
    print([readingText(title, table, reading.notes), '', `plot  ${files[0]}`].join('\n'));
    return;
  }
  const height = a.windHeight === undefined ? undefined : readHeight(a.windHeight);
  const boat = loadBoat(a.boat);
  // The wind the boat file speaks of, where the table's is quoted at another height.
  const factor = height === undefined ? 1 : boat.wind.factor(height);
  const { tws, twa } = comparablePoints(table);
  if (tws.length === 0 || twa.length === 0)
    throw new UsageError(`${title}: there is no wind above 0 and no angle above 0 to compare`);
  if (tws.length * twa.length > MOST_STATES)
    throw new UsageError(
      `${title}: ${tws.length} wind speeds by ${twa.length} angles are more than ${MOST_STATES} states to predict`,
    );
  const polar = predictPolar(boat, { tws: tws.map((v) => v / factor), twa });
  const wind = new Map(tws.map((v, i) => [v, i]));
  const angle = new Map(twa.map((v, j) => [v, j]));
  const differences = compareTable(table, (v, b) => polar.results[wind.get(v)!]![angle.get(b)!]!);
  const quoted = height ?? boat.wind.referenceHeight;
  const notes: ReadingNote[] = [
    ...reading.notes,
    {
      what: 'wind height',
      value: `${Number(quoted.toFixed(2))} m`,
      grounds: height === undefined ? 'taken from the boat file' : 'as given',
    },
  ];
  const files = writeFiles(a.out, [
    { name: `${stem}-differences.csv`, content: differencesCsv(differences, unit) },
    {
      name: `${stem}-plot.html`,
      content: tablePage(`${title} beside ${boat.spec.name}`, table, unit, differences),
    },
  ]);
  print(
    [
      readingText(title, table, notes),
      '',
      differencesText(summarise(differences), unit),
      '',
      cautionText(),
      '',
      `differences  ${files[0]}`,
      `plot         ${files[1]}`,
    ].join('\n'),
  );
}
