import type { BoatFileValue } from './schema.js';
import type { WavesSpec } from './types.js';

type Complain = (path: readonly string[], what: string, hint: string) => void;

/** The sea and what it costs, as the file gives them; undefined where it says nothing: flat water. */
export function readWaves(file: BoatFileValue, complain: Complain): WavesSpec | undefined {
  const w = file.waves;
  if (w === undefined) return undefined;
  if ((w.height === undefined) === (w.fetch === undefined)) {
    complain(['waves'], 'the sea needs either height or fetch', 'give one of the two');
    return undefined;
  }
  const rows = w.added_resistance;
  const timed = rows.filter((r) => r.period !== undefined).length;
  if (timed > 0 && timed < rows.length) {
    complain(
      ['waves', 'added_resistance'],
      'only some rows have a period',
      'give it for all rows or for none',
    );
    return undefined;
  }
  if (timed > 0 && w.height !== undefined && w.period === undefined) {
    complain(['waves'], 'the figures are by period, but the sea has none', 'give the period of the sea');
    return undefined;
  }
  const tables: { period: number | undefined; twa: number[]; coefficient: number[] }[] = [];
  for (const [i, row] of rows.entries()) {
    const last = tables[tables.length - 1];
    if (last === undefined || (row.period !== undefined && row.period > last.period!)) {
      tables.push({ period: row.period, twa: [row.twa], coefficient: [row.coefficient] });
      continue;
    }
    if (row.period !== last.period || !(row.twa > last.twa[last.twa.length - 1]!)) {
      complain(
        ['waves', 'added_resistance', `[${i + 1}]`, row.period !== last.period ? 'period' : 'twa'],
        row.period !== last.period
          ? 'periods must not fall from row to row'
          : 'angles must rise from row to row',
        'sort the rows by period, then by angle',
      );
      return undefined;
    }
    last.twa.push(row.twa);
    last.coefficient.push(row.coefficient);
  }
  return { height: w.height, fetch: w.fetch, period: w.period, tables };
}
