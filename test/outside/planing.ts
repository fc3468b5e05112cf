import {
  deadriseLift,
  frictionCoefficientSchoenherr,
  generateRoundBilge,
  HULL,
  type PlaningConditions,
  planingAt,
  planingEquilibrium,
  prepareHull,
} from '../../src/hull/index.js';
import { absolute, band, type OutsideCheck, relative } from './check.js';

/** The paper's worked example, in its units: lb, ft, s. */
const example: PlaningConditions = {
  weight: 60000,
  beam: 14,
  deadrise: 10,
  speed: 67.5,
  density: 1.94,
  kinematicViscosity: 1.28e-5,
  gravity: 32.2,
  friction: frictionCoefficientSchoenherr,
  allowance: 0.0004,
};

export const checks: readonly OutsideCheck[] = [
  {
    source: 'Savitsky 1964, worked example (from memory)',
    quantity: 'speed coefficient, lift, wetted length, friction at 2 deg',
    tolerance: 0.015,
    errorUnit: 'relative',
    run: () => {
      const s = planingAt(example, 2);
      return [
        relative('Cv', 3.18, s.cv),
        relative('CL deadrise', 0.069, deadriseLift(s.cl0, 10)),
        relative('CL0', 0.084, s.cl0),
        relative('lambda', 3.85, s.lambda),
        relative('friction', 7340, s.friction),
      ];
    },
  },
  {
    source: 'Savitsky 1964, worked example (from memory)',
    quantity: 'trim in equilibrium',
    tolerance: 0.1,
    errorUnit: 'deg',
    run: () => [absolute('trim', 2.3, planingEquilibrium(example, 29, 2, 4, 0.5).trim)],
  },
  {
    source: 'common practice, no source',
    quantity: 'R/W of a planing dinghy at 4, 5, 6, 7 m/s, between 0.09 and 0.17',
    tolerance: 0.02,
    errorUnit: '',
    note: 'a little above the band at 7 m/s: a round-bilge hull is taken as 25 % worse than a prism (judgement)',
    run: () => {
      const [lwl, bwl, tc, mass] = [3.8, 1.05, 0.12, 165];
      // The draft given is a little more than this weight needs; the hull finds its own.
      const lines = generateRoundBilge({
        lwl,
        bwl,
        canoeDraft: tc,
        cp: 0.56,
        cm: 0.7,
        cwp: 0.7,
        lcbAft: 0.035,
        freeboard: 0.35,
        beamMax: 1.4,
      });
      const x = -0.035 * lwl;
      const hull = prepareHull(
        lines,
        { mass, x, z: 0.35 },
        {
          water: { density: 1025, kinematicViscosity: 1.19e-6 },
          gravity: 9.80665,
          residuary: 'delft-2008',
          planing: true,
          centreReach: [x - 0.3, x + 0.2],
        },
      );
      const out = new Float64Array(HULL.count);
      return [4, 5, 6, 7].map((v) =>
        band(`${v} m/s`, [0.09, 0.17], hull.resistanceInto(v, 0, out) / (mass * 9.80665)),
      );
    },
  },
];
