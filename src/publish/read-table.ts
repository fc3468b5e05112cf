import type { SpeedPoint, SpeedRow, SpeedTable } from '../polar/index.js';
import { fixed } from './numbers.js';
import { oneLine, shortened } from './plain-text.js';
import { type CellRow, decimalsIn, guessCells, isMissing, numberIn, TableFileError } from './read-cells.js';
import {
  type AngleUnit,
  angleFrom,
  DELIMITERS,
  type SpeedUnit,
  speedFrom,
  speedIn,
  type TableFormat,
  type TableLayout,
} from './table-format.js';

/** What the reader took a table for, and on what grounds. */
export interface ReadingNote {
  readonly what: string;
  readonly value: string;
  readonly grounds: string;
}

/** What is known of a table before it is read; the rest is guessed. */
export interface TableHints {
  readonly layout?: TableLayout | undefined;
  readonly delimiter?: string | undefined;
  readonly decimalMark?: '.' | ',' | undefined;
  readonly windUnit?: SpeedUnit | undefined;
  readonly speedUnit?: SpeedUnit | undefined;
  readonly angleUnit?: AngleUnit | undefined;
}

export interface TableReading {
  readonly table: SpeedTable;
  readonly notes: readonly ReadingNote[];
  /** The format a table that was delimited text would be written in again. */
  readonly format?: TableFormat;
}

/** Most wind speeds and angles of a table (judgement: twice what any router holds). */
const MOST_WINDS = 200;
const MOST_ANGLES = 400;
/** Highest wind and boat speed [m/s] that is taken for one. */
const HIGHEST = 60;

const GIVEN = 'as given';

const ANGLE_NAME = /twa|angle/i;
const WIND_NAME = /tws|wind/i;
const SPEED_NAME = /^(boat_?speed|speed|target)/i;

const shown = (text: string): string => `"${shortened(oneLine(text), 30)}"`;

/** The unit of speed a text names; undefined: none. */
function speedUnitIn(text: string): SpeedUnit | undefined {
  const t = text.toLowerCase();
  if (/(^|[^a-z])(kn|kts?|knots?)([^a-z]|$)/.test(t)) return 'kn';
  if (/km[/_]?h|kph/.test(t)) return 'km/h';
  return /(^|[^a-z])(m[/_]s|mps)([^a-z]|$)/.test(t) ? 'm/s' : undefined;
}

function angleUnitIn(text: string): AngleUnit | undefined {
  if (/(^|[^a-z])rad/i.test(text)) return 'rad';
  return /(^|[^a-z])deg|°/i.test(text) ? 'deg' : undefined;
}

/** True where values can only be angles in degrees: they go beyond any wind speed, and not beyond a circle. */
const looksLikeDegrees = (values: readonly number[]): boolean => {
  const most = Math.max(...values);
  return most >= 90 && most <= 360;
};
const looksLikeRadians = (values: readonly number[]): boolean => {
  const most = Math.max(...values);
  return most >= 1.2 && most <= 6.3 && values.some((v) => !Number.isInteger(v));
};

interface Cell {
  readonly wind: number;
  readonly angle: number;
  readonly speed: number | undefined;
  readonly line: number;
}

/** The figures of a table in the units of the file, with what its heads say. */
interface Figures {
  readonly layout: TableLayout;
  readonly cells: readonly Cell[];
  readonly winds: readonly number[];
  readonly angles: readonly number[];
  readonly heads: { readonly wind: string; readonly angle: string; readonly speed: string };
  readonly header: TableFormat['header'];
  readonly grounds: string;
  readonly texts: { readonly wind: string[]; readonly angle: string[]; readonly speed: string[] };
}

interface Source {
  readonly file: string;
  readonly rows: readonly CellRow[];
  readonly mark: '.' | ',';
}

function numberOr(s: Source, r: CellRow, column: number, what: string): number {
  const cell = r.cells[column] ?? '';
  const value = numberIn(cell, s.mark);
  if (value === undefined)
    throw new TableFileError(
      s.file,
      r.line,
      `column ${column + 1}: ${shown(cell)} is no number, where ${what} is wanted`,
      'if columns are taken apart wrongly, say --delimiter and --decimal-mark',
    );
  return value;
}

function speedOr(s: Source, r: CellRow, column: number): number | undefined {
  return isMissing(r.cells[column] ?? '') ? undefined : numberOr(s, r, column, 'a boat speed');
}

/** Which way a rectangle lies: by its axes' values, then by the words in its corner. */
function whichWay(
  s: Source,
  down: readonly number[],
  across: readonly number[],
  head: string,
): { layout: TableLayout; grounds: string } {
  const tests = [looksLikeDegrees, looksLikeRadians];
  for (const test of tests) {
    if (test(down) === test(across)) continue;
    const layout = test(down) ? 'angles-down' : 'angles-across';
    return {
      layout,
      grounds: `guessed: ${layout === 'angles-down' ? 'the first column' : 'the first row'} runs like angles`,
    };
  }
  const [a, w] = [head.search(ANGLE_NAME), head.search(WIND_NAME)];
  if (a >= 0 && w >= 0 && a !== w)
    return {
      layout: a < w ? 'angles-down' : 'angles-across',
      grounds: 'the order of the words in the corner',
    };
  throw new TableFileError(
    s.file,
    s.rows[0]?.line,
    'neither the first row nor the first column runs clearly like wind angles',
    'say --layout angles-down or --layout angles-across',
  );
}

function rectangle(s: Source, given: TableLayout | undefined): Figures {
  const [top, ...body] = s.rows as [CellRow, ...CellRow[]];
  for (const r of body)
    if (r.cells.length !== top.cells.length)
      throw new TableFileError(
        s.file,
        r.line,
        `${r.cells.length} columns, where the first row has ${top.cells.length}`,
        'every row of a rectangle has the same number of columns',
      );
  const acrossTexts = top.cells.slice(1);
  const across = acrossTexts.map((_, j) => numberOr(s, top, j + 1, 'a wind speed or angle of the first row'));
  const down = body.map((r) => numberOr(s, r, 0, 'a wind speed or angle of the first column'));
  const header = top.cells[0]!;
  const way = given === undefined ? whichWay(s, down, across, header) : { layout: given, grounds: GIVEN };
  const anglesDown = way.layout === 'angles-down';
  const cells = body.flatMap((r, i) =>
    across.map(
      (x, j): Cell => ({
        wind: anglesDown ? x : down[i]!,
        angle: anglesDown ? down[i]! : x,
        speed: speedOr(s, r, j + 1),
        line: r.line,
      }),
    ),
  );
  const downTexts = body.map((r) => r.cells[0]!);
  const [first, second, third] = header.split(':');
  const own = third !== undefined;
  return {
    layout: way.layout,
    cells,
    winds: anglesDown ? across : down,
    angles: anglesDown ? down : across,
    heads: own
      ? { angle: anglesDown ? first! : second!, wind: anglesDown ? second! : first!, speed: third }
      : { angle: header, wind: header, speed: header },
    header,
    grounds: way.grounds,
    texts: {
      wind: anglesDown ? acrossTexts : downTexts,
      angle: anglesDown ? downTexts : acrossTexts,
      speed: body.flatMap((r) => r.cells.slice(1)),
    },
  };
}

/** Columns of a list: by their heads, or by their values where it has none. */
function listColumns(s: Source): { wind: number; angle: number; speed: number; headed: boolean } {
  const top = s.rows[0]!;
  const headed = top.cells.some((c) => numberIn(c, s.mark) === undefined);
  if (headed) {
    const angle = top.cells.findIndex((c) => ANGLE_NAME.test(c));
    const wind = top.cells.findIndex((c, j) => j !== angle && WIND_NAME.test(c));
    const named = top.cells.findIndex((c, j) => j !== angle && j !== wind && SPEED_NAME.test(c));
    const speed = named < 0 && top.cells.length === 3 && angle >= 0 && wind >= 0 ? 3 - angle - wind : named;
    if (angle < 0 || wind < 0 || speed < 0)
      throw new TableFileError(
        s.file,
        top.line,
        `the heads ${shown(top.cells.join(', '))} do not name wind speed, wind angle and boat speed`,
        'call the columns tws, twa and boat_speed',
      );
    return { wind, angle, speed, headed };
  }
  const columns = [0, 1, 2].map((j) => s.rows.map((r) => numberIn(r.cells[j] ?? '', s.mark) ?? 0));
  const angle = columns.findIndex((c) => looksLikeDegrees(c));
  if (top.cells.length !== 3 || angle < 0)
    throw new TableFileError(
      s.file,
      top.line,
      'a list without heads needs three columns, wind speed, wind angle and boat speed',
      'give it a first line such as tws_kn,twa_deg,boat_speed_kn',
    );
  const [wind, speed] = [0, 1, 2].filter((j) => j !== angle) as [number, number];
  return { wind, angle, speed, headed };
}

function list(s: Source, grounds: string): Figures {
  const at = listColumns(s);
  const body = at.headed ? s.rows.slice(1) : s.rows;
  const cells = body.map(
    (r): Cell => ({
      wind: numberOr(s, r, at.wind, 'a wind speed'),
      angle: numberOr(s, r, at.angle, 'a wind angle'),
      speed: speedOr(s, r, at.speed),
      line: r.line,
    }),
  );
  const head = (j: number): string => (at.headed ? s.rows[0]!.cells[j]! : '');
  const texts = (j: number): string[] => body.map((r) => r.cells[j] ?? '');
  const plain = at.headed && s.rows[0]!.cells.length === 3 && at.wind === 0 && at.angle === 1;
  return {
    layout: 'list',
    cells,
    winds: cells.map((c) => c.wind),
    angles: cells.map((c) => c.angle),
    heads: { wind: head(at.wind), angle: head(at.angle), speed: head(at.speed) },
    header: plain ? [head(0), head(1), head(2)] : undefined,
    grounds,
    texts: { wind: texts(at.wind), angle: texts(at.angle), speed: texts(at.speed) },
  };
}

/** A list rather than a rectangle: its first row names columns, or its first column repeats itself. */
function looksLikeList(s: Source): boolean {
  const top = s.rows[0]!.cells;
  const words = top.filter((c) => numberIn(c, s.mark) === undefined && c !== '').length;
  if (words >= 2) return true;
  const first = s.rows.map((r) => r.cells[0]);
  return words === 0 && top.length === 3 && new Set(first).size < 0.7 * first.length;
}

/** Wind speeds in m/s that are whole knots, as tables made in knots and turned into m/s have them. */
function wholeKnots(winds: readonly number[]): boolean {
  const some = winds.filter((v) => v > 0);
  const whole = some.every((v) => Math.abs(speedIn('kn', v) - Math.round(speedIn('kn', v))) < 0.02);
  return some.length > 1 && whole && some.some((v) => Math.abs(2 * v - Math.round(2 * v)) > 0.02);
}

interface Guess<T> {
  readonly value: T;
  readonly grounds: string;
}

function guessUnits(
  f: Figures,
  hints: TableHints,
): { wind: Guess<SpeedUnit>; speed: Guess<SpeedUnit>; angle: Guess<AngleUnit> } {
  const windWord = speedUnitIn(f.heads.wind);
  const speedWord = speedUnitIn(f.heads.speed);
  const angleWord = angleUnitIn(f.heads.angle);
  const pick = <T>(given: T | undefined, word: T | undefined, otherwise: Guess<T>): Guess<T> => {
    if (given !== undefined) return { value: given, grounds: GIVEN };
    return word === undefined ? otherwise : { value: word, grounds: 'named in the table' };
  };
  const wind = pick<SpeedUnit>(
    hints.windUnit,
    windWord ?? speedWord,
    wholeKnots(f.winds)
      ? { value: 'm/s', grounds: 'guessed: the winds are whole knots in m/s' }
      : { value: 'kn', grounds: 'guessed: nothing says otherwise' },
  );
  return {
    wind,
    speed: pick<SpeedUnit>(hints.speedUnit, speedWord, {
      value: wind.value,
      grounds: 'guessed: as the wind',
    }),
    angle: pick<AngleUnit>(
      hints.angleUnit,
      angleWord,
      Math.max(...f.angles) > 6.3
        ? { value: 'deg', grounds: 'guessed: values beyond 6.3' }
        : { value: 'rad', grounds: 'guessed: no value beyond 6.3' },
    ),
  };
}

/** A reading checked and put in order: SI, rising winds and angles. Counts what was left out. */
function assembled(
  file: string,
  f: Figures,
  units: { wind: SpeedUnit; speed: SpeedUnit; angle: AngleUnit },
): { rows: SpeedRow[]; missing: number; otherTack: number } {
  const rows = new Map<number, Map<number, SpeedPoint>>();
  let missing = 0;
  let otherTack = 0;
  for (const c of f.cells) {
    const tws = speedFrom(units.wind, c.wind);
    const raw = angleFrom(units.angle, c.angle);
    if (!(tws >= 0 && tws <= HIGHEST))
      throw new TableFileError(
        file,
        c.line,
        `wind speed ${c.wind} ${units.wind} is outside 0 to ${fixed(speedIn(units.wind, HIGHEST), 0)} ${units.wind}`,
        'is the unit another one? say --wind-unit; do angles run the other way? say --layout',
      );
    if (raw < 0 || (raw > Math.PI * (1 + 1e-4) && raw <= 2 * Math.PI * (1 + 1e-4))) {
      otherTack++;
      continue;
    }
    if (raw > Math.PI * (1 + 1e-4))
      throw new TableFileError(
        file,
        c.line,
        `wind angle ${c.angle} ${units.angle} is outside a circle`,
        'is the unit another one? say --angle-unit; do angles run the other way? say --layout',
      );
    const twa = Math.min(raw, Math.PI);
    const row = rows.get(tws) ?? new Map<number, SpeedPoint>();
    rows.set(tws, row);
    if (c.speed === undefined) {
      missing++;
      continue;
    }
    const speed = speedFrom(units.speed, c.speed);
    if (!(speed >= 0 && speed <= HIGHEST))
      throw new TableFileError(
        file,
        c.line,
        `boat speed ${c.speed} ${units.speed} is outside 0 to ${fixed(speedIn(units.speed, HIGHEST), 0)} ${units.speed}`,
        'is the unit another one? say --speed-unit',
      );
    const before = row.get(twa);
    if (before !== undefined && before.speed !== speed)
      throw new TableFileError(
        file,
        c.line,
        `wind ${c.wind} ${units.wind} and angle ${c.angle} ${units.angle} come twice, with different speeds`,
        'every wind speed and every angle stands once',
      );
    row.set(twa, { twa, speed });
  }
  const sorted = [...rows.entries()]
    .sort(([a], [b]) => a - b)
    .map(([tws, points]): SpeedRow => ({ tws, points: [...points.values()].sort((a, b) => a.twa - b.twa) }));
  return { rows: sorted, missing, otherTack };
}

/** @throws TableFileError where a table is too large, or nothing is in it */
export function checkSize(file: string, rows: readonly SpeedRow[]): void {
  const points = rows.reduce((n, r) => n + r.points.length, 0);
  if (points === 0) throw new TableFileError(file, undefined, 'there is no boat speed in it', '');
  const angles = Math.max(...rows.map((r) => r.points.length));
  if (rows.length > MOST_WINDS || angles > MOST_ANGLES)
    throw new TableFileError(
      file,
      undefined,
      `${rows.length} wind speeds and ${angles} angles are more than ${MOST_WINDS} and ${MOST_ANGLES}`,
      '',
    );
}

/**
 * Reads a delimited table of boat speeds. What is not given is guessed, and every guess is told.
 * @param file its name, for messages
 * @throws TableFileError with file, line, value and what is allowed
 */
export function readDelimitedTable(text: string, file: string, hints: TableHints = {}): TableReading {
  const { delimiter, decimalMark, rows } = guessCells(text, hints);
  if (rows.length < 2 || rows[0]!.cells.length < 2)
    throw new TableFileError(
      file,
      rows[0]?.line,
      'this is no table: at least two rows and two columns are wanted',
      'if columns are not taken apart, say --delimiter',
    );
  const source: Source = { file, rows, mark: decimalMark };
  const isList = hints.layout === undefined ? looksLikeList(source) : hints.layout === 'list';
  const figures = isList
    ? list(source, hints.layout === undefined ? 'guessed: one point a line' : GIVEN)
    : rectangle(source, hints.layout);
  const units = guessUnits(figures, hints);
  const values = { wind: units.wind.value, speed: units.speed.value, angle: units.angle.value };
  const { rows: winds, missing, otherTack } = assembled(file, figures, values);
  checkSize(file, winds);
  const most = (texts: readonly string[]): number =>
    Math.max(...texts.map((t) => decimalsIn(t, decimalMark)));
  const name = Object.keys(DELIMITERS).find((k) => DELIMITERS[k] === delimiter) ?? shown(delimiter);
  const note = (what: string, value: string, grounds: string): ReadingNote => ({ what, value, grounds });
  const count = rows[0]!.cells.length;
  return {
    table: { name: '', windHeight: undefined, rows: winds },
    notes: [
      note('delimiter', name, hints.delimiter === undefined ? `guessed: ${count} columns` : GIVEN),
      note('decimal mark', decimalMark, hints.decimalMark === undefined ? 'guessed' : GIVEN),
      note('layout', figures.layout, figures.grounds),
      note('wind unit', units.wind.value, units.wind.grounds),
      note('boat speed unit', units.speed.value, units.speed.grounds),
      note('angle unit', units.angle.value, units.angle.grounds),
      ...(missing > 0 ? [note('empty cells', String(missing), 'left out')] : []),
      ...(otherTack > 0 ? [note('cells of the other tack', String(otherTack), 'left out')] : []),
    ],
    format: {
      layout: figures.layout,
      delimiter,
      decimalMark,
      lineEnd: text.includes('\r\n') ? '\r\n' : '\n',
      header: figures.header,
      windUnit: units.wind.value,
      speedUnit: units.speed.value,
      angleUnit: units.angle.value,
      decimals: most(figures.texts.speed),
      windDecimals: most(figures.texts.wind),
      angleDecimals: most(figures.texts.angle),
    },
  };
}
