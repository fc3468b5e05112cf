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
  for (let i = 1; i < rows.length; i++) {
    if (!(rows[i]!.twa > rows[i - 1]!.twa)) {
      complain(
        ['waves', 'added_resistance', String(i), 'twa'],
        'angles must rise from row to row',
        'sort the rows',
      );
      return undefined;
    }
  }
  return {
    height: w.height,
    fetch: w.fetch,
    twa: rows.map((r) => r.twa),
    coefficient: rows.map((r) => r.coefficient),
  };
}
