import type { SailingResult } from '../equilibrium/index.js';
import type { SpeedTable } from './speed-table.js';

/** One point of a table beside the prediction at the same wind. SI and rad. */
export interface TableDifference {
  /** As the table quotes it. */
  readonly tws: number;
  readonly twa: number;
  readonly tableSpeed: number;
  readonly predicted: SailingResult;
  /** Table less prediction [m/s], and as a share of the prediction; undefined where no state balances. */
  readonly difference: number | undefined;
  readonly share: number | undefined;
}

/** Points of a table that ask for a prediction: at rest, or straight into the wind, there is nothing to compare. */
export function comparablePoints(table: SpeedTable): { tws: number[]; twa: number[] } {
  const rows = table.rows.filter((r) => r.tws > 0);
  const angles = new Set(rows.flatMap((r) => r.points.filter((p) => p.twa > 0).map((p) => p.twa)));
  return { tws: rows.map((r) => r.tws), twa: [...angles].sort((a, b) => a - b) };
}

/**
 * Every comparable point of a table beside the prediction.
 * @param predictedAt the prediction at the point's wind; the same wind at the boat's own reference height
 */
export function compareTable(
  table: SpeedTable,
  predictedAt: (tws: number, twa: number) => SailingResult,
): TableDifference[] {
  return table.rows
    .filter((r) => r.tws > 0)
    .flatMap((row) =>
      row.points
        .filter((p) => p.twa > 0)
        .map((p): TableDifference => {
          const predicted = predictedAt(row.tws, p.twa);
          const at = predicted.status === 'balanced' && predicted.speed > 0 ? predicted.speed : undefined;
          const difference = at === undefined ? undefined : p.speed - at;
          return {
            tws: row.tws,
            twa: p.twa,
            tableSpeed: p.speed,
            predicted,
            difference,
            share: at === undefined ? undefined : difference! / at,
          };
        }),
    );
}

/** Differences of one wind in three figures. */
export interface DifferenceSummary {
  readonly tws: number;
  /** Points compared, and points where the prediction has no state. */
  readonly count: number;
  readonly unbalanced: number;
  /** Mean and root mean square of the shares; undefined where nothing could be compared. */
  readonly mean: number | undefined;
  readonly rms: number | undefined;
  readonly largest: TableDifference | undefined;
}

/** Differences by wind speed; points without speed in the table (a no-go zone) are left out of the figures. */
export function summarise(differences: readonly TableDifference[]): DifferenceSummary[] {
  const winds = [...new Set(differences.map((d) => d.tws))];
  return winds.map((tws) => {
    const here = differences.filter((d) => d.tws === tws && d.tableSpeed > 0);
    const shares = here.filter((d) => d.share !== undefined);
    const n = shares.length;
    const sum = (f: (s: number) => number): number => shares.reduce((a, d) => a + f(d.share!), 0);
    return {
      tws,
      count: n,
      unbalanced: here.length - n,
      mean: n > 0 ? sum((s) => s) / n : undefined,
      rms: n > 0 ? Math.sqrt(sum((s) => s * s) / n) : undefined,
      largest: shares.reduce<TableDifference | undefined>(
        (w, d) => (w === undefined || Math.abs(d.share!) > Math.abs(w.share!) ? d : w),
        undefined,
      ),
    };
  });
}
