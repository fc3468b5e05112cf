import type { Polar } from './types.js';

/** Which sail set is fastest at a wind and angle, and what the others would cost. */
export interface CrossoverCell {
  /** Number of the fastest set; -1 where none balances. */
  readonly fastest: number;
  /** Share of speed lost with each set instead, 0 for the fastest, NaN where it does not balance. */
  readonly lost: readonly number[];
}

/** Crossover chart: cells[i][j] at polar.tws[i], polar.twa[j], for polar.sets. */
export function crossover(polar: Polar): CrossoverCell[][] {
  return polar.tws.map((_, i) =>
    polar.twa.map((__, j) => {
      const speeds = polar.sets.map((s) => s.speed[i]![j]!);
      let fastest = -1;
      speeds.forEach((v, k) => {
        if (v > (fastest < 0 ? Number.NEGATIVE_INFINITY : speeds[fastest]!)) fastest = k;
      });
      const best = fastest < 0 ? Number.NaN : speeds[fastest]!;
      return { fastest, lost: speeds.map((v) => 1 - v / best) };
    }),
  );
}
