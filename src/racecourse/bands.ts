import { type Boat, boatWithFactors } from '../boat/index.js';
import { createSetSolvers, type SailingState, stateVector } from '../equilibrium/index.js';
import type { Polar } from '../polar/index.js';
import { quantile } from './certainty.js';
import { factorDraws } from './spreads.js';

/** How far the speed of one state may be off, as shares of it: a tenth of the draws lie beyond on either side. */
export interface SpeedBand {
  readonly twa: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Error bands of a polar: its states solved again under draws of the model's uncertain constants (see SPREADS), each from
 * where it was. What no constant stands for, waves and crew above all, is not in them.
 * @param draws how many; a draw in which a state finds no balance near is left out for it
 * @param every take every so-manieth angle
 * @returns bands[i] for polar.tws[i], by rising angle
 */
export function speedBands(boat: Boat, polar: Polar, draws: number, seed = 1, every = 2): SpeedBand[][] {
  const draw = factorDraws(seed);
  const chosen = polar.results.map((row) =>
    row
      .filter(
        (s, j): s is SailingState => s.status === 'balanced' && (j % every === 0 || j === row.length - 1),
      )
      .sort((a, b) => a.twa - b.twa)
      .map((state) => ({ state, ratios: [] as number[] })),
  );
  for (let k = 0; k < draws; k++) {
    const sets = createSetSolvers(boatWithFactors(boat, draw(k).factors));
    for (const row of chosen) {
      for (const { state, ratios } of row) {
        const set = sets.find((s) => s.sailSet.name === state.sailSet)!;
        const o = set.solver.tryFrom(state.tws, state.twa, [stateVector(state)], true);
        if (o.ok) ratios.push(o.speed / state.speed);
      }
    }
  }
  return chosen.map((row) =>
    row
      .filter(({ ratios }) => ratios.length >= 0.5 * draws && ratios.length > 1)
      .map(({ state, ratios }) => {
        const sorted = [...ratios].sort((a, b) => a - b);
        return { twa: state.twa, low: quantile(sorted, 0.1), high: quantile(sorted, 0.9) };
      }),
  );
}
