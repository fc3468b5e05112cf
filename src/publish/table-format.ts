import { degrees, fromKnots, radians, toKnots } from '../units/index.js';

/** Units of wind and boat speeds in tables. */
export type SpeedUnit = 'kn' | 'm/s' | 'km/h';
export type AngleUnit = 'deg' | 'rad';
/** Where the angles stand: down the first column, across the first row, or one point a line. */
export type TableLayout = 'angles-down' | 'angles-across' | 'list';

export const SPEED_UNITS: readonly SpeedUnit[] = ['kn', 'm/s', 'km/h'];
export const ANGLE_UNITS: readonly AngleUnit[] = ['deg', 'rad'];
export const LAYOUTS: readonly TableLayout[] = ['angles-down', 'angles-across', 'list'];

/** Everything about a delimited table but its figures. */
export interface TableFormat {
  readonly layout: TableLayout;
  /** One character; a blank stands for any run of blanks when reading. */
  readonly delimiter: string;
  readonly decimalMark: '.' | ',';
  readonly lineEnd: '\n' | '\r\n';
  /** Text of the corner cell, or of a list's three heads; left out: names and units of what is in the table. */
  readonly header?: string | readonly [string, string, string] | undefined;
  readonly windUnit: SpeedUnit;
  readonly speedUnit: SpeedUnit;
  readonly angleUnit: AngleUnit;
  /** Decimals of boat speeds. */
  readonly decimals: number;
  /** Most decimals of wind speeds and of angles; zeros at the end are dropped. */
  readonly windDecimals: number;
  readonly angleDecimals: number;
}

const COMMA: TableFormat = {
  layout: 'angles-down',
  delimiter: ',',
  decimalMark: '.',
  lineEnd: '\r\n',
  windUnit: 'kn',
  speedUnit: 'kn',
  angleUnit: 'deg',
  decimals: 2,
  windDecimals: 2,
  angleDecimals: 1,
};

/** Formats to start from, named after their shape. */
export const TABLE_PRESETS: Readonly<Record<string, TableFormat>> = {
  'angles-down': COMMA,
  'angles-down-tab': { ...COMMA, delimiter: '\t' },
  'angles-down-semicolon': { ...COMMA, delimiter: ';', decimalMark: ',' },
  'angles-across': { ...COMMA, layout: 'angles-across' },
  'angles-across-tab': { ...COMMA, layout: 'angles-across', delimiter: '\t' },
  list: { ...COMMA, layout: 'list' },
};

/** Names of delimiters on the command line and in messages. */
export const DELIMITERS: Readonly<Record<string, string>> = {
  comma: ',',
  semicolon: ';',
  tab: '\t',
  bar: '|',
  blank: ' ',
};

const PER_METRE_PER_SECOND: Readonly<Record<SpeedUnit, (v: number) => number>> = {
  kn: toKnots,
  'm/s': (v) => v,
  'km/h': (v) => v * 3.6,
};
const TO_METRES_PER_SECOND: Readonly<Record<SpeedUnit, (v: number) => number>> = {
  kn: fromKnots,
  'm/s': (v) => v,
  'km/h': (v) => v / 3.6,
};

/** A speed [m/s] in a unit, and back. */
export const speedIn = (unit: SpeedUnit, metresPerSecond: number): number =>
  PER_METRE_PER_SECOND[unit](metresPerSecond);
export const speedFrom = (unit: SpeedUnit, value: number): number => TO_METRES_PER_SECOND[unit](value);
/** An angle [rad] in a unit, and back. */
export const angleIn = (unit: AngleUnit, rad: number): number => (unit === 'deg' ? degrees(rad) : rad);
export const angleFrom = (unit: AngleUnit, value: number): number =>
  unit === 'deg' ? radians(value) : value;

/** A unit as part of a name: `tws_kn`, `tws_m_s`. */
export const unitSuffix = (unit: SpeedUnit): string => unit.replace('/', '_');

/** A wind speed [m/s] and an angle [rad] as exactly the values that a table of this format prints. */
export const printedWind = (f: TableFormat, tws: number): number =>
  speedFrom(f.windUnit, Number(speedIn(f.windUnit, tws).toFixed(f.windDecimals)));
export const printedAngle = (f: TableFormat, twa: number): number =>
  Math.min(Math.PI, angleFrom(f.angleUnit, Number(angleIn(f.angleUnit, twa).toFixed(f.angleDecimals))));
