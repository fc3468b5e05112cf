import { type FactorName, type ModelFactors, NO_FACTORS } from '../boat/index.js';
import { normalQuantile, sobolPoints } from '../numerics/index.js';

/** How uncertain one constant of the model is. */
export interface Spread {
  readonly factor: FactorName;
  readonly words: string;
  /** Standard deviation of the factor's logarithm: 0.05 is about 5 %. */
  readonly sigma: number;
  readonly source: string;
}

/** The constants common to all variants of a boat, and how far each may be off. */
export const SPREADS: readonly Spread[] = [
  {
    factor: 'residuary',
    words: 'residuary resistance of the hull',
    sigma: 0.06,
    source:
      'rms difference of the 1998 and 2008 Delft regressions over random hulls, 5.7 % (the accuracy table)',
  },
  {
    factor: 'friction',
    words: 'friction of the hull',
    sigma: 0.04,
    source: 'judgement: no form factor, a smooth hull assumed',
  },
  {
    factor: 'planing',
    words: 'resistance when planing',
    sigma: 0.1,
    source: 'judgement: a prismatic surface stands for a round-bilge hull',
  },
  {
    factor: 'sailLift',
    words: 'lift limit of the sail sections',
    sigma: 0.06,
    source: 'judgement, from the spread of published section tests',
  },
  {
    factor: 'sailNormal',
    words: 'force of sails in separated flow',
    sigma: 0.08,
    source: 'judgement: 1.1 to 1.45 is measured dead before the wind (from memory)',
  },
  { factor: 'sailDrag', words: 'drag of the sail sections', sigma: 0.2, source: 'judgement' },
  { factor: 'windage', words: 'windage', sigma: 0.2, source: 'judgement' },
  {
    factor: 'righting',
    words: 'righting moment of the hull',
    sigma: 0.05,
    source: 'judgement: heights of weights are seldom measured',
  },
  { factor: 'crewReach', words: 'outboard reach of the crew', sigma: 0.04, source: 'judgement' },
  {
    factor: 'foilInduced',
    words: 'induced drag of keel and rudder',
    sigma: 0.1,
    source: 'judgement; 16 % between two methods for one keel (the accuracy table)',
  },
  { factor: 'foilProfile', words: 'profile drag of keel and rudder', sigma: 0.1, source: 'judgement' },
  {
    factor: 'windShear',
    words: 'growth of the wind with height',
    sigma: 0.2,
    source: 'exponents of 0.09 to 0.14 over water: common practice, no source',
  },
];

/** Draws beyond so many standard deviations are brought back to there. */
const FARTHEST = 3;

/**
 * Draws of the factors: log-normal, median 1, from Sobol points. The same numbers for every variant, and a draw depends
 * on its number and the seed alone.
 */
export function factorDraws(
  seed: number,
  spreads: readonly Spread[] = SPREADS,
): (index: number) => { readonly factors: ModelFactors; readonly z: Float64Array } {
  const point = sobolPoints(spreads.length, seed);
  return (index) => {
    const z = point(index).map((p) => Math.min(FARTHEST, Math.max(-FARTHEST, normalQuantile(p))));
    const factors: Record<FactorName, number> = { ...NO_FACTORS };
    spreads.forEach((s, j) => {
      factors[s.factor] = Math.exp(s.sigma * z[j]!);
    });
    return { factors, z };
  };
}
