import { commonAngles, type SpeedTable } from '../polar/index.js';
import { fixed } from './numbers.js';
import { angleIn, speedIn, type TableFormat, unitSuffix } from './table-format.js';

/** A number without zeros at the end of its decimals. */
function short(value: number, decimals: number): string {
  const text = fixed(value, decimals);
  return text.includes('.') ? text.replace(/\.?0+$/, '') : text;
}

const heads = (f: TableFormat): [angle: string, wind: string, speed: string] => [
  `twa_${f.angleUnit}`,
  `tws_${unitSuffix(f.windUnit)}`,
  `boat_speed_${unitSuffix(f.speedUnit)}`,
];

/** Text of the corner cell where none is chosen: what runs down, what across, what stands in the cells. */
function corner(f: TableFormat): string {
  if (typeof f.header === 'string') return f.header;
  const [angle, wind, speed] = heads(f);
  return (f.layout === 'angles-down' ? [angle, wind, speed] : [wind, angle, speed]).join(':');
}

/**
 * A speed table as delimited text: the rectangle with angles down or across, or a list of points.
 * @throws RangeError when a rectangle is wanted of a table whose rows have different angles
 */
export function delimitedTable(table: SpeedTable, f: TableFormat): string {
  const mark = (text: string): string => text.replace('.', f.decimalMark);
  const wind = (tws: number): string => mark(short(speedIn(f.windUnit, tws), f.windDecimals));
  const angle = (twa: number): string => mark(short(angleIn(f.angleUnit, twa), f.angleDecimals));
  const speed = (v: number): string => mark(fixed(speedIn(f.speedUnit, v), f.decimals));
  const text = (lines: readonly (readonly string[])[]): string =>
    lines.map((cells) => cells.join(f.delimiter) + f.lineEnd).join('');
  if (f.layout === 'list') {
    const [a, w, s] = heads(f);
    const names = typeof f.header === 'object' ? f.header : [w, a, s];
    return text([
      names,
      ...table.rows.flatMap((r) => r.points.map((p) => [wind(r.tws), angle(p.twa), speed(p.speed)])),
    ]);
  }
  const angles = commonAngles(table);
  if (angles === undefined) throw new RangeError('a rectangle needs the same angles at every wind speed');
  if (f.layout === 'angles-across')
    return text([
      [corner(f), ...angles.map(angle)],
      ...table.rows.map((r) => [wind(r.tws), ...r.points.map((p) => speed(p.speed))]),
    ]);
  return text([
    [corner(f), ...table.rows.map((r) => wind(r.tws))],
    ...angles.map((a, j) => [angle(a), ...table.rows.map((r) => speed(r.points[j]!.speed))]),
  ]);
}
