import { DEGREE } from '../units/index.js';
import { BesideError, partsBeside, type ReadBeside } from './beside.js';
import type { Estimator } from './estimator.js';
import type { BoatFileValue } from './schema.js';
import type { BoatSpec } from './types.js';

type Complain = (path: readonly string[], what: string, hint: string) => void;
interface Row {
  readonly awa: number;
  readonly lift: number;
  readonly drag: number;
  readonly height?: number | undefined;
}

/** Sail sets that the file gives by their coefficients. */
export function readMeasuredRigs(
  file: BoatFileValue,
  est: Estimator,
  complain: Complain,
  beside: ReadBeside,
  x: (aft: number) => number,
): BoatSpec['measuredRigs'] {
  return Object.entries(file.measured_rigs ?? {}).flatMap(([name, rig]) => {
    const path = ['measured_rigs', name];
    if ((rig.table === undefined) === (rig.rows === undefined)) {
      complain(
        path,
        rig.table === undefined ? 'neither table nor rows are given' : 'both table and rows are given',
        'give one of them',
      );
      return [];
    }
    let rows: readonly Row[];
    try {
      rows = rig.rows ?? rowsOf(rig.table!, beside);
    } catch (error) {
      if (!(error instanceof BesideError)) throw error;
      complain([...path, 'table'], `${rig.table}: ${error.message}`, error.hint);
      return [];
    }
    for (let i = 1; i < rows.length; i++) {
      if (rows[i]!.awa > rows[i - 1]!.awa) continue;
      complain(
        [...path, rig.table === undefined ? 'rows' : 'table'],
        `the angle of row ${i + 1} is not above the one before`,
        'sort the rows by apparent wind angle',
      );
      return [];
    }
    const effectiveHeight = est.pick(
      [...path, 'effective_height'],
      rig.effective_height,
      () => 1.1 * file.rig.mast_height,
    );
    const windage = est.pick([...path, 'windage'], rig.windage, () => 'left out' as const);
    return [
      {
        name,
        area: rig.area,
        awa: rows.map((r) => r.awa),
        lift: rows.map((r) => r.lift),
        drag: rows.map((r) => r.drag),
        height: rows.map((r) => r.height ?? rig.centre_height),
        x: x(rig.centre_aft_of_stem),
        effectiveHeight,
        windageIncluded: windage === 'included',
      },
    ];
  });
}

/** @throws BesideError with the line */
function rowsOf(name: string, beside: ReadBeside): Row[] {
  partsBeside(name);
  const text = new TextDecoder().decode(beside(name)).replace(/^\uFEFF/, '');
  const out: Row[] = [];
  let columns: Record<string, number> | undefined;
  text.split(/\r\n|\n|\r/).forEach((line, i) => {
    if (line.trim() === '' || line.startsWith('#')) return;
    const cells = line.split(/[;,\t]/).map((c) => c.trim());
    if (columns === undefined) {
      columns = {};
      for (const key of ['awa', 'lift', 'drag', 'height'])
        columns[key] = cells.findIndex((c) => c.toLowerCase() === key);
      for (const key of ['awa', 'lift', 'drag'])
        if (columns[key]! < 0)
          throw new BesideError(
            `line ${i + 1}: the header has no column ${key}`,
            'write awa,lift,drag,height',
          );
      return;
    }
    const at = columns;
    const number = (key: string, low: number, high: number): number => {
      const cell = cells[at[key]!] ?? '';
      const value = cell === '' ? Number.NaN : Number(cell);
      if (!(value >= low && value <= high))
        throw new BesideError(
          `line ${i + 1}: ${key} "${cell.slice(0, 40)}" is not a number from ${low} to ${high}`,
          'decimal points, no units; angles in degrees',
        );
      return value;
    };
    const row: Row = {
      awa: number('awa', 0, 180) * DEGREE,
      lift: number('lift', -1, 4),
      drag: number('drag', 0, 4),
    };
    out.push(at.height! >= 0 ? { ...row, height: number('height', 0.3, 60) } : row);
  });
  if (out.length < 3)
    throw new BesideError(`${out.length} rows found; three or more are needed`, 'write awa,lift,drag');
  return out;
}
