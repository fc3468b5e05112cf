import {
  apparentWind,
  charnockRoughness,
  logWindProfile,
  shearExponent,
  water,
} from '../../src/environment/index.js';
import { absolute, type OutsideCheck, relative } from './check.js';

const KNOT = 1852 / 3600;
const DEG = Math.PI / 180;

const EXAMPLES = [
  { tws: 6, boat: 4, twa: 45, aws: 9.28, awa: 27 },
  { tws: 12, boat: 7, twa: 30, aws: 18.4, awa: 18.9 },
  { tws: 25, boat: 25, twa: 145, aws: 15, awa: 72.5 },
];

const triangle = (e: (typeof EXAMPLES)[number]) =>
  apparentWind({ tws: e.tws * KNOT, twa: e.twa * DEG, speed: e.boat * KNOT, leeway: 0 });

export const checks: readonly OutsideCheck[] = [
  {
    source: 'printed examples in a sailing magazine',
    quantity: 'apparent wind speed',
    tolerance: 0.05,
    errorUnit: 'kn',
    note: 'printed to 0.01 and to 1 kn',
    run: () => EXAMPLES.map((e) => absolute(`${e.tws} kn, ${e.twa} deg`, e.aws, triangle(e).speed / KNOT)),
  },
  {
    source: 'printed examples in a sailing magazine',
    quantity: 'apparent wind angle',
    tolerance: 0.3,
    errorUnit: 'deg',
    note: 'printed to whole or tenth degrees',
    run: () => EXAMPLES.map((e) => absolute(`${e.tws} kn, ${e.twa} deg`, e.awa, triangle(e).angle / DEG)),
  },
  {
    source: 'exact: ln(z/z0) / ln(10/z0), z0 = 0.0002 m',
    quantity: 'wind at 2, 4, 6 m over 10 m',
    tolerance: 1e-4,
    errorUnit: '',
    run: () => {
      const p = logWindProfile(10, 0.0002);
      return [
        [2, 0.85125],
        [4, 0.91531],
        [6, 0.95279],
      ].map(([z, v]) => absolute(`${z} m`, v!, p.factor(z!)));
    },
  },
  {
    source: 'exact: 1 / ln(z/z0)',
    quantity: 'shear exponent at 10 and 5 m',
    tolerance: 1e-4,
    errorUnit: '',
    run: () => [
      absolute('10 m', 0.0924, shearExponent(10, 0.0002)),
      absolute('5 m', 0.0987, shearExponent(5, 0.0002)),
    ],
  },
  {
    source: 'Garratt 1977 (Charnock, a 0.0144, kappa 0.41)',
    quantity: 'roughness of the sea',
    tolerance: 0.01,
    errorUnit: 'relative',
    run: () =>
      [
        [4, 2.35e-5],
        [8, 1.237e-4],
        [12, 3.346e-4],
      ].map(([u, z0]) => relative(`U10 ${u} m/s`, z0!, charnockRoughness(u!))),
  },
  {
    source: 'ITTC 7.5-02-01-03, water at 15 deg C (from memory)',
    quantity: 'density',
    tolerance: 0.0005,
    errorUnit: 'relative',
    run: () => [
      relative('salt', 1026.02, water('salt', 15).density),
      relative('fresh', 999.1, water('fresh', 15).density),
    ],
  },
  {
    source: 'ITTC 7.5-02-01-03, water at 15 deg C (from memory)',
    quantity: 'kinematic viscosity',
    tolerance: 0.005,
    errorUnit: 'relative',
    run: () => [
      relative('salt', 1.1892e-6, water('salt', 15).kinematicViscosity),
      relative('fresh', 1.1386e-6, water('fresh', 15).kinematicViscosity),
    ],
  },
];
